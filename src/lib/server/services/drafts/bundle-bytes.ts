import { bagName } from "@/lib/bundle/bundle-paths"
import { Problem } from "@/lib/contracts/problems"
import type { Db } from "@/lib/server/db/client"
import { readBlob, streamOf } from "@/lib/server/services/datasets/read-blob"
import { type DraftPlace, getDraftRow } from "./drafts"

/** The bundle of a locked draft as a stream. @throws Problem `not-found`, `conflict` while there is none yet */
export async function bundleBytes(db: Db, place: DraftPlace) {
  const draft = await getDraftRow(db, place)
  if (draft.state !== "locked") throw new Problem("conflict", "A bundle is made of a locked draft.")
  const bundle = await db
    .selectFrom("bundle")
    .select(["blobId", "sha256", "size", "failure"])
    .where("draftId", "=", draft.id)
    .orderBy("createdAt", "desc")
    .executeTakeFirst()
  if (!bundle?.blobId || !bundle.sha256 || bundle.size === null) {
    const failure = (bundle?.failure as { message?: string } | null)?.message
    throw new Problem("conflict", failure ?? "The bundle is being made; ask again in a moment.")
  }
  return {
    name: `${bagName({ manuscript: { title: draft.manuscriptTitle }, draft: { number: draft.number } })}.zip`,
    sha256: bundle.sha256.toString("hex"),
    size: bundle.size,
    stream: streamOf(readBlob(db, bundle.blobId)),
  }
}
