import { sql } from "kysely"
import type { Db } from "./client"

/** Removes what has served its time and is no part of any record: windows of rate limits, kept answers. */
export async function deleteExpiredRows(db: Db): Promise<void> {
  await db
    .deleteFrom("rateLimit")
    .where("windowEndsAt", "<", sql<Date>`now()`)
    .execute()
  await db
    .deleteFrom("idempotencyKey")
    .where("createdAt", "<", sql<Date>`now() - interval '24 hours'`)
    .execute()
}
