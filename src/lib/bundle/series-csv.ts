import { type CsvCell, csvLine } from "@/lib/domain/csv"
import type { DrawnSeries } from "@specs/figure-kind"

/** Rows as CSV; numbers in their shortest exact form, an empty cell is a missing value. */
const csv = (header: readonly string[], rows: readonly (readonly CsvCell[])[]) =>
  [header, ...rows].map(csvLine).join("")

const rowsOf = ({ columns }: DrawnSeries): CsvCell[][] =>
  (columns[0]?.values ?? []).map((_, row) => columns.map(({ values }) => values[row]))
const namesOf = ({ columns }: DrawnSeries) => columns.map(({ name }) => name)

/** One drawn series as CSV. */
export const seriesCsv = (series: DrawnSeries): string => csv(namesOf(series), rowsOf(series))

/** A series of several curves in one table; the first column names the curve where there is more than one. */
export function curvesCsv(curves: readonly DrawnSeries[]): string {
  const [first] = curves
  if (!first || curves.length === 1) return first ? seriesCsv(first) : ""
  const rows = curves.flatMap((series) => rowsOf(series).map((row) => [series.curve, ...row]))
  return csv(["curve", ...namesOf(first)], rows)
}

/** The Table Schema beside it: names, units, meanings. @see Frictionless Table Schema v2 */
export function seriesSchema(series: DrawnSeries): object {
  return {
    $schema: "https://datapackage.org/profiles/2.0/tableschema.json",
    fields: series.columns.map((column) => ({
      name: column.name,
      type: "number",
      description: column.description,
      ...(column.unit ? { unit: column.unit } : {}),
    })),
    missingValues: [""],
  }
}

const slug = (text: string) => text.replace(/[^A-Za-z0-9.+-]+/g, "_")

/** File names of a panel's series, without ending and all different: panel-1-mean, panel-1-fit-0.1. */
export function seriesNames(panel: number, all: readonly DrawnSeries[]): readonly string[] {
  const taken = new Map<string, number>()
  return all.map(({ name, curve }) => {
    const base = `panel-${panel + 1}-${slug(name)}${curve === null ? "" : `-${slug(String(curve))}`}`
    const count = (taken.get(base) ?? 0) + 1
    taken.set(base, count)
    return count === 1 ? base : `${base}_${count}`
  })
}
