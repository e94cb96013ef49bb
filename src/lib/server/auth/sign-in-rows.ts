import { sql } from "kysely"
import type { Db } from "@/lib/server/db/client"
import { insertEvent } from "@/lib/server/db/events"
import type { Actor } from "./actor"

export const signInDays = 30

/** Writes down that a person signed in with a browser; the id goes into the session cookie. */
export async function startSignIn(
  db: Db,
  personId: string,
  provider: string,
  userAgent: string,
): Promise<string> {
  return db.transaction().execute(async (trx) => {
    const { id } = await trx
      .insertInto("signIn")
      .values({
        personId,
        provider,
        userAgent: userAgent.slice(0, 300),
        expiresAt: sql<Date>`now() + make_interval(days => ${signInDays})`,
      })
      .returning("id")
      .executeTakeFirstOrThrow()
    await insertEvent(trx, { manuscriptId: null, personId, kind: "person.signed-in", data: { provider } })
    return id
  })
}

/** The actor of a sign-in that is neither revoked nor expired; notes at most once a minute that it was seen. */
export async function findSignInActor(db: Db, signInId: string): Promise<Actor | null> {
  const row = await db
    .selectFrom("signIn")
    .innerJoin("person", "person.id", "signIn.personId")
    .select(["person.id", "person.name", "person.email"])
    .select(sql<boolean>`last_seen_at < now() - interval '1 minute'`.as("unseen"))
    .where("signIn.id", "=", signInId)
    .where("signIn.revokedAt", "is", null)
    .where("signIn.expiresAt", ">", sql<Date>`now()`)
    .executeTakeFirst()
  if (row === undefined) return null
  if (row.unseen)
    await db
      .updateTable("signIn")
      .set({ lastSeenAt: sql<Date>`now()` })
      .where("id", "=", signInId)
      .execute()
  return {
    person: { id: row.id, name: row.name, email: row.email },
    by: { kind: "sign-in", id: signInId },
    scope: "all",
  }
}

/** Ends the sign-ins of a person, or the one named; `except` stays. Returns how many ended. */
export async function revokeSignIns(
  db: Db,
  personId: string,
  { only, except }: { readonly only?: string; readonly except?: string } = {},
): Promise<number> {
  const revoked = await db
    .updateTable("signIn")
    .set({ revokedAt: sql<Date>`now()` })
    .where("personId", "=", personId)
    .where("revokedAt", "is", null)
    .$if(only !== undefined, (query) => query.where("id", "=", only ?? ""))
    .$if(except !== undefined, (query) => query.where("id", "<>", except ?? ""))
    .executeTakeFirst()
  return Number(revoked.numUpdatedRows)
}
