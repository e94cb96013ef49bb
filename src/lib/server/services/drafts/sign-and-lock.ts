import { Problem } from "@/lib/contracts/problems"
import type { CheckWeight, DraftCheck } from "@/lib/domain/draft-checks"
import type { Db } from "@/lib/server/db/client"
import { insertEvent } from "@/lib/server/db/events"
import { addJob } from "@/lib/server/db/jobs"
import { digestOf, pinnedFigures } from "./draft-content"
import { draftRecord } from "./draft-record"
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

/** The reason that is kept with the lock, or null when none is needed. @throws Problem `conflict` */
function settledReason(title: string, checks: readonly DraftCheck[], reason: string | undefined) {
  const messages = (weight: CheckWeight) =>
    checks.filter((check) => check.weight === weight).map(({ where, message }) => `${where}: ${message}`)
  const wrong = messages("must-fix")
  if (wrong.length > 0) throw new Problem("conflict", `${title} cannot be locked yet. ${wrong.join(" ")}`)
  const open = messages("needs-reason")
  if (open.length === 0) return null
  if (reason) return reason
  throw new Problem("conflict", `${title} is not settled. ${open.join(" ")} Settle this, or give a reason.`)
}

/**
 * Locks a draft for good, keeps what it is, and puts the making of its bundle in the queue, in one transaction. What is
 * not settled needs a written reason.
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
    const { id, title, number, digest } = await lockRow(trx, place)
    if (order.confirm.trim() !== title)
      throw new Problem("invalid-request", undefined, [
        { pointer: "/confirm", code: "not-confirmed", message: `Type “${title}” to confirm.` },
      ])
    requireDigest(digest, order.digest)
    const { checks } = await getDraft(trx, place)
    const lockReason = settledReason(title, checks, order.reason)
    const lockedAt = new Date()
    const record = await draftRecord(trx, id, { digest, lockedAt, lockedBy: personId, lockReason })
    await trx
      .updateTable("draft")
      .set((eb) => ({
        state: "locked",
        digest,
        lockedAt,
        lockedBy: personId,
        lockReason,
        record: JSON.stringify(record),
        revision: eb("revision", "+", 1),
      }))
      .where("id", "=", id)
      .execute()
    const bundle = await trx
      .insertInto("bundle")
      .values({ draftId: id, createdBy: personId })
      .returning("id")
      .executeTakeFirstOrThrow()
    await addJob(trx, "make-bundle", { bundleId: bundle.id }, { maxAttempts: 3 })
    await insertEvent(trx, {
      manuscriptId: place.manuscriptId,
      personId,
      kind: "draft.locked",
      subject: id,
      data: { number, digest: order.digest, reason: lockReason },
    })
  })
  return getDraft(db, place)
}
