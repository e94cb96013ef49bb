import type { SentencePart } from "../figure-kind"
import type { DataBinding, RowFilter } from "../schema/data-binding"
import type { ReductionParams } from "../schema/panel-parts"
import { choice, columnControl, slot, words } from "./parts"

const conditionText = (filter: RowFilter): string => {
  if (filter.range) {
    const [low, high] = filter.range
    return `${low === null ? "" : `${low} ≤ `}${filter.column}${high === null ? "" : ` ≤ ${high}`}`
  }
  return filter.oneOf
    ? `${filter.column} in {${filter.oneOf.join(", ")}}`
    : `${filter.column} = ${filter.equals}`
}

/** "**n**": the column of a role. */
export const columnSlot = (
  data: DataBinding,
  role: keyof DataBinding["columns"],
  accepts: string,
): SentencePart =>
  slot(`/data/columns/${role}`, data.columns[role] ?? "no column", accepts, columnControl(role))

/** " of **annihilation**": the dataset. */
export const datasetParts = (data: DataBinding): readonly SentencePart[] => [
  words(" of "),
  slot("/data/dataset", data.dataset, "one of the manuscript's datasets", { type: "dataset" }),
]

/** "**divided by its first value**": the normalisation. */
export function normaliseSlot({ normalise }: ReductionParams): SentencePart {
  const text =
    normalise === "none"
      ? "as it is"
      : normalise === "initial"
        ? "divided by its first value"
        : `divided by ${normalise.constant}`
  return slot(
    "/reduction/normalise",
    text,
    "what the observable is divided by",
    choice([
      ["none", "nothing: as it is"],
      ["initial", "its mean at the first time"],
    ]),
  )
}

/** ", averaged over **run** with **standard errors**", or where the errors of a table without trajectories come from. */
export function averageParts(data: DataBinding, reduction: ReductionParams): readonly SentencePart[] {
  const { trajectory, uncertainty } = data.columns
  return [
    words(", averaged over "),
    slot(
      "/data/columns/trajectory",
      trajectory ?? "nothing",
      "the column that numbers the trajectories; none when the table holds values with errors",
      columnControl("trajectory", true),
      { pointer: "/data/columns/trajectory", put: "nothing" },
    ),
    words(" with "),
    trajectory
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
          uncertainty ? `errors from ${uncertainty}` : "no errors",
          "the column of standard errors",
          columnControl("uncertainty", true),
          { pointer: "/data/columns/uncertainty", put: "nothing" },
        ),
  ]
}

/** ", **12 bins a decade**". */
export const binParts = ({ bins }: ReductionParams): readonly SentencePart[] => [
  words(", "),
  slot(
    "/reduction/bins/perDecade",
    bins ? `${bins.perDecade} bins a decade` : "every time",
    "logarithmic bins a decade, 3 to 30; empty for every time",
    { type: "number", min: 3, max: 30, step: 1 },
    { pointer: "/reduction/bins", put: "null" },
  ),
]

/** ", one curve per **gamma**, where **L = 512**". */
export const curveParts = (data: DataBinding): readonly SentencePart[] => [
  words(data.curveBy === null ? ", as " : ", one curve per "),
  slot(
    "/data/curveBy",
    data.curveBy ?? "one curve",
    "a parameter column; none for one curve",
    columnControl("parameter", true),
    { pointer: "/data/curveBy", put: "null" },
  ),
  ...whereParts(data),
]

/** ", where **L = 512**". */
export const whereParts = (data: DataBinding): readonly SentencePart[] => [
  words(", where "),
  slot(
    "/data/where",
    data.where.length === 0 ? "nothing is left out" : data.where.map(conditionText).join(" and "),
    "conditions on columns",
    { type: "filters" },
  ),
]
