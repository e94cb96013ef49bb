import { sql } from "kysely"
import { jsonObjectFrom } from "kysely/helpers/postgres"
import type { ManuscriptAnswer, ManuscriptInList } from "@/lib/contracts/manuscripts"
import { Problem } from "@/lib/contracts/problems"
import type { DraftState } from "@/lib/domain/states"
import type { Db } from "@/lib/server/db/client"
import { insertEvent } from "@/lib/server/db/events"

type Dated<T> = { [Key in keyof T]: Key extends `${string}At` ? Date : T[Key] }

/** The manuscripts a person takes part in, last changed first. */
export async function listManuscripts(db: Db, personId: string): Promise<Dated<ManuscriptInList>[]> {
  return db
    .selectFrom("membership")
    .innerJoin("manuscript", "manuscript.id", "membership.manuscriptId")
    .select(["manuscript.id", "manuscript.title", "membership.role", "manuscript.updatedAt"])
    .select((eb) => [
      eb
        .selectFrom("membership as other")
        .select((count) => count.fn.countAll<number>().as("n"))
        .whereRef("other.manuscriptId", "=", "manuscript.id")
        .$asScalar()
        .$notNull()
        .as("people"),
      eb
        .selectFrom("figure")
        .select((count) => count.fn.countAll<number>().as("n"))
        .whereRef("figure.manuscriptId", "=", "manuscript.id")
        .$asScalar()
        .$notNull()
        .as("figures"),
      jsonObjectFrom(
        eb
          .selectFrom("draft")
          .select(["draft.id", "draft.number", "draft.title"])
          .select(sql<DraftState>`draft.state`.as("state"))
          .whereRef("draft.manuscriptId", "=", "manuscript.id")
          .orderBy("draft.number", "desc")
          .limit(1),
      ).as("draft"),
    ])
    .where("membership.personId", "=", personId)
    .orderBy("manuscript.updatedAt", "desc")
    .execute()
}

/** A manuscript as one of its members sees it. @throws Problem `not-found` */
export async function readManuscript(
  db: Db,
  manuscriptId: string,
  personId: string,
): Promise<Dated<ManuscriptAnswer>> {
  const found = await db
    .selectFrom("manuscript")
    .innerJoin("membership", "membership.manuscriptId", "manuscript.id")
    .select([
      "manuscript.id",
      "manuscript.title",
      "manuscript.abstract",
      "manuscript.profile",
      "manuscript.revision",
      "manuscript.createdAt",
      "manuscript.updatedAt",
      "membership.role",
    ])
    .where("manuscript.id", "=", manuscriptId)
    .where("membership.personId", "=", personId)
    .executeTakeFirst()
  if (found === undefined) throw new Problem("not-found")
  return found
}

/** Starts a manuscript with its first draft; the person becomes its corresponding author. */
export async function createManuscript(
  db: Db,
  personId: string,
  manuscript: { title: string; abstract: string; profile?: string },
): Promise<Dated<ManuscriptAnswer>> {
  return db.transaction().execute(async (trx) => {
    const { id } = await trx
      .insertInto("manuscript")
      .values({ ...manuscript, createdBy: personId })
      .returning("id")
      .executeTakeFirstOrThrow()
    await trx
      .insertInto("membership")
      .values({ manuscriptId: id, personId, role: "corresponding-author" })
      .execute()
    await trx
      .insertInto("draft")
      .values({ manuscriptId: id, number: 1, title: "Draft 1", createdBy: personId })
      .execute()
    const data = { title: manuscript.title }
    await insertEvent(trx, { manuscriptId: id, personId, kind: "manuscript.created", subject: id, data })
    return readManuscript(trx, id, personId)
  })
}

/**
 * Changes what is given, if the revision is still the one that the caller has seen.
 *
 * @throws Problem `stale-revision`
 */
export async function changeManuscript(
  db: Db,
  manuscriptId: string,
  personId: string,
  change: { title?: string; abstract?: string; profile?: string },
  revision: number,
): Promise<Dated<ManuscriptAnswer>> {
  return db.transaction().execute(async (trx) => {
    const changed = await trx
      .updateTable("manuscript")
      .set((eb) => ({ ...change, revision: eb("revision", "+", 1), updatedAt: sql<Date>`now()` }))
      .where("id", "=", manuscriptId)
      .where("revision", "=", revision)
      .executeTakeFirst()
    if (changed.numUpdatedRows === 0n) throw new Problem("stale-revision")
    await insertEvent(trx, {
      manuscriptId,
      personId,
      kind: "manuscript.changed",
      subject: manuscriptId,
      data: change,
    })
    return readManuscript(trx, manuscriptId, personId)
  })
}
