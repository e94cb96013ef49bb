import type { Interval } from "@/lib/domain/quantity"
import { normalQuantile } from "@/lib/stats/distributions/normal-quantile"
import { tQuantile } from "@/lib/stats/distributions/t-quantile"
import { fitLaw, type LawFit } from "@/lib/stats/laws/fit-law"
import { fitLawGivenErrors, givenErrorsWarnings } from "@/lib/stats/laws/fit-law-given-errors"
import type { Law, LawScale } from "@/lib/stats/laws/law"
import { jackknifeTInterval, lawErrors, lawInterval } from "@/lib/stats/laws/law-errors"
import {
  lawErrorWarnings,
  lawJackknifeWarnings,
  lawRefusalWarning,
  lawSearchWarnings,
} from "@/lib/stats/laws/law-warnings"
import { deletionMeans, resampledMeans, type ReplicatedMeans } from "@/lib/stats/laws/replicated-means"
import type { LogWeights } from "@/lib/stats/power-law/fit-log-line"
import type { StatisticalWarning } from "@/lib/stats/warnings/statistical-warning"
import { warn } from "@/lib/stats/warnings/warning-catalogue"
import type { LawIntervalParams } from "../schema/panel-parts"
import type { ReducedCurve } from "./reduce-curves"

/** Means of a curve with its deletions and, where the interval asks for them, its resamples. */
export interface LawCurve extends ReducedCurve {
  readonly deletions: ReplicatedMeans | null
  readonly resampled: ReplicatedMeans | null
}

/** What of a law's fit does not depend on its window. */
export function prepareLawCurve(curve: ReducedCurve, interval: LawIntervalParams): LawCurve {
  const { ensemble, reference } = curve
  if (!ensemble) return { ...curve, deletions: null, resampled: null }
  return {
    ...curve,
    deletions: deletionMeans(ensemble, reference),
    resampled:
      interval.method === "expanded-percentile" && curve.ids.length >= fewestForResamples
        ? resampledMeans(ensemble, interval, reference)
        : null,
  }
}

/** @see docs/methods.md, thresholds */
const fewestForInterval = 5
const fewestForResamples = 10

export interface LawWish {
  readonly law: Law
  readonly window: readonly [number | null, number | null]
  readonly scale: LawScale | "auto"
  readonly weights: LogWeights
  readonly interval: LawIntervalParams
}

/** One parameter of a fitted law; no error where there is no evidence for one. */
export interface LawParameter {
  readonly name: string
  readonly value: number
  readonly standardError: number | null
  readonly interval: Interval | null
}

export interface FittedLawCurve {
  readonly parameters: readonly LawParameter[]
  readonly window: readonly [number, number]
  readonly points: number
  /** Standard error of the law at an abscissa; null where there is none. */
  readonly errorAt: ((t: number) => number) | null
  /** Factor on that error for a band of the interval's level. */
  readonly factor: number
  readonly fit: LawFit
  readonly warnings: readonly StatisticalWarning[]
}

/**
 * Fits a law to a curve with errors from whatever evidence there is.
 *
 * @returns the fit, or the warning that says why there is none
 * @see docs/methods.md, laws
 */
