import type { StatisticalWarning } from "../warnings/statistical-warning"
import { warn } from "../warnings/warning-catalogue"
import { autocorrelationTime, type AutocorrelationTime } from "./autocorrelation-time"
import { blocking, type Blocking } from "./blocking"

/** Mean of a stationary stretch of one trajectory. */
export interface StationaryMean {
  readonly mean: number
  /** sqrt(2 tau variance / n). */
  readonly standardError: number
  readonly autocorrelation: AutocorrelationTime
  /** A second opinion on the error. */
  readonly blocking: Blocking
  readonly warnings: readonly StatisticalWarning[]
}

const fewestTimes = 50
const tolerated = 3

/**
 * Time average of one stationary trajectory with the error that its correlations leave. A decay has no such error: one
 * trajectory of it says nothing about others.
 *
 * @param values of the stationary stretch, equally spaced in time
 * @see docs/methods.md, one trajectory
 */
export function stationaryMean(values: Float64Array, where: string): StationaryMean {
  const n = values.length
  const mean = values.reduce((sum, value) => sum + value, 0) / n
  const variance = values.reduce((sum, value) => sum + (value - mean) ** 2, 0) / (n - 1)
  const autocorrelation = autocorrelationTime(values)
  const standardError = Math.sqrt((2 * autocorrelation.tau * variance) / n)
  const warnings: StatisticalWarning[] = []
  if (n < fewestTimes * autocorrelation.tau)
    warnings.push(warn("SERIES_TOO_SHORT", where, { times: Math.round(n / autocorrelation.tau) }))
  const half = Math.floor(n / 2)
  const meanOf = (part: Float64Array) => part.reduce((sum, value) => sum + value, 0) / part.length
  // The difference of two independent halves has twice the error of the whole.
  const shift =
    Math.abs(meanOf(values.subarray(0, half)) - meanOf(values.subarray(n - half))) / (2 * standardError)
  if (shift > tolerated) warnings.push(warn("NOT_STATIONARY", where, { shift: shift.toFixed(1) }))
  return { mean, standardError, autocorrelation, blocking: blocking(values), warnings }
}
