import type { LogMoments } from "../ensemble/log-moments"
import { jackknife, jackknifeCovariance, type JackknifeSummary } from "../resampling/jackknife"
import { fitLogLine, logWeights, type LogLine, type LogWeights } from "./fit-log-line"

export type PowerLawRefusal = "TOO_FEW_POINTS" | "NONPOSITIVE_MEANS"

/** y = exp(level) (t / t_centre)^slope, fitted to the ensemble mean inside a window, and to each replicate of it. */
export interface PowerLawFit extends LogLine {
  /** First and one past the last point used, in the log moments' grid. */
  readonly from: number
  readonly to: number
  /** Of each replicate; NaN where a replicate's mean is not positive. */
  readonly slopes: Float64Array
  /** ln of each replicate's fitted mean at the whole sample's centre. */
  readonly levels: Float64Array
  readonly curvatures: Float64Array
}

/** Points of the grid inside a closed window of the abscissa (not its logarithm); null leaves a side open. */
export function pointsInWindow(
  x: Float64Array,
  [low, high]: readonly [number | null, number | null],
): readonly [number, number] {
  const slack = 1e-9
  const lowX = low === null || low <= 0 ? -Infinity : Math.log(low) - slack
  const highX = high === null ? Infinity : high <= 0 ? -Infinity : Math.log(high) + slack
  let from = 0
  while (from < x.length && x[from]! < lowX) from += 1
  let to = x.length
  while (to > from && x[to - 1]! > highX) to -= 1
  return [from, to]
}

/**
 * Log–log weighted least squares on the ensemble mean, repeated on every replicate, weights included.
 *
 * @param moments of the reduced ensemble and its deletions or resamples
 * @param window closed interval of the abscissa
 * @returns the fit, or why there is none
 * @see docs/methods.md, power law
 */
export function fitPowerLaw(
  moments: LogMoments,
  window: readonly [number | null, number | null],
  mode: LogWeights = "smoothed",
): PowerLawFit | { readonly refused: PowerLawRefusal; readonly points: number } {
  const { x, lnMean, lnRelativeVariance, replicates } = moments
  const points = x.length
  const [from, to] = pointsInWindow(x, window)
  if (to - from < 3) return { refused: "TOO_FEW_POINTS", points: Math.max(0, to - from) }
  let undefinedPoints = 0
  for (let k = from; k < to; k += 1) if (!Number.isFinite(lnMean[k]!)) undefinedPoints += 1
  if (undefinedPoints > 0) return { refused: "NONPOSITIVE_MEANS", points: undefinedPoints }

  const weights = new Float64Array(to - from)
  const lineOf = (row: number) => {
    logWeights(lnRelativeVariance, row * points, from, to, mode, weights)
    return fitLogLine(x, lnMean, row * points, from, to, weights)
  }
  const whole = lineOf(0)
  const slopes = new Float64Array(replicates)
  const levels = new Float64Array(replicates)
  const curvatures = new Float64Array(replicates)
  for (let i = 0; i < replicates; i += 1) {
    const line = lineOf(i + 1)
    slopes[i] = line.slope
    levels[i] = line.level + line.slope * (whole.centre - line.centre)
    curvatures[i] = line.curvature
  }
  return { ...whole, from, to, slopes, levels, curvatures }
}

/** Errors of a fit whose replicates are the deletions of one trajectory. */
export interface PowerLawErrors {
  readonly slope: JackknifeSummary
  readonly level: JackknifeSummary
  readonly curvature: JackknifeSummary
  /** Between level and slope. */
  readonly covariance: number
}

/** Jackknife errors of a fit to deletions. @see docs/methods.md, uncertainty */
export function powerLawErrors(fit: PowerLawFit): PowerLawErrors {
  return {
    slope: jackknife(fit.slope, fit.slopes),
    level: jackknife(fit.level, fit.levels),
    curvature: jackknife(fit.curvature, fit.curvatures),
    covariance: jackknifeCovariance(fit.levels, fit.slopes),
  }
}

/** Standard error of the fitted ln y at x = ln t. */
export function lineError(
  fit: LogLine,
  errors: { readonly slope: number; readonly level: number; readonly covariance: number },
  x: number,
): number {
  const d = x - fit.centre
  return Math.sqrt(Math.max(0, errors.level ** 2 + 2 * d * errors.covariance + d * d * errors.slope ** 2))
}
