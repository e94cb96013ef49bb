import type { Provenance, Quantity } from "@/lib/domain/quantity"
import { writeQuantity } from "@/lib/domain/rounding"
import { lineError } from "@/lib/stats/power-law/fit-power-law"
import { decadesOf } from "@/lib/stats/power-law/power-law-warnings"
import type { Evidence, Fit } from "./evidence"
import { methodSentence } from "./method-sentence"
import type { DecayExponentParams } from "./params"
import type { PreparedCurve } from "../ensemble/prepare-curves"

/** Exponent and amplitude of one fitted curve, each with how it was made. */
export function curveQuantities(
  prepared: PreparedCurve,
  evidence: Evidence,
  params: DecayExponentParams,
  fit: Fit,
): readonly Quantity[] {
  const { line, from, to, errors, logAmplitudeInterval } = evidence
  const { x, trajectories } = prepared.moments
  const facts: Omit<Provenance, "sentence"> = {
    estimator: "weighted least squares of ln mean on ln t",
    weights: prepared.origin === "no-errors" ? "equal" : fit.weights,
    window: evidence.window,
    decades: decadesOf(x, from, to),
    points: to - from,
    ...(trajectories > 0 ? { trajectories } : {}),
    ...(evidence.degreesOfFreedom > 0 ? { degreesOfFreedom: evidence.degreesOfFreedom } : {}),
    ...(prepared.resampled ? { resamples: fit.interval.resamples, seed: fit.interval.seed } : {}),
  }
  const provenance = { ...facts, sentence: methodSentence(prepared, facts, evidence.slopeInterval, params) }
  const amplitude = Math.exp(line.level - line.slope * line.centre)
  // The error of A follows from that of ln A; its interval is that of ln A, exponentiated.
  const amplitudeError = errors ? amplitude * lineError(line, errors, 0) : null
  return [
    {
      name: "exponent",
      value: line.slope,
      standardError: errors?.slope ?? null,
      interval: evidence.slopeInterval,
      ...writeQuantity(line.slope, errors?.slope ?? null),
      provenance,
    },
    {
      name: "amplitude",
      value: amplitude,
      standardError: amplitudeError,
      interval: logAmplitudeInterval && {
        ...logAmplitudeInterval,
        low: Math.exp(logAmplitudeInterval.low),
        high: Math.exp(logAmplitudeInterval.high),
      },
      ...writeQuantity(amplitude, amplitudeError),
      provenance,
    },
  ]
}
