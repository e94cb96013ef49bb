import { randomStream } from "../random/random-stream"
import type { Ensemble } from "./ensemble"
import { completeTimes, type LogMoments } from "./log-moments"

/** How often each trajectory is drawn in resample `index`: M draws with replacement from its own stream. */
export function resampleCounts(trajectories: number, seed: number, index: number, out: Float64Array): void {
  const stream = randomStream(seed, index)
  out.fill(0)
  for (let draw = 0; draw < trajectories; draw += 1) {
    const i = stream.below(trajectories)
    out[i] = out[i]! + 1
  }
}

/**
 * Log moments of B resamples of whole trajectories, in the layout of `logMoments`: row 0 is the whole sample. Sums run
 * over deviations from the whole sample's mean, so nothing large cancels. Reduced in index order on one stream per
 * resample: the same bits whatever the host.
 *
 * @param whole moments of the same ensemble and reference; its row 0 is taken over
 * @param onProgress called now and then with the number of finished resamples
 * @see docs/methods.md, bootstrap
 */
export function bootstrapMoments(
  ensemble: Ensemble,
  whole: LogMoments,
  reference: number | null,
  { resamples, seed }: { readonly resamples: number; readonly seed: number },
  onProgress?: (done: number) => void,
): LogMoments {
  const { abscissa, values, ids } = ensemble
  const m = ids.length
  const index = completeTimes(ensemble, reference)
  const points = index.length
  const columns = reference === null ? points : points + 1
  const centre = new Float64Array(columns)
  const weights = ensemble.weights ?? new Float64Array(m).fill(1)
  // deviations[i * columns + c] = y - centre; the reference time, if any, is the last column.
  const deviations = new Float64Array(m * columns)
  for (let c = 0; c < columns; c += 1) {
    const k = c < points ? index[c]! : reference!
    for (let i = 0; i < m; i += 1) centre[c] = centre[c]! + values[i * abscissa.length + k]! / m
    for (let i = 0; i < m; i += 1) deviations[i * columns + c] = values[i * abscissa.length + k]! - centre[c]!
  }

  const lnMean = new Float64Array((resamples + 1) * points)
  const lnRelativeVariance = new Float64Array((resamples + 1) * points)
  lnMean.set(whole.lnMean.subarray(0, points))
  lnRelativeVariance.set(whole.lnRelativeVariance.subarray(0, points))
  const counts = new Float64Array(m)
  // Weighted sums over the resample: c v d, c v^2 d, c v^2 d^2, and c v^2 d d0 with the reference column.
  const first = new Float64Array(columns)
  const skew = new Float64Array(columns)
  const square = new Float64Array(columns)
  const cross = new Float64Array(columns)
  for (let b = 0; b < resamples; b += 1) {
    resampleCounts(m, seed, b, counts)
    first.fill(0)
    skew.fill(0)
    square.fill(0)
    cross.fill(0)
    let weight = 0
    let weightSquares = 0
    for (let i = 0; i < m; i += 1) {
      const count = counts[i]!
      if (count === 0) continue
      const v = weights[i]!
      const cv = count * v
      const cvv = cv * v
      weight += cv
      weightSquares += cvv
      const row = i * columns
      const d0 = reference === null ? 0 : deviations[row + points]!
      for (let c = 0; c < columns; c += 1) {
        const d = deviations[row + c]!
        const vd = cvv * d
        first[c] = first[c]! + cv * d
        skew[c] = skew[c]! + vd
        square[c] = square[c]! + vd * d
        if (reference !== null) cross[c] = cross[c]! + vd * d0
      }
    }
    const shift0 = reference === null ? 0 : first[points]! / weight
    const mean0 = reference === null ? 1 : centre[points]! + shift0
    const q0 =
      reference === null ? 0 : square[points]! - 2 * shift0 * skew[points]! + shift0 * shift0 * weightSquares
    for (let c = 0; c < points; c += 1) {
      const shift = first[c]! / weight
      const mean = centre[c]! + shift
      let relative = (square[c]! - 2 * shift * skew[c]! + shift * shift * weightSquares) / (mean * mean)
      if (reference !== null) {
        const q1 = cross[c]! - shift * skew[points]! - shift0 * skew[c]! + shift * shift0 * weightSquares
        relative += q0 / (mean0 * mean0) - (2 * q1) / (mean * mean0)
      }
      const at = (b + 1) * points + c
      lnMean[at] = Math.log(mean / mean0)
      lnRelativeVariance[at] = Math.log(Math.max(0, (m / (m - 1)) * relative) / (weight * weight))
    }
    if (onProgress && b % 64 === 63) onProgress(b + 1)
  }
  return { x: whole.x, index, trajectories: m, replicates: resamples, lnMean, lnRelativeVariance }
}
