import type { Sentence, SentencePart, SlotControl } from "../figure-kind"
import type { RowFilter } from "../schema/data-binding"
import type { DecayExponentParams } from "./params"
import type { DecayResult } from "./result"

const words = (text: string): SentencePart => ({ type: "words", text })
const slot = (pointer: string, text: string, accepts: string, control: SlotControl): SentencePart => ({
  type: "slot",
  id: pointer,
  pointer,
  text,
  accepts,
  control,
})
const choice = (options: readonly (readonly [string, string])[]): SlotControl => ({
  type: "choice",
  options: options.map(([value, label]) => ({ value, label })),
})

const number = (value: number) => String(Number(value.toPrecision(4)))
const percent = (level: number) => `${Number((level * 100).toPrecision(4))} %`

const condition = (filter: RowFilter): string => {
  if (filter.range) {
    const [low, high] = filter.range
    return `${low === null ? "" : `${low} ≤ `}${filter.column}${high === null ? "" : ` ≤ ${high}`}`
  }
  return filter.oneOf
    ? `${filter.column} in {${filter.oneOf.join(", ")}}`
    : `${filter.column} = ${filter.equals}`
}

const normaliseWords = (normalise: DecayExponentParams["reduction"]["normalise"]): string =>
  normalise === "none"
    ? "as it is"
    : normalise === "initial"
      ? "divided by its first value"
      : `divided by ${normalise.constant}`

const intervalNames: Record<string, string> = {
  "jackknife-t": "leaving out one trajectory at a time",
  "expanded-percentile": "resampled trajectories, expanded percentile",
  percentile: "resampled trajectories, percentile",
  basic: "resampled trajectories, basic",
  bca: "resampled trajectories, BCa",
}

const weightNames: Record<string, string> = {
  smoothed: "smoothed weights",
  "inverse-variance": "inverse-variance weights",
  equal: "equal weights",
}

/** The panel as the sentence of a methods section, each choice a slot. */
export function decaySentence(params: DecayExponentParams, result?: DecayResult): Sentence {
  const { data, reduction, fit, references } = params
  const unit = result?.abscissa.unit ?? null
  const column = (role: string, optional = false): SlotControl => ({ type: "column", role, optional })
  const parts: SentencePart[] = [
    words("Plot "),
    slot(
      "/data/columns/observable",
      data.columns.observable ?? "no column",
      "the column that decays",
      column("observable"),
    ),
    words(", "),
    slot(
      "/reduction/normalise",
      normaliseWords(reduction.normalise),
      "what the observable is divided by",
      choice([
        ["none", "nothing: as it is"],
        ["initial", "its mean at the first time"],
      ]),
    ),
    words(", against "),
    slot("/data/columns/time", data.columns.time ?? "no column", "the column of times", column("time")),
    words(" of "),
    slot("/data/dataset", data.dataset, "one of the manuscript's datasets", { type: "dataset" }),
    words(" on log–log axes, averaged over "),
    slot(
      "/data/columns/trajectory",
      data.columns.trajectory ?? "nothing",
      "the column that numbers the trajectories; none when the table holds values with errors",
      column("trajectory", true),
    ),
    words(" with "),
    data.columns.trajectory
      ? slot(
          "/reduction/uncertainty",
          reduction.uncertainty === "none" ? "no error bars" : "standard errors",
          "what the error bars show",
          choice([
            ["standard-error", "standard errors"],
            ["none", "no error bars"],
          ]),
        )
      : slot(
          "/data/columns/uncertainty",
          data.columns.uncertainty ? `errors from ${data.columns.uncertainty}` : "no errors",
          "the column of standard errors",
          column("uncertainty", true),
        ),
    words(", "),
    slot(
      "/reduction/bins/perDecade",
      reduction.bins ? `${reduction.bins.perDecade} bins a decade` : "every time",
      "logarithmic bins a decade, 3 to 30; empty for every time",
      { type: "number", min: 3, max: 30, step: 1 },
    ),
    words(data.curveBy === null ? ", as " : ", one curve per "),
    slot(
      "/data/curveBy",
      data.curveBy ?? "one curve",
      "a parameter column; none for one curve",
      column("parameter", true),
    ),
    words(", where "),
    slot(
      "/data/where",
      data.where.length === 0 ? "no condition holds" : data.where.map(condition).join(" and "),
      "conditions on columns",
      { type: "filters" },
    ),
    words(". "),
  ]
  if (fit) parts.push(...fitParts(fit, unit, data.columns.time ?? "t"))
  parts.push(
    words(fit ? "Compare with " : "Draw "),
    slot(
      "/references",
      references.length === 0
        ? "no reference slope"
        : references.map((r) => r.label ?? `slope ${r.exponent}`).join(", "),
      "reference slopes, drawn as guides",
      { type: "references" },
    ),
    words("."),
  )
  return { parts, plain: captionSentence(params, result) }
}

