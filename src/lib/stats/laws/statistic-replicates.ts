import { jackknife, type JackknifeSummary } from "../resampling/jackknife"
import type { ReplicatedMeans } from "./replicated-means"

/** Several numbers computed from a mean curve, and again from each deletion or resample of it. */
export interface StatisticReplicates {
  /** Length s. */
  readonly estimate: Float64Array
  /** Replicates of each of the s numbers, NaN where one could not be computed. */
  readonly replicates: readonly Float64Array[]
}

/**
 * Repeats a whole computation on every replicate of the mean: what the jackknife and the bootstrap of any number need.
 *
 * @param statistic from the means of one row to s numbers, NaN for those that do not exist
 * @example overReplicates(deletionMeans(ensemble), (mean) => [Math.max(...mean)])
 */
export function overReplicates(
  { mean, replicates, abscissa }: ReplicatedMeans,
  statistic: (mean: Float64Array) => ArrayLike<number>,
): StatisticReplicates {
  const points = abscissa.length
  const estimate = Float64Array.from(statistic(mean.subarray(0, points)))
  const columns = Array.from(estimate, () => new Float64Array(replicates))
  for (let r = 0; r < replicates; r += 1) {
    const values = statistic(mean.subarray((r + 1) * points, (r + 2) * points))
    columns.forEach((column, s) => (column[r] = values[s]!))
  }
  return { estimate, replicates: columns }
}

/** Jackknife of each number over its deletions. */
export function jackknifeEach({ estimate, replicates }: StatisticReplicates): JackknifeSummary[] {
  return replicates.map((column, s) => jackknife(estimate[s]!, column))
}
