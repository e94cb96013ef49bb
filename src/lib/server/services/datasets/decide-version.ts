import type { z } from "zod"
import type { changeDatasetVersion as changeContract } from "@/lib/contracts/datasets"
import { Problem } from "@/lib/contracts/problems"
import type { Db } from "@/lib/server/db/client"
import { insertEvent } from "@/lib/server/db/events"
import { addJob } from "@/lib/server/db/jobs"
import { getDatasetVersion, getVersionRow } from "./datasets"

interface Place {
  readonly manuscriptId: string
  readonly datasetName: string
  readonly number: number
}

/** Locks a version and makes sure that it still waits for a decision. */
async function lockProposed(trx: Db, place: Place): Promise<string> {
  const { id } = await getVersionRow(trx, place.manuscriptId, place.datasetName, place.number)
  const { state } = await trx
    .selectFrom("datasetVersion")
    .select("state")
    .where("id", "=", id)
    .forUpdate()
    .executeTakeFirstOrThrow()
  if (state === "accepted")
    throw new Problem(
      "locked",
      `Version ${place.number} of “${place.datasetName}” is accepted and never changes.`,
    )
  if (state !== "proposed" && state !== "refused" && state !== "failed")
    throw new Problem("conflict", "The file is still being read; decide when its reading is there.")
  return id
}

/** Corrects columns, or sends the file to be read again by another recipe. @throws Problem `locked`, `conflict` */
export async function changeDatasetVersion(
  db: Db,
  place: Place,
  personId: string,
  change: z.output<NonNullable<typeof changeContract.body>>,
) {
  await db.transaction().execute(async (trx) => {
    const id = await lockProposed(trx, place)
    for (const { index, ...values } of change.columns ?? []) {
      if (Object.keys(values).length === 0) continue
      const { numUpdatedRows } = await trx
        .updateTable("datasetColumn")
        .set(values)
        .where("datasetVersionId", "=", id)
        .where("columnIndex", "=", index)
        .executeTakeFirst()
      if (numUpdatedRows === 0n)
        throw new Problem("invalid-request", undefined, [
          { pointer: "/columns", code: "no-such-column", message: `There is no column ${index}.` },
        ])
    }
    if (change.recipe) {
      await trx
        .updateTable("datasetVersion")
        .set({ state: "uploaded", recipe: JSON.stringify(change.recipe), failure: null })
        .where("id", "=", id)
        .execute()
      await addJob(trx, "read-table", { datasetVersionId: id }, { maxAttempts: 2 })
    }
    await insertEvent(trx, {
      manuscriptId: place.manuscriptId,
      personId,
      kind: "dataset-version.corrected",
      subject: id,
      data: { dataset: place.datasetName, number: place.number },
    })
  })
  return getDatasetVersion(db, place.manuscriptId, place.datasetName, place.number)
}

/** Accepts a version for good. Exactly one column may hold the time. @throws Problem `locked`, `conflict` */
export async function acceptDatasetVersion(db: Db, place: Place, personId: string) {
  await db.transaction().execute(async (trx) => {
    const id = await lockProposed(trx, place)
    const { state, reading } = await trx
      .selectFrom("datasetVersion")
      .select(["state", "reading"])
      .where("id", "=", id)
      .executeTakeFirstOrThrow()
    if (state !== "proposed")
      throw new Problem(
        "conflict",
        "This version could not be read; correct the recipe or upload the file again.",
      )
    const { asks = [] } = (reading ?? {}) as { asks?: { message: string }[] }
    if (asks.length > 0)
      throw new Problem(
        "conflict",
        `A question about the file is open: ${asks.map((ask) => ask.message).join(" ")}`,
      )
    await trx
      .updateTable("datasetVersion")
      .set({ state: "accepted", acceptedBy: personId, acceptedAt: new Date() })
      .where("id", "=", id)
      .execute()
    await insertEvent(trx, {
      manuscriptId: place.manuscriptId,
      personId,
      kind: "dataset-version.accepted",
      subject: id,
      data: { dataset: place.datasetName, number: place.number },
    })
  })
  return getDatasetVersion(db, place.manuscriptId, place.datasetName, place.number)
}

/** Refuses a version: it stays in the list with its file, figures cannot use it. @throws Problem `locked`, `conflict` */
export async function refuseDatasetVersion(db: Db, place: Place, personId: string) {
  await db.transaction().execute(async (trx) => {
    const id = await lockProposed(trx, place)
    await trx.updateTable("datasetVersion").set({ state: "refused" }).where("id", "=", id).execute()
    await insertEvent(trx, {
      manuscriptId: place.manuscriptId,
      personId,
      kind: "dataset-version.refused",
      subject: id,
      data: { dataset: place.datasetName, number: place.number },
    })
  })
  return getDatasetVersion(db, place.manuscriptId, place.datasetName, place.number)
}
