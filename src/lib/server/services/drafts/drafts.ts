import { Problem } from "@/lib/contracts/problems"
import type { BundleState, DraftState } from "@/lib/domain/states"
import type { Db } from "@/lib/server/db/client"
import { insertEvent } from "@/lib/server/db/events"
import { digestOf, pinnedFigures } from "./draft-content"

export interface DraftPlace {
  readonly manuscriptId: string
  readonly draftNumber: number
}

/** The row of a draft. @throws Problem `not-found` */
export async function getDraftRow(db: Db, { manuscriptId, draftNumber }: DraftPlace) {
  const row = await db
    .selectFrom("draft")
    .innerJoin("manuscript", "manuscript.id", "draft.manuscriptId")
    .leftJoin("person", "person.id", "draft.lockedBy")
    .select([
      "draft.id",
      "draft.number",
      "draft.title",
      "draft.revision",
      "draft.lockedAt",
      "draft.lockReason",
      "manuscript.title as manuscriptTitle",
      "person.id as lockerId",
      "person.name as lockerName",
    ])
    .select((eb) => eb.ref("draft.state").$castTo<DraftState>().as("state"))
    .where("draft.manuscriptId", "=", manuscriptId)
    .where("draft.number", "=", draftNumber)
    .executeTakeFirst()
  if (!row) throw new Problem("not-found", `There is no draft ${draftNumber} of this manuscript.`)
  return row
}

/** Authors of a manuscript: whoever has to sign off. */
function authors(db: Db, manuscriptId: string) {
  return db
    .selectFrom("membership")
    .innerJoin("person", "person.id", "membership.personId")
    .select(["person.id", "person.name"])
    .where("membership.manuscriptId", "=", manuscriptId)
    .where("membership.role", "in", ["corresponding-author", "co-author"])
    .orderBy("person.name")
    .execute()
}

/** One draft: what it pins, who signed off, what stands before the lock. @throws Problem `not-found` */
export async function getDraft(db: Db, place: DraftPlace) {
  const { id, manuscriptTitle, lockerId, lockerName, ...row } = await getDraftRow(db, place)
  const pins = await pinnedFigures(db, id)
  const digest = digestOf(manuscriptTitle, pins)
  const signOffs = await db
    .selectFrom("signOff")
    .innerJoin("person", "person.id", "signOff.personId")
    .select(["person.id", "person.name", "signOff.digest", "signOff.createdAt"])
    .where("signOff.draftId", "=", id)
    .where("signOff.withdrawnAt", "is", null)
    .orderBy("signOff.createdAt", "desc")
    .execute()
  const latest = signOffs.filter(
    (signOff, index) => signOffs.findIndex((other) => other.id === signOff.id) === index,
  )
  const isFresh = (signOff: { digest: Buffer }) => digest !== null && signOff.digest.equals(digest)
  const signed = new Set(latest.filter(isFresh).map((signOff) => signOff.id))
  const { open } = await db
    .selectFrom("thread")
    .innerJoin("draftFigure", "draftFigure.figureVersionId", "thread.figureVersionId")
    .select((eb) => eb.fn.countAll<number>().as("open"))
    .where("draftFigure.draftId", "=", id)
    .where("thread.mustSettle", "=", true)
    .where("thread.resolvedAt", "is", null)
    .executeTakeFirstOrThrow()
  const bundle = await db
    .selectFrom("bundle")
    .select(["size", "sha256", "failure"])
    .select((eb) => eb.ref("state").$castTo<BundleState>().as("state"))
    .where("draftId", "=", id)
    .orderBy("createdAt", "desc")
    .executeTakeFirst()
  return {
    id,
    ...row,
    digest: digest?.toString("hex") ?? null,
    figures: pins.map((pin) => ({
      position: pin.position,
      figureId: pin.figureId,
      figureName: pin.figureName,
      figureTitle: pin.figureTitle,
      version: pin.version,
      newest: pin.newest,
      caption: pin.caption,
      ready: pin.resultsSha256 !== null,
    })),
    signOffs: latest.map((signOff) => ({
      person: { id: signOff.id, name: signOff.name },
      at: signOff.createdAt,
      stale: !isFresh(signOff),
    })),
    waitingFor: (await authors(db, place.manuscriptId)).filter((author) => !signed.has(author.id)),
    openMustSettle: open,
    lockedBy: lockerId && lockerName ? { id: lockerId, name: lockerName } : null,
    bundle: bundle
      ? {
          state: bundle.state,
          size: bundle.size,
          sha256: bundle.sha256?.toString("hex") ?? null,
          failure: (bundle.failure as { message?: string } | null)?.message ?? null,
        }
      : null,
  }
}

/** The drafts of a manuscript, newest first. */
export async function listDrafts(db: Db, manuscriptId: string) {
  const numbers = await db
    .selectFrom("draft")
    .select("number")
    .where("manuscriptId", "=", manuscriptId)
    .orderBy("number", "desc")
    .execute()
  return Promise.all(numbers.map(({ number }) => getDraft(db, { manuscriptId, draftNumber: number })))
}

/** Opens the next draft with the pins of the locked one. @throws Problem `conflict` while one is open */
export async function openDraft(db: Db, manuscriptId: string, personId: string) {
  const number = await db.transaction().execute(async (trx) => {
    const last = await trx
      .selectFrom("draft")
      .select(["id", "number", "state"])
      .where("manuscriptId", "=", manuscriptId)
      .orderBy("number", "desc")
      .forUpdate()
      .executeTakeFirstOrThrow()
    if (last.state === "open")
      throw new Problem(
        "conflict",
        `Draft ${last.number} is still open; a manuscript works on one draft at a time.`,
      )
    const next = last.number + 1
    const { id } = await trx
      .insertInto("draft")
      .values({ manuscriptId, number: next, title: `Draft ${next}`, basedOn: last.id, createdBy: personId })
      .returning("id")
      .executeTakeFirstOrThrow()
    await trx
      .insertInto("draftFigure")
      .columns(["draftId", "figureId", "position", "figureVersionId", "caption"])
      .expression((eb) =>
        eb
          .selectFrom("draftFigure")
          .select([
            eb.val(id).$castTo<string>().as("draftId"),
            "figureId",
            "position",
            "figureVersionId",
            "caption",
          ])
          .where("draftId", "=", last.id),
      )
      .execute()
    await insertEvent(trx, {
      manuscriptId,
      personId,
      kind: "draft.opened",
      subject: id,
      data: { number: next },
    })
    return next
  })
  return getDraft(db, { manuscriptId, draftNumber: number })
}
