import { sql } from "kysely"
import { Problem } from "@/lib/contracts/problems"
import type { Db } from "@/lib/server/db/client"
import { insertEvent } from "@/lib/server/db/events"
import { type DraftPlace, getDraft, getDraftRow } from "./drafts"

export interface Pin {
  readonly figureId: string
  readonly version: number
  readonly caption?: string | undefined
}

/**
 * Replaces what a draft pins. A pin without a caption keeps the figure's own.
 *
 * @throws Problem `stale-revision`, `locked`, `invalid-request`
 */
export async function pinFigures(
  db: Db,
  place: DraftPlace,
  personId: string,
  pins: readonly Pin[],
  revision: number,
) {
  await db.transaction().execute(async (trx) => {
    const repeated = pins.findIndex((pin, at) => pins.findIndex((p) => p.figureId === pin.figureId) < at)
    if (repeated >= 0)
      throw new Problem("invalid-request", undefined, [
        {
          pointer: `/figures/${repeated}/figureId`,
          code: "figure-repeated",
          message: "A draft pins one version of a figure.",
        },
      ])
    const draft = await getDraftRow(trx, place)
    if (draft.state === "locked")
      throw new Problem("locked", `${draft.title} is locked; open the next draft to change it.`)
    const { numUpdatedRows } = await trx
      .updateTable("draft")
      .set((eb) => ({ revision: eb("revision", "+", 1) }))
      .where("id", "=", draft.id)
      .where("revision", "=", revision)
      .executeTakeFirst()
    if (numUpdatedRows === 0n) throw new Problem("stale-revision")
    const rows = []
    for (const [index, pin] of pins.entries()) rows.push(await rowOf(trx, place.manuscriptId, pin, index))
    await trx.deleteFrom("draftFigure").where("draftId", "=", draft.id).execute()
    if (rows.length > 0)
      await trx
        .insertInto("draftFigure")
        .values(rows.map((row) => ({ ...row, draftId: draft.id })))
        .execute()
    await insertEvent(trx, {
      manuscriptId: place.manuscriptId,
      personId,
      kind: "draft.pinned",
      subject: draft.id,
      data: { number: draft.number, figures: pins.length },
    })
    await trx
      .updateTable("manuscript")
      .set({ updatedAt: sql<Date>`now()` })
      .where("id", "=", place.manuscriptId)
      .execute()
  })
  return getDraft(db, place)
}

async function rowOf(trx: Db, manuscriptId: string, pin: Pin, index: number) {
  const found = await trx
    .selectFrom("figureVersion as v")
    .innerJoin("figure", "figure.id", "v.figureId")
    .select(["v.id", "figure.caption"])
    .where("figure.manuscriptId", "=", manuscriptId)
    .where("figure.id", "=", pin.figureId)
    .where("v.number", "=", pin.version)
    .executeTakeFirst()
  if (!found)
    throw new Problem("invalid-request", undefined, [
      {
        pointer: `/figures/${index}`,
        code: "no-such-version",
        message: `There is no version ${pin.version} of this figure in the manuscript.`,
      },
    ])
  return {
    figureId: pin.figureId,
    figureVersionId: found.id,
    position: index + 1,
    caption: pin.caption ?? found.caption,
  }
}
