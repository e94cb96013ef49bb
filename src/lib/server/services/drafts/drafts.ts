import type { DraftRecord } from "@/lib/bundle/draft-record"
import { Problem } from "@/lib/contracts/problems"
import { draftChecks } from "@/lib/domain/draft-checks"
import type { BundleState, DraftState } from "@/lib/domain/states"
import type { Db } from "@/lib/server/db/client"
import { insertEvent } from "@/lib/server/db/events"
import { digestOf, type Pinned, pinnedFigures } from "./draft-content"

export interface DraftPlace {
  readonly manuscriptId: string
  readonly draftNumber: number
}

/** The row of a draft; the title of a locked one is the manuscript's as it was. @throws Problem `not-found` */
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
      "draft.digest",
      "draft.lockedAt",
      "draft.lockReason",
      "draft.record",
      "manuscript.title as manuscriptTitle",
      "person.id as lockerId",
      "person.name as lockerName",
    ])
    .select((eb) => eb.ref("draft.state").$castTo<DraftState>().as("state"))
    .where("draft.manuscriptId", "=", manuscriptId)
    .where("draft.number", "=", draftNumber)
    .executeTakeFirst()
  if (!row) throw new Problem("not-found", `There is no draft ${draftNumber} of this manuscript.`)
  const { record, ...draft } = row
  const locked = record as DraftRecord | null
  return { ...draft, manuscriptTitle: locked?.manuscript.title ?? draft.manuscriptTitle }
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

/** The latest sign-off of each person, newest first. */
async function latestSignOffs(db: Db, draftId: string, digest: Buffer | null) {
  const signOffs = await db
    .selectFrom("signOff")
    .innerJoin("person", "person.id", "signOff.personId")
    .select(["person.id", "person.name", "signOff.digest", "signOff.createdAt"])
    .where("signOff.draftId", "=", draftId)
    .where("signOff.withdrawnAt", "is", null)
    .orderBy("signOff.createdAt", "desc")
    .execute()
  return signOffs
    .filter(({ id }, index) => signOffs.findIndex((other) => other.id === id) === index)
    .map(({ id, name, digest: signed, createdAt }) => ({
      person: { id, name },
      at: createdAt,
      stale: digest === null || !signed.equals(digest),
    }))
}

async function countOpenMustSettle(db: Db, draftId: string): Promise<number> {
  const { open } = await db
    .selectFrom("thread")
    .innerJoin("draftFigure", "draftFigure.figureVersionId", "thread.figureVersionId")
    .select((eb) => eb.fn.countAll<number>().as("open"))
    .where("draftFigure.draftId", "=", draftId)
    .where("thread.mustSettle", "=", true)
    .where("thread.resolvedAt", "is", null)
    .executeTakeFirstOrThrow()
  return open
}

async function latestBundle(db: Db, draftId: string) {
  const bundle = await db
    .selectFrom("bundle")
    .select(["size", "sha256", "failure"])
    .select((eb) => eb.ref("state").$castTo<BundleState>().as("state"))
    .where("draftId", "=", draftId)
    .orderBy("createdAt", "desc")
    .executeTakeFirst()
  if (!bundle) return null
  const { state, size, sha256, failure } = bundle
  const message = (failure as { message?: string } | null)?.message ?? null
  return { state, size, sha256: sha256?.toString("hex") ?? null, failure: message }
}

/** One draft: what it pins, who signed off, what stands before the lock. @throws Problem `not-found` */
export async function getDraft(db: Db, place: DraftPlace) {
  const { id, manuscriptTitle, lockerId, lockerName, digest: locked, ...row } = await getDraftRow(db, place)
  const isLocked = row.state === "locked"
  const pins = await pinnedFigures(db, id)
  const digest = isLocked ? locked : digestOf(manuscriptTitle, pins)
  const signOffs = await latestSignOffs(db, id, digest)
  const signed = new Set(signOffs.filter(({ stale }) => !stale).map(({ person }) => person.id))
  const waitingFor = isLocked
    ? []
    : (await authors(db, place.manuscriptId)).filter((author) => !signed.has(author.id))
  const openMustSettle = await countOpenMustSettle(db, id)
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
      ready: pin.results !== null,
    })),
    signOffs,
    waitingFor,
    openMustSettle,
    checks: isLocked ? [] : checksOf(pins, waitingFor, openMustSettle),
    lockedBy: lockerId && lockerName ? { id: lockerId, name: lockerName } : null,
    bundle: await latestBundle(db, id),
  }
}

function checksOf(pins: readonly Pinned[], waitingFor: readonly { name: string }[], openMustSettle: number) {
  const checks = draftChecks({
    figures: pins.map(({ figureName, version, newest, caption, results, staleData }) => ({
      name: figureName,
      version,
      newest,
      caption,
      ready: results !== null,
      staleData,
      quantities: results?.panels.flatMap((panel) => panel.quantities) ?? [],
      warnings: results?.panels.flatMap((panel) => panel.warnings) ?? [],
    })),
    waitingFor: waitingFor.map(({ name }) => name),
    openMustSettle,
  })
  return [...checks]
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
