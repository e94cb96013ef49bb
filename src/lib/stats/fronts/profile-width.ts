/** A non-negative profile as a distribution over position. */
export interface ProfileMoments {
  /** Integral of the profile. */
  readonly total: number
  readonly mean: number
  readonly variance: number
}

/**
 * Total, mean and variance of a profile by the trapezoid rule. The tails decide the variance: subtract the background
 * first, and say over which range it was taken.
 *
 * @param x positions, increasing; @param profile values; @param background subtracted from each value
 * @example profileMoments(Float64Array.of(-1, 0, 1), Float64Array.of(0, 1, 0)).mean // 0
 */
export function profileMoments(x: Float64Array, profile: Float64Array, background = 0): ProfileMoments {
  const n = x.length
  const weight = (k: number) => (x[Math.min(k + 1, n - 1)]! - x[Math.max(k - 1, 0)]!) / 2
  let total = 0
  let first = 0
  for (let k = 0; k < n; k += 1) {
    const p = weight(k) * (profile[k]! - background)
    total += p
    first += p * x[k]!
  }
  const mean = first / total
  let second = 0
  for (let k = 0; k < n; k += 1) second += weight(k) * (profile[k]! - background) * (x[k]! - mean) ** 2
  return { total, mean, variance: second / total }
}

/**
 * Positions on a ring of length `period`, cut open opposite to the circular mean of the profile, so that a peak across
 * the seam stays whole.
 *
 * @returns the order in which to read the profile and the unwrapped positions, increasing
 */
export function unwrapRing(
  x: Float64Array,
  profile: Float64Array,
  period: number,
): { readonly order: number[]; readonly x: Float64Array } {
  let cosine = 0
  let sine = 0
  for (let k = 0; k < x.length; k += 1) {
    const angle = (2 * Math.PI * x[k]!) / period
    cosine += profile[k]! * Math.cos(angle)
    sine += profile[k]! * Math.sin(angle)
  }
  const centre = (Math.atan2(sine, cosine) * period) / (2 * Math.PI)
  const unwrapped = x.map((value) => value - period * Math.round((value - centre) / period))
  const order = [...x.keys()].sort((a, b) => unwrapped[a]! - unwrapped[b]!)
  return { order, x: Float64Array.from(order, (k) => unwrapped[k]!) }
}

/**
 * Full width at half maximum between the outermost crossings of half the peak height, linear in between.
 *
 * @returns NaN when the profile does not fall below half its height on both sides
 */
export function fullWidthHalfMaximum(x: Float64Array, profile: Float64Array, background = 0): number {
  const n = x.length
  const half = (profile.reduce((a, b) => Math.max(a, b)) - background) / 2 + background
  const crossing = (below: number, above: number) =>
    x[below]! + ((half - profile[below]!) / (profile[above]! - profile[below]!)) * (x[above]! - x[below]!)
  let left = 0
  while (left < n && profile[left]! < half) left += 1
  let right = n - 1
  while (right >= 0 && profile[right]! < half) right -= 1
  if (left === 0 || right === n - 1) return Number.NaN
  return crossing(right + 1, right) - crossing(left - 1, left)
}
