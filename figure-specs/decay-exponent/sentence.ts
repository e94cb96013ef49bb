import type { Sentence, SentencePart } from "../figure-kind"
import { pointsSentence, quantitySentence } from "../sentence/caption"
import {
  averageParts,
  binParts,
  columnSlot,
  curveParts,
  datasetParts,
  normaliseSlot,
} from "../sentence/data-parts"
import { bandSlot, intervalParts, referenceParts, weightSlot, windowSlot } from "../sentence/fit-parts"
import { percentText, withMinusSigns, words } from "../sentence/parts"
import type { DecayExponentParams } from "./params"
import type { DecayResult } from "./result"

/** The panel as the sentence of a methods section, each choice a slot. */
export function decaySentence(params: DecayExponentParams, result?: DecayResult): Sentence {
  const { data, reduction, fit, references, axes } = params
  const scales = [axes.x.scale ?? "log", axes.y.scale ?? "log"].join("–")
  const parts: SentencePart[] = [
    words("Plot "),
    columnSlot(data, "observable", "the column that decays"),
    words(", "),
    normaliseSlot(reduction),
    words(", against "),
    columnSlot(data, "time", "the column of times"),
    ...datasetParts(data),
    words(` on ${scales} axes`),
    ...averageParts(data, reduction),
    ...binParts(reduction),
    ...curveParts(data),
    words(". "),
  ]
  if (fit)
    parts.push(
      words("Fit a power law to "),
      windowSlot("/fit/window", fit.window, data.columns.time ?? "t", result?.abscissa.unit ?? null),
      words(" with "),
      weightSlot(fit.weights),
      words("; "),
      ...intervalParts(fit.interval),
      words(", "),
      bandSlot(fit.band),
      words(". "),
    )
  parts.push(...referenceParts(references))
  return { parts, plain: caption(params, result) }
}

/** The statistics part of the caption: what a reader needs to judge the numbers. */
function caption({ data, reduction, fit }: DecayExponentParams, result?: DecayResult): string {
  const curves = result?.curves ?? []
  const sentences = [
    pointsSentence(
      data,
      reduction,
      curves.map((curve) => curve.trajectories),
    ),
  ]
  const method = curves.flatMap((curve) => curve.quantities)[0]?.provenance
  if (fit && method) {
    sentences.push(method.sentence, ...quantitySentence("exponent", "Exponent", curves, data.curveBy))
    if (fit.band.kind !== "none")
      sentences.push(
        `Shaded: ${fit.band.kind} ${percentText(fit.band.level)} confidence band of the fitted line.`,
      )
  }
  return withMinusSigns(sentences.join(" "))
}
