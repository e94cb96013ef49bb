import { createHash } from "node:crypto"
import type { Pool } from "pg"
import { Problem } from "@/lib/contracts/problems"
import { type OutgoingColumn, writeTableFrame } from "@/lib/domain/table-frame"
import type { Db } from "@/lib/server/db/client"
import { numberParts, type StoredColumn, storedColumns, textParts } from "./column-chunks"
import { type DatasetVersionPlace, getVersionRow } from "./datasets"

/**
 * Columns of an accepted version as one frame, numbers streamed from the database.
 *
 * @param names all columns when it is empty
 * @returns length and bytes of the frame, with a checksum that changes with data, names and units
 * @throws Problem `not-found`, `conflict` for a version that is not accepted, `invalid-request` for an unknown name
 */
export async function columnsFrame(db: Db, pool: Pool, place: DatasetVersionPlace, names: readonly string[]) {
  const version = await getVersionRow(db, place.manuscriptId, place.datasetName, place.number)
  if (version.state !== "accepted")
    throw new Problem("conflict", "This version is not accepted, so its columns may still change.")
  const stored = await storedColumns(db, version.id)
  const unknown = names.filter((name) => !stored.some((column) => column.name === name))
  if (unknown.length > 0)
    throw new Problem(
      "invalid-request",
      undefined,
      unknown.map((name) => ({
        pointer: "?names",
        code: "no-such-column",
        message: `There is no column “${name}”; the columns are ${stored.map((column) => column.name).join(", ")}.`,
      })),
    )
  const wanted = names.length === 0 ? stored : stored.filter((column) => names.includes(column.name))
  const columns: OutgoingColumn[] = []
  for (const column of wanted) columns.push(await outgoing(pool, version.id, column))
  const { length, pieces } = writeTableFrame(version.rows ?? 0, columns)
  const identity = JSON.stringify([version.id, wanted])
  return { length, pieces, checksum: createHash("sha256").update(identity).digest("hex") }
}

/** Numbers go out as they are read; texts are read first, because their dictionary stands in the header. */
async function outgoing(
  pool: Pool,
  versionId: string,
  { index, kind, name, unit, symbol }: StoredColumn,
): Promise<OutgoingColumn> {
  if (kind === "number") return { name, unit, symbol, parts: numberParts(pool, versionId, index) }
  const codes = new Map<string, number>()
  const parts: Uint8Array[] = []
  for await (const texts of textParts(pool, versionId, index)) {
    const part = Uint32Array.from(texts, (text) => {
      const code = codes.get(text) ?? codes.size
      codes.set(text, code)
      return code
    })
    parts.push(new Uint8Array(part.buffer))
  }
  return { name, unit, symbol, texts: [...codes.keys()], parts }
}
