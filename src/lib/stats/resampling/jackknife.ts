/** What leaving out one trajectory at a time says about a statistic. */
export interface JackknifeSummary {
  readonly standardError: number
  /** (M - 1)(mean of deletions - estimate); reported, never subtracted. */
  readonly bias: number
  /** Skewness-based acceleration, for BCa intervals. */
  readonly acceleration: number
  /** Largest share of one trajectory in the squared error, and which one. */
  readonly largestShare: number
  readonly largestIndex: number
}

/**
 * Delete-one jackknife over trajectories.
 *
 * SE^2 = (M-1)/M sum (theta_(i) - mean theta_(.))^2
 *
 * @param estimate the statistic on the whole sample
 * @param deletions the statistic without trajectory i, length M
 * @see Efron & Tibshirani, An Introduction to the Bootstrap (1993), chapter 11
 * @example jackknife(2, Float64Array.of(1.5, 2, 2.5)).standardError // sqrt(2/3 * 0.5)
 */
export function jackknife(estimate: number, deletions: Float64Array): JackknifeSummary {
  const m = deletions.length
  let sum = 0
  for (const value of deletions) sum += value
  const mean = sum / m
  let squares = 0
  let cubes = 0
  let largest = 0
  let largestIndex = 0
  deletions.forEach((value, i) => {
    const d = mean - value
    squares += d * d
    cubes += d * d * d
    if (d * d > largest) {
      largest = d * d
      largestIndex = i
    }
  })
  return {
    standardError: Math.sqrt(((m - 1) / m) * squares),
    bias: (m - 1) * (mean - estimate),
    acceleration: cubes / (6 * squares ** 1.5),
    largestShare: squares > 0 ? largest / squares : 0,
    largestIndex,
  }
}

/** Jackknife covariance of two statistics over the same deletions. */
export function jackknifeCovariance(one: Float64Array, other: Float64Array): number {
  const m = one.length
  const mean = (values: Float64Array) => values.reduce((sum, value) => sum + value, 0) / m
  const meanOne = mean(one)
  const meanOther = mean(other)
  let sum = 0
  for (let i = 0; i < m; i += 1) sum += (one[i]! - meanOne) * (other[i]! - meanOther)
  return ((m - 1) / m) * sum
}
