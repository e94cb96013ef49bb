import type { OrderFacts } from "../columns/order-watch"
import type { ColumnSummary } from "../columns/output-column"
import type { ArrayAxis, ColumnKind, ColumnRole } from "../table-reading"
import { isTrajectoryName } from "./trajectory-names"
import { isTimeName, timeRank } from "./time-names"

export interface RoleCandidate {
  readonly name: string
  readonly kind: ColumnKind
  /** Null for a column that the reader added. */
  readonly place: number | null
  readonly axes: readonly ArrayAxis[] | null
  readonly told: ColumnRole | null
  readonly facts: OrderFacts
  readonly summary: ColumnSummary
}

export interface ProposedRole {
  readonly role: ColumnRole | null
  readonly roleReason: string | null
  readonly uncertaintyOf: string | null
}

const COORDINATE = /^(x|site|position|pos|k|q|distance|lag)$/i
const WEIGHT = /^weights?$/i
const ERROR_SUFFIX = /[ _.-]?(err|error|std|sd|sem|sigma|unc|stderr|se)$/i
const ERROR_PREFIX = /^(?:err_|d_|u\.|u_|σ_?|sigma_|Δ|δ|delta_)/i
const ROW_NAMES = /^(row|index|column_1|unnamed: 0)$/i

/**
 * Proposes what each column is for, with the reason; nothing is applied unseen. What the user has said comes first, then
 * names, then how the values move.
 *
 * @see docs/intake.md, Header, rule 7
 */
export function proposeRoles(columns: readonly RoleCandidate[]): ProposedRole[] {
  const time = findTime(columns)
  const names = new Map(columns.map((column, index) => [column.name.toLowerCase(), index]))
  const byName = columns.map((column, index): ProposedRole | null => {
    const base = baseOf(column, names, columns)
    if (column.told)
      return {
        ...said(column.told, "Set in the recipe."),
        uncertaintyOf: column.told === "uncertainty" ? base : null,
      }
    if (index === time) return said("time", "Called so, and its values rise.")
    if (base) return { ...said("uncertainty", `Named as the error of “${base}”.`), uncertaintyOf: base }
    if (isTrajectoryName(column.name) && (column.facts.integers || column.kind === "text"))
      return said("trajectory", "Called so, and holds integers or labels.")
    if (WEIGHT.test(column.name) && column.kind === "number") return said("weight", "Called so.")
    return null
  })
  const hasTrajectory = byName.some((proposal) => proposal?.role === "trajectory")
  return columns.map((column, index) => {
    const named = byName[index]
    if (named) return named
    if (column.place === null || isRowNumber(column)) return undecided
    if (!hasTrajectory && column.facts.counts && column.facts.integers)
      return said("trajectory", "Goes up by one wherever time begins anew.")
    return byValues(column, time >= 0)
  })
}

function byValues({ name, kind, axes, facts, summary }: RoleCandidate, hasTime: boolean): ProposedRole {
  if (axes?.length === 0) return said("parameter", "A single value.")
  if (kind === "text" || kind === "datetime") return undecided
  if (facts.steady) return said("parameter", "Has at most two values in each trajectory.")
  if (kind === "boolean") return undecided
  if (COORDINATE.test(name) && summary.distinctCount > 1) return said("coordinate", "Called so.")
  if (hasTime && isTimeName(name)) return undecided
  return said("observable", hasTime ? "A number that changes along time." : "A number with no other role.")
}

const undecided: ProposedRole = { role: null, roleReason: null, uncertaintyOf: null }
const said = (role: ColumnRole, roleReason: string): ProposedRole => ({
  role,
  roleReason,
  uncertaintyOf: null,
})

/** The best-named numeric column that rises. */
function findTime(columns: readonly RoleCandidate[]): number {
  const told = columns.findIndex((column) => column.told === "time")
  if (told >= 0) return told
  const fits = columns.flatMap((column, index) =>
    column.kind === "number" && column.told === null && isTimeName(column.name) && column.facts.rises
      ? [index]
      : [],
  )
  return fits.sort((a, b) => timeRank(columns[a]!.name) - timeRank(columns[b]!.name))[0] ?? -1
}

function baseOf(
  column: RoleCandidate,
  names: ReadonlyMap<string, number>,
  columns: readonly RoleCandidate[],
): string | null {
  if (column.kind !== "number") return null
  for (const affix of [ERROR_SUFFIX, ERROR_PREFIX]) {
    const base = column.name.replace(affix, "")
    const index = base !== column.name && base !== "" ? names.get(base.toLowerCase()) : undefined
    if (index !== undefined && columns[index]!.kind === "number") return columns[index]!.name
  }
  return null
}

/** 0, 1, 2 … as programs write row names. */
const isRowNumber = ({ name, facts, summary }: RoleCandidate): boolean =>
  ROW_NAMES.test(name) && facts.integers && facts.rises && (summary.min === 0 || summary.min === 1)
