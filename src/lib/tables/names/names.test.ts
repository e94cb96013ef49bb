import { describe, expect, test } from "vitest"
import { uniqueNames } from "./column-names"
import { splitUnit } from "./split-unit"
import { texSymbol } from "./tex-symbol"
import { isKnownUnit, isUnit } from "./unit-grammar"

// Rules and examples: docs/intake.md, Header, rules 4 to 6.
describe("units", () => {
  test.each([
    "1",
    "%",
    "mV",
    "1/J",
    "J^-1",
    "J^{-1}",
    "J_z",
    "\\hbar",
    "a.u.",
    "arb. u.",
    "m s^-1",
    "kg·m/s^2",
    "V**-1",
  ])("%s is a unit", (unit) => expect(isUnit(unit)).toBe(true))
  test.each(["", "a,b", "total", "per site", "3.5", "very long words here", "T_c", "<b>"])(
    "%j is none",
    (unit) => expect(isUnit(unit)).toBe(false),
  )
  test.each(["N", "n0", "T_c", "L", "tau"])("%s is not known well enough for a ratio", (unit) =>
    expect(isKnownUnit(unit)).toBe(false),
  )
})

describe("splitUnit", () => {
  test.each<[string, string, string | null]>([
    ["t [1/J]", "t", "1/J"],
    ["omega[J]", "omega", "J"],
    ["x [1]", "x", "1"],
    ["x[1]", "x[1]", null],
    ["x [3]", "x [3]", null],
    ["Zeit t (µs)", "Zeit t", "µs"],
    ["U(mV)", "U", "mV"],
    ["A(t)", "A(t)", null],
    ["S(q)", "S(q)", null],
    ["Energy (total)", "Energy (total)", null],
    ["t/J^-1", "t", "J^-1"],
    ["U / mV", "U", "mV"],
    ["dE/dt", "dE/dt", null],
    ["T/T_c", "T/T_c", null],
    ["n/n0", "n/n0", null],
    ["E/N", "E/N", null],
    ["time_us", "time", "us"],
    ["x_min", "x_min", null],
    ["r_cm", "r_cm", null],
    ["mz", "mz", null],
  ])("%s", (header, name, unit) => {
    expect(splitUnit(header)).toMatchObject({ name, unit })
  })
})

describe("texSymbol", () => {
  test.each<[string, string | null]>([
    ["t", "t"],
    ["S_z", "S_z"],
    ["n0", "n_0"],
    ["omega", "\\omega"],
    ["ν", "\\nu"],
    ["gamma_eff", "\\gamma_{\\mathrm{eff}}"],
    ["n_10", "n_{10}"],
    ["ΔE", "\\Delta E"],
    ["A(t)", "A(t)"],
    ["time", null],
    ["mz_err", null],
    ["a_b_c", null],
    ["f(x y)", null],
  ])("%s", (name, symbol) => expect(texSymbol(name)).toBe(symbol))
})

describe("uniqueNames", () => {
  const named = (names: string[]) => {
    const seen: unknown[] = []
    const unique = uniqueNames(names, (code, column) => seen.push(`${column}:${code}`))
    return { unique, seen }
  }
  test("numbers the nameless and repeats, never onto a name in use", () => {
    expect(named(["", "e", "e_2", "e", "column_1", "e"])).toEqual({
      unique: ["column_1", "e", "e_2", "e_3", "column_1_2", "e_4"],
      seen: ["1:empty-name", "4:duplicate-name", "5:duplicate-name", "6:duplicate-name"],
    })
  })
  test.each([
    "=cmd()",
    "+a",
    "@x",
    "-1",
    "<script>",
    "$x$",
    "\\input",
    "a\u0000b",
    "\u202eabc",
    "__proto__",
    "constructor",
    "x".repeat(201),
  ])("%j is kept and reported", (name) =>
    expect(named([name])).toEqual({ unique: [name], seen: ["1:unsafe-name"] }),
  )
})
