/** What the signal has to exceed: a value, or a fraction of its last or largest value at the same position. */
export interface Threshold {
  readonly of: "value" | "final" | "maximum"
  readonly level: number
}

/**
 * First upward crossing of a threshold after which the signal stays above for at least two samples, linear in between.
 *
 * @param t times, increasing; @param signal at one position; both of length T
 * @returns NaN where there is no such crossing, also when the signal starts above
 * @see docs/methods.md, fronts
 */
export function arrivalTime(t: Float64Array, signal: Float64Array, { of, level }: Threshold): number {
  const last = signal[signal.length - 1]!
  const c = of === "value" ? level : level * (of === "final" ? last : signal.reduce((a, b) => Math.max(a, b)))
  for (let k = 1; k + 1 < t.length; k += 1) {
    const before = signal[k - 1]!
    const after = signal[k]!
    if (before < c && after >= c && signal[k + 1]! >= c)
      return t[k - 1]! + ((c - before) / (after - before)) * (t[k]! - t[k - 1]!)
  }
  return Number.NaN
}

/**
 * Arrival time at each position of a mean map.
 *
 * @param map X x T, times running fastest
 */
export function arrivalTimes(t: Float64Array, map: Float64Array, threshold: Threshold): Float64Array {
  const positions = map.length / t.length
  return Float64Array.from({ length: positions }, (_, a) =>
    arrivalTime(t, map.subarray(a * t.length, (a + 1) * t.length), threshold),
  )
}
