import type { Db } from "@/lib/server/db/client"
import { type DatasetVersionPlace, getVersionRow } from "./datasets"
import { readBlob, streamOf } from "./read-blob"

/** The uploaded file, streamed from the database. @throws Problem `not-found` */
export async function originalOf(db: Db, place: DatasetVersionPlace) {
  const { id, fileName, size, sha256 } = await getVersionRow(
    db,
    place.manuscriptId,
    place.datasetName,
    place.number,
  )
  const { blobId } = await db
    .selectFrom("datasetVersion")
    .select("blobId")
    .where("id", "=", id)
    .executeTakeFirstOrThrow()
  return { fileName, size, sha256: sha256.toString("hex"), stream: streamOf(readBlob(db, blobId)) }
}
