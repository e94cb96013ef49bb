import type { Task } from "graphile-worker"
import { type Db, getDb } from "@/lib/server/db/client"
import { insertEvent } from "@/lib/server/db/events"
import { notifyProgress } from "./notify-progress"
import { JobFailure, runInChild } from "./run-in-child"

const bounds = { timeoutMs: 10 * 60_000, memoryMb: 1024 }

async function finish(
  db: Db,
  datasetVersionId: string,
  manuscriptId: string,
  failure: string | null,
  name: object,
) {
  await db.transaction().execute(async (trx) => {
    if (failure !== null)
      await trx
        .updateTable("datasetVersion")
        .set({ state: "failed", failure: JSON.stringify({ message: failure }) })
        .where("id", "=", datasetVersionId)
        .where("state", "in", ["uploaded", "reading"])
        .execute()
    await insertEvent(trx, {
      manuscriptId,
      personId: null,
      kind: failure === null ? "dataset-version.read" : "dataset-version.failed",
      subject: datasetVersionId,
      data: { ...name, failure },
    })
  })
}

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
  // Decided or read meanwhile: a repeated job has nothing to do.
  if (!version) return
  const { manuscriptId, name, number } = version
  try {
    const answer = await runInChild("read-table", { datasetVersionId }, bounds, (share, what) => {
      notifyProgress(db, {
        manuscriptId,
        subject: datasetVersionId,
        kind: "dataset-version.progress",
        share,
        what,
      }).catch((error: Error) =>
        console.error(`progress of ${datasetVersionId} was not told: ${error.message}`),
      )
    })
    await finish(
      db,
      datasetVersionId,
      manuscriptId,
      answer.type === "failure" ? (answer.message ?? "") : null,
      { dataset: name, number },
    )
  } catch (error) {
    const known = error instanceof JobFailure
    await finish(
      db,
      datasetVersionId,
      manuscriptId,
      known
        ? error.message
        : "Reading the file failed on the server. Upload it again; if it stays, report it.",
      { dataset: name, number },
    )
    if (!known) throw error
  }
}
