import { describe, expect, test } from "vitest"
import type { Quantity } from "./quantity"
import { texNameProblem, valuesTex } from "./values-tex"

const quantity = (name: string): Quantity => ({
  name,
  value: -0.4964,
  standardError: 0.0024,
  interval: { level: 0.95, low: -0.501, high: -0.4918, type: "jackknife-t" },
  text: "-0.4964(24)",
  tex: "-0.4964(24)",
})

describe("values.tex", () => {
  test("a macro a quantity, with where it comes from", () => {
    const text = valuesTex([{ quantity: quantity("alphaWeak"), figure: "decay", version: 3 }], "Draft 1")
    expect(text).toContain("\\newcommand{\\alphaWeak}{\\ensuremath{-0.4964(24)}}")
    expect(text).toContain("% decay, version 3: -0.4964, 95 % [-0.501, -0.4918] jackknife-t")
  })
  test("for siunitx the number with its bracket (siunitx manual, \\num{0.587(12)})", () => {
    const sources = [{ quantity: quantity("alphaWeak"), figure: "decay", version: 3 }]
    const text = valuesTex(sources, "Draft 1", "siunitx")
    expect(text).toContain("\\newcommand{\\alphaWeak}{\\num{-0.4964(24)}}")
  })
  test("names that TeX has, or that cannot be macros, are refused", () => {
    expect(texNameProblem("alpha")).toMatch(/means something in TeX/)
    expect(texNameProblem("alpha2")).toMatch(/letters only/)
    expect(texNameProblem("alphaWeak")).toBeNull()
  })
  test("two quantities of one name are refused", () => {
    const twice = ["decay", "growth"].map((figure) => ({
      quantity: quantity("alphaWeak"),
      figure,
      version: 1,
    }))
    expect(() => valuesTex(twice, "Draft 1")).toThrow(/decay and in growth/)
  })
})
