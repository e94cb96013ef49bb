import type { DataTable } from "@specs/figure-kind"

/** A table of numbers from its rows, as figures see it. */
export const longTable = (names: readonly string[], rows: readonly (readonly number[])[]): DataTable => ({
  rows: rows.length,
  columns: names.map((name, c) => ({
    name,
    unit: null,
    symbol: null,
    values: Float64Array.from(rows, (row) => row[c]!),
  })),
})
