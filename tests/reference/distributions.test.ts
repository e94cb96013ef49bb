import { readFileSync } from "node:fs"
import { describe, expect, test } from "vitest"
import { lineBandFactor } from "@/lib/stats/bands/line-band-factor"
import { chiSquareCdf } from "@/lib/stats/distributions/chi-square-cdf"
import { chiSquareQuantile } from "@/lib/stats/distributions/chi-square-quantile"
import { fQuantile } from "@/lib/stats/distributions/f-quantile"
import { normalQuantile } from "@/lib/stats/distributions/normal-quantile"
import { tCdf } from "@/lib/stats/distributions/t-cdf"
import { tQuantile } from "@/lib/stats/distributions/t-quantile"

const read = (name: string) =>
  JSON.parse(readFileSync(new URL(`./data/r/${name}.json`, import.meta.url), "utf8"))
// R's qnorm, qt, qchisq, qf, pt, pchisq; relative 1e-10, absolute 1e-12 near zero as the file states.
const r = read("quantiles")

const expectAll = (expected: readonly number[], actual: (index: number) => number) =>
  expected.forEach((value, index) =>
    expect(Math.abs(actual(index) - value), `entry ${index}`).toBeLessThanOrEqual(
      Math.max(1e-12, 1e-10 * Math.abs(value)),
    ),
  )

describe("distributions against R", () => {
  test("normal quantile", () => expectAll(r.normal.q, (i) => normalQuantile(r.normal.p[i])))
  test("t quantile", () => expectAll(r.t.q, (i) => tQuantile(r.t.p[i], r.t.df[i])))
  test("chi-square quantile", () =>
    expectAll(r.chisq.q, (i) => chiSquareQuantile(r.chisq.p[i], r.chisq.df[i])))
  test("F quantile", () => expectAll(r.f.q, (i) => fQuantile(r.f.p[i], r.f.d1[i], r.f.d2[i])))
  test("t probability", () =>
    expectAll((r.tCdf.p as number[]).slice(0, r.tCdf.x.length), (i) => tCdf(r.tCdf.x[i], r.tCdf.df[i])))
  test("chi-square upper tail, absolute 1e-12", () =>
    (r.chisqSf.p as number[]).forEach((p, i) =>
      expect(Math.abs(1 - chiSquareCdf(r.chisqSf.x[i], r.chisqSf.df[i]) - p)).toBeLessThanOrEqual(1e-12),
    ))

  test("Working–Hotelling factors of a straight line (p = 2), relative 1e-9", () => {
    const table = read("working_hotelling") as Record<"p" | "n" | "level" | "multiplier", number[]>
    const factor = table.multiplier
    let checked = 0
    table.p.forEach((p, i) => {
      if (p !== 2) return
      const expected = factor[i]!
      const actual = lineBandFactor("simultaneous", table.level[i]!, table.n[i]! - 2)
      expect(Math.abs(actual / expected - 1)).toBeLessThanOrEqual(1e-9)
      checked += 1
    })
    expect(checked).toBeGreaterThan(40)
  })
})
