import { expect, test } from "vitest"
import { announcedFileName, announcedSha256, plainFileName } from "./upload-headers"

const disposition = (value: string) => announcedFileName(new Headers({ "content-disposition": value }))
const digest = (value: string) => announcedSha256(new Headers({ "content-digest": value }))

test("the file name of a Content-Disposition", () => {
  expect(disposition('attachment; filename="run 1.csv"')).toBe("run 1.csv")
  expect(disposition('attachment; filename="say \\"a\\".csv"')).toBe('say "a".csv')
  expect(disposition("attachment; filename=run.csv; size=3")).toBe("run.csv")
  // RFC 6266, section 5, last example: the extended form wins.
  expect(disposition("attachment; filename=\"EURO rates\"; filename*=utf-8''%e2%82%ac%20rates")).toBe(
    "€ rates",
  )
  expect(disposition("attachment")).toBeUndefined()
  expect(() => disposition("attachment; filename*=UTF-8''%ff")).toThrow(/invalid-request/)
})

test("folders and control characters of a file name are left out", () => {
  expect(plainFileName("../../etc/passwd")).toBe("passwd")
  expect(plainFileName("C:\\data\\run.csv")).toBe("run.csv")
  expect(plainFileName("a\u0000b\n.csv")).toBe("ab.csv")
  expect(plainFileName("folder/")).toBeUndefined()
})

test("the checksum of a Content-Digest", () => {
  // RFC 9530, appendix B.1.
  const example = "RK/0qy18MlBSVnWgjwz6lZEWjP/lF5HF9bvEF8FabDg="
  expect(digest(`sha-256=:${example}:`)?.toString("base64")).toBe(example)
  expect(digest(`sha-512=:YQ==:, sha-256=:${example}:`)?.toString("base64")).toBe(example)
  expect(announcedSha256(new Headers())).toBeNull()
  for (const bad of ["sha-512=:YQ==:", "sha-256=:YQ==:", "md5=:xxx:"])
    expect(() => digest(bad)).toThrow(/invalid-request/)
})
