import type { Interval } from "@/lib/domain/quantity"
import { lineBandFactor } from "@/lib/stats/bands/line-band-factor"
import { chiSquareQuantile } from "@/lib/stats/distributions/chi-square-quantile"
import { normalQuantile } from "@/lib/stats/distributions/normal-quantile"
import { tQuantile } from "@/lib/stats/distributions/t-quantile"
import { fitGivenErrors } from "@/lib/stats/power-law/fit-given-errors"
import type { LogLine } from "@/lib/stats/power-law/fit-log-line"
import {
  fitPowerLaw,
  lineError,
  pointsInWindow,
  powerLawErrors,
  type PowerLawErrors,
  type PowerLawFit,
} from "@/lib/stats/power-law/fit-power-law"
import { powerLawWarnings, rangeWarnings } from "@/lib/stats/power-law/power-law-warnings"
import { bootstrapInterval } from "@/lib/stats/resampling/bootstrap-interval"
import type { StatisticalWarning } from "@/lib/stats/warnings/statistical-warning"
import { warn } from "@/lib/stats/warnings/warning-catalogue"
import type { DecayExponentParams } from "./params"
import type { PreparedCurve } from "../ensemble/prepare-curves"

export type Fit = NonNullable<DecayExponentParams["fit"]>

/** A fitted line with its errors, from whatever evidence there is: trajectories, given errors, or neither. */
export interface Evidence {
  readonly line: LogLine
  readonly from: number
  readonly to: number
  /** First and last abscissa of the fit. */
  readonly window: readonly [number, number]
  /** Standard errors of slope and level, and their covariance; null when no error exists. */
  readonly errors: { readonly slope: number; readonly level: number; readonly covariance: number } | null
  readonly slopeInterval: Interval | null
  /** Of ln A. */
  readonly logAmplitudeInterval: Interval | null
  /** Factor on the standard error of the line for the band. */
  readonly bandFactor: number | null
  readonly degreesOfFreedom: number
  readonly warnings: readonly StatisticalWarning[]
}

/** Trajectories below which no interval is given. @see docs/methods.md, thresholds */
const fewestForInterval = 5

/** Ends of a stretch of ln t, without the dust that taking the logarithm and back leaves in the last digits. */
const windowOf = (x: Float64Array, from: number, to: number): readonly [number, number] => {
  const tidy = (lnT: number) => Number(Math.exp(lnT).toPrecision(12))
  return [tidy(x[from]!), tidy(x[to - 1]!)]
}

/** The fit of one curve with its errors, or the warning that says why there is none. */
export function evidenceOf(
  prepared: PreparedCurve,
  fit: Fit,
  where: string,
): Evidence | { readonly refusal: StatisticalWarning } {
  const { moments, origin, ids } = prepared
  if (origin === "given-errors") return givenEvidence(prepared, fit, where)
  const fitted = fitPowerLaw(moments, fit.window, origin === "no-errors" ? "equal" : fit.weights)
  if ("refused" in fitted)
    return {
      refusal:
        fitted.refused === "NONPOSITIVE_MEANS"
          ? warn("NONPOSITIVE_MEANS", where, { times: fitted.points })
          : warn("TOO_FEW_POINTS", where, { points: fitted.points }),
    }
  const { from, to } = fitted
  if (ids.length < fewestForInterval)
    return {
      line: fitted,
      from,
      to,
      window: windowOf(moments.x, from, to),
      errors: null,
      slopeInterval: null,
      logAmplitudeInterval: null,
      bandFactor: null,
      degreesOfFreedom: ids.length - 1,
      warnings: rangeWarnings(moments.x, moments.lnMean, from, to, where),
    }
  const errors = powerLawErrors(fitted)
  const intervals = intervalsOf(prepared, fitted, errors, fit, where)
  return {
    line: fitted,
    from,
    to,
    window: windowOf(moments.x, from, to),
    errors: {
      slope: errors.slope.standardError,
      level: errors.level.standardError,
      covariance: errors.covariance,
    },
    slopeInterval: intervals.slope,
    logAmplitudeInterval: intervals.logAmplitude,
    bandFactor: lineBandFactor(
      fit.band.kind === "simultaneous" ? "simultaneous" : "pointwise",
      fit.band.level,
      ids.length - 1,
    ),
    degreesOfFreedom: ids.length - 1,
    warnings: [...powerLawWarnings(moments, fitted, errors, fit.weights, ids, where), ...intervals.warnings],
  }
}

