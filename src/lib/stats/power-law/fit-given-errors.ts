import { fitLogLine, logWeights, type LogLine, type LogWeights } from "./fit-log-line"

/** A log–log line through points whose standard errors are given, with the errors that follow from them alone. */
export interface GivenErrorsFit extends LogLine {
  readonly slopeError: number
  readonly levelError: number
  /** Between level and slope; zero up to rounding with inverse-variance weights. */
  readonly covariance: number
  readonly chiSquare: number
  readonly degreesOfFreedom: number
}

/**
 * Weighted least squares of ln y with known errors: var(slope) = 1 / sum w (x - centre)^2, var(level) = 1 / sum w with
 * w = (y/sigma)^2. With smoothed or equal weights the variances are those of the linear estimator under the same errors.
 *
 * @param relativeVariance (sigma/y)^2 of each point of the window
 * @see Draper & Smith, Applied Regression Analysis; values checked against R's lm in tests/reference
 */
export function fitGivenErrors(
  x: Float64Array,
  lnY: Float64Array,
  relativeVariance: Float64Array,
  mode: LogWeights,
): GivenErrorsFit {
  const n = x.length
  const weights = new Float64Array(n)
  logWeights(relativeVariance.map(Math.log), 0, 0, n, mode, weights)
  const line = fitLogLine(x, lnY, 0, 0, n, weights)
  let weight = 0
  let xx = 0
  for (let k = 0; k < n; k += 1) {
    weight += weights[k]!
    xx += weights[k]! * (x[k]! - line.centre) ** 2
  }
  let slopeVariance = 0
  let levelVariance = 0
  let covariance = 0
  let chiSquare = 0
  for (let k = 0; k < n; k += 1) {
    const toSlope = (weights[k]! * (x[k]! - line.centre)) / xx
    const toLevel = weights[k]! / weight
    slopeVariance += toSlope * toSlope * relativeVariance[k]!
    levelVariance += toLevel * toLevel * relativeVariance[k]!
    covariance += toSlope * toLevel * relativeVariance[k]!
    chiSquare += (lnY[k]! - line.level - line.slope * (x[k]! - line.centre)) ** 2 / relativeVariance[k]!
  }
  return {
    ...line,
    slopeError: Math.sqrt(slopeVariance),
    levelError: Math.sqrt(levelVariance),
    covariance,
    chiSquare,
    degreesOfFreedom: n - 2,
  }
}
