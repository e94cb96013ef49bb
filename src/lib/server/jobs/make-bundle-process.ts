import { writeBundle } from "@/lib/bundle/write-bag"
import { closeDb, getDb } from "@/lib/server/db/client"
import { storeBlob } from "@/lib/server/services/datasets/store-blob"
import { bundleContent } from "@/lib/server/services/drafts/bundle-content"
import { tellWorker, workOfChild } from "./run-in-child"

/** Originals of a whole draft may be many files of the upload limit. */
const largestBundle = 20e9

/** Makes the bundle of a locked draft and stores it by content; a program of its own. */
async function main(): Promise<void> {
  const { bundleId } = workOfChild<{ bundleId: string }>()
  const db = getDb()
  try {
    const { draftId } = await db
      .selectFrom("bundle")
      .select("draftId")
      .where("id", "=", bundleId)
      .executeTakeFirstOrThrow()
    const pieces = writeBundle(await bundleContent(db, draftId))
    await db.transaction().execute(async (trx) => {
      const blob = await storeBlob(trx, pieces, largestBundle)
      await trx
        .updateTable("bundle")
        .set({ state: "done", blobId: blob.id, sha256: blob.sha256, size: blob.size, finishedAt: new Date() })
        .where("id", "=", bundleId)
        .execute()
    })
    tellWorker({ type: "done" })
  } finally {
    await closeDb()
  }
}

await main()
process.disconnect?.()
