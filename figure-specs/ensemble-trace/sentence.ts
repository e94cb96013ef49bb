import type { Sentence, SentencePart } from "../figure-kind"
import { quantitySentence, trajectoryCount } from "../sentence/caption"
import {
  averageParts,
  binParts,
  columnSlot,
  curveParts,
  datasetParts,
  normaliseSlot,
} from "../sentence/data-parts"
import { windowSlot } from "../sentence/fit-parts"
import { choice, percentText, slot, withMinusSigns, words } from "../sentence/parts"
import type { EnsembleTraceParams } from "./params"
import type { TraceResult } from "./result"

const scaleNames = { linear: "linear", log: "logarithmic" } as const
const scaleSlot = (axis: "x" | "y", scale: keyof typeof scaleNames) =>
  slot(
    `/axes/${axis}/scale`,
    scaleNames[scale],
    `scale of the ${axis} axis`,
    choice(Object.entries(scaleNames)),
  )

/** The panel as the sentence of a methods section. */
export function traceSentence(params: EnsembleTraceParams, result?: TraceResult): Sentence {
  const { data, reduction, axes, band, saturation } = params
  const time = data.columns.time ?? "t"
  const parts: SentencePart[] = [
    words("Plot "),
    columnSlot(data, "observable", "the column to follow"),
    words(", "),
    normaliseSlot(reduction),
    words(", on a "),
    scaleSlot("y", axes.y.scale ?? "linear"),
    words(" axis against "),
    columnSlot(data, "time", "the column of times"),
    words(" on a "),
    scaleSlot("x", axes.x.scale ?? "linear"),
    words(" one,"),
    ...datasetParts(data),
    ...averageParts(data, reduction),
    ...binParts(reduction),
    ...curveParts(data),
    words(", with "),
    slot(
      "/band/kind",
      band.kind === "none" ? "no band" : `a pointwise ${percentText(band.level)} band`,
      "band of the mean",
      choice([
        ["pointwise", "pointwise band"],
        ["none", "no band"],
      ]),
    ),
    words(". "),
  ]
  if (saturation)
    parts.push(
      words("It is saturated for "),
      windowSlot("/saturation/window", saturation.window, time, result?.abscissa.unit ?? null),
      words("."),
    )
  return { parts, plain: caption(params, result) }
}

function caption({ data, band }: EnsembleTraceParams, result?: TraceResult): string {
  const curves = result?.curves ?? []
  const count = trajectoryCount(curves.map((curve) => curve.trajectories))
  const banded =
    band.kind === "none" ? "" : `; shaded: pointwise ${percentText(band.level)} confidence band of the mean`
  const sentences = [`Lines: ${data.columns.trajectory ? `mean${count}` : "values"}${banded}.`]
  const method = curves.flatMap((curve) => curve.quantities)[0]?.provenance
  if (method)
    sentences.push(
      method.sentence,
      ...quantitySentence("saturation", "Saturation value", curves, data.curveBy),
    )
  return withMinusSigns(sentences.join(" "))
}
