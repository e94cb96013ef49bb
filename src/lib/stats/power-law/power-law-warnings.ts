import { tQuantile } from "../distributions/t-quantile"
import type { LogMoments } from "../ensemble/log-moments"
import type { StatisticalWarning } from "../warnings/statistical-warning"
import { warn } from "../warnings/warning-catalogue"
import type { LogWeights } from "./fit-log-line"
import { fitPowerLaw, type PowerLawErrors, type PowerLawFit } from "./fit-power-law"

/** log10 of the ratio of the last to the first abscissa of a fit. */
export function decadesOf(x: Float64Array, from: number, to: number): number {
  return (x[to - 1]! - x[from]!) / Math.LN10
}

const round = (value: number, digits = 2) => Number(value.toPrecision(digits)).toString()

/** Warnings that need no ensemble: how far the window and the observable reach. */
export function rangeWarnings(x: Float64Array, lnY: Float64Array, from: number, to: number, where: string) {
  const warnings: StatisticalWarning[] = []
  const decades = decadesOf(x, from, to)
  if (decades < 2) {
    const severity = decades < 1 ? "severe" : decades < 1.5 ? "caution" : "note"
    warnings.push(warn("SHORT_RANGE", where, { decades: decades.toFixed(2) }, severity))
  }
  const window = lnY.subarray(from, to)
  if (Math.max(...window) - Math.min(...window) < Math.LN2) warnings.push(warn("SMALL_CHANGE", where))
  return warnings
}

/**
 * What a referee would ask about a log–log fit to an ensemble mean.
 *
 * @param ids of the trajectories, to name the one that carries the error
 * @see docs/methods.md, warnings
 */
export function powerLawWarnings(
  moments: LogMoments,
  fit: PowerLawFit,
  errors: PowerLawErrors,
  mode: LogWeights,
  ids: readonly string[],
  where: string,
): StatisticalWarning[] {
  const { x, lnMean, lnRelativeVariance, trajectories } = moments
  const { from, to } = fit
  const warnings = rangeWarnings(x, lnMean, from, to, where)
  const relative = Array.from(lnRelativeVariance.subarray(from, to), (v) => Math.exp(v / 2))

  const insignificant = relative.filter((r) => r > 1 / 3).length
  if (insignificant > 0) warnings.push(warn("NONPOSITIVE_MEANS", where, { times: insignificant }))
  const worst = Math.max(...relative)
  if (worst > 0.3 || Math.abs(errors.slope.bias) > 0.25 * errors.slope.standardError) {
    const bias = worst > 0.3 ? (worst * worst) / 2 : Math.abs(errors.slope.bias)
    warnings.push(warn("LOG_BIAS", where, { bias: round(bias) }))
  }
  if (trajectories >= 20 && errors.slope.largestShare > 0.25)
    warnings.push(
      warn("HEAVY_TAILS", where, {
        trajectory: ids[errors.slope.largestIndex] ?? String(errors.slope.largestIndex),
        percent: Math.round(100 * errors.slope.largestShare),
      }),
    )

  const { standardError: curvatureError } = errors.curvature
  if (Math.abs(fit.curvature) > tQuantile(0.975, trajectories - 1) * curvatureError) {
    const perDecade = 2 * fit.curvature * Math.LN10
    const error = 2 * curvatureError * Math.LN10
    warnings.push(
      warn("RUNNING_EXPONENT_DRIFT", where, {
        drift: `${round(perDecade)} ± ${round(error, 1)}`.replaceAll("-", "−"),
      }),
    )
  }

  const later = fitPowerLaw(moments, [2 * Math.exp(x[from]!), Math.exp(x[to - 1]!)], mode)
  if (!("refused" in later)) {
    const shift = Math.abs(later.slope - fit.slope) / errors.slope.standardError
    if (shift > 2) warnings.push(warn("WINDOW_SENSITIVE", where, { shift: shift.toFixed(1) }))
  }
  return warnings
}
