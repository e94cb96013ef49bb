import type { Pool } from "pg"
import { copyRows } from "@/lib/server/db/copy-rows"
import type { Db } from "@/lib/server/db/client"
import { isValid, textsOfBytes } from "@/lib/tables"

/** A column of a dataset version as the database knows it. */
export interface StoredColumn {
  readonly index: number
  readonly name: string
  readonly unit: string | null
  readonly symbol: string | null
  readonly kind: "number" | "text"
}

/** The columns of a dataset version in the order of the file. */
export async function storedColumns(db: Db, datasetVersionId: string): Promise<StoredColumn[]> {
  return db
    .selectFrom("datasetColumn")
    .select(["columnIndex as index", "name", "unit", "symbol"])
    .select((eb) => eb.ref("kind").$castTo<StoredColumn["kind"]>().as("kind"))
    .where("datasetVersionId", "=", datasetVersionId)
    .orderBy("columnIndex")
    .execute()
}

interface Chunk {
  readonly rows: number
  readonly data: Buffer
  readonly valid: Buffer | null
}

/** The parts of one column, at most 65,536 rows each, on a connection of their own. */
async function* chunks(pool: Pool, datasetVersionId: string, column: number): AsyncGenerator<Chunk> {
  if (!/^[0-9a-f-]{36}$/.test(datasetVersionId) || !Number.isSafeInteger(column))
    throw new TypeError("A column is named by the id of its version and its place.")
  const client = await pool.connect()
  let complete = false
  try {
    const query = `select n, data, valid from column_chunk
      where dataset_version_id = '${datasetVersionId}' and column_index = ${column} order by part`
    for await (const [n, data, valid] of copyRows(client, query))
      yield { rows: n!.readInt32BE(), data: data!, valid: valid ?? null }
    complete = true
  } finally {
    // In the middle of a COPY a connection is of no more use.
    client.release(!complete)
  }
}

/** The doubles of a column as bytes, part by part, NaN where a value is missing. */
export async function* numberParts(
  pool: Pool,
  datasetVersionId: string,
  column: number,
): AsyncGenerator<Uint8Array> {
  for await (const { rows, data, valid } of chunks(pool, datasetVersionId, column)) {
    if (valid)
      for (let row = 0; row < rows; row += 1)
        if (!isValid(valid, row)) data.writeDoubleLE(Number.NaN, row * 8)
    yield data
  }
}

/** The texts of a column, part by part, "" where a value is missing. */
export async function* textParts(
  pool: Pool,
  datasetVersionId: string,
  column: number,
): AsyncGenerator<string[]> {
  for await (const { rows, data, valid } of chunks(pool, datasetVersionId, column))
    yield textsOfBytes(data, rows, valid).map((text) => text ?? "")
}
