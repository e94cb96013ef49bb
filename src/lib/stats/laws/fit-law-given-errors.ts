import { chiSquareCdf } from "../distributions/chi-square-cdf"
import { normalCovariance } from "../nonlinear/normal-covariance"
import { orderQuantile } from "../resampling/bootstrap-interval"
import type { StatisticalWarning } from "../warnings/statistical-warning"
import { warn } from "../warnings/warning-catalogue"
import { fitLaw, type LawFit, type LawRefusal } from "./fit-law"
import type { Law, LawScale } from "./law"
import { replicatesOf, refusedShare } from "./law-errors"
import { lawErrorWarnings, lawSearchWarnings } from "./law-warnings"
import { parametricMeans } from "./parametric-means"

/** Points with standard errors, in increasing abscissa. */
export interface GivenPoints {
  readonly t: Float64Array
  readonly y: Float64Array
  /** Standard errors, positive. */
  readonly sigma: Float64Array
}

export interface GivenErrorsOptions {
  readonly scale?: LawScale
  readonly resamples: number
  readonly seed: number
  /** Widen the errors by sqrt(chi-square per degree of freedom) when that exceeds 1. */
  readonly birge?: boolean
}

/** A law fitted to points with known errors. */
export interface GivenErrorsLawFit {
  /** Its replicates are parametric resamples of the points. */
  readonly fit: LawFit
  /** From the known errors alone, times the square of the Birge factor; row-major p x p. */
  readonly covariance: Float64Array
  readonly standardErrors: Float64Array
  /** Standard deviations over the parametric resamples; a check on the analytic ones. */
  readonly resampledErrors: Float64Array
  /** Probability of a larger chi-square if law and errors are right. */
  readonly probability: number
  /** Factor applied to the errors, 1 unless asked for and needed. */
  readonly birgeFactor: number
}

/**
 * Least squares of a law on points with known errors, weights 1/sigma^2: covariance from the errors alone, chi-square per
 * degree of freedom reported and never used to rescale silently.
 *
 * @see docs/methods.md, values with errors
 */
export function fitLawGivenErrors(
  law: Law,
  { t, y, sigma }: GivenPoints,
  window: readonly [number | null, number | null],
  { scale = "raw", birge = false, ...resampling }: GivenErrorsOptions,
): GivenErrorsLawFit | { readonly refused: LawRefusal; readonly points: number } {
  const means = parametricMeans(t, y, sigma, resampling)
  const fit = fitLaw(law, means, window, { scale, weights: "inverse-variance" })
  if ("refused" in fit) return fit
  const p = fit.parameters.length
  const n = fit.to - fit.from
  const jacobian = new Float64Array(n * p)
  const slopes = new Float64Array(p)
  for (let k = 0; k < n; k += 1) {
    const at = fit.from + k
    const value = law.curve.value(t[at]!, fit.parameters, slopes)
    const error = fit.scale === "log" ? (sigma[at]! / y[at]!) * value : sigma[at]!
    for (let j = 0; j < p; j += 1) jacobian[k * p + j] = slopes[j]! / error
  }
  const ratio = fit.chiSquare / fit.degreesOfFreedom
  const birgeFactor = birge ? Math.max(1, Math.sqrt(ratio)) : 1
  const covariance = normalCovariance(jacobian, n, p).map((value) => value * birgeFactor ** 2)
  return {
    fit,
    covariance,
    standardErrors: Float64Array.from({ length: p }, (_, j) => Math.sqrt(covariance[j * p + j]!)),
    resampledErrors: Float64Array.from(
      { length: p },
      (_, j) => deviationOf(replicatesOf(fit, j)) * birgeFactor,
    ),
    probability: 1 - chiSquareCdf(fit.chiSquare, fit.degreesOfFreedom),
    birgeFactor,
  }
}

function deviationOf(values: Float64Array): number {
  const finite = values.filter(Number.isFinite)
  const mean = finite.reduce((sum, value) => sum + value, 0) / finite.length
  return Math.sqrt(finite.reduce((sum, value) => sum + (value - mean) ** 2, 0) / (finite.length - 1))
}

/**
 * Percentile interval of one parameter over the parametric resamples.
 *
 * @returns null when more than 5 % of the resamples could not be fitted
 */
export function parametricInterval(
  { fit }: GivenErrorsLawFit,
  parameter: number,
  level: number,
): readonly [number, number] | null {
  const all = replicatesOf(fit, parameter)
  const sorted = all.filter(Number.isFinite).sort()
  if (sorted.length < (1 - refusedShare) * all.length) return null
  const tail = (1 - level) / 2
  return [orderQuantile(sorted, tail), orderQuantile(sorted, 1 - tail)]
}

/** What a referee would ask about a fit with given errors. */
export function givenErrorsWarnings(
  { fit, covariance, probability, birgeFactor }: GivenErrorsLawFit,
  points: GivenPoints,
  where: string,
): StatisticalWarning[] {
  const means = { abscissa: points.t, replicates: 0, mean: points.y, variance: points.sigma }
  const warnings = [...lawSearchWarnings(fit, means, where), ...lawErrorWarnings(fit, covariance, where)]
  const ratio = fit.chiSquare / fit.degreesOfFreedom
  if (probability > 0.999) warnings.push(warn("CHI2_TOO_SMALL", where))
  if (probability < 0.01 && birgeFactor === 1)
    warnings.push(warn("SCATTER_EXCEEDS_ERRORS", where, { ratio: ratio.toFixed(1) }))
  return warnings
}
