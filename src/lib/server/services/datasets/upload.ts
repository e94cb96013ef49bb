import { Problem } from "@/lib/contracts/problems"
import { datasetName, largestUpload } from "@/lib/contracts/datasets"
import type { Db } from "@/lib/server/db/client"
import { insertEvent } from "@/lib/server/db/events"
import { addJob } from "@/lib/server/db/jobs"
import { presentVersion, versionsInList } from "./datasets"
import { storeBlob } from "./store-blob"

export interface Upload {
  readonly manuscriptId: string
  readonly datasetName: string
  readonly fileName: string
  readonly personId: string
  readonly pieces: AsyncIterable<Uint8Array>
  /** Content-Length, where the client sends it. */
  readonly announced: number | null
}

/**
 * Stores a file as the next version of a dataset, which is made when it does not exist, and puts the job that reads it
 * in the queue: all of it in one transaction. The bytes of the newest version again make no second one.
 *
 * @returns the version and whether it is new
 * @throws Problem `too-large`, `invalid-request`
 */
export async function uploadDatasetVersion(db: Db, upload: Upload) {
  const { manuscriptId, personId } = upload
  const named = datasetName.safeParse(upload.datasetName)
  if (!named.success)
    throw new Problem("invalid-request", undefined, [
      { pointer: "/datasetName", code: "bad-name", message: named.error.issues[0]!.message },
    ])
  if (upload.announced !== null && upload.announced > largestUpload)
    throw new Problem(
      "too-large",
      `The file has ${Math.ceil(upload.announced / 1e6)} MB; the limit for one file is ${largestUpload / 1e6} MB. Nothing was stored.`,
    )
  return db.transaction().execute(async (trx) => {
    const blob = await storeBlob(trx, upload.pieces)
    await trx
      .insertInto("dataset")
      .values({ manuscriptId, name: named.data, createdBy: personId })
      .onConflict((conflict) => conflict.columns(["manuscriptId", "name"]).doNothing())
      .execute()
    const dataset = await trx
      .selectFrom("dataset")
      .select("id")
      .where("manuscriptId", "=", manuscriptId)
      .where("name", "=", named.data)
      .forNoKeyUpdate()
      .executeTakeFirstOrThrow()
    const newest = await trx
      .selectFrom("datasetVersion")
      .select(["id", "number", "blobId"])
      .where("datasetId", "=", dataset.id)
      .orderBy("number", "desc")
      .executeTakeFirst()
    if (newest?.blobId === blob.id) {
      const row = await versionsInList(trx).where("v.id", "=", newest.id).executeTakeFirstOrThrow()
      return { version: presentVersion(row), isNew: false }
    }
    const number = (newest?.number ?? 0) + 1
    const { id } = await trx
      .insertInto("datasetVersion")
      .values({
        datasetId: dataset.id,
        number,
        fileName: upload.fileName,
        blobId: blob.id,
        uploadedBy: personId,
      })
      .returning("id")
      .executeTakeFirstOrThrow()
    await addJob(trx, "read-table", { datasetVersionId: id }, { maxAttempts: 2 })
    await insertEvent(trx, {
      manuscriptId,
      personId,
      kind: "dataset-version.uploaded",
      subject: id,
      data: { dataset: named.data, number, fileName: upload.fileName, size: blob.size },
    })
    const row = await versionsInList(trx).where("v.id", "=", id).executeTakeFirstOrThrow()
    return { version: presentVersion(row), isNew: true }
  })
}
