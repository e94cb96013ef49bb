import { sql } from "kysely"
import { Problem } from "@/lib/contracts/problems"
import type { ComputationState } from "@/lib/domain/states"
import type { Db } from "@/lib/server/db/client"
import { insertEvent } from "@/lib/server/db/events"

interface Progress {
  readonly share: number
  readonly what: string
}
interface Failure {
  readonly message: string
  readonly errors?: { pointer: string; code: string; message: string }[]
}

/** Figure versions with what a list of them shows. */
export function versionsInList(db: Db) {
  return db
    .selectFrom("figureVersion as v")
    .innerJoin("figure", "figure.id", "v.figureId")
    .innerJoin("person", "person.id", "v.authorId")
    .leftJoin("computation as c", "c.figureVersionId", "v.id")
    .leftJoin("figureVersion as base", "base.id", "v.basedOn")
    .select([
      "v.id",
      "v.figureId",
      "v.number",
      "v.message",
      "v.createdAt",
      "base.number as basedOn",
      "person.id as personId",
      "person.name as personName",
    ])
    .select((eb) => [
      eb.ref("c.state").$castTo<ComputationState | null>().as("state"),
      eb.ref("c.progress").$castTo<Progress | null>().as("progress"),
      eb.ref("c.failure").$castTo<Failure | null>().as("failure"),
      eb
        .selectFrom("thread")
        .select((count) => count.fn.countAll<number>().as("n"))
        .whereRef("thread.figureVersionId", "=", "v.id")
        .where("thread.resolvedAt", "is", null)
        .$asScalar()
        .$notNull()
        .as("openThreads"),
      sql<
        number[]
      >`array(select draft.number from draft_figure pinned join draft on draft.id = pinned.draft_id
        where pinned.figure_version_id = v.id order by draft.number)`.as("pinnedIn"),
      sql<boolean>`exists(select from draft_figure pinned join draft on draft.id = pinned.draft_id
        where pinned.figure_version_id = v.id and draft.state = 'locked')`.as("locked"),
    ])
    .orderBy("v.number", "desc")
}

type VersionRow = Awaited<ReturnType<ReturnType<typeof versionsInList>["executeTakeFirstOrThrow"]>>

export const presentVersion = ({
  personId,
  personName,
  state,
  progress,
  failure,
  figureId: _,
  ...row
}: VersionRow) => ({
  ...row,
  author: { id: personId, name: personName },
  computation: { state: state ?? ("queued" as const), progress, failure },
})

const fields = ["id", "name", "title", "caption", "position", "revision", "createdAt"] as const

/** The figures of a manuscript in their order, versions newest first. */
export async function listFigures(db: Db, manuscriptId: string) {
  const figures = await db
    .selectFrom("figure")
    .select(fields)
    .where("manuscriptId", "=", manuscriptId)
    .orderBy("position")
    .execute()
  const versions = await versionsInList(db).where("figure.manuscriptId", "=", manuscriptId).execute()
  return figures.map((figure) => ({
    ...figure,
    versions: versions.filter((version) => version.figureId === figure.id).map(presentVersion),
  }))
}

/** One figure with its versions. @throws Problem `not-found` */
export async function getFigure(db: Db, manuscriptId: string, figureId: string) {
  const figure = await db
    .selectFrom("figure")
    .select(fields)
    .where("manuscriptId", "=", manuscriptId)
    .where("id", "=", figureId)
    .executeTakeFirst()
  if (!figure) throw new Problem("not-found", "There is no such figure in this manuscript.")
  const versions = await versionsInList(db).where("v.figureId", "=", figureId).execute()
  return { ...figure, versions: versions.map(presentVersion) }
}

/** Adds a figure at the end. @throws Problem `name-taken` */
export async function createFigure(
  db: Db,
  manuscriptId: string,
  personId: string,
  figure: { name: string; title: string; caption: string },
) {
  const id = await db.transaction().execute(async (trx) => {
    // Two figures added at once must not get one position.
    await trx.selectFrom("manuscript").select("id").where("id", "=", manuscriptId).forNoKeyUpdate().execute()
    const { last } = await trx
      .selectFrom("figure")
      .select((eb) => eb.fn.coalesce(eb.fn.max("position"), eb.lit(0)).as("last"))
      .where("manuscriptId", "=", manuscriptId)
      .executeTakeFirstOrThrow()
    const created = await trx
      .insertInto("figure")
      .values({ ...figure, manuscriptId, position: last + 1, createdBy: personId })
      .returning("id")
      .executeTakeFirstOrThrow()
    await insertEvent(trx, {
      manuscriptId,
      personId,
      kind: "figure.created",
      subject: created.id,
      data: { figure: figure.name },
    })
    return created.id
  })
  return getFigure(db, manuscriptId, id)
}

/** Changes title or caption, if the revision is still the one that was seen. @throws Problem `stale-revision` */
export async function changeFigure(
  db: Db,
  manuscriptId: string,
  personId: string,
  figureId: string,
  change: { title?: string; caption?: string },
  revision: number,
) {
  const before = await getFigure(db, manuscriptId, figureId)
  await db.transaction().execute(async (trx) => {
    const { numUpdatedRows } = await trx
      .updateTable("figure")
      .set((eb) => ({ ...change, revision: eb("revision", "+", 1), updatedAt: sql<Date>`now()` }))
      .where("id", "=", figureId)
      .where("revision", "=", revision)
      .executeTakeFirst()
    if (numUpdatedRows === 0n) throw new Problem("stale-revision")
    await insertEvent(trx, {
      manuscriptId,
      personId,
      kind: "figure.changed",
      subject: figureId,
      data: { figure: before.name, changed: Object.keys(change) },
    })
  })
  return getFigure(db, manuscriptId, figureId)
}
