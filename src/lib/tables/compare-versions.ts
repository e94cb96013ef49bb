import { isUnit } from "./names/unit-grammar"
import type { CellValue, ColumnReading, TableReading } from "./table-reading"

/** What two versions of a dataset have to say to each other: the part of a reading that is kept with a version. */
export type ComparedReading = Pick<TableReading, "columns" | "rows">

export type ColumnChange =
  | { readonly change: "added" | "removed"; readonly name: string }
  | { readonly change: "renamed"; readonly name: string; readonly to: string }
  | {
      readonly change: "unit" | "role" | "kind"
      readonly name: string
      readonly from: string | null
      readonly to: string | null
    }
  | {
      readonly change: "range"
      readonly name: string
      readonly from: readonly [number, number]
      readonly to: readonly [number, number]
    }
  | { readonly change: "missing"; readonly name: string; readonly from: number; readonly to: number }
  | { readonly change: "values"; readonly name: string }

export interface VersionComparison {
  /** Nothing that a reading tells differs. */
  readonly same: boolean
  /** A figure that binds the old columns finds them all in the new version, of the same kind. */
  readonly compatible: boolean
  readonly rows: { readonly from: number; readonly to: number }
  readonly columns: readonly ColumnChange[]
  /** Null when there is no trajectory column, or nobody counted its values. */
  readonly trajectories: TrajectoryChange | null
  /** One sentence for each difference, the gravest first. */
  readonly sentences: readonly string[]
}

export interface TrajectoryChange {
  readonly from: number
  readonly to: number
  readonly added: readonly CellValue[]
  readonly removed: readonly CellValue[]
  /** In both versions, with other values. */
  readonly changed: readonly CellValue[]
}

/** Fingerprints of whole trajectories by their name; see `trajectoryPrints`. */
export type TrajectoryPrints = ReadonlyMap<CellValue, string>

/**
 * Compares a new version of a dataset to the one before, from their readings alone; with the fingerprints of their
 * trajectories it also tells which of these were added, removed or changed.
 *
 * @see docs/intake.md, Versions
 */
export function compareVersions(
  before: ComparedReading,
  after: ComparedReading,
  prints: { readonly before: TrajectoryPrints; readonly after: TrajectoryPrints } | null = null,
): VersionComparison {
  const columns = columnChanges(before.columns, after.columns)
  const trajectories = prints
    ? trajectoryChange(prints.before, prints.after)
    : countedTrajectories(before, after)
  const rows = { from: before.rows, to: after.rows }
  const moved = trajectories !== null && trajectories.from !== trajectories.to
  const touched =
    trajectories !== null &&
    [trajectories.added, trajectories.removed, trajectories.changed].some((list) => list.length > 0)
  return {
    same: columns.length === 0 && rows.from === rows.to && !moved && !touched,
    compatible: !columns.some(
      ({ change }) => change === "removed" || change === "renamed" || change === "kind",
    ),
    rows,
    columns,
    trajectories,
    sentences: sentencesOf(rows, columns, trajectories),
  }
}

function columnChanges(before: readonly ColumnReading[], after: readonly ColumnReading[]): ColumnChange[] {
  const later = new Map(after.map((column) => [column.name, column]))
  const earlier = new Map(before.map((column) => [column.name, column]))
  const removed = before.filter(({ name }) => !later.has(name))
  const added = after.filter(({ name }) => !earlier.has(name))
  // One gone and one new at the same place with the same values: a new name.
  const renamed = removed.flatMap((column) => {
    const twin = added.find((other) => other.index === column.index && sameValues(column, other))
    return twin ? [{ column, twin }] : []
  })
  const isRenamed = (column: ColumnReading) =>
    renamed.some((pair) => pair.column === column || pair.twin === column)
  return [
    ...renamed.map(({ column, twin }) => ({ change: "renamed" as const, name: column.name, to: twin.name })),
    ...removed
      .filter((column) => !isRenamed(column))
      .map(({ name }) => ({ change: "removed" as const, name })),
    ...added.filter((column) => !isRenamed(column)).map(({ name }) => ({ change: "added" as const, name })),
    ...before.flatMap((column) => {
      const other = later.get(column.name)
      return other ? changesWithin(column, other) : []
    }),
  ]
}

const sameValues = (a: ColumnReading, b: ColumnReading): boolean =>
  a.kind === b.kind &&
  a.count === b.count &&
  a.sum === b.sum &&
  a.min === b.min &&
  a.max === b.max &&
  JSON.stringify(a.firstValues) === JSON.stringify(b.firstValues)

