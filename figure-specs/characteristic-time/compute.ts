import { warn } from "@/lib/stats/warnings/warning-catalogue"
import { fitSeries, meanSeries } from "../curve-panel/curve-series"
import { describeColumns } from "../curve-panel/described-columns"
import type { PanelInput } from "../figure-kind"
import { nameQuantities } from "../name-quantities"
import { fitTimes, lawFacts, timeQuantities } from "./fit-times"
import type { CharacteristicTimeParams } from "./params"
import { reduceTimes } from "./reduce-times"
import type { CharacteristicTimeResult, TimeCurve } from "./result"

/**
 * A characteristic time against a control parameter with its competing laws.
 *
 * @throws SpecError with pointers relative to the panel
 */
export function computeTimes(input: PanelInput, params: CharacteristicTimeParams): CharacteristicTimeResult {
  const { bound, curves } = reduceTimes(input, params)
  const { fit } = params
  const fitted = curves.map((times) => ({ times, fit: fit ? fitTimes(times, fit, params) : null }))
  const results = fitted.map(({ times, fit: found }): TimeCurve => ({
    curve: times.curve,
    trajectories: Math.max(...times.counts),
    counts: Array.from(times.counts),
    abscissa: Array.from(times.u),
    mean: Array.from(times.tau),
    standardError: times.sigma ? Array.from(times.sigma) : Array.from(times.u, () => null),
    laws: found?.laws ?? [],
    quantities: found?.quantities ?? [],
    verdict: found?.verdict ?? null,
  }))
  const chosen = fit && fit.window.some((end) => end !== null) ? [warn("SELECTED_WINDOW", "the panel")] : []
  const columns = describeColumns(bound, false, "parameter")
  return {
    kind: "characteristic-time",
    curves: results,
    quantities: nameQuantities(params.quantities, results, timeQuantities),
    warnings: [
      ...fitted.flatMap(({ times, fit: found }) => [...times.warnings, ...(found?.warnings ?? [])]),
      ...chosen,
    ],
    series: results.flatMap((curve) => [
      meanSeries(curve, columns),
      ...curve.laws.map((law, rank) => ({
        ...fitSeries(curve.curve, law, columns, lawFacts[law.law].words),
        name: rank === 0 ? "fit" : `fit-${law.law}`,
      })),
    ]),
    ...columns,
  }
}
