import { sql } from "kysely"
import type { Db } from "./client"

export interface JobOptions {
  /** Not before this time. */
  readonly runAt?: Date
  /** A second job with the key of one that waits replaces it. */
  readonly key?: string
  /** Jobs of one queue run one after another. */
  readonly queue?: string
  readonly maxAttempts?: number
}

/** Puts a job in the queue, in the transaction of the row that needs it. */
export async function addJob(
  db: Db,
  name: string,
  payload: Readonly<Record<string, unknown>>,
  { runAt, key, queue, maxAttempts }: JobOptions = {},
): Promise<void> {
  await sql`select graphile_worker.add_job(
    identifier => ${name}::text, payload => ${JSON.stringify(payload)}::json, queue_name => ${queue ?? null}::text,
    run_at => ${runAt ?? null}::timestamptz, max_attempts => ${maxAttempts ?? null}::integer,
    job_key => ${key ?? null}::text)`.execute(db)
}
