import { Problem } from "@/lib/contracts/problems"
import { writeTableFrame } from "@/lib/domain/table-frame"
import type { Db } from "@/lib/server/db/client"
import { getVersionRow } from "./datasets"
import { loadTable } from "./load-columns"
import { readBlob, streamOf } from "./read-blob"

interface Place {
  readonly manuscriptId: string
  readonly datasetName: string
  readonly number: number
}

/** The uploaded file, streamed from the database. @throws Problem `not-found` */
export async function originalOf(db: Db, place: Place) {
  const row = await getVersionRow(db, place.manuscriptId, place.datasetName, place.number)
  const { blobId } = await db
    .selectFrom("datasetVersion")
    .select("blobId")
    .where("id", "=", row.id)
    .executeTakeFirstOrThrow()
  return {
    fileName: row.fileName,
    size: row.size,
    sha256: row.sha256.toString("hex"),
    stream: streamOf(readBlob(db, blobId)),
  }
}

/** All columns of an accepted version in one frame. @throws Problem `not-found`, `conflict` */
export async function columnsFrame(db: Db, place: Place) {
  const row = await getVersionRow(db, place.manuscriptId, place.datasetName, place.number)
  if (row.state !== "accepted")
    throw new Problem("conflict", "This version is not accepted, so its columns may still change.")
  return { frame: writeTableFrame(await loadTable(db, row.id)), sha256: row.sha256.toString("hex") }
}
