import { expect, test } from "vitest"
import { csvLine, csvText } from "./csv"

test("cells with commas, quotes and line ends are quoted (RFC 4180, section 2, rules 5 to 7)", () => {
  expect(csvLine(["a", "b,c", 'd"e', "f\ng"])).toBe('a,"b,c","d""e","f\ng"\r\n')
})

test("numbers keep every digit, what is missing is empty", () => {
  expect(csvLine([0.1 + 0.2, -1e-300, null, undefined, 0])).toBe("0.30000000000000004,-1e-300,,,0\r\n")
})

test("no spreadsheet runs what somebody wrote", () => {
  expect(["=1+1", "+1", "-1", "@x", "a=1"].map(csvText)).toEqual(["'=1+1", "'+1", "'-1", "'@x", "a=1"])
})
