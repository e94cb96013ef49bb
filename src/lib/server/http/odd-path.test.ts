import { expect, test } from "vitest"
import { isOddPath } from "./odd-path"

test.each([
  "/",
  "/api/v1/me",
  "/a/b?next=//evil.example",
  "/a#//",
  "http://host/a/b",
  "http://host",
  "/.well-known/x",
])("%s is plain", (url) => expect(isOddPath(url)).toBe(false))
test.each([
  "//admin",
  "http://host//admin",
  "/\\admin",
  "/a%2Fb",
  "/a%5cb",
  "/%2e%2e/a",
  "/a/../b",
  "/a/.",
  "/a%00",
  "/a%252fb",
])("%s is odd", (url) => expect(isOddPath(url)).toBe(true))
