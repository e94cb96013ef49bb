import type { z } from "zod"
import type { changeDatasetVersion as changeContract } from "@/lib/contracts/datasets"
import { Problem } from "@/lib/contracts/problems"
import type { Db } from "@/lib/server/db/client"
import { insertEvent } from "@/lib/server/db/events"
import { addJob } from "@/lib/server/db/jobs"
import { parseRecipe, RecipeError, type TableReading } from "@/lib/tables"
import { costsData } from "@/lib/tables/costs-data"
import { type DatasetVersionPlace, getDatasetVersion, getVersionRow } from "./datasets"

type Change = z.output<NonNullable<typeof changeContract.body>>

/** Locks a version and makes sure that nothing is decided or running. @returns its id and state */
async function lockUndecided(trx: Db, place: DatasetVersionPlace) {
  const { id } = await getVersionRow(trx, place.manuscriptId, place.datasetName, place.number)
  const version = await trx
    .selectFrom("datasetVersion")
    .select(["id", "state", "reading", "rows"])
    .where("id", "=", id)
    .forUpdate()
    .executeTakeFirstOrThrow()
  if (version.state === "accepted")
    throw new Problem(
      "locked",
      `Version ${place.number} of “${place.datasetName}” is accepted and never changes.`,
    )
  if (version.state === "uploaded" || version.state === "reading")
    throw new Problem("conflict", "The file is still being read; decide when its reading is there.")
  return version
}

/** One decision about a version in a transaction with its line of the history. @returns the version after it */
async function decide(
  db: Db,
  place: DatasetVersionPlace,
  personId: string,
  kind: string,
  act: (trx: Db) => Promise<string>,
) {
  await db.transaction().execute(async (trx) => {
    const subject = await act(trx)
    await insertEvent(trx, {
      manuscriptId: place.manuscriptId,
      personId,
      kind: `dataset-version.${kind}`,
      subject,
      data: { dataset: place.datasetName, number: place.number },
    })
  })
  return getDatasetVersion(db, place.manuscriptId, place.datasetName, place.number)
}

/** A recipe as it is stored. @throws Problem `invalid-request` with every place of it that is wrong */
function checkedRecipe(recipe: unknown): string {
  try {
    return JSON.stringify(parseRecipe(recipe))
  } catch (error) {
    if (!(error instanceof RecipeError)) throw error
    throw new Problem(
      "invalid-request",
      "The recipe cannot be used.",
      error.issues.map(({ pointer, message }) => ({
        pointer: `/recipe${pointer}`,
        code: "invalid-recipe",
        message,
      })),
    )
  }
}

/** Corrects columns, or sends the file to be read again by another recipe. @throws Problem `locked`, `conflict` */
export function changeDatasetVersion(db: Db, place: DatasetVersionPlace, personId: string, change: Change) {
  return decide(db, place, personId, "corrected", async (trx) => {
    const { id } = await lockUndecided(trx, place)
    for (const column of change.columns ?? []) await correctColumn(trx, id, column)
    if (change.recipe) {
      await trx
        .updateTable("datasetVersion")
        .set({ state: "uploaded", recipe: checkedRecipe(change.recipe), failure: null })
        .where("id", "=", id)
        .execute()
      await addJob(trx, "read-table", { datasetVersionId: id }, { maxAttempts: 2 })
    }
    return id
  })
}

async function correctColumn(
  trx: Db,
  datasetVersionId: string,
  { index, ...values }: NonNullable<Change["columns"]>[number],
): Promise<void> {
  if (Object.keys(values).length === 0) return
  const { numUpdatedRows } = await trx
    .updateTable("datasetColumn")
    .set(values)
    .where("datasetVersionId", "=", datasetVersionId)
    .where("columnIndex", "=", index)
    .executeTakeFirst()
  if (numUpdatedRows === 0n)
    throw new Problem("invalid-request", undefined, [
      { pointer: "/columns", code: "no-such-column", message: `There is no column ${index}.` },
    ])
}

/**
 * Accepts a version for good.
 *
 * @param treatAsMissing whether cells and rows that could not be read may count as missing
 * @throws Problem `locked`; `conflict` while a question is open, or when data would be lost without a word
 */
export function acceptDatasetVersion(
  db: Db,
  place: DatasetVersionPlace,
  personId: string,
  treatAsMissing: boolean,
) {
  return decide(db, place, personId, "accepted", async (trx) => {
    const { id, state, reading, rows } = await lockUndecided(trx, place)
    if (state === "failed" || rows === null)
      throw new Problem(
        "conflict",
        "This version could not be read; correct the recipe or upload the file again.",
      )
    const { asks, problemCounts } = reading as TableReading
    if (asks.length > 0)
      throw new Problem(
        "conflict",
        `A question about the file is open: ${asks.map((ask) => ask.message).join(" ")}`,
      )
    const lost = problemCounts.reduce((sum, { code, count }) => sum + (costsData(code) ? count : 0), 0)
    if (lost > 0 && !treatAsMissing)
      throw new Problem(
        "conflict",
        `${lost} ${lost === 1 ? "place" : "places"} could not be read. Accept with "treatAsMissing": true to leave them out, or correct the file or its recipe.`,
      )
    await trx
      .updateTable("datasetVersion")
      .set({ state: "accepted", acceptedBy: personId, acceptedAt: new Date() })
      .where("id", "=", id)
      .execute()
    return id
  })
}

/** Refuses a version: it stays in the list with its file, figures cannot use it. @throws Problem `locked`, `conflict` */
export function refuseDatasetVersion(db: Db, place: DatasetVersionPlace, personId: string) {
  return decide(db, place, personId, "refused", async (trx) => {
    const { id } = await lockUndecided(trx, place)
    await trx.updateTable("datasetVersion").set({ state: "refused" }).where("id", "=", id).execute()
    return id
  })
}

/** Stops a reading: the worker sees that it is not wanted any more. @throws Problem `conflict` when none runs */
export function cancelReading(db: Db, place: DatasetVersionPlace, personId: string) {
  return decide(db, place, personId, "cancelled", async (trx) => {
    const { id } = await getVersionRow(trx, place.manuscriptId, place.datasetName, place.number)
    const message = "The reading was cancelled. Read the file again, or refuse it."
    const { numUpdatedRows } = await trx
      .updateTable("datasetVersion")
      .set({ state: "failed", failure: JSON.stringify({ message, cancelled: true }) })
      .where("id", "=", id)
      .where("state", "in", ["uploaded", "reading"])
      .executeTakeFirst()
    if (numUpdatedRows === 0n) throw new Problem("conflict", "This version is not being read.")
    return id
  })
}
