import fc from "fast-check"
import { readFileSync } from "node:fs"
import { describe, expect, test } from "vitest"
import { writeAsymmetric, writeQuantity } from "./rounding"

interface Reference {
  symmetric: { value: number; u: number; text: string }[]
  asymmetric: { value: number; plus: number; minus: number; text: string }[]
}
// Made with Python's decimal module from the PDG rule; tests/reference/data/scipy/rounding.json says how.
const reference = JSON.parse(
  readFileSync(new URL("../../../tests/reference/data/scipy/rounding.json", import.meta.url), "utf8"),
) as Reference

describe("rounding to the uncertainty", () => {
  test.each(reference.symmetric)("$value ± $u is $text", ({ value, u, text }) => {
    expect(writeQuantity(value, u, { scientific: false }).text).toBe(text)
  })
  test.each(reference.asymmetric)("$value + $plus - $minus is $text", ({ value, plus, minus, text }) => {
    expect(writeAsymmetric(value, plus, minus).text).toBe(text)
  })
  test("small values in scientific form (docs/methods.md, rounding)", () => {
    expect(writeQuantity(1e-7, 2.34e-9).text).toBe("1.000(23)e-7")
  })
  test("no usable uncertainty, no bracket", () => {
    expect(writeQuantity(0.5, 0).text).toBe("0.5")
    expect(writeQuantity(0.5, null).text).toBe("0.5")
    expect(writeQuantity(0.5, Number.NaN).text).toBe("0.5")
  })

  test("property: what is read back differs by at most half a unit of the last place", () => {
    const values = fc.double({ min: -1e5, max: 1e5, noNaN: true })
    const errors = fc.double({ min: 1e-9, max: 1e4, noNaN: true })
    fc.assert(
      fc.property(values, errors, (value, u) => {
        const { text } = writeQuantity(value, u, { scientific: false })
        const match = /^(-?\d+(?:\.(\d+))?)\((\d+(?:\.\d+)?)\)$/.exec(text)
        expect(match).not.toBeNull()
        const places = match![2]?.length ?? 0
        const readU = match![3]!.includes(".") ? Number(match![3]) : Number(match![3]) * 10 ** -places
        // The PDG rule keeps at least one digit, so the written uncertainty is within 15 % of the true one.
        expect(Math.abs(readU - u) / u).toBeLessThan(0.15)
        expect(Math.abs(Number(match![1]) - value)).toBeLessThanOrEqual(0.51 * u)
      }),
    )
  })
})
