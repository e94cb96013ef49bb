import type { Db } from "@/lib/server/db/client"
import { isValid, textsOfBytes } from "@/lib/tables/column-chunk"
import type { DataTable, TableColumn } from "@specs/figure-kind"

/**
 * Columns of an accepted dataset version in memory, as figures read them: numbers with NaN where missing, texts with ""
 * where missing.
 */
export async function loadTable(db: Db, datasetVersionId: string): Promise<DataTable> {
  const { rows } = await db
    .selectFrom("datasetVersion")
    .select("rows")
    .where("id", "=", datasetVersionId)
    .executeTakeFirstOrThrow()
  const columns = await db
    .selectFrom("datasetColumn")
    .select(["columnIndex", "name", "unit", "symbol", "kind"])
    .where("datasetVersionId", "=", datasetVersionId)
    .orderBy("columnIndex")
    .execute()
  const loaded: TableColumn[] = []
  for (const { columnIndex, kind, ...column } of columns)
    loaded.push({ ...column, values: await loadValues(db, datasetVersionId, columnIndex, kind, rows ?? 0) })
  return { rows: rows ?? 0, columns: loaded }
}

async function loadValues(
  db: Db,
  datasetVersionId: string,
  columnIndex: number,
  kind: string,
  rows: number,
): Promise<Float64Array | string[]> {
  const chunks = await db
    .selectFrom("columnChunk")
    .select(["n", "data", "valid"])
    .where("datasetVersionId", "=", datasetVersionId)
    .where("columnIndex", "=", columnIndex)
    .orderBy("part")
    .execute()
  if (kind === "text")
    return chunks.flatMap(({ data, n, valid }) => textsOfBytes(data, n, valid).map((t) => t ?? ""))
  const values = new Float64Array(rows)
  const bytes = new Uint8Array(values.buffer)
  let at = 0
  for (const { data, n, valid } of chunks) {
    bytes.set(data, at * 8)
    if (valid) for (let row = 0; row < n; row += 1) if (!isValid(valid, row)) values[at + row] = Number.NaN
    at += n
  }
  return values
}
