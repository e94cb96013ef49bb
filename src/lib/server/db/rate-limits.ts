import { sql } from "kysely"
import type { Db } from "./client"

/**
 * Counts one attempt under a key and says how long to wait when there were too many.
 *
 * @param limit attempts that are let through in one window
 * @param windowSeconds length of a window; it starts with the first attempt
 * @returns seconds until the window ends, or null when this attempt is let through
 */
export async function countAttempt(
  db: Db,
  key: string,
  limit: number,
  windowSeconds: number,
): Promise<number | null> {
  const { rows } = await sql<{ hits: number; wait: number }>`
    insert into rate_limit (key, window_ends_at, hits)
    values (${key}, now() + make_interval(secs => ${windowSeconds}), 1)
    on conflict (key) do update set
      hits = case when rate_limit.window_ends_at <= now() then 1 else rate_limit.hits + 1 end,
      window_ends_at = case when rate_limit.window_ends_at <= now()
        then excluded.window_ends_at else rate_limit.window_ends_at end
    returning hits, ceil(extract(epoch from window_ends_at - now()))::integer as wait`.execute(db)
  const row = rows[0]
  if (row === undefined) throw new Error("the attempt was not counted")
  return row.hits > limit ? Math.max(1, row.wait) : null
}

/** Forgets the attempts under a key, after one that succeeded. */
export async function forgetAttempts(db: Db, key: string): Promise<void> {
  await db.deleteFrom("rateLimit").where("key", "=", key).execute()
}
