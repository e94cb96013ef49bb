import { warn } from "@/lib/stats/warnings/warning-catalogue"
import { describeColumns } from "../curve-panel/described-columns"
import type { PreparedCurve, PreparedCurves } from "../ensemble/prepare-curves"
import type { DrawnSeries, PanelInput, TableColumn } from "../figure-kind"
import { nameQuantities } from "../name-quantities"
import { fitDecayCurve, type FittedCurve } from "./fit-curve"
import type { DecayExponentParams } from "./params"
import { prepareDecay } from "./prepare"
import type { DecayCurve, DecayResult } from "./result"

const orNull = (value: number) => (Number.isFinite(value) ? value : null)

/** Fits a prepared panel in its window and gathers everything that is drawn and quoted. */
export function fitDecay(prepared: PreparedCurves, params: DecayExponentParams): DecayResult {
  const fitted = prepared.curves.map((curve) => ({ curve, fit: fitDecayCurve(curve, params) }))
  const curves = fitted.map(({ curve, fit }): DecayCurve => ({
    curve: curve.curve,
    trajectories: curve.ids.length,
    abscissa: Array.from(curve.abscissa),
    mean: Array.from(curve.mean),
    standardError: Array.from(curve.standardError, orNull),
    fit: fit.fit,
    quantities: fit.quantities,
  }))
  const { columns } = prepared.bound
  const time = columns.get("time")!
  const observable = columns.get("observable")!
  const chosen =
    params.fit && params.fit.window.some((end) => end !== null) ? [warn("SELECTED_WINDOW", "the panel")] : []
  return {
    kind: "decay-exponent",
    curves,
    quantities: nameQuantities(params.quantities, curves, ["exponent", "amplitude"]),
    warnings: [...fitted.flatMap(({ curve, fit }) => [...curve.warnings, ...fit.warnings]), ...chosen],
    series: fitted.flatMap(({ curve, fit }) => seriesOf(curve, fit, time, observable)),
    ...describeColumns(prepared.bound, params.reduction.normalise !== "none"),
  }
}

/**
 * Everything a decay panel shows, from its tables.
 *
 * @throws SpecError with pointers relative to the panel
 */
export function computeDecay(
  input: PanelInput,
  params: DecayExponentParams,
  onProgress?: (done: number, total: number) => void,
): DecayResult {
  return fitDecay(prepareDecay(input, params, onProgress), params)
}

function seriesOf(
  curve: PreparedCurve,
  { fit }: FittedCurve,
  time: TableColumn,
  observable: TableColumn,
): DrawnSeries[] {
  const t = { name: time.name, unit: time.unit, description: "abscissa" }
  const y = (name: string, description: string, values: readonly (number | null)[]) => ({
    name,
    unit: observable.unit,
    description,
    values,
  })
  const mean: DrawnSeries = {
    name: "mean",
    curve: curve.curve,
    columns: [
      { ...t, values: Array.from(curve.abscissa) },
      y("mean", curve.ids.length > 0 ? "mean over trajectories" : "value as given", Array.from(curve.mean)),
      y("standard_error", "standard error of the mean", Array.from(curve.standardError, orNull)),
    ],
  }
  if (!fit) return [mean]
  const line: DrawnSeries = {
    name: "fit",
    curve: curve.curve,
    columns: [
      { ...t, values: fit.grid },
      y("fit", "fitted power law; outside the window it is extrapolation", fit.line),
      ...(fit.bandLow && fit.bandHigh
        ? [
            y("band_low", "lower end of the band", fit.bandLow),
            y("band_high", "upper end of the band", fit.bandHigh),
          ]
        : []),
      {
        name: "outside_window",
        unit: null,
        description: "1 outside the fit window",
        values: fit.outside.map(Number),
      },
    ],
  }
  return [mean, line]
}
