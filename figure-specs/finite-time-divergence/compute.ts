import type { Provenance, Quantity } from "@/lib/domain/quantity"
import { writeQuantity } from "@/lib/domain/rounding"
import { laws } from "@/lib/stats/laws/laws"
import type { StatisticalWarning } from "@/lib/stats/warnings/statistical-warning"
import { warn } from "@/lib/stats/warnings/warning-catalogue"
import { fitSeries, meanSeries } from "../curve-panel/curve-series"
import { describeColumns } from "../curve-panel/described-columns"
import { fitLawCurve, prepareLawCurve, type FittedLawCurve, type LawCurve } from "../ensemble/law-curve"
import { reduceCurves, type ReducedCurves } from "../ensemble/reduce-curves"
import type { PanelInput } from "../figure-kind"
import { nameQuantities } from "../name-quantities"
import { evidenceWords, uncertaintyWords, weightWords, windowWords } from "../sentence/method-words"
import type { FiniteTimeDivergenceParams } from "./params"
import type { DivergenceCurve, DivergenceResult } from "./result"

const law = laws["finite-time-divergence"]
export const divergenceQuantities = ["singularTime", "divergenceExponent", "amplitude"] as const

export interface PreparedDivergence extends ReducedCurves {
  readonly curves: readonly LawCurve[]
}

export const preparedFrom = ({ data, reduction, fit }: FiniteTimeDivergenceParams) => ({
  data,
  reduction,
  interval: fit.interval,
})

/** What of a divergence panel does not depend on the fit window. @throws SpecError */
export function prepareDivergence(input: PanelInput, params: FiniteTimeDivergenceParams): PreparedDivergence {
  const { bound, curves } = reduceCurves(input, params)
  return { bound, curves: curves.map((curve) => prepareLawCurve(curve, params.fit.interval)) }
}

function quantitiesOf(
  curve: LawCurve,
  fitted: FittedLawCurve,
  { data, fit }: FiniteTimeDivergenceParams,
): readonly Quantity[] {
  const bounded = fitted.warnings.some(({ code }) => code === "BOUNDARY_SOLUTION")
  const resampled = curve.resampled ? { resamples: fit.interval.resamples, seed: fit.interval.seed } : {}
  const facts: Omit<Provenance, "sentence"> = {
    estimator: `least squares of A (t* - t)^-g on the ${fitted.fit.scale === "log" ? "logarithm of the mean" : "mean"}`,
    weights: fit.weights,
    window: fitted.window,
    points: fitted.points,
    ...(curve.ids.length > 0 ? { trajectories: curve.ids.length } : {}),
    ...resampled,
  }
  return divergenceQuantities.flatMap((name): Quantity[] => {
    const parameter = fitted.parameters.find((one) => one.name === name)!
    // At the edge of its range a parameter has no value, only a bound, and the others hang on it.
    const { standardError, interval } = bounded ? { standardError: null, interval: null } : parameter
    const sentence =
      `Divergence A (t* − t)^−g fitted to ${evidenceWords(curve.origin, curve.ids.length)} by least squares ` +
      `${fitted.fit.scale === "log" ? "in the logarithms" : "on the values"} over ` +
      `${windowWords(fitted.window, data.columns.time ?? "t", fitted.points)}, ${weightWords[fit.weights]}; ` +
      `${uncertaintyWords(interval, interval?.type === "expanded-percentile" ? resampled : {})}.`
    return [
      {
        name,
        value: parameter.value,
        standardError,
        interval,
        ...writeQuantity(parameter.value, standardError),
        provenance: { ...facts, sentence },
      },
    ]
  })
}

/** How close to t* the law is drawn, as a share of its distance from the last point: beyond, it leaves every frame. */
const nearest = 0.1
const linePoints = 160

function drawnFit(
  fitted: FittedLawCurve,
  grid: Float64Array,
  band: boolean,
): NonNullable<DivergenceCurve["fit"]> {
  const { parameters } = fitted.fit
  const singularTime = fitted.parameters.find(({ name }) => name === "singularTime")!.value
  const [first, last] = fitted.window
  const start = grid[0]!
  // Evenly spaced in ln(t* - t), so that the steep end is as smooth as the flat one.
  const far = Math.log(singularTime - start)
  const near = Math.log(nearest * (singularTime - last))
  const times = Array.from({ length: linePoints }, (_, k) =>
    k === 0 ? start : singularTime - Math.exp(far + ((near - far) * k) / (linePoints - 1)),
  )
  const all = [...new Set([...times, first, last])].sort((a, b) => a - b)
  const slopes = new Float64Array(parameters.length)
  const line = all.map((t) => law.curve.value(t, parameters, slopes))
  const { errorAt, factor } = fitted
  const ends = (side: 1 | -1) =>
    band && errorAt ? all.map((t, k) => line[k]! + side * factor * errorAt(t)) : null
  return {
    singularTime,
    window: fitted.window,
    grid: all,
    line,
    bandLow: ends(-1),
    bandHigh: ends(1),
    outside: all.map((t) => t < first || t > last),
  }
}

/** Fits prepared curves in the window of the spec. */
export function fitDivergence(
  { bound, curves }: PreparedDivergence,
  params: FiniteTimeDivergenceParams,
): DivergenceResult {
  const { fit } = params
  const warnings: StatisticalWarning[] = []
  const results = curves.map((curve): DivergenceCurve => {
    warnings.push(...curve.warnings)
    const fitted = fitLawCurve(curve, { law, ...fit })
    const drawn = {
      curve: curve.curve,
      trajectories: curve.ids.length,
      abscissa: Array.from(curve.abscissa),
      mean: Array.from(curve.mean),
      standardError: Array.from(curve.standardError, (value) => (Number.isFinite(value) ? value : null)),
    }
    if ("refusal" in fitted) {
      warnings.push(fitted.refusal)
      return { ...drawn, quantities: [], fit: null }
    }
    warnings.push(...fitted.warnings, warn("EXTRAPOLATED_BAND", curve.where))
    return {
      ...drawn,
      quantities: quantitiesOf(curve, fitted, params),
      fit: drawnFit(fitted, curve.abscissa, fit.band !== "none"),
    }
  })
  if (fit.window.some((end) => end !== null)) warnings.push(warn("SELECTED_WINDOW", "the panel"))
  const columns = describeColumns(bound, params.reduction.normalise !== "none")
  return {
    kind: "finite-time-divergence",
    curves: results,
    quantities: nameQuantities(params.quantities, results, divergenceQuantities),
    warnings,
    series: results.flatMap((curve) => [
      meanSeries(curve, columns),
      ...(curve.fit ? [fitSeries(curve.curve, curve.fit, columns, "divergence")] : []),
    ]),
    ...columns,
  }
}
