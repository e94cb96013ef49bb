import type { Task } from "graphile-worker"
import { getDb } from "@/lib/server/db/client"
import { insertEvent } from "@/lib/server/db/events"
import { notifyProgress } from "./notify-progress"
import { JobFailure, runInChild } from "./run-in-child"

const bounds = { timeoutMs: 10 * 60_000, memoryMb: 2048 }

interface Failure {
  readonly message: string
  readonly errors?: readonly object[] | undefined
}

/** Job `compute-figure`: results and proof of a figure version, in a process of its own. */
export const computeFigureJob: Task = async (payload) => {
  const { figureVersionId } = payload as { figureVersionId: string }
  const db = getDb()
  const running = () => db.updateTable("computation").where("figureVersionId", "=", figureVersionId)
  const started = await running()
    .set({ state: "computing", startedAt: new Date() })
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
  const tell = (kind: "computed" | "failed") =>
    insertEvent(db, {
      manuscriptId,
      personId: null,
      kind: `figure-version.${kind}`,
      subject: figureVersionId,
      data: { figure: version.name, figureId: version.figureId, number: version.number },
    })
  const fail = async (failure: Failure) => {
    await running()
      .set({ state: "failed", progress: null, failure: JSON.stringify(failure), finishedAt: new Date() })
      .where("state", "=", "computing")
      .execute()
    await tell("failed")
  }
  const showProgress = async (share: number, what: string) => {
    await running()
      .set({ progress: JSON.stringify({ share, what }) })
      .where("state", "=", "computing")
      .execute()
    const kind = "figure-version.progress"
    await notifyProgress(db, { manuscriptId, subject: figureVersionId, kind, share, what })
  }
  try {
    const answer = await runInChild("compute-figure", { figureVersionId }, bounds, {
      isWanted: async () => {
        const { state } = await db
          .selectFrom("computation")
          .select("state")
          .where("figureVersionId", "=", figureVersionId)
          .executeTakeFirstOrThrow()
        return state !== "cancelled"
      },
      onProgress: (share, what) =>
        void showProgress(share, what).catch((error: Error) =>
          console.error(`progress of ${figureVersionId} was not told: ${error.message}`),
        ),
    })
    if (answer.type === "done") await tell("computed")
    else if (answer.type === "failure") await fail(answer)
  } catch (error) {
    if (error instanceof JobFailure) return fail({ message: error.message })
    await fail({
      message: "Computing the figure failed on the server. Compute it again; if it stays, report it.",
    })
    throw error
  }
}
