import { tQuantile } from "../distributions/t-quantile"
import { bootstrapInterval, orderQuantile, type BootstrapInterval } from "../resampling/bootstrap-interval"
import { jackknife, jackknifeCovariance, type JackknifeSummary } from "../resampling/jackknife"
import type { LawFit } from "./fit-law"

/** Jackknife errors of a law's parameters, in their order; all NaN when a single deletion could not be fitted. */
export interface LawErrors {
  readonly parameters: readonly JackknifeSummary[]
  /** Row-major p x p. */
  readonly covariance: Float64Array
  /** Deletions without a fit. */
  readonly failed: number
}

/** One parameter over the replicates of a fit. */
export function replicatesOf(fit: LawFit, parameter: number): Float64Array {
  const p = fit.parameters.length
  return Float64Array.from(
    { length: fit.replicates.length / p },
    (_, r) => fit.replicates[r * p + parameter]!,
  )
}

/**
 * Errors of a fit whose replicates are the deletions of one trajectory.
 *
 * @param fit of `deletionMeans`
 * @see docs/methods.md, uncertainty
 */
export function lawErrors(fit: LawFit): LawErrors {
  const columns = Array.from(fit.parameters, (_, j) => replicatesOf(fit, j))
  return {
    parameters: columns.map((column, j) => jackknife(fit.parameters[j]!, column)),
    covariance: Float64Array.from(columns.flatMap((a) => columns.map((b) => jackknifeCovariance(a, b)))),
    failed: columns[0]!.filter(Number.isNaN).length,
  }
}

/** Quoted interval: estimate +- t_{M-1} standard errors. */
export function jackknifeTInterval(
  estimate: number,
  standardError: number,
  trajectories: number,
  level: number,
): readonly [number, number] {
  const half = tQuantile((1 + level) / 2, trajectories - 1) * standardError
  return [estimate - half, estimate + half]
}

/** Above this share of resamples without a fit no interval is given. */
export const refusedShare = 0.05

/**
 * Expanded-percentile interval of one parameter.
 *
 * @param fit of `resampledMeans`
 * @returns null when more than 5 % of the resamples could not be fitted
 */
export function lawInterval(
  fit: LawFit,
  parameter: number,
  trajectories: number,
  level: number,
): BootstrapInterval | null {
  const interval = bootstrapInterval(
    "expanded-percentile",
    level,
    fit.parameters[parameter]!,
    replicatesOf(fit, parameter),
    trajectories,
    0,
  )
  return interval.failedShare > refusedShare ? null : interval
}

/**
 * Where a parameter runs to the end of its range there is no value, only a bound: the one-sided quantile over the
 * resamples, those at the end of the range included.
 *
 * @param side `lower`: the parameter exceeds the bound with the given level
 */
export function lawBound(fit: LawFit, parameter: number, level: number, side: "lower" | "upper"): number {
  const sorted = replicatesOf(fit, parameter)
    .filter((value) => !Number.isNaN(value))
    .sort()
  return orderQuantile(sorted, side === "lower" ? 1 - level : level)
}
