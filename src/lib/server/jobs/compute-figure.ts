import type { Task } from "graphile-worker"
import { getDb } from "@/lib/server/db/client"
import { insertEvent } from "@/lib/server/db/events"
import { notifyProgress } from "./notify-progress"
import { JobFailure, runInChild } from "./run-in-child"

const bounds = { timeoutMs: 10 * 60_000, memoryMb: 2048 }

/** Job `compute-figure`: results and proof of a figure version, in a process of its own. */
export const computeFigureJob: Task = async (payload) => {
  const { figureVersionId } = payload as { figureVersionId: string }
  const db = getDb()
  const started = await db
    .updateTable("computation")
    .set({ state: "computing", startedAt: new Date() })
    .where("figureVersionId", "=", figureVersionId)
    .where("state", "in", ["queued", "computing"])
    .executeTakeFirst()
  // Cancelled or done meanwhile.
  if (started.numUpdatedRows === 0n) return
  const version = await db
    .selectFrom("figureVersion")
    .innerJoin("figure", "figure.id", "figureVersion.figureId")
    .select(["figure.manuscriptId", "figure.name", "figure.id as figureId", "figureVersion.number"])
    .where("figureVersion.id", "=", figureVersionId)
    .executeTakeFirstOrThrow()
  const { manuscriptId } = version
  const finish = (failure: { message: string; errors?: readonly object[] | undefined } | null) =>
    db.transaction().execute(async (trx) => {
      if (failure)
        await trx
          .updateTable("computation")
          .set({ state: "failed", failure: JSON.stringify(failure), finishedAt: new Date() })
          .where("figureVersionId", "=", figureVersionId)
          .execute()
      await insertEvent(trx, {
        manuscriptId,
        personId: null,
        kind: failure ? "figure-version.failed" : "figure-version.computed",
        subject: figureVersionId,
        data: { figure: version.name, figureId: version.figureId, number: version.number },
      })
    })
  try {
    const answer = await runInChild("compute-figure", { figureVersionId }, bounds, (share, what) => {
      const progress = { share, what }
      Promise.all([
        db
          .updateTable("computation")
          .set({ progress: JSON.stringify(progress) })
          .where("figureVersionId", "=", figureVersionId)
          .where("state", "=", "computing")
          .execute(),
        notifyProgress(db, {
          manuscriptId,
          subject: figureVersionId,
          kind: "figure-version.progress",
          ...progress,
        }),
      ]).catch((error: Error) =>
        console.error(`progress of ${figureVersionId} was not told: ${error.message}`),
      )
    })
    await finish(answer.type === "failure" ? { message: answer.message ?? "", errors: answer.errors } : null)
  } catch (error) {
    const known = error instanceof JobFailure
    await finish({
      message: known
        ? error.message
        : "Computing the figure failed on the server. Save it again; if it stays, report it.",
    })
    if (!known) throw error
  }
}
