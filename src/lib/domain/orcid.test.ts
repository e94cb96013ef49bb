import { describe, expect, test } from "vitest"
import { isOrcid } from "./orcid"

// Identifiers published by ORCID as examples of the check digit; the last one is the first with a wrong digit.
describe("isOrcid", () => {
  test.each(["0000-0002-1825-0097", "0000-0002-1694-233X"])("takes %s", (text) =>
    expect(isOrcid(text)).toBe(true),
  )
  test.each(["0000-0002-1825-0098", "0000-0002-1694-2330", "0000000218250097", "0000-0002-1825-009x", ""])(
    "refuses %j",
    (text) => expect(isOrcid(text)).toBe(false),
  )
})
