import type { CurveKey, DataTable, PanelInput, TableColumn } from "./figure-kind"
import type { ColumnRole, DataBinding, RowFilter } from "./schema/data-binding"
import { SpecError, type SpecIssue } from "./spec-error"

/** The rows of one curve, as indices into the table. */
export interface CurveRows {
  readonly curve: CurveKey
  readonly rows: Int32Array
}

export interface BoundData {
  readonly table: DataTable
  readonly columns: ReadonlyMap<ColumnRole, TableColumn>
  readonly curveBy: TableColumn | null
  readonly curves: readonly CurveRows[]
}

const isNumeric = (column: TableColumn): column is TableColumn & { values: Float64Array } =>
  column.values instanceof Float64Array

/** Values of a column as numbers; a text column bound to a number's role is a SpecError before this is called. */
export function numbersOf(column: TableColumn): Float64Array {
  if (!isNumeric(column)) throw new TypeError(`Column ${column.name} holds text.`)
  return column.values
}

function matches(column: TableColumn, filter: RowFilter): (row: number) => boolean {
  const { values } = column
  if (filter.range) {
    const [low, high] = filter.range
    return (row) => {
      const value = Number(values[row])
      return (low === null || value >= low) && (high === null || value <= high)
    }
  }
  const wanted = filter.oneOf ?? [filter.equals!]
  const accepted = new Set<unknown>(isNumeric(column) ? wanted.map(Number) : wanted.map(String))
  return (row) => accepted.has(values[row])
}

/**
 * Finds the table and columns of a binding, filters its rows and splits them into curves, in ascending order of the
 * splitting column.
 *
 * @param roles what the kind needs: true for required
 * @throws SpecError with every place that does not fit: dataset-unknown, column-unknown, column-missing,
 *   column-not-numeric, no-rows, too-many-curves
 */
export function bindColumns(
  input: PanelInput,
  binding: DataBinding,
  roles: Partial<Record<ColumnRole, boolean>>,
): BoundData {
  const table = input.tables.get(binding.dataset)
  if (!table) {
    const known = [...input.tables.keys()].join(", ") || "none"
    throw new SpecError([
      {
        pointer: "/data/dataset",
        code: "dataset-unknown",
        message: `There is no accepted dataset “${binding.dataset}”. There are: ${known}.`,
      },
    ])
  }
  const issues: SpecIssue[] = []
  const names = table.columns.map((column) => column.name).join(", ")
  const find = (name: string, pointer: string): TableColumn | undefined => {
    const column = table.columns.find((candidate) => candidate.name === name)
    if (!column)
      issues.push({
        pointer,
        code: "column-unknown",
        message: `Dataset “${binding.dataset}” has no column “${name}”. It has: ${names}.`,
      })
    return column
  }
  const columns = new Map<ColumnRole, TableColumn>()
  for (const [role, required] of Object.entries(roles) as [ColumnRole, boolean][]) {
    const name = binding.columns[role]
    const pointer = `/data/columns/${role}`
    if (name === undefined) {
      if (required)
        issues.push({ pointer, code: "column-missing", message: `Name the column that holds the ${role}.` })
      continue
    }
    const column = find(name, pointer)
    if (!column) continue
    if (role !== "trajectory" && !isNumeric(column))
      issues.push({
        pointer,
        code: "column-not-numeric",
        message: `Column “${name}” holds text, not numbers.`,
      })
    columns.set(role, column)
  }
  const tests = binding.where.flatMap((filter, index) => {
    const column = find(filter.column, `/data/where/${index}/column`)
    return column ? [matches(column, filter)] : []
  })
  const curveBy = binding.curveBy === null ? null : (find(binding.curveBy, "/data/curveBy") ?? null)
  if (issues.length > 0) throw new SpecError(issues)
  return { table, columns, curveBy, curves: splitCurves(table, tests, curveBy, binding) }
}

/** More curves than can be told apart on paper are a mistake in the binding. */
const mostCurves = 24

function splitCurves(
  table: DataTable,
  tests: readonly ((row: number) => boolean)[],
  curveBy: TableColumn | null,
  binding: DataBinding,
): readonly CurveRows[] {
  const byCurve = new Map<CurveKey, number[]>()
  for (let row = 0; row < table.rows; row += 1) {
    if (!tests.every((test) => test(row))) continue
    const key = curveBy ? curveBy.values[row]! : null
    if (typeof key === "number" && Number.isNaN(key)) continue
    const rows = byCurve.get(key)
    if (rows) rows.push(row)
    else byCurve.set(key, [row])
    if (byCurve.size > mostCurves)
      throw new SpecError([
        {
          pointer: "/data/curveBy",
          code: "too-many-curves",
          message: `Column “${binding.curveBy}” has more than ${mostCurves} values; choose one with fewer, or filter.`,
        },
      ])
  }
  if (byCurve.size === 0)
    throw new SpecError([
      {
        pointer: "/data/where",
        code: "no-rows",
        message: "No row is left after the conditions; loosen them.",
      },
    ])
  const order = ([a]: [CurveKey, number[]], [b]: [CurveKey, number[]]) =>
    typeof a === "number" && typeof b === "number" ? a - b : String(a) < String(b) ? -1 : 1
  return [...byCurve].sort(order).map(([curve, rows]) => ({ curve, rows: Int32Array.from(rows) }))
}
