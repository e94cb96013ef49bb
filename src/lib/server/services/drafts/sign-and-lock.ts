import { Problem } from "@/lib/contracts/problems"
import type { Db } from "@/lib/server/db/client"
import { insertEvent } from "@/lib/server/db/events"
import { addJob } from "@/lib/server/db/jobs"
import { digestOf, pinnedFigures } from "./draft-content"
import { type DraftPlace, getDraft, getDraftRow } from "./drafts"

/** Locks the draft's row and returns it with the digest of what it pins at this moment. */
async function lockRow(trx: Db, place: DraftPlace) {
  const { id } = await getDraftRow(trx, place)
  await trx.selectFrom("draft").select("id").where("id", "=", id).forUpdate().execute()
  const draft = await getDraftRow(trx, place)
  if (draft.state === "locked") throw new Problem("locked", `${draft.title} is locked.`)
  const digest = digestOf(draft.manuscriptTitle, await pinnedFigures(trx, id))
  if (!digest) throw new Problem("conflict", `${draft.title} pins no figure yet.`)
  return { ...draft, digest }
}

function requireDigest(digest: Buffer, seen: string): void {
  if (digest.toString("hex") !== seen)
    throw new Problem("conflict", "The draft has changed since you looked at it. Look at it again.")
}

/** Signs off on exactly what is pinned. @throws Problem `conflict` when that has changed since, `locked` */
export async function signOff(db: Db, place: DraftPlace, personId: string, seen: string) {
  await db.transaction().execute(async (trx) => {
    const draft = await lockRow(trx, place)
    requireDigest(draft.digest, seen)
    await trx
      .updateTable("signOff")
      .set({ withdrawnAt: new Date() })
      .where("draftId", "=", draft.id)
      .where("personId", "=", personId)
      .where("withdrawnAt", "is", null)
      .execute()
    await trx.insertInto("signOff").values({ draftId: draft.id, personId, digest: draft.digest }).execute()
    await insertEvent(trx, {
      manuscriptId: place.manuscriptId,
      personId,
      kind: "draft.signed-off",
      subject: draft.id,
      data: { number: draft.number, digest: seen },
    })
  })
  return getDraft(db, place)
}

/** Takes one's own sign-off back. @throws Problem `conflict` when there is none, `locked` */
export async function withdrawSignOff(db: Db, place: DraftPlace, personId: string): Promise<void> {
  await db.transaction().execute(async (trx) => {
    const draft = await getDraftRow(trx, place)
    if (draft.state === "locked") throw new Problem("locked", `${draft.title} is locked.`)
    const { numUpdatedRows } = await trx
      .updateTable("signOff")
      .set({ withdrawnAt: new Date() })
      .where("draftId", "=", draft.id)
      .where("personId", "=", personId)
      .where("withdrawnAt", "is", null)
      .executeTakeFirst()
    if (numUpdatedRows === 0n) throw new Problem("conflict", "You have no sign-off to withdraw.")
    await insertEvent(trx, {
      manuscriptId: place.manuscriptId,
      personId,
      kind: "draft.sign-off-withdrawn",
      subject: draft.id,
      data: { number: draft.number },
    })
  })
}

/**
 * Locks a draft for good and puts the making of its bundle in the queue, in one transaction. Missing sign-offs and
 * unsettled threads need a written reason.
 *
 * @throws Problem `invalid-request` when the name is not typed, `conflict`, `locked`
 */
export async function lockDraft(
  db: Db,
  place: DraftPlace,
  personId: string,
  order: { confirm: string; digest: string; reason?: string | undefined },
) {
  await db.transaction().execute(async (trx) => {
    const draft = await lockRow(trx, place)
    if (order.confirm.trim() !== draft.title)
      throw new Problem("invalid-request", undefined, [
        { pointer: "/confirm", code: "not-confirmed", message: `Type “${draft.title}” to confirm.` },
      ])
    requireDigest(draft.digest, order.digest)
    const { figures, waitingFor, openMustSettle } = await getDraft(trx, place)
    const unready = figures.filter((figure) => !figure.ready)
    if (unready.length > 0)
      throw new Problem(
        "conflict",
        `Not computed yet: ${unready.map((figure) => figure.figureName).join(", ")}. Wait for the proofs, or unpin them.`,
      )
    const open = [
      ...(waitingFor.length > 0
        ? [`sign-offs are missing from ${waitingFor.map((p) => p.name).join(", ")}`]
        : []),
      ...(openMustSettle > 0 ? [`${openMustSettle} threads must be settled`] : []),
    ]
    if (open.length > 0 && !order.reason)
      throw new Problem("conflict", `Before the lock: ${open.join("; ")}. Settle this, or give a reason.`)
    await trx
      .updateTable("draft")
      .set((eb) => ({
        state: "locked",
        digest: draft.digest,
        lockedAt: new Date(),
        lockedBy: personId,
        lockReason: open.length > 0 ? (order.reason ?? null) : null,
        revision: eb("revision", "+", 1),
      }))
      .where("id", "=", draft.id)
      .execute()
    const { id: bundleId } = await trx
      .insertInto("bundle")
      .values({ draftId: draft.id, createdBy: personId })
      .returning("id")
      .executeTakeFirstOrThrow()
    await addJob(trx, "make-bundle", { bundleId }, { maxAttempts: 3 })
    await insertEvent(trx, {
      manuscriptId: place.manuscriptId,
      personId,
      kind: "draft.locked",
      subject: draft.id,
      data: { number: draft.number, digest: order.digest, reason: order.reason ?? null },
    })
  })
  return getDraft(db, place)
}
