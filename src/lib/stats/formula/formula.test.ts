import fc from "fast-check"
import { describe, expect, test } from "vitest"
import { deriveQuantity, derivedInterval, deriveResamples, type QuantitySource } from "./derive-quantity"
import { FormulaError } from "./formula-error"
import { parseFormula } from "./parse-formula"

const values = new Map([
  ["a", 2],
  ["b", 3],
  ["alphaWeak", -0.5],
])
const value = (text: string) => parseFormula(text, values.keys()).evaluate(values)
const failure = (text: string) => {
  try {
    parseFormula(text, values.keys())
  } catch (error) {
    if (error instanceof FormulaError) return [error.code, error.position]
    throw error
  }
  return null
}

describe("formulas", () => {
  test.each([
    ["1/a", 0.5],
    ["a + b*2", 8],
    ["(a + b)*2", 10],
    ["-a^2", -4],
    ["(-a)^2", 4],
    ["2^-1", 0.5],
    ["2^3^2", 512],
    ["a - b - 1", -2],
    ["b/a/2", 0.75],
    ["--a", 2],
    ["a^-b*2", 0.25],
    ["sqrt(a*8) + exp(0) + log(exp(b)) + abs(-1)", 9],
    ["min(a, b, 1) + max(a, b)", 4],
    ["2*pi", 2 * Math.PI],
    [" 1.5e1 × a · .5 − 1 ", 14],
    ["2*alphaWeak", -1],
  ])("%s", (text, expected) => expect(value(text)).toBeCloseTo(expected, 14))

  test("what arithmetic does not define is not a number", () => {
    expect(value("log(-1)")).toBeNaN()
    expect(value("1/(a - 2)")).toBe(Infinity)
  })

  test.each([
    ["", "EMPTY", 0],
    ["a +", "UNEXPECTED", 3],
    ["a b", "UNEXPECTED", 2],
    ["2a", "UNEXPECTED", 1],
    ["1.2.3", "UNEXPECTED", 3],
    ["(a + b", "UNEXPECTED", 0],
    ["a + b)", "UNEXPECTED", 5],
    ["a + c", "UNKNOWN_NAME", 4],
    ["sin(a)", "UNKNOWN_FUNCTION", 0],
    ["a(b)", "UNKNOWN_FUNCTION", 0],
    ["1 + sqrt", "ARGUMENTS", 4],
    ["sqrt(a, b)", "ARGUMENTS", 0],
    ["min(a)", "ARGUMENTS", 0],
    ["sqrt()", "UNEXPECTED", 5],
    ["a; b", "UNEXPECTED", 1],
    ["a.constructor", "UNEXPECTED", 1],
    ["constructor", "UNKNOWN_NAME", 0],
    ["__proto__", "UNEXPECTED", 0],
    ["toString()", "UNKNOWN_FUNCTION", 0],
    ["1e999", "BAD_NUMBER", 0],
  ])("%s is refused with %s at %i", (text, code, position) => expect(failure(text)).toEqual([code, position]))

  test("endless formulas are refused", () => {
    expect(failure("a".padEnd(600, "+1"))).toEqual(["TOO_LONG", 500])
    expect(failure("(".repeat(70) + "1" + ")".repeat(70))).toEqual(["TOO_DEEP", 60])
    expect(failure("-".repeat(70) + "1")).toEqual(["TOO_DEEP", 60])
  })

  test("names are listed once, in order", () => {
    expect(parseFormula("b + a*b - pi", ["a", "b"]).names).toEqual(["b", "a"])
  })
})

/** A random expression: its text with only the brackets that it needs, and its value by plain arithmetic. */
interface Sample {
  readonly text: string
  readonly value: number
  /** 1 sum, 2 product, 3 signed, 4 power, 5 atom. */
  readonly rank: number
}

const bracket = ({ text, rank }: Sample, least: number) => (rank < least ? `(${text})` : text)
const sample = fc.letrec<{ any: Sample }>((tie) => ({
  any: fc.oneof(
    { maxDepth: 5, withCrossShrink: true },
    fc.nat({ max: 99 }).map((n): Sample => ({ text: String(n / 10), value: n / 10, rank: 5 })),
    fc.constantFrom("a", "b").map((name): Sample => ({ text: name, value: values.get(name)!, rank: 5 })),
    fc.tuple(tie("any"), fc.constantFrom("+", "-"), tie("any")).map(([p, sign, q]): Sample => ({
      text: `${bracket(p, 1)} ${sign} ${bracket(q, 2)}`,
      value: sign === "+" ? p.value + q.value : p.value - q.value,
      rank: 1,
    })),
    fc.tuple(tie("any"), fc.constantFrom("*", "/"), tie("any")).map(([p, sign, q]): Sample => ({
      text: `${bracket(p, 2)}${sign}${bracket(q, 3)}`,
      value: sign === "*" ? p.value * q.value : p.value / q.value,
      rank: 2,
    })),
    tie("any").map((p): Sample => ({ text: `-${bracket(p, 3)}`, value: -p.value, rank: 3 })),
    fc.tuple(tie("any"), tie("any")).map(([p, q]): Sample => ({
      text: `${bracket(p, 5)}^${bracket(q, 3)}`,
      value: p.value ** q.value,
      rank: 4,
    })),
    tie("any").map((p): Sample => ({ text: `sqrt(${p.text})`, value: Math.sqrt(p.value), rank: 5 })),
  ),
})).any

