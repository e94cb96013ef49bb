import { bundleFiles } from "@/lib/bundle/bundle-files"
import { writeBag } from "@/lib/bundle/write-bag"
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
    const content = await bundleContent(db, draftId)
    const pieces = writeBag(bundleFiles(content), {
      "Source-Organization": content.people.map((person) => person.name).join(", "),
      "External-Description": `${content.manuscript.title}, ${content.draft.title}`,
      "External-Identifier": content.draft.digest,
      "Bagging-Date": content.draft.lockedAt.slice(0, 10),
      "Bag-Software-Agent": `${content.software.name} ${content.software.version}`,
    })
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
