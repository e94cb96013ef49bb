import type { Task } from "graphile-worker"
import { getDb } from "@/lib/server/db/client"
import { insertEvent } from "@/lib/server/db/events"
import { notifyProgress } from "./notify-progress"
import { JobFailure, runInChild } from "./run-in-child"

const bounds = { timeoutMs: 10 * 60_000, memoryMb: 1024 }

/** Job `read-table`: reads an uploaded file in a process of its own and proposes its columns. */
export const readTableJob: Task = async (payload) => {
  const { datasetVersionId } = payload as { datasetVersionId: string }
  const db = getDb()
  const version = await db
    .updateTable("datasetVersion")
    .set({ state: "reading" })
    .from("dataset")
    .whereRef("dataset.id", "=", "datasetVersion.datasetId")
    .where("datasetVersion.id", "=", datasetVersionId)
    .where("datasetVersion.state", "in", ["uploaded", "reading"])
    .returning(["dataset.manuscriptId", "dataset.name", "datasetVersion.number"])
    .executeTakeFirst()
  // Decided, read or cancelled meanwhile: there is nothing to do.
  if (!version) return
  const { manuscriptId, name, number } = version
  const tell = (failure: string | null) =>
    insertEvent(db, {
      manuscriptId,
      personId: null,
      kind: failure === null ? "dataset-version.read" : "dataset-version.failed",
      subject: datasetVersionId,
      data: { dataset: name, number, ...(failure === null ? {} : { failure }) },
    })
  /** A reading that ended without a word of its own. */
  const fail = async (message: string) => {
    await db
      .updateTable("datasetVersion")
      .set({ state: "failed", failure: JSON.stringify({ message }) })
      .where("id", "=", datasetVersionId)
      .where("state", "=", "reading")
      .execute()
    await tell(message)
  }
  try {
    const answer = await runInChild("read-table", { datasetVersionId }, bounds, {
      isWanted: async () => {
        const { failure } = await db
          .selectFrom("datasetVersion")
          .select("failure")
          .where("id", "=", datasetVersionId)
          .executeTakeFirstOrThrow()
        return !(failure as { cancelled?: boolean } | null)?.cancelled
      },
      onProgress: (share, what) => {
        const kind = "dataset-version.progress"
        notifyProgress(db, { manuscriptId, subject: datasetVersionId, kind, share, what }).catch(
          (error: Error) => console.error(`progress of ${datasetVersionId} was not told: ${error.message}`),
        )
      },
    })
    if (answer.type === "done") await tell(null)
    else if (answer.type === "failure") await tell(answer.message)
  } catch (error) {
    if (error instanceof JobFailure) return fail(error.message)
    await fail("Reading the file failed on the server. Upload it again; if it stays, report it.")
    throw error
  }
}