test("any expression means what arithmetic says", () =>
  fc.assert(
    fc.property(
      sample.filter(({ text }) => text.length <= 500),
      (expression) => Object.is(value(expression.text), expression.value),
    ),
    { seed: 1, numRuns: 500 },
  ))

test("any text is either understood or refused with a position inside it", () =>
  fc.assert(
    fc.property(
      fc.oneof(
        fc.string({ unit: "grapheme", maxLength: 40 }),
        fc.string({ unit: fc.constantFrom(..."ab12.()+-*/^, sqrtmin"), maxLength: 40 }),
      ),
      (text) => {
        const refused = failure(text)
        if (refused === null) return typeof value(text) === "number"
        return (refused[1] as number) >= 0 && (refused[1] as number) <= text.length
      },
    ),
    { seed: 2, numRuns: 1000 },
  ))

describe("derived quantities", () => {
  const source = (rows: Record<string, [number, number[]]>): QuantitySource => ({
    estimates: new Map(Object.entries(rows).map(([name, [estimate]]) => [name, estimate])),
    deletions: new Map(
      Object.entries(rows).map(([name, [, deletions]]) => [name, Float64Array.from(deletions)]),
    ),
    resamples: new Map(
      Object.entries(rows).map(([name, [, deletions]]) => [name, Float64Array.from(deletions)]),
    ),
  })
  const p = [0.9, 1.1, 1.0, 0.95, 1.05]
  const q = [2.1, 1.9, 2.0, 2.05, 1.95]

  test("quantities of one ensemble keep their correlation: p + q/1 hardly varies, p - q does", () => {
    const both = [source({ p: [1, p], q: [2, q] })]
    expect(deriveQuantity(parseFormula("p + q", ["p", "q"]), both).standardError).toBeCloseTo(0, 14)
    const difference = deriveQuantity(parseFormula("p - q", ["p", "q"]), both)
    // sqrt(4/5 sum (2 d)^2), d = -0.1, 0.1, 0, -0.05, 0.05.
    expect(difference.standardError).toBeCloseTo(Math.sqrt(0.8 * 4 * 0.025), 13)
    expect(difference.degreesOfFreedom).toBeCloseTo(4, 12)
  })

  test("of two ensembles their variances add, and the degrees of freedom are Welch's", () => {
    const apart = [source({ p: [1, p] }), source({ q: [2, q] })]
    const sum = deriveQuantity(parseFormula("p + q", ["p", "q"]), apart)
    expect(sum.standardError).toBeCloseTo(Math.sqrt(2 * 0.8 * 0.025), 13)
    expect(sum.degreesOfFreedom).toBeCloseTo(8, 12)
    const [low, high] = derivedInterval(sum, 0.95)
    // t quantile 0.975 with 8 degrees of freedom: 2.306004 (any table).
    expect((high - low) / 2 / sum.standardError).toBeCloseTo(2.306004, 6)
  })

  test("linear formulas: jackknife and delta agree; a bent one shows the difference", () => {
    const both = [source({ p: [1, p], q: [2, q] })]
    const linear = deriveQuantity(parseFormula("3*p - q/2", ["p", "q"]), both)
    expect(linear.deltaError / linear.standardError).toBeCloseTo(1, 8)
    const bent = deriveQuantity(parseFormula("exp(10*p)", ["p"]), both)
    expect(Math.abs(bent.deltaError / bent.standardError - 1)).toBeGreaterThan(0.02)
  })

  test("resamples of independent ensembles are not paired draw by draw", () => {
    const sum = parseFormula("p - r", ["p", "r"])
    const apart = deriveResamples(sum, [source({ p: [1, p] }), source({ r: [1, p] })])!
    expect([...apart].some((d) => Math.abs(d) > 0.01)).toBe(true)
    const together = deriveResamples(sum, [source({ p: [1, p], r: [1, p] })])!
    expect([...together]).toEqual([0, 0, 0, 0, 0])
    const { estimates, deletions } = source({ p: [1, p] })
    expect(deriveResamples(sum, [{ estimates, deletions }])).toBeNull()
  })
})
