import { sql } from "kysely"
import type { Db } from "@/lib/server/db/client"
import type { Actor } from "./actor"
import { hashOfSecret } from "./secret"

/**
 * The actor of an `Authorization` header: undefined without one, null when it names no live token.
 *
 * Marks the token as used, at most once a minute so that a busy client does not rewrite the row at each request.
 */
export async function findTokenActor(db: Db, header: string | null): Promise<Actor | null | undefined> {
  if (header === null) return undefined
  const secret = /^Bearer\s+(aq_[A-Za-z0-9_-]{43})$/i.exec(header.trim())?.[1]
  if (secret === undefined) return null
  const token = await db
    .selectFrom("apiToken")
    .innerJoin("person", "person.id", "apiToken.personId")
    .select(["apiToken.id", "apiToken.scope", "person.id as personId", "person.name", "person.email"])
    .where("apiToken.hash", "=", hashOfSecret(secret))
    .where("apiToken.revokedAt", "is", null)
    .where("apiToken.expiresAt", ">", sql<Date>`now()`)
    .executeTakeFirst()
  if (token === undefined) return null
  await db
    .updateTable("apiToken")
    .set({ lastUsedAt: sql<Date>`now()` })
    .where("id", "=", token.id)
    .where((eb) =>
      eb.or([eb("lastUsedAt", "is", null), eb("lastUsedAt", "<", sql<Date>`now() - interval '1 minute'`)]),
    )
    .execute()
  return {
    person: { id: token.personId, name: token.name, email: token.email },
    by: { kind: "token", id: token.id },
    scope: token.scope,
  }
}
