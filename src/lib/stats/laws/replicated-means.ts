import type { Ensemble } from "../ensemble/ensemble"
import { resampleCounts } from "../ensemble/bootstrap-moments"

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

/** Means without one trajectory at a time, for the jackknife. @param reference as in `resampledMeans` */
export function deletionMeans(ensemble: Ensemble, reference: number | null = null): ReplicatedMeans {
  const m = ensemble.ids.length
  const sums = new TrajectorySums(ensemble, reference)
  for (let i = 0; i < m; i += 1) sums.add(i, 1)
  return collect(sums, m, (i, write) => {
    sums.add(i, -1)
    write()
    sums.add(i, 1)
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
  const m = ensemble.ids.length
  const sums = new TrajectorySums(ensemble, reference)
  const counts = new Float64Array(m)
  for (let i = 0; i < m; i += 1) sums.add(i, 1)
  return collect(sums, resamples, (replicate, write) => {
    resampleCounts(m, seed, replicate, counts)
    sums.clear()
    for (let i = 0; i < m; i += 1) if (counts[i]! > 0) sums.add(i, counts[i]!)
    write()
  })
}

/** Row 0 from the sums as they stand, then one row a replicate. */
function collect(
  sums: TrajectorySums,
  replicates: number,
  visit: (replicate: number, write: () => void) => void,
): ReplicatedMeans {
  const mean = new Float64Array((replicates + 1) * sums.points)
  const variance = new Float64Array((replicates + 1) * sums.points)
  sums.write(mean, variance, 0)
  for (let r = 0; r < replicates; r += 1) visit(r, () => sums.write(mean, variance, (r + 1) * sums.points))
  return { abscissa: sums.abscissa, replicates, mean, variance }
}

/**
 * Running sums over trajectories of weighted deviations d from the whole sample's mean, so that nothing large cancels:
 * c v d, c v^2 d, c v^2 d^2 and, for a ratio, c v^2 d d0, with c the times a trajectory counts and v its weight.
 *
 * @see docs/methods.md, mean and error, normalisation
 */
class TrajectorySums {
  readonly abscissa: Float64Array
  readonly points: number
  private readonly columns: number
  private readonly centre: Float64Array
  private readonly deviations: Float64Array
  private readonly weights: Float64Array
  private readonly hasReference: boolean
  private drawn = 0
  private weight = 0
  private weightSquares = 0
  private readonly first: Float64Array
  private readonly skew: Float64Array
  private readonly square: Float64Array
  private readonly cross: Float64Array

  constructor({ abscissa, values, ids, weights }: Ensemble, reference: number | null) {
    const m = ids.length
    const times = abscissa.length
    const isComplete = (k: number) => {
      for (let i = 0; i < m; i += 1) if (Number.isNaN(values[i * times + k]!)) return false
      return true
    }
    const index = [...abscissa.keys()].filter((k) => k !== reference && isComplete(k))
    const all = reference === null ? index : [...index, reference]
    this.abscissa = Float64Array.from(index, (k) => abscissa[k]!)
    this.points = index.length
    this.columns = all.length
    this.hasReference = reference !== null
    this.weights = weights ?? new Float64Array(m).fill(1)
    this.centre = new Float64Array(this.columns)
    this.deviations = new Float64Array(m * this.columns)
    this.first = new Float64Array(this.columns)
    this.skew = new Float64Array(this.columns)
    this.square = new Float64Array(this.columns)
    this.cross = new Float64Array(this.columns)
    all.forEach((k, c) => {
      for (let i = 0; i < m; i += 1) this.centre[c] = this.centre[c]! + values[i * times + k]! / m
      for (let i = 0; i < m; i += 1)
        this.deviations[i * this.columns + c] = values[i * times + k]! - this.centre[c]!
    })
  }

  clear(): void {
    this.drawn = 0
    this.weight = 0
    this.weightSquares = 0
    for (const sums of [this.first, this.skew, this.square, this.cross]) sums.fill(0)
  }

  /** Counts trajectory i so many times more. */
  add(i: number, count: number): void {
    const v = this.weights[i]!
    const cv = count * v
    const cvv = cv * v
    const row = i * this.columns
    const d0 = this.deviations[row + this.points] ?? 0
    this.drawn += count
    this.weight += cv
    this.weightSquares += cvv
    const { deviations, first, skew, square, cross, columns, hasReference } = this
    for (let c = 0; c < columns; c += 1) {
      const d = deviations[row + c]!
      const weighted = cvv * d
      first[c] = first[c]! + cv * d
      skew[c] = skew[c]! + weighted
      square[c] = square[c]! + weighted * d
      if (hasReference) cross[c] = cross[c]! + weighted * d0
    }
  }

  /** Writes mean and squared error, or those of the ratio to the reference time, covariance included. */
  write(mean: Float64Array, variance: Float64Array, offset: number): void {
    const { points, weight, weightSquares, first, skew, square, cross, drawn } = this
    const factor = drawn > 1 ? drawn / (drawn - 1) / (weight * weight) : Number.NaN
    const centredSquare = (c: number) => {
      const shift = first[c]! / weight
      return square[c]! - 2 * shift * skew[c]! + shift * shift * weightSquares
    }
    const shift0 = this.hasReference ? first[points]! / weight : 0
    const base = this.hasReference ? this.centre[points]! + shift0 : 1
    const q0 = this.hasReference ? centredSquare(points) : 0
    for (let c = 0; c < points; c += 1) {
      const shift = first[c]! / weight
      const ratio = (this.centre[c]! + shift) / base
      let q = centredSquare(c)
      if (this.hasReference) {
        const q1 = cross[c]! - shift * skew[points]! - shift0 * skew[c]! + shift * shift0 * weightSquares
        q += ratio * ratio * q0 - 2 * ratio * q1
      }
      mean[offset + c] = ratio
      variance[offset + c] = (factor * Math.max(0, q)) / (base * base)
    }
  }
}
