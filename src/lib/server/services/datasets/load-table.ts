import type { Pool } from "pg"
import type { Db } from "@/lib/server/db/client"
import type { DataTable, TableColumn } from "@specs/figure-kind"
import { numberParts, type StoredColumn, storedColumns, textParts } from "./column-chunks"

/** Columns of an accepted dataset version in memory, as figures read them: NaN or "" where a value is missing. */
export async function loadTable(db: Db, pool: Pool, datasetVersionId: string): Promise<DataTable> {
  const version = await db
    .selectFrom("datasetVersion")
    .select("rows")
    .where("id", "=", datasetVersionId)
    .executeTakeFirstOrThrow()
  const rows = version.rows ?? 0
  const columns: TableColumn[] = []
  for (const column of await storedColumns(db, datasetVersionId)) {
    const { name, unit, symbol } = column
    columns.push({ name, unit, symbol, values: await valuesOf(pool, datasetVersionId, column, rows) })
  }
  return { rows, columns }
}

async function valuesOf(
  pool: Pool,
  datasetVersionId: string,
  { index, kind }: StoredColumn,
  rows: number,
): Promise<Float64Array | string[]> {
  if (kind === "text") {
    const texts: string[] = []
    for await (const part of textParts(pool, datasetVersionId, index))
      for (const text of part) texts.push(text)
    return texts
  }
  const values = new Float64Array(rows)
  const bytes = new Uint8Array(values.buffer)
  let at = 0
  for await (const part of numberParts(pool, datasetVersionId, index)) {
    bytes.set(part, at)
    at += part.length
  }
  return values
}
