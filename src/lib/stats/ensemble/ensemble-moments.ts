import type { Ensemble } from "./ensemble"

/** Mean over trajectories and its error at each time. */
export interface Moments {
  /** Length T. */
  readonly mean: Float64Array
  /** Standard error of the mean; NaN for a single trajectory. */
  readonly standardError: Float64Array
  /** Trajectories with a value at each time. */
  readonly count: Float64Array
}

/**
 * Weighted mean over trajectories at each time and its standard error, two-pass.
 *
 * m = sum v y / sum v;  SE^2 = M/(M-1) sum (v (y - m))^2 / (sum v)^2, which for equal weights is s^2/M with divisor M-1.
 * Missing values (NaN) are left out time by time and counted.
 *
 * @see docs/methods.md, mean and error
 */
export function ensembleMoments({ abscissa, values, ids, weights }: Ensemble): Moments {
  const times = abscissa.length
  const mean = new Float64Array(times)
  const standardError = new Float64Array(times)
  const count = new Float64Array(times)
  for (let k = 0; k < times; k += 1) {
    let sum = 0
    let weight = 0
    let n = 0
    for (let i = 0; i < ids.length; i += 1) {
      const y = values[i * times + k]!
      if (Number.isNaN(y)) continue
      const v = weights?.[i] ?? 1
      sum += v * y
      weight += v
      n += 1
    }
    const m = sum / weight
    // Second pass: the residual sum corrects what rounding left in the mean.
    let correction = 0
    let squares = 0
    for (let i = 0; i < ids.length; i += 1) {
      const y = values[i * times + k]!
      if (Number.isNaN(y)) continue
      const d = (weights?.[i] ?? 1) * (y - m)
      correction += d
      squares += d * d
    }
    mean[k] = m + correction / weight
    standardError[k] = n > 1 ? Math.sqrt((n / (n - 1)) * squares) / weight : Number.NaN
    count[k] = n
  }
  return { mean, standardError, count }
}

/** Effective number of trajectories (sum v)^2 / sum v^2; M when all count the same. @see Kish, Survey Sampling (1965) */
export function effectiveTrajectories({ ids, weights }: Ensemble): number {
  if (!weights) return ids.length
  const sum = weights.reduce((a, v) => a + v, 0)
  const squares = weights.reduce((a, v) => a + v * v, 0)
  return (sum * sum) / squares
}
