import type { DataTable } from "./figure-kind"
import type { ColumnRole } from "./schema/data-binding"

/** Distinct values up to which a parameter column splits into curves unasked. */
const fewValues = 8

type Roles = ReadonlyMap<string, string>

const namedFor = (table: DataTable, roles: Roles, role: string) =>
  table.columns.filter((column) => roles.get(column.name) === role)

/** The first column of each wanted role. */
export function proposedColumns(
  table: DataTable,
  roles: Roles,
  wanted: readonly ColumnRole[],
): Partial<Record<ColumnRole, string>> {
  return Object.fromEntries(
    wanted.flatMap((role) => {
      const [column] = namedFor(table, roles, role)
      return column ? [[role, column.name]] : []
    }),
  )
}

/** Distinct values of a column in ascending order; text in its own order. */
export function distinctValues(table: DataTable, name: string): readonly (number | string)[] {
  const column = table.columns.find((candidate) => candidate.name === name)
  const values = [...new Set<number | string>(column?.values ?? [])].filter((value) => !Number.isNaN(value))
  return values.sort((a, b) => (a < b ? -1 : a > b ? 1 : 0))
}

/** The first parameter that takes a few values, or null. */
export function proposedCurveBy(table: DataTable, roles: Roles): string | null {
  const fits = ({ name }: { readonly name: string }) => {
    const count = distinctValues(table, name).length
    return count > 1 && count <= fewValues
  }
  return namedFor(table, roles, "parameter").find(fits)?.name ?? null
}
