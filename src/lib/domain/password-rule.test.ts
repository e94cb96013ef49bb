import { describe, expect, test } from "vitest"
import { passwordIssue } from "./password-rule"

describe("passwordIssue", () => {
  test.each(["", "short", "fourteen chars"])("asks for 15 characters: %j", (password) =>
    expect(passwordIssue(password)).toMatch(/at least 15/),
  )
  test("refuses more than 200 characters", () =>
    expect(passwordIssue("abcdefg hijklmn ".repeat(20))).toMatch(/at most 200/))
  test.each([
    "passwordpassword",
    "Password123456789",
    "P4ssw0rd-P4ssw0rd",
    "qwertyuiop123456",
    "1234567890123456",
    "aaaaaaaaaaaaaaaaaa",
    "xyzzyxyzzyxyzzyxyzzy",
    "correct horse battery staple",
    "Welcome2024welcome2025",
    "iloveyou iloveyou",
  ])("refuses the common %j", (password) => expect(passwordIssue(password)).not.toBeNull())
  test("refuses one's own name and address with digits", () => {
    expect(passwordIssue("ilse.brandvold1984", ["Ilse Brandvold", "ilse@example.org"])).not.toBeNull()
    expect(passwordIssue("ilse.brandvold1984")).toBeNull()
  })
  test.each(["slow decay of a driven gas", "tümpel unter dem eis", "K7#mQz!vR2pLx9wT"])(
    "takes %j without rules of composition",
    (password) => expect(passwordIssue(password)).toBeNull(),
  )
})
