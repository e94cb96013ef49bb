import { describe, expect, test } from "vitest"
import { laws } from "../laws/laws"
import { countsWarnings, fitCounts, type CountsFit } from "./fit-counts"
import { poissonDeviance } from "./poisson-problem"
import { wilsonInterval } from "./proportion-interval"

const t = Float64Array.from({ length: 12 }, (_, k) => k + 1)
// Rounded expectations of 200 exp(-t/3) with a ripple of one count: late counts are 0, 1, 2.
const counts = Float64Array.of(144, 101, 75, 52, 39, 26, 20, 13, 10, 8, 4, 5)

const expectFit = (fit: ReturnType<typeof fitCounts>): CountsFit => {
  if ("refused" in fit) throw new Error(fit.refused)
  return fit
}

test("deviance of a count from its expectation", () => {
  expect(poissonDeviance(0, 3)).toBe(6)
  expect(poissonDeviance(5, 5)).toBe(0)
  expect(poissonDeviance(4, 2)).toBeCloseTo(2 * (4 * Math.log(2) - 2), 14)
  // Second order in the difference: (k - mu)^2 / mu.
  expect(poissonDeviance(1e6, 1e6 + 1) * 1e6).toBeCloseTo(1, 5)
})

describe("an exponential through counts", () => {
  const fit = expectFit(fitCounts(laws.exponential, t, counts))
  const sumOf = (weight: (k: number) => number) =>
    fit.expected.reduce((sum, mu, k) => sum + weight(k) * (mu - counts[k]!), 0)

  test("solves the likelihood equations: sum mu = sum k and sum t mu = sum t k (McCullagh & Nelder, section 2.5)", () => {
    expect(Math.abs(sumOf(() => 1))).toBeLessThan(1e-8)
    expect(Math.abs(sumOf((k) => t[k]!))).toBeLessThan(1e-7)
  })

  test("has the errors of the Fisher information, here for ln A and the rate as sums over mu", () => {
    const [s0, s1, s2] = [0, 1, 2].map((power) =>
      fit.expected.reduce((sum, mu, k) => sum + mu * t[k]! ** power, 0),
    )
    const rateError = Math.sqrt(s0! / (s0! * s2! - s1! * s1!))
    // delta tau = tau^2 delta rate
    expect(fit.standardErrors[1]! / (fit.parameters[1]! ** 2 * rateError)).toBeCloseTo(1, 9)
  })

  test("warns of small counts, and of nothing else", () => {
    expect(countsWarnings(fit, counts, "curve").map(({ code }) => code)).toEqual(["COUNTS_LOW"])
    const large = counts.map((k) => 100 * k)
    const steady = expectFit(
      fitCounts(
        laws.exponential,
        t,
        large.map((_, k) => Math.round(20000 * Math.exp(-t[k]! / 3))),
      ),
    )
    expect(countsWarnings(steady, large, "curve")).toEqual([])
  })

  test("OVERDISPERSED counts widen their errors by the root of the factor", () => {
    const wild = counts.map((k, i) => Math.max(0, Math.round(k * (i % 2 ? 1.4 : 0.6))))
    const other = expectFit(fitCounts(laws.exponential, t, wild))
    expect(other.overdispersion).toBeGreaterThan(1.5)
    expect(countsWarnings(other, wild, "curve").map(({ code }) => code)).toContain("OVERDISPERSED")
    const [s0, s1, s2] = [0, 1, 2].map((power) =>
      other.expected.reduce((sum, mu, k) => sum + mu * t[k]! ** power, 0),
    )
    const plain = other.parameters[1]! ** 2 * Math.sqrt(s0! / (s0! * s2! - s1! * s1!))
    expect((other.standardErrors[1]! / plain) ** 2).toBeCloseTo(other.overdispersion, 8)
  })

  test("zero counts stay in", () => {
    const sparse = Float64Array.of(9, 4, 3, 0, 1, 0, 0, 1, 0, 0, 0, 0)
    const rare = expectFit(fitCounts(laws.exponential, t, sparse))
    expect(rare.expected.reduce((a, b) => a + b, 0)).toBeCloseTo(18, 8)
  })

  test("two counts are refused", () => {
    expect(fitCounts(laws.exponential, t.slice(0, 2), counts.slice(0, 2))).toEqual({
      refused: "TOO_FEW_POINTS",
      points: 2,
    })
  })
})

test("Wilson's interval solves |p - k/n| = z sqrt(p (1 - p)/n), its definition", () => {
  const z = 1.959963984540054
  for (const [k, n] of [
    [3, 10],
    [50, 100],
    [99, 100],
  ] as const)
    for (const p of wilsonInterval(k, n, 0.95))
      expect(Math.abs(p - k / n)).toBeCloseTo(z * Math.sqrt((p * (1 - p)) / n), 12)
  expect(wilsonInterval(0, 10, 0.95)[0]).toBe(0)
  expect(wilsonInterval(10, 10, 0.95)[1]).toBe(1)
})
