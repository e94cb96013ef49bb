import { readFileSync } from "node:fs"
import { describe, expect, test } from "vitest"
import { resampleCounts } from "@/lib/stats/ensemble/bootstrap-moments"
import { bootstrapInterval, type BootstrapKind } from "@/lib/stats/resampling/bootstrap-interval"
import { jackknife } from "@/lib/stats/resampling/jackknife"

// R package boot on data of Davison & Hinkley (1997); its tolerances at B = 9999: 0.04 SE at 68 %, 0.10 SE at 95 %.
const { cases } = JSON.parse(readFileSync(new URL("./data/r/bootstrap_ci.json", import.meta.url), "utf8"))
const city = cases.find((entry: { name: string }) => entry.name.startsWith("city"))
const aircondit = cases.find((entry: { name: string }) => entry.name.startsWith("aircondit"))

const statistics = [
  {
    entry: city,
    size: city.data.u.length as number,
    of: (count: ArrayLike<number>) => {
      const total = (x: number[]) => x.reduce((sum, value, i) => sum + count[i]! * value, 0)
      return total(city.data.x) / total(city.data.u)
    },
  },
  {
    entry: aircondit,
    size: aircondit.data.hours.length as number,
    of: (count: ArrayLike<number>) => {
      const hours = aircondit.data.hours as number[]
      return (
        hours.reduce((sum, value, i) => sum + count[i]! * value, 0) /
        Array.from(count).reduce((a, b) => a + b, 0)
      )
    },
  },
]
// Ten times as many as the tolerances are for: the upper tail of the city ratio is long.
const resamples = 99_999

describe.each(statistics)("bootstrap intervals against R: $entry.name", ({ entry, size, of }) => {
  const estimate = of(new Array<number>(size).fill(1))
  const deletions = Float64Array.from({ length: size }, (_, i) =>
    of(Array.from({ length: size }, (__, j) => (i === j ? 0 : 1))),
  )
  const { standardError, acceleration } = jackknife(estimate, deletions)
  const counts = new Float64Array(size)
  const resampled = Float64Array.from({ length: resamples }, (_, b) => {
    resampleCounts(size, 20261201, b, counts)
    return of(counts)
  })

  test("jackknife error and acceleration, relative 1e-12", () => {
    expect(Math.abs(standardError / entry.jackknife.jackknifeSE - 1)).toBeLessThan(1e-12)
    expect(acceleration).toBeCloseTo(entry.jackknife.acceleration, 12)
  })

  test.each(["percentile", "basic", "bca"] satisfies BootstrapKind[])("%s", (kind) => {
    const se = entry.result.se as number
    ;(entry.result.conf as number[]).forEach((level, c) => {
      const interval = bootstrapInterval(kind, level, estimate, resampled, size, acceleration)
      const [low, high] = entry.result[kind][c] as [number, number]
      // R's BCa regresses the influence values on the resamples, ours is the plain jackknife: for the long tail of the
      // city ratio that moves the end by up to a fifth of a standard error.
      const room = kind === "bca" && entry === city ? 0.2 : level > 0.9 ? 0.1 : 0.04
      expect(Math.abs(interval.high - high) / se).toBeLessThan(room)
      expect(Math.abs(interval.low - low) / se).toBeLessThan(room)
    })
  })

  test("the expanded percentile is wider than the percentile, and the standard error is R's", () => {
    const narrow = bootstrapInterval("percentile", 0.95, estimate, resampled, size, acceleration)
    const wide = bootstrapInterval("expanded-percentile", 0.95, estimate, resampled, size, acceleration)
    expect(wide.high - wide.low).toBeGreaterThan(narrow.high - narrow.low)
    expect(Math.abs(narrow.standardError / entry.result.se - 1)).toBeLessThan(0.03)
  })
})
