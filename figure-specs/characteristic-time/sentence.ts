import type { Sentence } from "../figure-kind"
import { trajectoryCount } from "../sentence/caption"
import { columnSlot, curveParts, datasetParts } from "../sentence/data-parts"
import { referenceParts, windowSlot } from "../sentence/fit-parts"
import { choice, columnControl, percentText, slot, withMinusSigns, words } from "../sentence/parts"
import { lawFacts } from "./fit-times"
import { timeLaws, type CharacteristicTimeParams } from "./params"
import type { CharacteristicTimeResult, TimeCurve } from "./result"

const shownNames = {
  best: "the best of them",
  power: "the power law",
  exponential: "the exponential law",
  activated: "the activated law",
} as const

/** The panel as the sentence of a methods section. */
export function timeSentence(params: CharacteristicTimeParams, result?: CharacteristicTimeResult): Sentence {
  const { data, fit, references } = params
  const { trajectory, uncertainty } = data.columns
  const parts = [
    words("Plot "),
    columnSlot(data, "observable", "the column of times, one a trajectory or one a value"),
    words(" against "),
    columnSlot(data, "parameter", "the column of the control parameter"),
    ...datasetParts(data),
    words(", averaged over "),
    slot(
      "/data/columns/trajectory",
      trajectory ?? "nothing",
      "the column that numbers the trajectories; none when the table holds one time a value",
      columnControl("trajectory", true),
      { pointer: "/data/columns/trajectory", put: "nothing" },
    ),
    words(" with "),
    trajectory
      ? words("standard errors")
      : slot(
          "/data/columns/uncertainty",
          uncertainty ? `errors from ${uncertainty}` : "no errors",
          "the column of standard errors",
          columnControl("uncertainty", true),
          { pointer: "/data/columns/uncertainty", put: "nothing" },
        ),
    ...curveParts(data),
    words(". "),
  ]
  if (fit)
    parts.push(
      words(`Compare ${fit.laws.map((law) => `the ${lawFacts[law].words}`).join(", ")} for `),
      windowSlot("/fit/window", fit.window, data.columns.parameter ?? "u", result?.abscissa.unit ?? null),
      words(" and show "),
      slot(
        "/fit/shown",
        shownNames[fit.shown],
        "the law that is drawn solid",
        choice(
          (["best", ...timeLaws] as const)
            .filter((law) => law === "best" || fit.laws.includes(law))
            .map((law) => [law, shownNames[law]]),
        ),
      ),
      words(" with "),
      slot(
        "/fit/band",
        fit.band === "none" ? "no band" : `a pointwise ${percentText(fit.level)} band`,
        "band around the law that is shown",
        choice([
          ["pointwise", "pointwise band"],
          ["none", "no band"],
        ]),
      ),
      words(". "),
    )
  parts.push(...referenceParts(references))
  return { parts, plain: caption(params, result) }
}

/** "power law favoured over exponential law (difference of AICc 12.3)". */
function rankingWords({ laws, verdict }: TimeCurve): string | null {
  const [best, second] = [...laws].sort((a, b) => a.aicc - b.aicc)
  if (!best || !second || verdict === null) return null
  const distance = `difference of AICc ${second.delta.toFixed(1)}`
  const [first, other] = [lawFacts[best.law].words, lawFacts[second.law].words]
  if (verdict === "unsafe") return "the laws cannot be ranked safely, both are shown"
  if (verdict === "no law fits") return "none of the laws passes its own chi-square test"
  if (verdict === "undecided") return `${first} and ${other} cannot be told apart (${distance})`
  return `${first} ${verdict} over ${other} (${distance})`
}

function caption(
  { data, fit, timeName }: CharacteristicTimeParams,
  result?: CharacteristicTimeResult,
): string {
  const curves = result?.curves ?? []
  const counts = curves.flatMap((curve) => curve.counts)
  const sentences = [
    data.columns.trajectory
      ? `Points: mean ${timeName}${trajectoryCount(counts)} (bars: one standard error of the mean).`
      : `Points: ${timeName}${data.columns.uncertainty ? " (bars: standard errors as given)" : ""}.`,
  ]
  for (const curve of curves) {
    const [shown] = curve.laws
    const [quantity] = curve.quantities
    if (!fit || !shown || !quantity?.provenance) continue
    const which = curve.curve === null ? "" : ` (${data.curveBy} = ${curve.curve})`
    sentences.push(quantity.provenance.sentence)
    sentences.push(`${capital(quantity.name)}, one standard error in brackets: ${quantity.text}${which}.`)
    const ranking = rankingWords(curve)
    if (ranking) sentences.push(`Ranking: ${ranking}.`)
  }
  return withMinusSigns(sentences.join(" "))
}

const capital = (text: string) => text.charAt(0).toUpperCase() + text.slice(1)
