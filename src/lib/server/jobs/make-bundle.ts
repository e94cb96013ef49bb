import type { Task } from "graphile-worker"
import { getDb } from "@/lib/server/db/client"
import { insertEvent } from "@/lib/server/db/events"
import { runInChild } from "./run-in-child"

const bounds = { timeoutMs: 60 * 60_000, memoryMb: 1024 }

/** Job `make-bundle`: the bundle of a draft that was locked, in a process of its own. */
export const makeBundleJob: Task = async (payload, { job }) => {
  const { bundleId } = payload as { bundleId: string }
  const db = getDb()
  const bundle = await db
    .updateTable("bundle")
    .set({ state: "building" })
    .from("draft")
    .whereRef("draft.id", "=", "bundle.draftId")
    .where("bundle.id", "=", bundleId)
    .where("bundle.state", "in", ["queued", "building"])
    .returning(["draft.manuscriptId", "draft.number"])
    .executeTakeFirst()
  if (!bundle) return
  const tell = (kind: string) =>
    insertEvent(db, {
      manuscriptId: bundle.manuscriptId,
      personId: null,
      kind,
      subject: bundleId,
      data: { number: bundle.number },
    })
  try {
    await runInChild("make-bundle", { bundleId }, bounds)
  } catch (error) {
    if (job.attempts >= job.max_attempts) {
      const message = "Making the bundle failed on the server; report it with the number of the draft."
      await db
        .updateTable("bundle")
        .set({ state: "failed", failure: JSON.stringify({ message }), finishedAt: new Date() })
        .where("id", "=", bundleId)
        .execute()
      await tell("bundle.failed")
    }
    throw error
  }
  await tell("bundle.made")
}
