import type { Interval, Provenance } from "@/lib/domain/quantity"
import { numberText, percentText } from "../sentence/parts"
import type { DecayExponentParams } from "./params"
import type { PreparedCurve } from "../ensemble/prepare-curves"

const weightWords: Record<string, string> = {
  smoothed: "weights from smoothed relative errors",
  "inverse-variance": "inverse-variance weights",
  equal: "equal weights",
}

const intervalWords: Record<Interval["type"], string> = {
  "jackknife-t": "jackknife over trajectories with Student's t",
  "expanded-percentile": "expanded percentile bootstrap over trajectories",
  percentile: "percentile bootstrap over trajectories",
  basic: "basic bootstrap over trajectories",
  bca: "bias-corrected and accelerated bootstrap over trajectories",
  studentized: "studentized bootstrap over trajectories",
  analytic: "least squares with the given errors",
  "parametric-bootstrap": "parametric bootstrap",
}

/** One sentence for a methods section: estimator, weights, window, evidence, interval. */
export function methodSentence(
  prepared: PreparedCurve,
  facts: Omit<Provenance, "sentence">,
  interval: Interval | null,
  params: DecayExponentParams,
): string {
  const time = params.data.columns.time ?? "t"
  const evidence =
    prepared.origin === "trajectories"
      ? `the mean of ${facts.trajectories} trajectories`
      : prepared.origin === "given-errors"
        ? "values with given standard errors"
        : "a single trajectory"
  const window = facts.window
    ? `${numberText(facts.window[0])} ≤ ${time} ≤ ${numberText(facts.window[1])} (${facts.points} points, ${facts.decades!.toFixed(2)} decades)`
    : "all points"
  const uncertainty = interval
    ? `the ${percentText(interval.level)} interval is from the ${intervalWords[interval.type]}${
        facts.resamples ? ` (${facts.resamples} resamples, seed ${facts.seed})` : ""
      }`
    : "no uncertainty can be given"
  return (
    `Power law fitted to ${evidence} by least squares in the logarithms over ${window}, ` +
    `${weightWords[facts.weights ?? "equal"]}; ${uncertainty}.`
  )
}
