import { deletionMeans, resampledMeans, type ReplicatedMeans } from "../laws/replicated-means"

/** M trajectories of an observable over space and time. */
export interface MapEnsemble {
  /** Positions, length X, strictly increasing. */
  readonly x: Float64Array
  /** Times, length T, strictly increasing. */
  readonly t: Float64Array
  /** y_i(x_a, t_k) at index `(i * X + a) * T + k`, none missing. */
  readonly values: Float64Array
  readonly ids: readonly string[]
}

/** A map that cannot be averaged. */
export class MapError extends Error {
  constructor(
    readonly code: "MISSING_POINTS",
    message: string,
  ) {
    super(message)
    this.name = "MapError"
  }
}

/**
 * Mean map over trajectories and its replicates, position by position, times running fastest.
 *
 * @param resampling number and seed of the resamples; absent for the deletions of one trajectory
 * @throws MapError MISSING_POINTS when a trajectory lacks a value
 */
export function meanMaps(
  { x, t, values, ids }: MapEnsemble,
  resampling?: { readonly resamples: number; readonly seed: number },
): ReplicatedMeans {
  const missing = values.findIndex(Number.isNaN)
  if (missing >= 0) {
    const cell = missing % (x.length * t.length)
    throw new MapError(
      "MISSING_POINTS",
      `Trajectory ${ids[Math.floor(missing / (x.length * t.length))]} has no value at position ` +
        `${x[Math.floor(cell / t.length)]}, time ${t[cell % t.length]}; leave that position or time out.`,
    )
  }
  const cells = { abscissa: Float64Array.from({ length: x.length * t.length }, (_, k) => k), values, ids }
  return resampling ? resampledMeans(cells, resampling) : deletionMeans(cells)
}
