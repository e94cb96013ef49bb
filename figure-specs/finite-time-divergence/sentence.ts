import type { Sentence } from "../figure-kind"
import { pointsSentence, quantitySentence } from "../sentence/caption"
import { averageParts, columnSlot, curveParts, datasetParts, normaliseSlot } from "../sentence/data-parts"
import { lawIntervalParts, weightSlot, windowSlot } from "../sentence/fit-parts"
import { choice, percentText, slot, withMinusSigns, words } from "../sentence/parts"
import type { FiniteTimeDivergenceParams } from "./params"
import type { DivergenceResult } from "./result"

const scaleNames = {
  auto: "the logarithms where they are defined",
  log: "the logarithms",
  raw: "the values themselves",
} as const

/** The panel as the sentence of a methods section. */
export function divergenceSentence(params: FiniteTimeDivergenceParams, result?: DivergenceResult): Sentence {
  const { data, reduction, fit } = params
  return {
    parts: [
      words("Plot "),
      columnSlot(data, "observable", "the column that grows"),
      words(", "),
      normaliseSlot(reduction),
      words(", against "),
      columnSlot(data, "time", "the column of times"),
      ...datasetParts(data),
      ...averageParts(data, reduction),
      ...curveParts(data),
      words(". Fit a divergence $A\\,(t^\\ast-t)^{-g}$ to "),
      windowSlot("/fit/window", fit.window, data.columns.time ?? "t", result?.abscissa.unit ?? null),
      words(" by least squares on "),
      slot(
        "/fit/scale",
        scaleNames[fit.scale],
        "what the fit compares with the law",
        choice(Object.entries(scaleNames)),
      ),
      words(" with "),
      weightSlot(fit.weights),
      words("; "),
      ...lawIntervalParts(fit.interval),
      words(", "),
      slot(
        "/fit/band",
        fit.band === "none" ? "no band" : "pointwise band",
        "band around the fitted law",
        choice([
          ["pointwise", "pointwise band"],
          ["none", "no band"],
        ]),
      ),
      words("."),
    ],
    plain: caption(params, result),
  }
}

function caption({ data, reduction, fit }: FiniteTimeDivergenceParams, result?: DivergenceResult): string {
  const curves = result?.curves ?? []
  const counts = curves.map((curve) => curve.trajectories)
  const sentences = [pointsSentence(data, reduction, counts)]
  const method = curves.flatMap((curve) => curve.quantities)[0]?.provenance
  if (method) {
    sentences.push(
      method.sentence,
      ...quantitySentence("singularTime", "Time of divergence", curves, data.curveBy),
      ...quantitySentence("divergenceExponent", "Exponent", curves, data.curveBy),
    )
    if (fit.band !== "none")
      sentences.push(`Shaded: pointwise ${percentText(fit.interval.level)} confidence band of the law.`)
  }
  return withMinusSigns(sentences.join(" "))
}
