import { readFileSync } from "node:fs"
import { describe, expect, test } from "vitest"
import { buildEnsemble } from "@/lib/stats/ensemble/build-ensemble"
import { ensembleMoments } from "@/lib/stats/ensemble/ensemble-moments"
import { logMoments } from "@/lib/stats/ensemble/log-moments"
import { fitPowerLaw, powerLawErrors, type PowerLawFit } from "@/lib/stats/power-law/fit-power-law"
import { jackknife } from "@/lib/stats/resampling/jackknife"
import { tQuantile } from "@/lib/stats/distributions/t-quantile"

/** 12 trajectories on 15 times; estimators computed with NumPy and SciPy: tests/reference/data/SOURCE.md. */
const read = (name: string) => readFileSync(new URL(`./data/scipy/${name}`, import.meta.url), "utf8")
const reference = JSON.parse(read("small_ensemble.json"))
const rows = read("small_ensemble.csv")
  .trim()
  .split("\n")
  .slice(1)
  .map((line) => line.split(",").map(Number))
const table = {
  trajectory: rows.map((row) => row[0]!),
  abscissa: rows.map((row) => row[1]!),
  observable: rows.map((row) => row[2]!),
}
const ensemble = buildEnsemble(table)

/** Relative 1e-9, the tolerance that the reference file states for deterministic values. */
const expectClose = (actual: ArrayLike<number>, expected: readonly number[]) => {
  expect(actual.length).toBe(expected.length)
  expected.forEach((value, k) =>
    expect(Math.abs(actual[k]! - value)).toBeLessThanOrEqual(1e-9 * Math.abs(value)),
  )
}
const fitted = (fit: ReturnType<typeof fitPowerLaw>): PowerLawFit => {
  if ("refused" in fit) throw new Error(fit.refused)
  return fit
}

describe("a small ensemble against NumPy and SciPy", () => {
  test("mean and standard error", () => {
    const { mean, standardError } = ensembleMoments(ensemble)
    expectClose(mean, reference.mean)
    expectClose(standardError, reference.sem)
  })

  test("importance weights: the weighted mean and its linearised error", () => {
    const weights = Float64Array.from(reference.weightedMean.weights as number[])
    const weighted = ensembleMoments({ ...ensemble, weights })
    expectClose(weighted.mean, reference.weightedMean.mean)
    expectClose(weighted.standardError, reference.weightedMean.semLinear)
  })

  test("the default: smoothed weights, jackknife-t", () => {
    const expected = reference.recommendedDefault
    const fit = fitted(fitPowerLaw(logMoments(ensemble), [null, null], "smoothed"))
    expectClose([fit.slope, fit.level - fit.slope * fit.centre], [expected.slope, expected.intercept])
    const { slope } = powerLawErrors(fit)
    expectClose([slope.standardError], [expected.jackknifeSE])
    // The bias is a difference of nearly equal numbers times M - 1: its error is that of the slopes, not its own.
    expect(slope.bias).toBeCloseTo(expected.jackknifeBias, 10)
    expectClose(fit.slopes, expected.deletedSlopes)
    for (const level of ["0.6827", "0.95"]) {
      const half = tQuantile((1 + Number(level)) / 2, 11) * slope.standardError
      expectClose([fit.slope - half, fit.slope + half], expected.ci[level])
    }
  })

  test("inverse-variance weights", () => {
    const fit = fitted(fitPowerLaw(logMoments(ensemble), [null, null], "inverse-variance"))
    expectClose(
      [fit.slope, fit.level - fit.slope * fit.centre],
      [reference.loglogWls.slope, reference.loglogWls.intercept],
    )
  })

  test("every deletion equals the moments of the ensemble without that trajectory", () => {
    for (const referenceIndex of [null, 0]) {
      const all = logMoments(ensemble, referenceIndex)
      const times = ensemble.abscissa.length
      const without = 4
      const rest = {
        abscissa: ensemble.abscissa,
        ids: ensemble.ids.filter((_, i) => i !== without),
        values: ensemble.values.filter((_, at) => Math.floor(at / times) !== without),
      }
      const direct = logMoments(rest, referenceIndex)
      const points = all.x.length
      for (let k = 0; k < points; k += 1) {
        expect(all.lnMean[(without + 1) * points + k]).toBeCloseTo(direct.lnMean[k]!, 12)
        expect(all.lnRelativeVariance[(without + 1) * points + k]).toBeCloseTo(
          direct.lnRelativeVariance[k]!,
          10,
        )
      }
    }
  })

  test("ratio to the first time: mean and error with the covariance", () => {
    const ratio = logMoments(ensemble, 0)
    const expectedRatio = (reference.ratioToFirst.ratio as number[]).slice(1)
    expectClose(ratio.lnMean.slice(0, ratio.x.length).map(Math.exp), expectedRatio)
    const points = ratio.x.length
    const errors = expectedRatio.map((value, k) => {
      const deletions = Float64Array.from(ensemble.ids, (_, i) =>
        Math.exp(ratio.lnMean[(i + 1) * points + k]!),
      )
      return jackknife(value, deletions).standardError
    })
    expectClose(errors, (reference.ratioToFirst.jackknifeSE as number[]).slice(1))
  })
})
