import type { Interval, Provenance } from "@/lib/domain/quantity"
import type { PreparedCurve } from "../ensemble/prepare-curves"
import { evidenceWords, uncertaintyWords, weightWords, windowWords } from "../sentence/method-words"
import type { DecayExponentParams } from "./params"

/** One sentence for a methods section: estimator, weights, window, evidence, interval. */
export function methodSentence(
  prepared: PreparedCurve,
  facts: Omit<Provenance, "sentence">,
  interval: Interval | null,
  params: DecayExponentParams,
): string {
  const time = params.data.columns.time ?? "t"
  const window = facts.window
    ? windowWords(facts.window, time, facts.points ?? 0, facts.decades ?? null)
    : "all points"
  return (
    `Power law fitted to ${evidenceWords(prepared.origin, prepared.ids.length)} by least squares in the logarithms ` +
    `over ${window}, ${weightWords[facts.weights ?? "equal"]}; ${uncertaintyWords(interval, facts)}.`
  )
}
