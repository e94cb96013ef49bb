import type { Interval, Quantity } from "@/lib/domain/quantity"
import { writeQuantity } from "@/lib/domain/rounding"
import { normalQuantile } from "@/lib/stats/distributions/normal-quantile"
import { tQuantile } from "@/lib/stats/distributions/t-quantile"
import type { StatisticalWarning } from "@/lib/stats/warnings/statistical-warning"
import { warn } from "@/lib/stats/warnings/warning-catalogue"
import { meanSeries } from "../curve-panel/curve-series"
import { describeColumns } from "../curve-panel/described-columns"
import { reduceCurves, type ReducedCurve } from "../ensemble/reduce-curves"
import { windowMean, type WindowMean } from "../ensemble/window-mean"
import type { PanelInput } from "../figure-kind"
import { nameQuantities } from "../name-quantities"
import { evidenceWords, uncertaintyWords, windowWords } from "../sentence/method-words"
import type { EnsembleTraceParams } from "./params"
import type { TraceCurve, TraceResult } from "./result"

const orNull = (value: number) => (Number.isFinite(value) ? value : null)

/** Factor on a standard error for a two-sided interval: Student's t over trajectories, the normal for given errors. */
const factorOf = (curve: ReducedCurve, level: number) =>
  curve.origin === "given-errors"
    ? normalQuantile((1 + level) / 2)
    : tQuantile((1 + level) / 2, Math.max(1, curve.ids.length - 1))

/** Fewest trajectories for an interval that deserves the name. @see docs/methods.md, thresholds */
const fewestForInterval = 5

function saturationQuantity(
  curve: ReducedCurve,
  mean: WindowMean,
  level: number,
  abscissa: string,
): Quantity {
  const { value, points, window } = mean
  const hasError = curve.origin === "given-errors" || curve.ids.length >= fewestForInterval
  const standardError = hasError ? mean.standardError : null
  const half = standardError === null ? null : factorOf(curve, level) * standardError
  const type: Interval["type"] = curve.origin === "given-errors" ? "analytic" : "jackknife-t"
  const interval: Interval | null =
    half === null ? null : { level, low: value - half, high: value + half, type }
  return {
    name: "saturation",
    value,
    standardError,
    interval,
    ...writeQuantity(value, standardError),
    provenance: {
      estimator: "time average in a window",
      window,
      points,
      ...(curve.ids.length > 0 ? { trajectories: curve.ids.length } : {}),
      ...(curve.ids.length > 1 ? { degreesOfFreedom: curve.ids.length - 1 } : {}),
      sentence:
        `Average of ${evidenceWords(curve.origin, curve.ids.length)} over ${windowWords(window, abscissa, points)}; ` +
        `${uncertaintyWords(interval)}.`,
    },
  }
}

function traceCurve(
  curve: ReducedCurve,
  params: EnsembleTraceParams,
): { readonly curve: TraceCurve; readonly warnings: readonly StatisticalWarning[] } {
  const { band, saturation, data } = params
  const warnings = [...curve.warnings]
  const mean = saturation && windowMean(curve, saturation.window)
  if (saturation && !mean) warnings.push(warn("TOO_FEW_POINTS", curve.where, { points: 0 }))
  if (mean?.change && Math.abs(mean.change.value) > 2 * mean.change.standardError)
    warnings.push(
      warn("NOT_SATURATED", curve.where, {
        change: (Math.abs(mean.change.value) / mean.change.standardError).toFixed(1),
      }),
    )
  const banded = band.kind !== "none" && curve.origin !== "no-errors"
  if (banded) warnings.push(warn("POINTWISE_BAND", curve.where))
  const factor = banded ? factorOf(curve, band.level) : 0
  const end = (side: 1 | -1) =>
    banded ? Array.from(curve.mean, (m, k) => orNull(m + side * factor * curve.standardError[k]!)) : null
  return {
    warnings,
    curve: {
      curve: curve.curve,
      quantities:
        saturation && mean
          ? [saturationQuantity(curve, mean, saturation.level, data.columns.time ?? "t")]
          : [],
      trajectories: curve.ids.length,
      abscissa: Array.from(curve.abscissa),
      mean: Array.from(curve.mean),
      standardError: Array.from(curve.standardError, orNull),
      bandLow: end(-1),
      bandHigh: end(1),
      saturation: mean && { value: mean.value, window: mean.window },
    },
  }
}

/**
 * An ensemble mean with its band, and the value to which it saturates.
 *
 * @throws SpecError with pointers relative to the panel
 */
export function computeTrace(input: PanelInput, params: EnsembleTraceParams): TraceResult {
  const { bound, curves } = reduceCurves(input, params)
  const traced = curves.map((curve) => traceCurve(curve, params))
  const described = describeColumns(bound, params.reduction.normalise !== "none")
  const results = traced.map(({ curve }) => curve)
  return {
    kind: "ensemble-trace",
    curves: results,
    quantities: nameQuantities(params.quantities, results, ["saturation"]),
    warnings: traced.flatMap(({ warnings }) => warnings),
    series: results.map((curve) => meanSeries(curve, described)),
    ...described,
  }
}