function fitParts(
  fit: NonNullable<DecayExponentParams["fit"]>,
  unit: string | null,
  time: string,
): readonly SentencePart[] {
  const [low, high] = fit.window
  const window =
    low === null && high === null
      ? "all times"
      : `${time} from ${low === null ? "the first" : number(low)} to ${high === null ? "the last" : number(high)}`
  const parts: SentencePart[] = [
    words("Fit a power law to "),
    slot("/fit/window", window, `fit window, two times${unit ? ` in ${unit}` : ""}`, {
      type: "window",
      unit,
    }),
    words(" with "),
    slot(
      "/fit/weights",
      weightNames[fit.weights]!,
      "how points are weighted",
      choice(Object.entries(weightNames)),
    ),
    words("; uncertainty from "),
    slot(
      "/fit/interval/method",
      intervalNames[fit.interval.method]!,
      "where the interval comes from",
      choice(Object.entries(intervalNames)),
    ),
  ]
  if (fit.interval.method !== "jackknife-t")
    parts.push(
      words(" ("),
      slot("/fit/interval/resamples", String(fit.interval.resamples), "number of resamples", {
        type: "number",
        min: 1000,
        max: 20000,
        step: 1000,
      }),
      words(" resamples, seed "),
      slot("/fit/interval/seed", String(fit.interval.seed), "seed of the resamples", {
        type: "number",
        min: 0,
        step: 1,
      }),
      words(")"),
    )
  parts.push(
    words(" at "),
    slot(
      "/fit/interval/level",
      percent(fit.interval.level),
      "level of the interval",
      choice([
        ["0.6827", "68.27 %"],
        ["0.9", "90 %"],
        ["0.95", "95 %"],
        ["0.99", "99 %"],
      ]),
    ),
    words(", "),
    slot(
      "/fit/band/kind",
      fit.band.kind === "none" ? "no band" : `${fit.band.kind} ${percent(fit.band.level)} band`,
      "band around the fitted line",
      choice([
        ["pointwise", "pointwise band"],
        ["simultaneous", "simultaneous band: holds the whole line"],
        ["none", "no band"],
      ]),
    ),
    words(". "),
  )
  return parts
}

/** The statistics part of the caption: what a reader needs to judge the numbers. */
function captionSentence(params: DecayExponentParams, result?: DecayResult): string {
  const { fit, reduction } = params
  const trajectories = result ? [...new Set(result.curves.map((curve) => curve.trajectories))] : []
  const count =
    trajectories.length === 0 || trajectories[0] === 0
      ? ""
      : ` of ${Math.min(...trajectories)}${trajectories.length > 1 ? ` to ${Math.max(...trajectories)}` : ""} trajectories`
  const bars =
    reduction.uncertainty === "none"
      ? "without error bars"
      : params.data.columns.trajectory
        ? "bars: one standard error of the mean"
        : "bars: standard errors as given"
  const binned = reduction.bins ? `, ${reduction.bins.perDecade} logarithmic bins per decade` : ""
  const sentences = [
    `${params.data.columns.trajectory ? "Points: mean" : "Points: values"}${count} (${bars}${binned}).`,
  ]
  const quantity = result?.curves.flatMap((curve) => curve.quantities)[0]
  if (fit && quantity?.provenance) {
    sentences.push(quantity.provenance.sentence)
    const exponents = result!.curves.flatMap((curve) => {
      const exponent = curve.quantities.find((q) => q.name === "exponent")
      return exponent
        ? [`${exponent.text}${curve.curve === null ? "" : ` (${params.data.curveBy} = ${curve.curve})`}`]
        : []
    })
    sentences.push(
      `Exponent${exponents.length > 1 ? "s" : ""}, one standard error in brackets: ${exponents.join(", ")}.`,
    )
    if (fit.band.kind !== "none")
      sentences.push(
        `Shaded: ${fit.band.kind} ${percent(fit.band.level)} confidence band of the fitted line.`,
      )
  }
  return sentences
    .join(" ")
    .replaceAll("(-", "(−")
    .replace(/(^|[ (])-(\d)/g, "$1−$2")
}