export function fitLawCurve(
  curve: LawCurve,
  wish: LawWish,
): FittedLawCurve | { readonly refusal: StatisticalWarning } {
  const { deletions, where, ids } = curve
  if (!deletions) return fitGiven(curve, wish)
  const { law, window, scale, weights, interval } = wish
  const fit = fitLaw(law, deletions, window, { scale, weights: ids.length > 1 ? weights : "equal" })
  if ("refused" in fit) return { refusal: lawRefusalWarning(fit, where) }
  const facts = factsOf(deletions.abscissa, fit)
  const warnings = lawSearchWarnings(fit, deletions, where)
  if (ids.length < fewestForInterval) {
    const bare = { standardError: null, interval: null }
    const parameters = law.parameters.map((name, j) => ({ name, value: fit.parameters[j]!, ...bare }))
    return { ...facts, parameters, errorAt: null, factor: 0, fit, warnings }
  }
  const errors = lawErrors(fit)
  const resampled = curve.resampled && fitLaw(law, curve.resampled, window, { scale: fit.scale, weights })
  const parameters = law.parameters.map((name, j): LawParameter => {
    const value = fit.parameters[j]!
    const { standardError } = errors.parameters[j]!
    if (!Number.isFinite(standardError)) return { name, value, standardError: null, interval: null }
    const percentile =
      resampled && !("refused" in resampled) ? lawInterval(resampled, j, ids.length, interval.level) : null
    const [low, high] = percentile
      ? [percentile.low, percentile.high]
      : jackknifeTInterval(value, standardError, ids.length, interval.level)
    const type = percentile ? "expanded-percentile" : "jackknife-t"
    return { name, value, standardError, interval: { level: interval.level, low, high, type } }
  })
  const failed = resampled && !("refused" in resampled) ? resampled.replicates.filter(Number.isNaN).length : 0
  const share = resampled && !("refused" in resampled) ? failed / resampled.replicates.length : 0
  return {
    ...facts,
    parameters,
    errorAt: jackknifeErrorOf(fit),
    factor: tQuantile((1 + interval.level) / 2, ids.length - 1),
    fit,
    warnings: [
      ...warnings,
      ...lawErrorWarnings(fit, errors.covariance, where),
      ...lawJackknifeWarnings(fit, errors.parameters, deletions, ids, where),
      ...(share > 0.01 ? [warn("BOOTSTRAP_FAILURES", where, { percent: Math.ceil(100 * share) })] : []),
    ],
  }
}

const factsOf = (t: Float64Array, { from, to }: LawFit) => ({
  window: [t[from]!, t[to - 1]!] as const,
  points: to - from,
})

/** Jackknife error of the fitted law at any abscissa. */
function jackknifeErrorOf({ law, parameters, replicates }: LawFit): (t: number) => number {
  const p = parameters.length
  const slopes = new Float64Array(p)
  const rows = Array.from({ length: replicates.length / p }, (_, r) =>
    replicates.subarray(r * p, (r + 1) * p),
  ).filter((row) => row.every(Number.isFinite))
  return (t) => {
    const values = rows.map((row) => law.curve.value(t, row, slopes))
    const mean = values.reduce((sum, value) => sum + value, 0) / values.length
    const squares = values.reduce((sum, value) => sum + (value - mean) ** 2, 0)
    return Math.sqrt(((values.length - 1) / values.length) * squares)
  }
}

function fitGiven(
  curve: LawCurve,
  { law, window, scale, interval }: LawWish,
): FittedLawCurve | { readonly refusal: StatisticalWarning } {
  const { where } = curve
  const points = { t: curve.abscissa, y: curve.mean, sigma: curve.standardError }
  const given = fitLawGivenErrors(law, points, window, {
    scale: scale === "auto" ? (law.log ? "log" : "raw") : scale,
    resamples: interval.resamples,
    seed: interval.seed,
  })
  if ("refused" in given) return { refusal: lawRefusalWarning(given, where) }
  const { fit, standardErrors, covariance } = given
  const z = normalQuantile((1 + interval.level) / 2)
  const p = law.parameters.length
  const slopes = new Float64Array(p)
  return {
    ...factsOf(curve.abscissa, fit),
    parameters: law.parameters.map((name, j) => {
      const value = fit.parameters[j]!
      const half = z * standardErrors[j]!
      return {
        name,
        value,
        standardError: standardErrors[j]!,
        interval: { level: interval.level, low: value - half, high: value + half, type: "analytic" },
      }
    }),
    errorAt: (t) => {
      law.curve.value(t, fit.parameters, slopes)
      let variance = 0
      for (let a = 0; a < p; a += 1)
        for (let b = 0; b < p; b += 1) variance += slopes[a]! * covariance[a * p + b]! * slopes[b]!
      return Math.sqrt(Math.max(0, variance))
    },
    factor: z,
    fit,
    warnings: givenErrorsWarnings(given, points, where),
  }
}
