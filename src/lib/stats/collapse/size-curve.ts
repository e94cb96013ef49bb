/** One curve of a collapse, in logarithms: ln y with relative errors over ln t, for one system size. */
export interface SizeCurve {
  readonly lnSize: number
  /** ln t, increasing, length n. */
  readonly x: Float64Array
  /** ln y, length n. */
  readonly y: Float64Array
  /** Standard error of y over y, length n; all 1 where no errors are known. */
  readonly error: Float64Array
}

/** y = L^a F(t/L^z). */
export interface CollapseExponents {
  readonly a: number
  readonly z: number
}

/**
 * A curve for the collapse from values at t > 0 inside a window.
 *
 * @param size L, positive; @param window of t, closed, the same rule for every size
 * @param sigma standard errors of y; absent when unknown
 * @returns null when a value in the window is not positive: its logarithm does not exist
 */
export function sizeCurve(
  size: number,
  t: Float64Array,
  y: ArrayLike<number>,
  sigma: ArrayLike<number> | null,
  [low, high]: readonly [number | null, number | null] = [null, null],
): SizeCurve | null {
  const used = [...t.keys()].filter(
    (k) => t[k]! > 0 && (low === null || t[k]! >= low) && (high === null || t[k]! <= high),
  )
  if (used.some((k) => !(y[k]! > 0))) return null
  return {
    lnSize: Math.log(size),
    x: Float64Array.from(used, (k) => Math.log(t[k]!)),
    y: Float64Array.from(used, (k) => Math.log(y[k]!)),
    error: Float64Array.from(used, (k) => (sigma ? sigma[k]! / y[k]! : 1)),
  }
}
