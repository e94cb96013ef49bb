import { sql } from "kysely"
import type { Db } from "@/lib/server/db/client"
import type { Actor } from "./actor"

/** Whether the sign-in or token of an actor has neither ended nor been revoked since. */
export async function isActorLive(db: Db, { by }: Actor): Promise<boolean> {
  const row = await db
    .selectFrom(by.kind === "token" ? "apiToken" : "signIn")
    .select("id")
    .where("id", "=", by.id)
    .where("revokedAt", "is", null)
    .where("expiresAt", ">", sql<Date>`now()`)
    .executeTakeFirst()
  return row !== undefined
}
