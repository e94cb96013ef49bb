import type { Interval, Provenance, Quantity } from "@/lib/domain/quantity"
import { writeQuantity } from "@/lib/domain/rounding"
import { normalQuantile } from "@/lib/stats/distributions/normal-quantile"
import { tQuantile } from "@/lib/stats/distributions/t-quantile"
import { lineError } from "@/lib/stats/power-law/fit-power-law"
import {
  rankCharacteristicTimes,
  type RankedTimeLaw,
  type TimeRanking,
} from "@/lib/stats/ranking/rank-characteristic-times"
import type { StatisticalWarning } from "@/lib/stats/warnings/statistical-warning"
import { warn } from "@/lib/stats/warnings/warning-catalogue"
import { uncertaintyWords, windowWords } from "../sentence/method-words"
import type { CharacteristicTimeParams, TimeLawName } from "./params"
import type { ReducedTimes } from "./reduce-times"
import type { RankedLawResult } from "./result"

type Fit = NonNullable<CharacteristicTimeParams["fit"]>

/** What the parameter of each law is called, and the law in words and as an abscissa of a straight line in ln tau. */
export const lawFacts = {
  power: { quantity: "exponent", words: "power law", abscissa: Math.log },
  exponential: { quantity: "rate", words: "exponential law", abscissa: (u: number) => u },
  activated: { quantity: "barrier", words: "activated law", abscissa: (u: number) => 1 / u },
} as const satisfies Record<TimeLawName, object>

export const timeQuantities = [...Object.values(lawFacts).map(({ quantity }) => quantity), "amplitude"]

export interface FittedTimes {
  readonly laws: readonly RankedLawResult[]
  readonly quantities: readonly Quantity[]
  readonly verdict: TimeRanking["verdict"] | null
  readonly warnings: readonly StatisticalWarning[]
}

const nothing = (...warnings: StatisticalWarning[]): FittedTimes => ({
  laws: [],
  quantities: [],
  verdict: null,
  warnings,
})

/** Fits and ranks the laws of the spec. */
export function fitTimes(
  times: ReducedTimes,
  fit: Fit,
  { data, timeName }: CharacteristicTimeParams,
): FittedTimes {
  const [low, high] = fit.window
  const inside = [...times.u.keys()].filter(
    (k) => (low === null || times.u[k]! >= low) && (high === null || times.u[k]! <= high),
  )
  const pick = (values: Float64Array) => Float64Array.from(inside, (k) => values[k]!)
  const { where } = times
  if (inside.length < 3) return nothing(warn("TOO_FEW_POINTS", where, { points: inside.length }))
  const u = pick(times.u)
  const tau = pick(times.tau)
  const bad = inside.filter((k) => !(times.tau[k]! > 0) || !(times.u[k]! > 0)).length
  if (bad > 0) return nothing(warn("NONPOSITIVE_MEANS", where, { times: bad }))
  const sigma = times.sigma ? pick(times.sigma) : undefined
  const ranking = rankCharacteristicTimes({ u, tau, ...(sigma ? { sigma } : {}) }, where, fit.laws)
  const shown = fit.shown === "best" ? ranking.laws[0]! : ranking.laws.find(({ law }) => law === fit.shown)!
  const ordered = [shown, ...ranking.laws.filter((law) => law !== shown)]
  const factor = sigma
    ? normalQuantile((1 + fit.level) / 2)
    : tQuantile((1 + fit.level) / 2, shown.line.degreesOfFreedom)
  const window = [u[0]!, u.at(-1)!] as const
  const words = (law: RankedTimeLaw, interval: Interval) =>
    `${capital(lawFacts[law.law].words)} fitted to the logarithm of the ${timeName} over ` +
    `${windowWords(window, data.columns.parameter ?? "u", inside.length)} by least squares ` +
    `${sigma ? "weighted with the relative standard errors" : "with equal weights, their scale from the scatter"}; ` +
    `${uncertaintyWords(interval)}.`
  return {
    laws: ordered.map((law) =>
      drawn(law, times.u, window, fit.band !== "none" && law === shown ? factor : null),
    ),
    quantities: ordered.flatMap((law) =>
      quantitiesOf(law, factor, fit.level, law === shown, (interval) => ({
        estimator: `weighted least squares of ln time on ${law.law === "power" ? "ln u" : law.law === "exponential" ? "u" : "1/u"}`,
        weights: sigma ? "inverse-variance" : "equal",
        window,
        points: inside.length,
        degreesOfFreedom: law.line.degreesOfFreedom,
        sentence: words(law, interval),
      })),
    ),
    verdict: ranking.verdict,
    warnings: [...ranking.warnings, ...scatterWarnings(shown, where)],
  }
}