function changesWithin(before: ColumnReading, after: ColumnReading): ColumnChange[] {
  const { name } = before
  if (before.kind !== after.kind) return [{ change: "kind", name, from: before.kind, to: after.kind }]
  const changes: ColumnChange[] = []
  if ((before.unit ?? "") !== (after.unit ?? ""))
    changes.push({ change: "unit", name, from: before.unit, to: after.unit })
  if (before.role !== after.role) changes.push({ change: "role", name, from: before.role, to: after.role })
  if (before.missingCount !== after.missingCount)
    changes.push({ change: "missing", name, from: before.missingCount, to: after.missingCount })
  const ranges = [before, after].map(({ min, max }) =>
    min === null || max === null ? null : ([min, max] as const),
  )
  const [from, to] = ranges
  if (from && to && (from[0] !== to[0] || from[1] !== to[1]))
    changes.push({ change: "range", name, from, to })
  // With as many rows as before and within the same range, the sum still tells.
  else if (before.count === after.count && !sameValues(before, after))
    changes.push({ change: "values", name })
  return changes
}

function countedTrajectories(before: ComparedReading, after: ComparedReading): TrajectoryChange | null {
  const counted = ({ columns }: ComparedReading) =>
    columns.find(({ role, distinctCapped }) => role === "trajectory" && !distinctCapped)?.distinctCount
  const [from, to] = [counted(before), counted(after)]
  return from === undefined || to === undefined ? null : { from, to, added: [], removed: [], changed: [] }
}

function trajectoryChange(before: TrajectoryPrints, after: TrajectoryPrints): TrajectoryChange {
  return {
    from: before.size,
    to: after.size,
    added: [...after.keys()].filter((name) => !before.has(name)),
    removed: [...before.keys()].filter((name) => !after.has(name)),
    changed: [...before]
      .filter(([name, print]) => after.has(name) && after.get(name) !== print)
      .map(([name]) => name),
  }
}

function sentencesOf(
  rows: VersionComparison["rows"],
  columns: readonly ColumnChange[],
  trajectories: TrajectoryChange | null,
): string[] {
  const sentences = columns
    .filter(({ change }) => change !== "range" && change !== "values")
    .map(columnSentence)
  if (trajectories) sentences.push(...trajectorySentences(trajectories))
  if (rows.from !== rows.to) sentences.push(`${rows.to} rows instead of ${rows.from}.`)
  return [
    ...sentences,
    ...columns.filter(({ change }) => change === "range" || change === "values").map(columnSentence),
  ]
}

function columnSentence(change: ColumnChange): string {
  const name = `“${change.name}”`
  switch (change.change) {
    case "added":
      return `The column ${name} is new.`
    case "removed":
      return `The column ${name} is gone.`
    case "renamed":
      return `The column ${name} is now called “${change.to}”.`
    case "unit":
      return `The unit of ${name} is ${unitText(change.to)} instead of ${unitText(change.from)}.`
    case "role":
      return `${name} is proposed as ${change.to ?? "nothing"} instead of ${change.from ?? "nothing"}.`
    case "kind":
      return `${name} holds ${change.to} instead of ${change.from}.`
    case "missing":
      return `${change.to} values of ${name} are missing instead of ${change.from}.`
    case "range":
      return `${name} goes from ${change.to[0]} to ${change.to[1]} instead of ${change.from[0]} to ${change.from[1]}.`
    case "values":
      return `${name} has other values within the same range.`
  }
}

const unitText = (unit: string | null): string => (unit ? (isUnit(unit) ? unit : `“${unit}”`) : "none")

function trajectorySentences({ from, to, added, removed, changed }: TrajectoryChange): string[] {
  const sentences: string[] = []
  const named = (list: readonly CellValue[]) => list.slice(0, 5).join(", ") + (list.length > 5 ? " …" : "")
  if (removed.length > 0) sentences.push(`${removed.length} trajectories are gone: ${named(removed)}.`)
  if (changed.length > 0)
    sentences.push(`${changed.length} trajectories have other values: ${named(changed)}.`)
  if (added.length > 0) sentences.push(`${added.length} trajectories are new: ${named(added)}.`)
  if (sentences.length === 0 && from !== to) sentences.push(`${to} trajectories instead of ${from}.`)
  return sentences
}
