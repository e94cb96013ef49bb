import { sql } from "kysely"
import type { Db } from "@/lib/server/db/client"

/** Tells whoever watches a manuscript how far a job is. Not part of the record. */
export async function notifyProgress(
  db: Db,
  progress: { manuscriptId: string; subject: string; kind: string; share: number; what: string },
): Promise<void> {
  await sql`select pg_notify('afterquench_progress', ${JSON.stringify(progress)})`.execute(db)
}
