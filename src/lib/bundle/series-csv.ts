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

/** File name of a series, without ending: panel-1-mean, panel-1-fit-gamma_0.1. */
export function seriesName(panel: number, series: DrawnSeries): string {
  return `panel-${panel + 1}-${slug(series.name)}${series.curve === null ? "" : `-${slug(String(series.curve))}`}`
}
