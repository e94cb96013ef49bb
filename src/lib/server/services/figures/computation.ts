import { Problem } from "@/lib/contracts/problems"
import type { ComputationState } from "@/lib/domain/states"
import type { Db } from "@/lib/server/db/client"
import { insertEvent } from "@/lib/server/db/events"
import { addJob } from "@/lib/server/db/jobs"
import { getFigureVersion, getVersionRow } from "./figure-versions"
import { getFigure } from "./figures"

interface Turn {
  readonly from: readonly ComputationState[]
  readonly to: ComputationState
  readonly kind: string
  readonly refusal: string
}

const cancelling: Turn = {
  from: ["queued", "computing"],
  to: "cancelled",
  kind: "figure-version.cancelled",
  refusal: "This version is not being computed.",
}
const repeating: Turn = {
  from: ["failed", "cancelled"],
  to: "queued",
  kind: "figure-version.queued",
  refusal: "This version is computed, or being computed; its numbers do not change.",
}

/** Stops a computation, or queues it again after it failed or was cancelled. @throws Problem `conflict` */
async function turn(
  db: Db,
  { manuscriptId, figureId, number }: { manuscriptId: string; figureId: string; number: number },
  personId: string,
  { from, to, kind, refusal }: Turn,
) {
  const figure = await getFigure(db, manuscriptId, figureId)
  const { id } = await getVersionRow(db, manuscriptId, figureId, number)
  await db.transaction().execute(async (trx) => {
    const { numUpdatedRows } = await trx
      .updateTable("computation")
      .set({ state: to, progress: null, failure: null, finishedAt: null })
      .where("figureVersionId", "=", id)
      .where("state", "in", from)
      .executeTakeFirst()
    if (numUpdatedRows === 0n) throw new Problem("conflict", refusal)
    if (to === "queued") await addJob(trx, "compute-figure", { figureVersionId: id }, { maxAttempts: 2 })
    const data = { figure: figure.name, figureId, number }
    await insertEvent(trx, { manuscriptId, personId, kind, subject: id, data })
  })
  return getFigureVersion(db, manuscriptId, figureId, number)
}

type Place = Parameters<typeof turn>[1]

/** Stops computing a version; the worker ends its process. @throws Problem `conflict` */
export const cancelComputation = (db: Db, place: Place, personId: string) =>
  turn(db, place, personId, cancelling)

/** Computes a version again after it failed or was cancelled. @throws Problem `conflict` */
export const computeAgain = (db: Db, place: Place, personId: string) => turn(db, place, personId, repeating)
