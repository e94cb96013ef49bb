import { createWriteStream } from "node:fs"
import { mkdtemp, rm } from "node:fs/promises"
import os from "node:os"
import path from "node:path"
import { Readable } from "node:stream"
import { pipeline } from "node:stream/promises"
import { closeDb, type Db, getDb } from "@/lib/server/db/client"
import { readBlob } from "@/lib/server/services/datasets/read-blob"
import {
  chunkBytes,
  type ColumnSink,
  fileSource,
  intakeLimits,
  parseRecipe,
  readTable,
  type TableReading,
} from "@/lib/tables"
import { tellWorker, workOfChild } from "./run-in-child"

/** Reads one dataset version from its stored file into columns, in one transaction; a program of its own. */
async function main(): Promise<void> {
  const { datasetVersionId } = workOfChild<{ datasetVersionId: string }>()
  const db = getDb()
  const version = await db
    .selectFrom("datasetVersion")
    .select(["blobId", "fileName", "recipe"])
    .where("id", "=", datasetVersionId)
    .executeTakeFirstOrThrow()
  const folder = await mkdtemp(path.join(os.tmpdir(), "afterquench-table-"))
  try {
    const file = path.join(folder, "original")
    await pipeline(Readable.from(readBlob(db, version.blobId)), createWriteStream(file))
    const source = await fileSource(file, version.fileName)
    const reading = await db.transaction().execute(async (trx) => {
      const read = await readTable(
        source,
        {
          recipe: version.recipe === null ? null : parseRecipe(version.recipe),
          limits: intakeLimits,
          onProgress: ({ bytes, totalBytes, phase }) =>
            tellWorker({
              type: "progress",
              share: totalBytes > 0 ? (phase === "surveying" ? 0.2 : 0.2 + 0.8 * (bytes / totalBytes)) : 0,
              what: phase === "surveying" ? "Looking at the file" : "Reading rows",
            }),
        },
        chunkSink(trx, datasetVersionId),
      )
      await storeReading(trx, datasetVersionId, read)
      return read
    })
    await source.close()
    tellWorker(reading.refused ? { type: "failure", message: reading.refused.message } : { type: "done" })
  } finally {
    await rm(folder, { recursive: true, force: true })
    await closeDb()
  }
}

/** Writes the parts of the columns as they come; a second start voids the first. */
function chunkSink(trx: Db, datasetVersionId: string): ColumnSink {
  return {
    async start() {
      await trx.deleteFrom("columnChunk").where("datasetVersionId", "=", datasetVersionId).execute()
      await trx.deleteFrom("datasetColumn").where("datasetVersionId", "=", datasetVersionId).execute()
    },
    async chunk(columnIndex, part, data) {
      await trx
        .insertInto("columnChunk")
        .values({
          datasetVersionId,
          columnIndex,
          part,
          n: data.rows,
          data: Buffer.from(chunkBytes(data)),
          valid: data.valid && Buffer.from(data.valid),
          ...(data.kind === "number" ? { min: data.min, max: data.max, nanCount: data.nanCount } : {}),
        })
        .execute()
    },
  }
}

async function storeReading(trx: Db, datasetVersionId: string, reading: TableReading): Promise<void> {
  if (!reading.refused && reading.columns.length > 0)
    await trx
      .insertInto("datasetColumn")
      .values(
        reading.columns.map((column) => ({
          datasetVersionId,
          columnIndex: column.index,
          name: storable(column.name),
          unit: column.unit ? storable(column.unit) : null,
          symbol: column.symbol === null ? null : storable(column.symbol),
          role: column.role,
          kind: column.kind === "number" || column.kind === "boolean" ? "number" : "text",
          statistics: storableJson({
            count: column.count,
            min: column.min,
            max: column.max,
            missingCount: column.missingCount,
            nanCount: column.nanCount,
            distinctCount: column.distinctCount,
            roleReason: column.roleReason,
            sketch: column.sketch,
          }),
        })),
      )
      .execute()
  const { numUpdatedRows } = await trx
    .updateTable("datasetVersion")
    .set({
      state: reading.refused ? "failed" : "proposed",
      format: reading.format,
      reading: storableJson(reading),
      recipe: storableJson(reading.recipe),
      rows: reading.refused ? null : reading.rows,
      failure: reading.refused && storableJson(reading.refused),
    })
    .where("id", "=", datasetVersionId)
    .where("state", "=", "reading")
    .executeTakeFirst()
  if (numUpdatedRows === 0n) throw new Error("The reading was cancelled.")
}

/** PostgreSQL's text holds no NUL and no half of a surrogate pair; a file's names and cells may. */
const storable = (text: string) => text.replace(/\p{Surrogate}/gu, "\ufffd").replaceAll("\0", "\ufffd")
const storableJson = (value: unknown) =>
  JSON.stringify(value, (_, part: unknown) => (typeof part === "string" ? storable(part) : part))

await main()
process.disconnect?.()