const capital = (text: string) => text.charAt(0).toUpperCase() + text.slice(1)

function scatterWarnings({ line, probability }: RankedTimeLaw, where: string): readonly StatisticalWarning[] {
  if (probability < 0.01) {
    const ratio = (line.chiSquare / line.degreesOfFreedom).toFixed(1)
    return [warn("SCATTER_EXCEEDS_ERRORS", where, { ratio })]
  }
  return probability > 0.999 ? [warn("CHI2_TOO_SMALL", where)] : []
}

/** Parameter of the law and, for the law that is shown, its amplitude. */
function quantitiesOf(
  { law, line, lnAmplitude }: RankedTimeLaw,
  factor: number,
  level: number,
  withAmplitude: boolean,
  provenance: (interval: Interval) => Provenance,
): readonly Quantity[] {
  const around = (value: number, error: number): Interval => ({
    level,
    low: value - factor * error,
    high: value + factor * error,
    type: "analytic",
  })
  const ends = around(line.slope, line.slopeError)
  const slope: Quantity = {
    name: lawFacts[law].quantity,
    value: line.slope,
    standardError: line.slopeError,
    interval: ends,
    ...writeQuantity(line.slope, line.slopeError),
    provenance: provenance(ends),
  }
  if (!withAmplitude) return [slope]
  const errors = { slope: line.slopeError, level: line.levelError, covariance: line.covariance }
  const amplitude = Math.exp(lnAmplitude)
  const logError = lineError(line, errors, 0)
  const log = around(lnAmplitude, logError)
  const interval = { ...log, low: Math.exp(log.low), high: Math.exp(log.high) }
  return [
    slope,
    {
      name: "amplitude",
      value: amplitude,
      standardError: amplitude * logError,
      interval,
      ...writeQuantity(amplitude, amplitude * logError),
      provenance: provenance(interval),
    },
  ]
}

const linePoints = 80

/** A law on a grid over all values of the parameter, with a band where a factor is given. */
function drawn(
  { law, line, aicc, delta, weight, probability }: RankedTimeLaw,
  u: Float64Array,
  [first, last]: readonly [number, number],
  factor: number | null,
): RankedLawResult {
  const lowest = Math.max(
    u[0]!,
    u.find((value) => value > 0)!,
  )
  const grid = Array.from(
    { length: linePoints },
    (_, k) => lowest * (u.at(-1)! / lowest) ** (k / (linePoints - 1)),
  )
  // The ends of the window are points of the line, whatever rounding does to powers.
  const all = [...new Set([...grid.slice(1, -1), lowest, u.at(-1)!, first, last])].sort((a, b) => a - b)
  const { abscissa } = lawFacts[law]
  const at = (value: number) => line.level + line.slope * (abscissa(value) - line.centre)
  const errors = { slope: line.slopeError, level: line.levelError, covariance: line.covariance }
  const band = (side: 1 | -1) =>
    factor === null
      ? null
      : all.map((value) => Math.exp(at(value) + side * factor * lineError(line, errors, abscissa(value))))
  return {
    law,
    aicc,
    delta,
    weight,
    probability: Number.isNaN(probability) ? null : probability,
    grid: all,
    line: all.map((value) => Math.exp(at(value))),
    bandLow: band(-1),
    bandHigh: band(1),
    outside: all.map((value) => value < first || value > last),
  }
}
