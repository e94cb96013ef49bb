import type { ArrayAxis } from "./table-reading"

/** A column of a dataset version in memory, with the axes it was read with. */
export interface LoadedColumn {
  readonly name: string
  readonly unit: string | null
  readonly symbol: string | null
  /** Null for a plain column, [] for a single value. */
  readonly axes: readonly ArrayAxis[] | null
  readonly values: Float64Array | readonly string[]
}

export interface LongTable {
  readonly rows: number
  readonly columns: readonly Omit<LoadedColumn, "axes">[]
  /** Columns of other lengths, which have no place beside these rows. */
  readonly leftOut: readonly string[]
}

/**
 * The columns as one table, one row for each element. Arrays over the same axes lie side by side, each axis becomes a
 * column of its coordinate or, without one, of the index from 0; single values are repeated. Of several sets of axes or
 * lengths the largest is taken.
 *
 * @see docs/intake.md, Arrays
 * @example longTable([{ name: "mz", axes: [{ name: "run", length: 2, coordinate: null }, …], … }]).columns // run, time, mz
 */
export function longTable(columns: readonly LoadedColumn[]): LongTable {
  const groups = new Map<string, LoadedColumn[]>()
  for (const column of columns) {
    if (column.axes?.length === 0) continue
    const key = keyOf(column)
    groups.set(key, [...(groups.get(key) ?? []), column])
  }
  const [chosen = []] = [...groups.values()].sort((a, b) => b[0]!.values.length - a[0]!.values.length)
  const rows = chosen[0]?.values.length ?? 1
  const axes = chosen[0]?.axes ?? []
  const steps = axes.map((_, axis) =>
    axes.slice(axis + 1).reduce((product, { length }) => product * length, 1),
  )
  const axisColumns = axes.map((axis, index) => axisColumn(axis, index, steps[index]!, rows, columns))
  const single = columns.filter((column) => column.axes?.length === 0)
  const used = new Set([...chosen, ...single])
  const coordinates = new Set(axes.map(({ coordinate }) => coordinate))
  return {
    rows,
    columns: [...axisColumns, ...single.map((column) => repeated(column, rows)), ...chosen].map(
      ({ name, unit, symbol, values }) => ({ name, unit, symbol, values }),
    ),
    leftOut: columns
      .filter((column) => !used.has(column) && !coordinates.has(column.name))
      .map(({ name }) => name),
  }
}

const keyOf = ({ axes, values }: LoadedColumn): string =>
  axes === null
    ? `rows ${values.length}`
    : JSON.stringify(axes.map(({ name, length, coordinate }) => [name, length, coordinate]))

function axisColumn(
  axis: ArrayAxis,
  index: number,
  step: number,
  rows: number,
  columns: readonly LoadedColumn[],
): Omit<LoadedColumn, "axes"> {
  const coordinate = columns.find(({ name }) => name === axis.coordinate)
  const name = axis.name ?? `axis_${index + 1}`
  const { unit = null, symbol = null } = coordinate ?? {}
  const place = (row: number) => Math.floor(row / step) % axis.length
  if (coordinate && !(coordinate.values instanceof Float64Array)) {
    const texts = coordinate.values
    return { name, unit, symbol, values: Array.from({ length: rows }, (_, row) => texts[place(row)]!) }
  }
  const positions = coordinate?.values as Float64Array | undefined
  const values = new Float64Array(rows)
  for (let row = 0; row < rows; row++) values[row] = positions ? positions[place(row)]! : place(row)
  return { name, unit, symbol, values }
}

function repeated(column: LoadedColumn, rows: number): LoadedColumn {
  const [value] = column.values
  const values =
    typeof value === "number"
      ? new Float64Array(rows).fill(value)
      : Array.from({ length: rows }, () => value ?? "")
  return { ...column, values }
}
