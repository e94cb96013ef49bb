import type { Ensemble } from "./ensemble"

/**
 * Logarithms of the mean and of its squared relative error, on the complete times with t > 0: of the whole sample and of
 * its replicates (deletions of one trajectory, or resamples).
 */
export interface LogMoments {
  /** ln t, length K. */
  readonly x: Float64Array
  /** Index of each of the K points in the ensemble's abscissa. */
  readonly index: Int32Array
  readonly trajectories: number
  readonly replicates: number
  /** Row 0 is the whole sample, row r + 1 replicate r; (replicates + 1) K values. NaN where a mean is not positive. */
  readonly lnMean: Float64Array
  /** ln (SE/mean)^2 in the same layout; -Infinity where the error is zero. */
  readonly lnRelativeVariance: Float64Array
}

/** Sums over trajectories at one time, from which every deletion follows in closed form. */
interface Sums {
  readonly weight: number
  readonly mean: number
  /** v (y - m) of each trajectory. */
  readonly deviations: Float64Array
  /** sum v^2 (y - m) */
  readonly skew: number
}

/**
 * Moments of an ensemble and of each of its M deletions in O(M T), from centred sums: nothing is subtracted that was
 * not first centred. With a reference time the mean is divided by the mean at that time and the relative error is that
 * of the ratio, covariance included.
 *
 * @param reference index into the abscissa of the time to divide by, or null
 * @see docs/methods.md, jackknife and normalisation
 */
export function logMoments(ensemble: Ensemble, reference: number | null = null): LogMoments {
  const { abscissa, ids } = ensemble
  const trajectories = ids.length
  const complete = (k: number) => {
    for (let i = 0; i < trajectories; i += 1)
      if (Number.isNaN(ensemble.values[i * abscissa.length + k]!)) return false
    return true
  }
  const index = Int32Array.from(
    [...abscissa.keys()].filter((k) => abscissa[k]! > 0 && k !== reference && complete(k)),
  )
  const points = index.length
  const lnMean = new Float64Array((trajectories + 1) * points)
  const lnRelativeVariance = new Float64Array((trajectories + 1) * points)
  const weights = ensemble.weights ?? new Float64Array(trajectories).fill(1)
  const squares = weights.reduce((sum, v) => sum + v * v, 0)
  const base = reference === null ? null : sumsAt(ensemble, weights, reference)
  const baseSquares = base ? dot(base.deviations, base.deviations) : 0

  for (let point = 0; point < points; point += 1) {
    const own = sumsAt(ensemble, weights, index[point]!)
    const ownSquares = dot(own.deviations, own.deviations)
    const cross = base ? dot(own.deviations, base.deviations) : 0
    for (let row = 0; row <= trajectories; row += 1) {
      const i = row - 1
      const v = i < 0 ? 0 : weights[i]!
      const e = i < 0 ? 0 : own.deviations[i]!
      const n = i < 0 ? trajectories : trajectories - 1
      const weight = own.weight - v
      const shift = i < 0 ? 0 : -e / weight
      const mean = own.mean + shift
      const left = squares - v * v
      const q = ownSquares - e * e - 2 * shift * (own.skew - v * e) + shift * shift * left
      let relative = q / (mean * mean)
      let logarithm = Math.log(mean)
      if (base) {
        const e0 = i < 0 ? 0 : base.deviations[i]!
        const shift0 = i < 0 ? 0 : -e0 / weight
        const mean0 = base.mean + shift0
        const q0 = baseSquares - e0 * e0 - 2 * shift0 * (base.skew - v * e0) + shift0 * shift0 * left
        const q1 =
          cross - e * e0 - shift0 * (own.skew - v * e) - shift * (base.skew - v * e0) + shift * shift0 * left
        relative += q0 / (mean0 * mean0) - (2 * q1) / (mean * mean0)
        logarithm -= Math.log(mean0)
      }
      lnMean[row * points + point] = logarithm
      lnRelativeVariance[row * points + point] = Math.log(
        Math.max(0, (n / (n - 1)) * relative) / (weight * weight),
      )
    }
  }
  return {
    x: Float64Array.from(index, (k) => Math.log(abscissa[k]!)),
    index,
    trajectories,
    replicates: trajectories,
    lnMean,
    lnRelativeVariance,
  }
}

/** Indices of the times t > 0 at which every trajectory has a value, without the reference time. */
export function completeTimes({ abscissa, values, ids }: Ensemble, reference: number | null): Int32Array {
  const complete = (k: number) => {
    for (let i = 0; i < ids.length; i += 1) if (Number.isNaN(values[i * abscissa.length + k]!)) return false
    return true
  }
  return Int32Array.from(
    [...abscissa.keys()].filter((k) => abscissa[k]! > 0 && k !== reference && complete(k)),
  )
}

function sumsAt({ abscissa, values, ids }: Ensemble, weights: Float64Array, k: number): Sums {
  const times = abscissa.length
  let weight = 0
  let sum = 0
  for (let i = 0; i < ids.length; i += 1) {
    weight += weights[i]!
    sum += weights[i]! * values[i * times + k]!
  }
  let mean = sum / weight
  let correction = 0
  for (let i = 0; i < ids.length; i += 1) correction += weights[i]! * (values[i * times + k]! - mean)
  mean += correction / weight
  const deviations = Float64Array.from(ids, (_, i) => weights[i]! * (values[i * times + k]! - mean))
  return { weight, mean, deviations, skew: dot(weights, deviations) }
}

function dot(a: Float64Array, b: Float64Array): number {
  let sum = 0
  for (let i = 0; i < a.length; i += 1) sum += a[i]! * b[i]!
  return sum
}
