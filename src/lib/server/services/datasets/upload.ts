import { Problem } from "@/lib/contracts/problems"
import { datasetName, largestUpload } from "@/lib/contracts/datasets"
import type { Db } from "@/lib/server/db/client"
import { insertEvent } from "@/lib/server/db/events"
import { addJob } from "@/lib/server/db/jobs"
import { presentVersion, versionsInList } from "./datasets"
import { storeBlob } from "./store-blob"
import { inTurn, withoutSilence } from "./upload-turns"

export interface Upload {
  readonly manuscriptId: string
  readonly datasetName: string
  readonly fileName: string
  readonly personId: string
  readonly pieces: AsyncIterable<Uint8Array>
  /** Content-Length, where the client sends it. */
  readonly announced: number | null
  /** What the bytes have to be, where the client says it. */
  readonly sha256?: Buffer | null
}

/**
 * Stores a file as the next version of a dataset, which is made when it does not exist, and puts the job that reads it
 * in the queue: all of it in one transaction. The bytes of the newest version again make no second one; if their reading
 * had failed, they are read again.
 *
 * @returns the version and whether it is new
 * @throws Problem `too-large`, `invalid-request`
 */
export async function uploadDatasetVersion(db: Db, upload: Upload) {
  const named = datasetName.safeParse(upload.datasetName)
  if (!named.success)
    throw new Problem("invalid-request", undefined, [
      { pointer: "/datasetName", code: "bad-name", message: named.error.issues[0]!.message },
    ])
  if (upload.announced !== null && upload.announced > largestUpload)
    throw new Problem(
      "too-large",
      `The file has ${Math.ceil(upload.announced / 1e6)} MB; the limit for one file is ${largestUpload / 1e6} MB. Nothing was stored.`,
      [],
      // The rest of the body is not read, so the connection is of no more use.
      { connection: "close" },
    )
  return inTurn(() => db.transaction().execute((trx) => store(trx, upload, named.data)))
}

async function store(trx: Db, upload: Upload, name: string) {
  const { manuscriptId, personId } = upload
  const blob = await storeBlob(trx, withoutSilence(upload.pieces))
  if (upload.sha256 && !upload.sha256.equals(blob.sha256))
    throw new Problem("invalid-request", "What arrived is not what was sent; nothing was stored.", [
      {
        pointer: "Content-Digest",
        code: "wrong-checksum",
        message: `The bytes that arrived have the SHA-256 ${blob.sha256.toString("hex")}.`,
      },
    ])
  await trx
    .insertInto("dataset")
    .values({ manuscriptId, name, createdBy: personId })
    .onConflict((conflict) => conflict.columns(["manuscriptId", "name"]).doNothing())
    .execute()
  const dataset = await trx
    .selectFrom("dataset")
    .select("id")
    .where("manuscriptId", "=", manuscriptId)
    .where("name", "=", name)
    .forNoKeyUpdate()
    .executeTakeFirstOrThrow()
  const newest = await trx
    .selectFrom("datasetVersion")
    .select(["id", "number", "blobId", "state"])
    .where("datasetId", "=", dataset.id)
    .orderBy("number", "desc")
    .executeTakeFirst()
  const read = (datasetVersionId: string) =>
    addJob(trx, "read-table", { datasetVersionId }, { maxAttempts: 2 })
  if (newest?.blobId === blob.id) {
    // Sent again after a failure: it is meant to be read again.
    if (newest.state === "failed") {
      await trx
        .updateTable("datasetVersion")
        .set({ state: "uploaded", failure: null })
        .where("id", "=", newest.id)
        .execute()
      await read(newest.id)
    }
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
  await read(id)
  await insertEvent(trx, {
    manuscriptId,
    personId,
    kind: "dataset-version.uploaded",
    subject: id,
    data: { dataset: name, number, fileName: upload.fileName, size: blob.size },
  })
  const row = await versionsInList(trx).where("v.id", "=", id).executeTakeFirstOrThrow()
  return { version: presentVersion(row), isNew: true }
}
