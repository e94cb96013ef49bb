import type { SentencePart } from "../figure-kind"
import type { BandParams, IntervalParams, LawIntervalParams } from "../schema/panel-parts"
import { choice, numberText, percentText, slot, words } from "./parts"

/** "**t from 20 to 2000**": a window of the abscissa. */
export function windowSlot(
  pointer: string,
  [low, high]: readonly [number | null, number | null],
  abscissa: string,
  unit: string | null,
): SentencePart {
  const text =
    low === null && high === null
      ? `all ${abscissa}`
      : `${abscissa} from ${low === null ? "the first" : numberText(low)} to ${high === null ? "the last" : numberText(high)}`
  return slot(pointer, text, `fit window, two values of ${abscissa}${unit ? ` in ${unit}` : ""}`, {
    type: "window",
    unit,
  })
}

const weightNames = {
  smoothed: "smoothed weights",
  "inverse-variance": "inverse-variance weights",
  equal: "equal weights",
} as const

/** "**smoothed weights**". */
export const weightSlot = (weights: keyof typeof weightNames): SentencePart =>
  slot("/fit/weights", weightNames[weights], "how points are weighted", choice(Object.entries(weightNames)))

const intervalNames: Record<IntervalParams["method"], string> = {
  "jackknife-t": "leaving out one trajectory at a time",
  "expanded-percentile": "resampled trajectories, expanded percentile",
  percentile: "resampled trajectories, percentile",
  basic: "resampled trajectories, basic",
  bca: "resampled trajectories, BCa",
}

const levels = choice([
  ["0.6827", "68.27 %"],
  ["0.9", "90 %"],
  ["0.95", "95 %"],
  ["0.99", "99 %"],
])

/** "uncertainty from **leaving out one trajectory at a time** at **95 %**". */
export function intervalParts(
  interval: Pick<IntervalParams, "method" | "level" | "resamples" | "seed">,
  at = "/fit/interval",
  methods: readonly IntervalParams["method"][] = Object.keys(intervalNames) as IntervalParams["method"][],
): readonly SentencePart[] {
  const resamples =
    interval.method === "jackknife-t"
      ? []
      : [
          words(" ("),
          slot(`${at}/resamples`, String(interval.resamples), "number of resamples", {
            type: "number",
            min: 1000,
            max: 20000,
            step: 1000,
          }),
          words(" resamples, seed "),
          slot(`${at}/seed`, String(interval.seed), "seed of the resamples", {
            type: "number",
            min: 0,
            step: 1,
          }),
          words(")"),
        ]
  return [
    words("uncertainty from "),
    slot(
      `${at}/method`,
      intervalNames[interval.method],
      "where the interval comes from",
      choice(methods.map((method) => [method, intervalNames[method]])),
    ),
    ...resamples,
    words(" at "),
    slot(`${at}/level`, percentText(interval.level), "level of the interval", levels),
  ]
}

/** The same for the parameters of a law. */
export const lawIntervalParts = (
  interval: LawIntervalParams,
  at = "/fit/interval",
): readonly SentencePart[] => intervalParts(interval, at, ["jackknife-t", "expanded-percentile"])

/** "**pointwise 95 % band**". */
export const bandSlot = (band: BandParams, at = "/fit/band"): SentencePart =>
  slot(
    `${at}/kind`,
    band.kind === "none" ? "no band" : `${band.kind} ${percentText(band.level)} band`,
    "band around the line",
    choice([
      ["pointwise", "pointwise band"],
      ["simultaneous", "simultaneous band: holds the whole line"],
      ["none", "no band"],
    ]),
  )

/** "Compare with **1/2**.": reference slopes. */
export const referenceParts = (
  references: readonly { readonly exponent: number; readonly label?: string | undefined }[],
  pointer = "/references",
): readonly SentencePart[] => [
  words("Compare with "),
  slot(
    pointer,
    references.length === 0
      ? "no reference slope"
      : references.map(({ label, exponent }) => label ?? `slope ${numberText(exponent)}`).join(", "),
    "reference slopes, drawn as guides",
    { type: "references" },
  ),
  words("."),
]