function intervalsOf(
  prepared: PreparedCurve,
  fitted: PowerLawFit,
  errors: PowerLawErrors,
  fit: Fit,
  where: string,
): { slope: Interval; logAmplitude: Interval; warnings: StatisticalWarning[] } {
  const { level, method } = fit.interval
  const factor = tQuantile((1 + level) / 2, prepared.ids.length - 1)
  const logAmplitude = fitted.level - fitted.slope * fitted.centre
  const plain = {
    slope: errors.slope.standardError,
    level: errors.level.standardError,
    covariance: errors.covariance,
  }
  const symmetric = {
    slope: around(fitted.slope, factor * errors.slope.standardError, level, "jackknife-t"),
    logAmplitude: around(logAmplitude, factor * lineError(fitted, plain, 0), level, "jackknife-t"),
  }
  if (method === "jackknife-t" || !prepared.resampled) return { ...symmetric, warnings: [] }
  const resampled = fitPowerLaw(prepared.resampled, fit.window, fit.weights)
  if ("refused" in resampled) return { ...symmetric, warnings: [] }
  const of = (estimate: number, values: Float64Array, acceleration: number) =>
    bootstrapInterval(method, level, estimate, values, prepared.ids.length, acceleration)
  const slopes = of(fitted.slope, resampled.slopes, errors.slope.acceleration)
  const amplitudes = of(
    logAmplitude,
    resampled.levels.map((value, b) => value - resampled.slopes[b]! * fitted.centre),
    errors.level.acceleration,
  )
  const percent = Math.round(100 * slopes.failedShare)
  const warnings = slopes.failedShare > 0.01 ? [warn("BOOTSTRAP_FAILURES", where, { percent })] : []
  if (slopes.failedShare > 0.05) return { ...symmetric, warnings }
  return {
    slope: { level, low: slopes.low, high: slopes.high, type: method },
    logAmplitude: { level, low: amplitudes.low, high: amplitudes.high, type: method },
    warnings,
  }
}

const around = (value: number, half: number, level: number, type: Interval["type"]): Interval => ({
  level,
  low: value - half,
  high: value + half,
  type,
})

function givenEvidence(
  prepared: PreparedCurve,
  fit: Fit,
  where: string,
): Evidence | { readonly refusal: StatisticalWarning } {
  const { x, lnMean, lnRelativeVariance } = prepared.moments
  const [from, to] = pointsInWindow(x, fit.window)
  if (to - from < 3) return { refusal: warn("TOO_FEW_POINTS", where, { points: Math.max(0, to - from) }) }
  const undefinedPoints = lnMean.subarray(from, to).filter((value) => !Number.isFinite(value)).length
  if (undefinedPoints > 0) return { refusal: warn("NONPOSITIVE_MEANS", where, { times: undefinedPoints }) }
  const line = fitGivenErrors(
    x.slice(from, to),
    lnMean.slice(from, to),
    lnRelativeVariance.slice(from, to).map(Math.exp),
    fit.weights,
  )
  const errors = { slope: line.slopeError, level: line.levelError, covariance: line.covariance }
  const { level } = fit.interval
  const factor = normalQuantile((1 + level) / 2)
  const warnings = rangeWarnings(x, lnMean, from, to, where)
  if (line.chiSquare > chiSquareQuantile(0.99, line.degreesOfFreedom))
    warnings.push(
      warn("SCATTER_EXCEEDS_ERRORS", where, { ratio: (line.chiSquare / line.degreesOfFreedom).toFixed(1) }),
    )
  if (line.chiSquare < chiSquareQuantile(0.001, line.degreesOfFreedom))
    warnings.push(warn("CHI2_TOO_SMALL", where))
  return {
    line,
    from,
    to,
    window: windowOf(x, from, to),
    errors,
    slopeInterval: around(line.slope, factor * errors.slope, level, "analytic"),
    logAmplitudeInterval: around(
      line.level - line.slope * line.centre,
      factor * lineError(line, errors, 0),
      level,
      "analytic",
    ),
    bandFactor:
      fit.band.kind === "simultaneous"
        ? Math.sqrt(chiSquareQuantile(fit.band.level, 2))
        : normalQuantile((1 + fit.band.level) / 2),
    degreesOfFreedom: line.degreesOfFreedom,
    warnings,
  }
}
