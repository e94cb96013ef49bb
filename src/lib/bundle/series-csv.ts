import type { DrawnSeries } from "@specs/figure-kind"

const quoted = (text: string) => (/[",\n\r]/.test(text) ? `"${text.replaceAll('"', '""')}"` : text)

/** One drawn series as CSV with numbers in their shortest exact form; an empty cell is a missing value. @see RFC 4180 */
export function seriesCsv(series: DrawnSeries): string {
  const rows = series.columns[0]?.values.length ?? 0
  const lines = [series.columns.map((column) => quoted(column.name)).join(",")]
  for (let row = 0; row < rows; row += 1)
    lines.push(
      series.columns
        .map((column) => (column.values[row] == null ? "" : String(column.values[row])))
        .join(","),
    )
  return `${lines.join("\r\n")}\r\n`
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
