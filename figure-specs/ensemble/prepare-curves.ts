import { bootstrapMoments } from "@/lib/stats/ensemble/bootstrap-moments"
import { logMoments, type LogMoments } from "@/lib/stats/ensemble/log-moments"
import type { BoundData } from "../bind-columns"
import type { PanelInput } from "../figure-kind"
import type { IntervalParams } from "../schema/panel-parts"
import { reduceCurves, type ReducedCurve, type ReductionWish } from "./reduce-curves"

/** One curve reduced, and everything that a log–log fit in any window on it needs. */
export interface PreparedCurve extends ReducedCurve {
  /** Moments of the deletions of one trajectory; for given errors, of the points themselves, without replicates. */
  readonly moments: LogMoments
  /** Moments of resamples, where the interval asks for them. */
  readonly resampled: LogMoments | null
}

export interface PreparedCurves {
  readonly bound: BoundData
  readonly curves: readonly PreparedCurve[]
}

/** Trajectories below which resampling them says too little. @see docs/methods.md, thresholds */
const fewestForResamples = 10

/**
 * The part of a computation that does not depend on a fit window: reduction, deletions and resamples. The editor keeps it
 * while a window is dragged.
 *
 * @param interval says how many resamples to draw; null when nothing is fitted
 * @throws SpecError with pointers relative to the panel
 */
export function prepareCurves(
  input: PanelInput,
  wish: ReductionWish,
  interval: IntervalParams | null,
  onProgress?: (done: number, total: number) => void,
): PreparedCurves {
  const { bound, curves } = reduceCurves(input, wish)
  const prepared = curves.map((curve, index) => {
    const { ensemble, reference } = curve
    if (!ensemble) return { ...curve, moments: givenMoments(curve), resampled: null }
    const moments = logMoments(ensemble, reference)
    const wanted =
      interval !== null && interval.method !== "jackknife-t" && curve.ids.length >= fewestForResamples
    const resampled = wanted
      ? bootstrapMoments(ensemble, moments, reference, interval, (done) =>
          onProgress?.(index + done / interval.resamples, curves.length),
        )
      : null
    onProgress?.(index + 1, curves.length)
    return { ...curve, moments, resampled }
  })
  return { bound, curves: prepared }
}

function givenMoments({ abscissa, mean, standardError }: ReducedCurve): LogMoments {
  const index = Int32Array.from([...abscissa.keys()].filter((k) => abscissa[k]! > 0))
  return {
    x: Float64Array.from(index, (k) => Math.log(abscissa[k]!)),
    index,
    trajectories: 0,
    replicates: 0,
    lnMean: Float64Array.from(index, (k) => Math.log(mean[k]!)),
    lnRelativeVariance: Float64Array.from(index, (k) => 2 * Math.log(standardError[k]! / Math.abs(mean[k]!))),
  }
}
