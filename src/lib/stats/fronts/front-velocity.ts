import { tQuantile } from "../distributions/t-quantile"
import { jackknifeEach, overReplicates, type StatisticReplicates } from "../laws/statistic-replicates"
import type { JackknifeSummary } from "../resampling/jackknife"
import type { StatisticalWarning } from "../warnings/statistical-warning"
import { warn } from "../warnings/warning-catalogue"
import { arrivalTimes, type Threshold } from "./arrival-times"
import { meanMaps, type MapEnsemble } from "./map-ensemble"
import { frontLine } from "./front-line"

export interface FrontOptions {
  readonly threshold: Threshold
  /** Positions used, closed; null leaves a side open. */
  readonly positions: readonly [number | null, number | null]
  /** `ballistic`: x = v t + x0. `airy`: x = v t + d t^(1/3) + x0, the front of free lattice particles. */
  readonly model: "ballistic" | "airy"
}

/** Velocity of a front, the whole chain from the mean map on repeated for every trajectory left out. */
export interface FrontVelocity {
  readonly velocity: number
  readonly error: JackknifeSummary
  /** Velocity over the deletions. */
  readonly deletions: Float64Array
  /** Of the nearer and the farther half of the positions. */
  readonly halves: readonly [number, number]
  /** d of the Airy front; NaN for a ballistic one. */
  readonly widening: number
  readonly positions: Float64Array
  readonly arrival: Float64Array
  /** Standard errors of the arrival times. */
  readonly arrivalError: Float64Array
  /** Positions inside the range that the front does not cross during the run; they are left out. */
  readonly censored: number
  readonly warnings: readonly StatisticalWarning[]
}

/** Thresholds at which the velocity is looked at again. */
const otherLevels = [0.1, 0.25, 0.5]

/**
 * Front velocity from arrival times on the ensemble-mean map. The front of the mean is not the mean of the fronts of
 * single trajectories, which their scatter broadens.
 *
 * @returns null when fewer than four positions are crossed
 * @throws MapError MISSING_POINTS
 * @see docs/methods.md, fronts
 */
export function frontVelocity(map: MapEnsemble, options: FrontOptions, where: string): FrontVelocity | null {
  const means = meanMaps(map)
  const statistic = chain(map, options)
  const all = overReplicates(means, statistic)
  const errors = jackknifeEach(all)
  const [velocity, near, far, widening, curvature] = all.estimate
  if (Number.isNaN(velocity!)) return null
  const inRange = positionsInRange(map.x, options.positions)
  const kept = inRange.filter((_, k) => !Number.isNaN(all.estimate[scalars + k]!))
  const highest = means.mean.subarray(0, map.x.length * map.t.length).reduce((a, b) => Math.max(a, b))
  const others = otherLevels.map((fraction) => {
    const level = options.threshold.of === "value" ? fraction * highest : fraction
    const changed = chain(map, { ...options, threshold: { ...options.threshold, level } })
    return overReplicates(means, (mean) => [changed(mean)[0]! - statistic(mean)[0]!])
  })
  const ofKept = (pick: (k: number) => number) =>
    Float64Array.from(inRange.flatMap((_, k) => (Number.isNaN(all.estimate[scalars + k]!) ? [] : [pick(k)])))
  return {
    velocity: velocity!,
    error: errors[0]!,
    deletions: all.replicates[0]!,
    halves: [near!, far!],
    widening: widening!,
    positions: Float64Array.from(kept, (a) => map.x[a]!),
    arrival: ofKept((k) => all.estimate[scalars + k]!),
    arrivalError: ofKept((k) => errors[scalars + k]!.standardError),
    censored: inRange.length - kept.length,
    warnings: frontWarnings(map.ids.length, curvature!, errors[4]!, others, where),
  }
}

/** Numbers of the chain before the arrival times. */
const scalars = 5

/** From a mean map to velocity, velocities of both halves, widening, curvature, then the arrival times. */
function chain({ x, t }: MapEnsemble, { threshold, positions, model }: FrontOptions) {
  const inRange = positionsInRange(x, positions)
  return (map: Float64Array): Float64Array => {
    const times = arrivalTimes(t, map, threshold)
    const crossed = inRange.filter((a) => !Number.isNaN(times[a]!))
    const out = new Float64Array(scalars + inRange.length).fill(Number.NaN)
    inRange.forEach((a, k) => (out[scalars + k] = times[a]!))
    if (crossed.length < 4) return out
    const at = Float64Array.from(crossed, (a) => x[a]!)
    const arrived = Float64Array.from(crossed, (a) => times[a]!)
    const middle = Math.ceil(crossed.length / 2)
    const whole = frontLine(at, arrived, model)
    out[0] = whole.velocity
    out[1] = frontLine(at.subarray(0, middle), arrived.subarray(0, middle), "ballistic").velocity
    out[2] = frontLine(at.subarray(middle), arrived.subarray(middle), "ballistic").velocity
    out[3] = whole.widening
    out[4] = whole.curvature
    return out
  }
}

function positionsInRange(x: Float64Array, [low, high]: FrontOptions["positions"]): number[] {
  return [...x.keys()].filter((a) => (low === null || x[a]! >= low) && (high === null || x[a]! <= high))
}

function frontWarnings(
  trajectories: number,
  curvature: number,
  curvatureError: JackknifeSummary,
  others: readonly StatisticReplicates[],
  where: string,
): StatisticalWarning[] {
  if (trajectories < 2) return [warn("SINGLE_TRAJECTORY", where)]
  const warnings: StatisticalWarning[] = []
  const depends = others.some((other) => {
    const { standardError } = jackknifeEach(other)[0]!
    return Math.abs(other.estimate[0]!) > 2 * standardError && standardError > 0
  })
  if (depends) warnings.push(warn("THRESHOLD_DEPENDENCE", where))
  if (Math.abs(curvature) > tQuantile(0.975, trajectories - 1) * curvatureError.standardError)
    warnings.push(warn("FRONT_NOT_STRAIGHT", where))
  return warnings
}
