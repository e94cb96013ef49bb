import { warn } from "@/lib/stats/warnings/warning-catalogue"
import { fitSeries, meanSeries } from "../curve-panel/curve-series"
import { describeColumns } from "../curve-panel/described-columns"
import type { PreparedCurves } from "../ensemble/prepare-curves"
import type { PanelInput } from "../figure-kind"
import { nameQuantities } from "../name-quantities"
import { fitDecayCurve } from "./fit-curve"
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
  const columns = describeColumns(prepared.bound, params.reduction.normalise !== "none")
  const chosen =
    params.fit && params.fit.window.some((end) => end !== null) ? [warn("SELECTED_WINDOW", "the panel")] : []
  return {
    kind: "decay-exponent",
    curves,
    quantities: nameQuantities(params.quantities, curves, ["exponent", "amplitude"]),
    warnings: [...fitted.flatMap(({ curve, fit }) => [...curve.warnings, ...fit.warnings]), ...chosen],
    series: curves.flatMap((curve) => [
      meanSeries(curve, columns),
      ...(curve.fit ? [fitSeries(curve.curve, curve.fit, columns, "power law")] : []),
    ]),
    ...columns,
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
