/** 2 k (k + 1)/(n - k - 1), the correction for few points; Infinity where the points do not suffice. */
const smallSample = (k: number, n: number) => (n - k - 1 > 0 ? (2 * k * (k + 1)) / (n - k - 1) : Infinity)

/**
 * Akaike's criterion, corrected for few points, when the errors are known: chi-square + 2 k + 2 k (k + 1)/(n - k - 1).
 *
 * @param k parameters of the curve; @param n points
 * @see Hurvich & Tsai, Biometrika 76, 297 (1989); Burnham & Anderson (2002)
 */
export function aiccKnownErrors(chiSquare: number, k: number, n: number): number {
  return chiSquare + 2 * k + smallSample(k, n)
}

/**
 * The same when the scale of the errors is estimated from the residuals, which counts as one parameter more. Constants
 * that are common to all models of the same n points are left out.
 *
 * @param sumOfSquares of the residuals, weighted alike for all models compared
 */
export function aiccEstimatedScale(sumOfSquares: number, k: number, n: number): number {
  return n * Math.log(sumOfSquares / n) + 2 * (k + 1) + smallSample(k + 1, n)
}

/**
 * Akaike weights exp(-D/2)/sum, D the distance from the best; they sum to 1.
 *
 * @see Burnham & Anderson, Model Selection and Multimodel Inference (2002), section 2.9
 * @example akaikeWeights([10, 10]) // [0.5, 0.5]
 */
export function akaikeWeights(criteria: readonly number[]): number[] {
  const best = Math.min(...criteria)
  const relative = criteria.map((value) => (value === best ? 1 : Math.exp((best - value) / 2)))
  const sum = relative.reduce((a, b) => a + b, 0)
  return relative.map((value) => value / sum)
}
