import type { Interval } from "@/lib/domain/quantity"
import type { Origin } from "../ensemble/reduce-curves"
import { numberText, percentText } from "./parts"

export const weightWords: Readonly<Record<string, string>> = {
  smoothed: "weights from smoothed relative errors",
  "inverse-variance": "inverse-variance weights",
  equal: "equal weights",
}

const intervalWords: Readonly<Record<Interval["type"], string>> = {
  "jackknife-t": "jackknife over trajectories with Student's t",
  "expanded-percentile": "expanded percentile bootstrap over trajectories",
  percentile: "percentile bootstrap over trajectories",
  basic: "basic bootstrap over trajectories",
  bca: "bias-corrected and accelerated bootstrap over trajectories",
  studentized: "studentized bootstrap over trajectories",
  analytic: "standard errors of the points",
  "parametric-bootstrap": "parametric bootstrap",
}

/** "the 95 % interval is from the jackknife over trajectories with Student's t". */
export function uncertaintyWords(
  interval: Interval | null,
  { resamples, seed }: { readonly resamples?: number | undefined; readonly seed?: number | undefined } = {},
): string {
  if (!interval) return "no uncertainty can be given"
  const drawn = resamples === undefined ? "" : ` (${resamples} resamples, seed ${seed})`
  return `the ${percentText(interval.level)} interval is from the ${intervalWords[interval.type]}${drawn}`
}

/** "the mean of 400 trajectories". */
export function evidenceWords(origin: Origin, trajectories: number): string {
  if (origin === "trajectories") return `the mean of ${trajectories} trajectories`
  return origin === "given-errors" ? "values with given standard errors" : "a single trajectory"
}

/** "30 ≤ t ≤ 2000 (23 points, 1.81 decades)". @param decades left out where ratios mean nothing */
export function windowWords(
  [low, high]: readonly [number, number],
  abscissa: string,
  points: number,
  decades: number | null = null,
): string {
  const reach = decades === null ? "" : `, ${decades.toFixed(2)} decades`
  return `${numberText(low)} ≤ ${abscissa} ≤ ${numberText(high)} (${points} points${reach})`
}
