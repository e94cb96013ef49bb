import { chiSquareCdf } from "../distributions/chi-square-cdf"
import { fitGivenErrors, type GivenErrorsFit } from "../power-law/fit-given-errors"
import type { StatisticalWarning } from "../warnings/statistical-warning"
import { warn } from "../warnings/warning-catalogue"
import { aiccEstimatedScale, aiccKnownErrors, akaikeWeights } from "./aicc"

/** tau = A u^p, A exp(c u) or A exp(E/u): all straight lines in ln tau. */
export type TimeLaw = "power" | "exponential" | "activated"

const abscissaOf: Readonly<Record<TimeLaw, (u: number) => number>> = {
  power: Math.log,
  exponential: (u) => u,
  activated: (u) => 1 / u,
}

/** A characteristic time at each value of a control parameter. */
export interface CharacteristicTimes {
  /** Control parameter, positive. */
  readonly u: Float64Array
  /** Times, positive. */
  readonly tau: Float64Array
  /** Standard errors of the times; absent when unknown. */
  readonly sigma?: Float64Array
}

export interface RankedTimeLaw {
  readonly law: TimeLaw
  /** ln tau = level + slope (x - centre), x = ln u, u or 1/u; slope is p, c or E. Errors include the estimated scale. */
  readonly line: GivenErrorsFit
  readonly lnAmplitude: number
  readonly aicc: number
  /** Distance from the best law's criterion. */
  readonly delta: number
  readonly weight: number
  /** Probability of a larger chi-square; NaN when the errors are unknown. */
  readonly probability: number
}

export type Verdict = "favoured" | "strongly favoured" | "undecided" | "no law fits" | "unsafe"

export interface TimeRanking {
  /** Best first. */
  readonly laws: readonly RankedTimeLaw[]
  /** What may be said of the best one. */
  readonly verdict: Verdict
  readonly warnings: readonly StatisticalWarning[]
}

const curveParameters = 2
/** A law whose chi-square is this improbable does not describe the times, however far the others are. */
const rejected = 0.01

/**
 * Fits and ranks laws for a time against a control parameter. All are fitted to ln tau with the same errors sigma/tau, so
 * that their likelihoods share one response.
 *
 * @param laws to compare, the three of `TimeLaw` by default
 * @see docs/methods.md, ranking of laws
 */
export function rankCharacteristicTimes(
  { u, tau, sigma }: CharacteristicTimes,
  where: string,
  laws: readonly TimeLaw[] = ["power", "exponential", "activated"],
): TimeRanking {
  const n = u.length
  const lnTau = tau.map(Math.log)
  const relativeVariance = sigma ? sigma.map((s, k) => (s / tau[k]!) ** 2) : new Float64Array(n).fill(1)
  const fitted = laws.map((law) => {
    const line = fitGivenErrors(u.map(abscissaOf[law]), lnTau, relativeVariance, "inverse-variance")
    const aicc = sigma
      ? aiccKnownErrors(line.chiSquare, curveParameters, n)
      : aiccEstimatedScale(line.chiSquare, curveParameters, n)
    return {
      law,
      line: sigma ? line : withEstimatedScale(line),
      lnAmplitude: line.level - line.slope * line.centre,
      aicc,
      probability: sigma ? 1 - chiSquareCdf(line.chiSquare, line.degreesOfFreedom) : Number.NaN,
    }
  })
  const weights = akaikeWeights(fitted.map(({ aicc }) => aicc))
  const best = Math.min(...fitted.map(({ aicc }) => aicc))
  const ranked = fitted
    .map((entry, k) => ({ ...entry, delta: entry.aicc - best, weight: weights[k]! }))
    .sort((a, b) => a.aicc - b.aicc)
  const verdict = isUnsafe(u) ? "unsafe" : verdictOn(ranked)
  return { laws: ranked, verdict, warnings: verdict === "unsafe" ? [warn("MODEL_RANK_UNSAFE", where)] : [] }
}

function withEstimatedScale(line: GivenErrorsFit): GivenErrorsFit {
  const variance = line.chiSquare / line.degreesOfFreedom
  return {
    ...line,
    slopeError: line.slopeError * Math.sqrt(variance),
    levelError: line.levelError * Math.sqrt(variance),
    covariance: line.covariance * variance,
  }
}

/** Fewer than six points, or a parameter that spans less than a factor of three. */
function isUnsafe(u: Float64Array): boolean {
  return u.length < 6 || !(Math.max(...u) >= 3 * Math.min(...u))
}

function verdictOn([best, second]: readonly RankedTimeLaw[]): Verdict {
  if (best!.probability < rejected) return "no law fits"
  if (!second || second.delta < 4) return "undecided"
  return second.delta >= 10 ? "strongly favoured" : "favoured"
}
