import { describe, expect, test } from "vitest"
import fc from "fast-check"
import { scan, scanDouble } from "./scan-double"

const encoder = new TextEncoder()

/** Compares bits: Object.is tells -0 from 0 and takes NaN for NaN. */
function expectSame(text: string) {
  const bytes = encoder.encode(text)
  const value = scanDouble(bytes, 0, bytes.length)
  if (!Object.is(value, Number(text)) || scan.end !== bytes.length)
    expect({ text, value, end: scan.end }).toEqual({ text, value: Number(text), end: bytes.length })
}

/** Doubles with every bit pattern equally likely: all exponents, subnormals included. */
const anyDouble = fc.bigInt({ min: 0n, max: (1n << 64n) - 1n }).map((bits) => {
  const view = new DataView(new ArrayBuffer(8))
  view.setBigUint64(0, bits)
  return view.getFloat64(0)
})
const finite = anyDouble.filter(Number.isFinite)

/** The exact decimal expansion of the point half way between two neighbouring doubles. */
function halfway(value: number): string {
  const view = new DataView(new ArrayBuffer(8))
  view.setFloat64(0, Math.abs(value))
  const bits = view.getBigUint64(0)
  const raw = Number(bits >> 52n)
  const mantissa = raw === 0 ? bits : (bits & 0xfffffffffffffn) | (1n << 52n)
  const binary = (raw === 0 ? -1074 : raw - 1075) - 1
  const odd = 2n * mantissa + 1n
  return binary >= 0 ? `${odd << BigInt(binary)}` : `${odd * 5n ** BigInt(-binary)}e${binary}`
}

// The reference is the language's own Number(text), which ECMA-262 (StringToNumber) defines as the nearest double.
describe("scanDouble equals Number(text) bit for bit", () => {
  test("for the shortest text of every kind of double", () => {
    fc.assert(
      fc.property(finite, (value) => expectSame(String(value))),
      { numRuns: 20_000 },
    )
  })
  test("for doubles printed with 1 to 20 digits", () => {
    fc.assert(
      fc.property(finite, fc.integer({ min: 0, max: 20 }), (value, digits) =>
        expectSame(value.toExponential(digits)),
      ),
      { numRuns: 20_000 },
    )
  })
  test("for random digits, marks and exponents", () => {
    const number = fc.stringMatching(/^[+-]?(\d{1,25}\.?\d{0,25}|\.\d{1,25})([eE][+-]?\d{1,4})?$/)
    fc.assert(fc.property(number, expectSame), { numRuns: 20_000 })
  })
  test("for exact half-way cases, a digit beyond them and a digit short of them", () => {
    fc.assert(
      fc.property(finite, (value) => {
        const [digits, exponent = "0"] = halfway(value).split("e")
        expectSame(`${digits}e${exponent}`)
        expectSame(`${digits}1e${Number(exponent) - 1}`)
        expectSame(`${BigInt(digits!) - 1n}e${exponent}`)
      }),
      { numRuns: 500 },
    )
  })
  test.each([
    "0",
    "-0",
    "-0.0e5",
    ".5",
    "5.",
    "+1.8",
    "9007199254740993",
    "9007199254740992.5",
    "2.2250738585072011e-308",
    "4.9406564584124654e-324",
    "2.4703282292062327e-324",
    "1.7976931348623158e308",
    "1.7976931348623159e308",
    "1e400",
    "1e-400",
    "0.000000000000000000000000000000000000001234567890123456789e39",
    "1e99999999999",
    "-1e-99999999999",
  ])("for %s", expectSame)
})

describe("scanDouble stops", () => {
  const at = (text: string, mark?: number) => {
    const bytes = encoder.encode(text)
    const value = scanDouble(bytes, 0, bytes.length, mark)
    return { value, end: scan.end }
  }
  test("before an exponent letter without digits", () => {
    expect(at("1.6e")).toEqual({ value: 1.6, end: 3 })
    expect(at("1.6e+")).toEqual({ value: 1.6, end: 3 })
  })
  test("at once when there is no digit", () => {
    for (const text of ["", "-", ".", "+.", "e5", "abc"]) expect(at(text).end).toBe(0)
  })
  test("at a second mark, a letter or an underscore", () => {
    expect(at("1.2.3")).toEqual({ value: 1.2, end: 3 })
    expect(at("0x1F")).toEqual({ value: 0, end: 1 })
    expect(at("1_000")).toEqual({ value: 1, end: 1 })
  })
  test("and takes a comma as decimal mark when told so", () => {
    expect(at("-0,8709", 44)).toEqual({ value: -0.8709, end: 7 })
    expect(at("1,00000000000000000000000000001e-3;", 44)).toEqual({ value: 1e-3, end: 34 })
  })
})
