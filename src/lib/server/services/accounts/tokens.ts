import { sql } from "kysely"
import { Problem } from "@/lib/contracts/problems"
import type { TokenScope } from "@/lib/domain/policy"
import { newSecret } from "@/lib/server/auth/secret"
import type { Db } from "@/lib/server/db/client"
import { insertEvent } from "@/lib/server/db/events"

const shown = ["id", "name", "prefix", "scope", "createdAt", "expiresAt", "lastUsedAt"] as const

/** A person's tokens that still work, newest first. */
export async function listTokens(db: Db, personId: string) {
  return db
    .selectFrom("apiToken")
    .select(shown)
    .where("personId", "=", personId)
    .where("revokedAt", "is", null)
    .where("expiresAt", ">", sql<Date>`now()`)
    .orderBy("createdAt", "desc")
    .execute()
}

/** Makes a token. Only the hash is kept: the secret in the answer is the only copy. */
export async function createToken(
  db: Db,
  personId: string,
  { name, scope, days }: { name: string; scope: TokenScope; days: number },
) {
  const { secret, hash } = newSecret("aq_")
  return db.transaction().execute(async (trx) => {
    const token = await trx
      .insertInto("apiToken")
      .values({
        personId,
        name,
        scope,
        hash,
        prefix: secret.slice(0, 9),
        expiresAt: sql<Date>`now() + make_interval(days => ${days})`,
      })
      .returning(shown)
      .executeTakeFirstOrThrow()
    const data = { name, scope }
    await insertEvent(trx, {
      manuscriptId: null,
      personId,
      kind: "person.token-created",
      subject: token.id,
      data,
    })
    return { ...token, secret }
  })
}

/** @throws Problem `not-found` when it is not this person's or was revoked before */
export async function revokeToken(db: Db, personId: string, tokenId: string): Promise<void> {
  await db.transaction().execute(async (trx) => {
    const revoked = await trx
      .updateTable("apiToken")
      .set({ revokedAt: sql<Date>`now()` })
      .where("id", "=", tokenId)
      .where("personId", "=", personId)
      .where("revokedAt", "is", null)
      .returning("name")
      .executeTakeFirst()
    if (revoked === undefined) throw new Problem("not-found")
    await insertEvent(trx, {
      manuscriptId: null,
      personId,
      kind: "person.token-revoked",
      subject: tokenId,
      data: { name: revoked.name },
    })
  })
}
