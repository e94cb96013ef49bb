import { describe, expect, test } from "vitest"
import { type Cell, readCell } from "./read-cell"

const point = { decimal: "." } as const
const comma = { decimal: "," } as const
const number = (value: number, extra: object = {}): Cell => ({ kind: "number", value, ...extra })
const bad = (code: string) => ({ kind: "bad", code })

// Forms and codes: docs/intake.md, Cells. Values: the language's own decimal literals, or exact powers of two.
test.each<[string, unknown]>([
  ["1", number(1)],
  ["+1.8", number(1.8)],
  [".27e1", number(2.7)],
  ["5.", number(5)],
  ["-0", number(-0)],
  ["1.5D-3", number(1.5e-3, { note: "fortran-exponent" })],
  ["1.5q2", number(150, { note: "fortran-exponent" })],
  ["0.1234567-120", number(0.1234567e-120, { note: "missing-exponent-letter" })],
  ["1.0+100", number(1e100, { note: "missing-exponent-letter" })],
  ["********", bad("overflow-stars")],
  ["0x1.8p+1", number(3, { note: "hex-float" })],
  ["-0x.8P1", number(-1, { note: "hex-float" })],
  ["0x1p-1074", number(5e-324, { note: "hex-float" })],
  ["0x1F", bad("not-a-number")],
  ["0x1p-1075", bad("not-a-number")],
  ["0b1", bad("not-a-number")],
  ["1_000", bad("not-a-number")],
  ["1.6e", bad("not-a-number")],
  ["1e", bad("not-a-number")],
  ["Infinity1", bad("not-a-number")],
  ["NaN", number(NaN)],
  ["-nan", number(NaN)],
  ["nan(0x8)", number(NaN)],
  ["-1.#IND", number(NaN)],
  ["1.#QNAN", number(NaN)],
  ["inf", number(Infinity)],
  ["-Infinity", number(-Infinity)],
  ["1.#INF", number(Infinity)],
  ["", { kind: "missing", word: "" }],
  ["NA", { kind: "missing", word: "NA" }],
  ["--", { kind: "missing", word: "--" }],
  ["None", { kind: "missing", word: "None" }],
  ["1,234,567.8", bad("thousands-separator")],
  ["1 234 567", bad("thousands-separator")],
  ["1'234", bad("thousands-separator")],
  ["1,5", bad("thousands-separator")],
  ["12345678901234567890", number(12345678901234567000, { code: "integer-precision" })],
  ["9007199254740992", number(9007199254740992)],
  ["9007199254740993", number(9007199254740992, { code: "integer-precision" })],
  ["1.234567890123456789", number(1.234567890123456789, { note: "digits-beyond-double" })],
  ["0.00000000000000000001", number(1e-20)],
  ["1e400", bad("overflow")],
  ["-1e400", bad("overflow")],
  ["1e-400", bad("underflow")],
  ["0e-400", number(0)],
  ["\u22121.5", number(-1.5, { note: "unicode-minus" })],
  ["(1+2j)", { kind: "complex", re: 1, im: 2 }],
  ["1+2i", { kind: "complex", re: 1, im: 2 }],
  ["1-2*I", { kind: "complex", re: 1, im: -2 }],
  ["(1.0e+00+-2e0j)", { kind: "complex", re: 1, im: -2 }],
  ["(1.5, -2)", { kind: "complex", re: 1.5, im: -2 }],
  ["T", { kind: "boolean", value: 1 }],
  [".false.", { kind: "boolean", value: 0 }],
  ["2026-01-02T03:04:05.678901Z", { kind: "datetime" }],
  ["2026-13-02", bad("not-a-number")],
  ["=1+2", bad("not-a-number")],
])("a point cell %s", (text, expected) => {
  expect(readCell(text, point)).toEqual(expected)
})

describe("a decimal comma", () => {
  test.each<[string, unknown]>([
    ["-0,8709", number(-0.8709)],
    ["9,226e-07", number(9.226e-7)],
    ["3", number(3)],
    ["1.5", bad("thousands-separator")],
    ["1.234,5", bad("thousands-separator")],
    ["1,", bad("not-a-number")],
    ["1,2,3", bad("not-a-number")],
  ])("%s", (text, expected) => expect(readCell(text, comma)).toEqual(expected))
})

describe("digit groups, once the user has named their mark", () => {
  test.each<[string, string, string, unknown]>([
    ["1,234,567.8", ".", ",", number(1234567.8)],
    ["1,000,000", ".", ",", number(1e6)],
    ["12,34", ".", ",", bad("thousands-separator")],
    ["1 234 567", ".", " ", number(1234567)],
    ["1'234.5", ".", "'", number(1234.5)],
    ["1.234,5", ",", ".", number(1234.5)],
    ["125000", ".", ",", number(125000)],
  ])("%s", (text, decimal, thousands, expected) => {
    expect(readCell(text, { decimal, thousands } as never)).toEqual(expected)
  })
})
