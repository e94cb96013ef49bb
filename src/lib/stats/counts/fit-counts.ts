import { fitLaw, type LawRefusal } from "../laws/fit-law"
import type { Law } from "../laws/law"
import { parametricMeans } from "../laws/parametric-means"
import { levenbergMarquardt } from "../nonlinear/levenberg-marquardt"
import { normalCovariance } from "../nonlinear/normal-covariance"
import type { StatisticalWarning } from "../warnings/statistical-warning"
import { warn } from "../warnings/warning-catalogue"
import { poissonProblem } from "./poisson-problem"

/** A law fitted to counts by maximum likelihood. */
export interface CountsFit {
  readonly law: Law
  /** In the order of `law.parameters`. */
  readonly parameters: Float64Array
  /** From the Fisher information, times the overdispersion where that exceeds 1.5; row-major p x p. */
  readonly covariance: Float64Array
  readonly standardErrors: Float64Array
  readonly expected: Float64Array
  readonly deviance: number
  readonly degreesOfFreedom: number
  /** Pearson chi-square per degree of freedom; 1 for Poisson scatter. */
  readonly overdispersion: number
  readonly iterations: number
}

const toleratedOverdispersion = 1.5
/** Below this the square root of a count is no longer its error. */
const lowCount = 10

/**
 * Fits a law to independent Poisson counts by minimising the deviance. Weights 1/k would pull the curve below the points
 * by about one count, so they are never used; zero counts stay in.
 *
 * Counts of the same seeds at successive times are not independent: fit those as an ensemble of batches.
 *
 * @param t abscissas, increasing; @param counts non-negative integers; both of length n
 * @see docs/methods.md, counts
 */
export function fitCounts(
  law: Law,
  t: Float64Array,
  counts: Float64Array,
): CountsFit | { readonly refused: LawRefusal; readonly points: number } {
  const n = t.length
  const p = law.parameters.length
  // Least squares with errors that no single count decides gives the start.
  const level = Math.sqrt(counts.reduce((sum, k) => sum + k, 0) / n || 1)
  const sigma = counts.map((k) => Math.max(Math.sqrt(k + 1), level / 2))
  const points = parametricMeans(t, counts, sigma, { resamples: 0, seed: 0 })
  const start = fitLaw(law, points, [null, null], { scale: "raw", weights: "inverse-variance" })
  if ("refused" in start) return start
  const fit = levenbergMarquardt(poissonProblem(law.curve, t, counts), start.parameters)
  if (fit.code !== "converged") return { refused: "NO_CONVERGENCE", points: n }
  const slopes = new Float64Array(p)
  const information = new Float64Array(n * p)
  const expected = t.map((at, i) => {
    const value = law.curve.value(at, fit.parameters, slopes)
    for (let j = 0; j < p; j += 1) information[i * p + j] = slopes[j]! / Math.sqrt(value)
    return value
  })
  const pearson = expected.reduce((sum, mu, i) => sum + (counts[i]! - mu) ** 2 / mu, 0)
  const overdispersion = pearson / (n - p)
  const factor = overdispersion > toleratedOverdispersion ? overdispersion : 1
  const covariance = normalCovariance(information, n, p).map((value) => value * factor)
  return {
    law,
    parameters: fit.parameters,
    covariance,
    standardErrors: Float64Array.from({ length: p }, (_, j) => Math.sqrt(covariance[j * p + j]!)),
    expected,
    deviance: fit.sumOfSquares,
    degreesOfFreedom: n - p,
    overdispersion,
    iterations: fit.iterations,
  }
}

/** What a referee would ask about counts and their fit. */
export function countsWarnings(
  { overdispersion }: CountsFit,
  counts: Float64Array,
  where: string,
): StatisticalWarning[] {
  const warnings: StatisticalWarning[] = []
  if (overdispersion > toleratedOverdispersion)
    warnings.push(warn("OVERDISPERSED", where, { factor: overdispersion.toFixed(1) }))
  if (counts.some((k) => k < lowCount)) warnings.push(warn("COUNTS_LOW", where))
  return warnings
}
