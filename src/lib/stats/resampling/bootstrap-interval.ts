import { normalCdf } from "../distributions/normal-cdf"
import { normalQuantile } from "../distributions/normal-quantile"
import { tQuantile } from "../distributions/t-quantile"

export type BootstrapKind = "percentile" | "expanded-percentile" | "basic" | "bca"

export interface BootstrapInterval {
  readonly low: number
  readonly high: number
  /** Standard deviation of the resampled statistic. */
  readonly standardError: number
  /** Mean of the resampled statistic minus the estimate. */
  readonly bias: number
  /** Share of resamples in which the statistic could not be computed. */
  readonly failedShare: number
}

/**
 * The p quantile of sorted values as the order statistic at (B + 1) p, linear in between, held at the ends.
 *
 * @see Davison & Hinkley, Bootstrap Methods and their Application (1997), section 5.3
 */
export function orderQuantile(sorted: ArrayLike<number>, p: number): number {
  const position = (sorted.length + 1) * p - 1
  const at = Math.min(Math.max(position, 0), sorted.length - 1)
  const below = Math.floor(at)
  const above = Math.min(below + 1, sorted.length - 1)
  return sorted[below]! + (at - below) * (sorted[above]! - sorted[below]!)
}

/**
 * Interval of a statistic from its values on resampled trajectories. Resamples without a value (NaN) are counted and
 * left out, never redrawn.
 *
 * @param trajectories M, for the expanded percentile
 * @param acceleration from the jackknife, for BCa
 * @see Hesterberg, Am. Stat. 69, 371 (2015) for the expanded percentile; DiCiccio & Efron, Stat. Sci. 11, 189 (1996) for BCa
 */
export function bootstrapInterval(
  kind: BootstrapKind,
  level: number,
  estimate: number,
  resampled: Float64Array,
  trajectories: number,
  acceleration: number,
): BootstrapInterval {
  const sorted = resampled.filter((value) => Number.isFinite(value)).sort()
  const n = sorted.length
  let sum = 0
  for (const value of sorted) sum += value
  const mean = sum / n
  let squares = 0
  for (const value of sorted) squares += (value - mean) ** 2
  const tail = (1 - level) / 2
  const ends = (low: number, high: number) =>
    [orderQuantile(sorted, low), orderQuantile(sorted, high)] as const
  const [low, high] = (() => {
    switch (kind) {
      case "percentile":
        return ends(tail, 1 - tail)
      case "expanded-percentile": {
        const z = Math.sqrt(trajectories / (trajectories - 1)) * tQuantile(1 - tail, trajectories - 1)
        return ends(normalCdf(-z), normalCdf(z))
      }
      case "basic": {
        const [a, b] = ends(tail, 1 - tail)
        return [2 * estimate - b, 2 * estimate - a] as const
      }
      case "bca": {
        const below = sorted.reduce((count, v) => count + (v < estimate ? 1 : v === estimate ? 0.5 : 0), 0)
        const z0 = normalQuantile(below / n)
        const corrected = (z: number) => normalCdf(z0 + (z0 + z) / (1 - acceleration * (z0 + z)))
        return ends(corrected(normalQuantile(tail)), corrected(normalQuantile(1 - tail)))
      }
    }
  })()
  return {
    low,
    high,
    standardError: Math.sqrt(squares / (n - 1)),
    bias: mean - estimate,
    failedShare: 1 - n / resampled.length,
  }
}
