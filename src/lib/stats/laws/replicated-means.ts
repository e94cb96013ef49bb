import type { Ensemble } from "../ensemble/ensemble"
import { resampleCounts } from "../ensemble/bootstrap-moments"
import { normalQuantile } from "../distributions/normal-quantile"
import { randomStream } from "../random/random-stream"

/** Means and their squared standard errors, of the whole sample and of its deletions or resamples. */
export interface ReplicatedMeans {
  /** The K times at which every trajectory has a value, increasing. */
  readonly abscissa: Float64Array
  readonly replicates: number
  /** Row 0 is the whole sample, row r + 1 replicate r; (replicates + 1) K values. */
  readonly mean: Float64Array
  /** In the same layout; zero where all trajectories agree, NaN for a single one. */
  readonly variance: Float64Array
}

/** Writes how often each trajectory counts in replicate r. */
type CountTrajectories = (replicate: number, out: Float64Array) => void

/** Means without one trajectory at a time, for the jackknife. @param reference as in `resampledMeans` */
export function deletionMeans(ensemble: Ensemble, reference: number | null = null): ReplicatedMeans {
  return replicatedMeans(ensemble, reference, ensemble.ids.length, (replicate, out) => {
    out.fill(1)
    out[replicate] = 0
  })
}

/**
 * Means of B resamples of whole trajectories, one random stream each.
 *
 * @param reference index of the time by whose mean the curve is divided (ratio of means), or null
 */
export function resampledMeans(
  ensemble: Ensemble,
  { resamples, seed }: { readonly resamples: number; readonly seed: number },
  reference: number | null = null,
): ReplicatedMeans {
  return replicatedMeans(ensemble, reference, resamples, (replicate, out) =>
    resampleCounts(ensemble.ids.length, seed, replicate, out),
  )
}

/**
 * Sums over deviations from the whole sample's mean, so that nothing large cancels; the error of a ratio includes its
 * covariance.
 *
 * @see docs/methods.md, mean and error, normalisation
 */
function replicatedMeans(
  { abscissa, values, ids, weights }: Ensemble,
  reference: number | null,
  replicates: number,
  countTrajectories: CountTrajectories,
): ReplicatedMeans {
  const m = ids.length
  const times = abscissa.length
  const isComplete = (k: number) => {
    for (let i = 0; i < m; i += 1) if (Number.isNaN(values[i * times + k]!)) return false
    return true
  }
  const index = [...abscissa.keys()].filter((k) => k !== reference && isComplete(k))
  const points = index.length
  const columns = reference === null ? index : [...index, reference]
  const centre = columns.map((k) => {
    let sum = 0
    for (let i = 0; i < m; i += 1) sum += values[i * times + k]! / m
    return sum
  })
  const mean = new Float64Array((replicates + 1) * points)
  const variance = new Float64Array((replicates + 1) * points)
  const counts = new Float64Array(m)
  const shifts = new Float64Array(columns.length)
  for (let row = 0; row <= replicates; row += 1) {
    if (row === 0) counts.fill(1)
    else countTrajectories(row - 1, counts)
    let drawn = 0
    let weight = 0
    for (let i = 0; i < m; i += 1) {
      drawn += counts[i]!
      weight += counts[i]! * (weights?.[i] ?? 1)
    }
    const factor = drawn > 1 ? drawn / (drawn - 1) / (weight * weight) : Number.NaN
    shifts.fill(0)
    for (let i = 0; i < m; i += 1) {
      const cv = counts[i]! * (weights?.[i] ?? 1)
      if (cv === 0) continue
      for (let c = 0; c < columns.length; c += 1)
        shifts[c] = shifts[c]! + (cv * (values[i * times + columns[c]!]! - centre[c]!)) / weight
    }
    const base = reference === null ? 1 : centre[points]! + shifts[points]!
    for (let c = 0; c < points; c += 1) mean[row * points + c] = (centre[c]! + shifts[c]!) / base
    for (let i = 0; i < m; i += 1) {
      const v = weights?.[i] ?? 1
      const cvv = counts[i]! * v * v
      if (cvv === 0) continue
      const d0 = reference === null ? 0 : values[i * times + reference]! - base
      for (let c = 0; c < points; c += 1) {
        const at = row * points + c
        const d = values[i * times + columns[c]!]! - centre[c]! - shifts[c]! - mean[at]! * d0
        variance[at] = variance[at]! + cvv * d * d
      }
    }
    for (let c = 0; c < points; c += 1) {
      const at = row * points + c
      variance[at] = (variance[at]! * factor) / (base * base)
    }
  }
  return { abscissa: Float64Array.from(index, (k) => abscissa[k]!), replicates, mean, variance }
}

/** Above this relative error a positive value is drawn from a lognormal, which cannot change its sign. */
const lognormalAbove = 0.2

/**
 * Points with given standard errors in place of an ensemble: resample b is y + sigma z, points independent; a positive y
 * with sigma/y > 0.2 is drawn from the lognormal of the same mean and standard deviation.
 *
 * @param t abscissas, increasing; @param y values; @param sigma standard errors, positive; all of length K
 * @see docs/methods.md, values with errors
 */
export function parametricMeans(
  t: Float64Array,
  y: Float64Array,
  sigma: Float64Array,
  { resamples, seed }: { readonly resamples: number; readonly seed: number },
): ReplicatedMeans {
  const points = t.length
  const mean = new Float64Array((resamples + 1) * points)
  const variance = new Float64Array((resamples + 1) * points)
  mean.set(y)
  for (let b = 0; b < resamples; b += 1) {
    const stream = randomStream(seed, b)
    for (let k = 0; k < points; k += 1) {
      const z = normalQuantile((stream.uint32() + 0.5) / 4294967296)
      const relative = sigma[k]! / y[k]!
      const logVariance = Math.log1p(relative * relative)
      mean[(b + 1) * points + k] =
        relative > lognormalAbove
          ? y[k]! * Math.exp(Math.sqrt(logVariance) * z - logVariance / 2)
          : y[k]! + sigma[k]! * z
    }
  }
  for (let row = 0; row <= resamples; row += 1)
    for (let k = 0; k < points; k += 1) variance[row * points + k] = sigma[k]! ** 2
  return { abscissa: t, replicates: resamples, mean, variance }
}
