import { diagonalRatio, factorQr, inverseNormal } from "./householder-qr"

/** Below this ratio of the triangle's diagonal the parameters are not determined by the points. */
const rankTolerance = 1e-10

/**
 * (J'J)^-1 of a Jacobian whose rows are already divided by the errors: the covariance of the parameters when the errors
 * are known; times sum of squares / (n - p) when their scale is estimated.
 *
 * @param jacobian row-major n x p, kept
 * @returns row-major p x p, all NaN where the columns are dependent
 * @see Bates & Watts, Nonlinear Regression Analysis (1988), section 2.2
 */
export function normalCovariance(jacobian: Float64Array, rows: number, columns: number): Float64Array {
  const scaled = Float64Array.from(jacobian)
  const norms = new Float64Array(columns)
  for (let i = 0; i < rows * columns; i += 1)
    norms[i % columns] = norms[i % columns]! + jacobian[i]! * jacobian[i]!
  for (let j = 0; j < columns; j += 1) norms[j] = Math.sqrt(norms[j]!)
  for (let i = 0; i < rows * columns; i += 1) scaled[i] = scaled[i]! / norms[i % columns]!
  const undetermined = new Float64Array(columns * columns).fill(Number.NaN)
  if (rows < columns || norms.some((norm) => !(norm > 0) || norm === Infinity)) return undetermined
  const qr = factorQr(scaled, rows, columns)
  if (diagonalRatio(qr) < rankTolerance) return undetermined
  return inverseNormal(qr).map((value, k) => value / (norms[Math.floor(k / columns)]! * norms[k % columns]!))
}

/** Correlation of two parameters from a row-major p x p covariance; NaN where an error is zero. */
export function correlationOf(covariance: Float64Array, p: number, a: number, b: number): number {
  return covariance[a * p + b]! / Math.sqrt(covariance[a * p + a]! * covariance[b * p + b]!)
}
