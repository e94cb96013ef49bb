import type { Pool, PoolClient } from "pg"

/** Held by every living worker, of this machine or another, for as long as its connection lives. */
const presenceKey = 577_215_664

/**
 * A worker that was killed leaves its jobs locked for four hours. If no other worker is alive, every lock is such a one
 * and is taken away; then this worker shows its presence.
 *
 * @returns the connection that holds the presence; release it when the worker stops
 */
export async function unlockAbandonedJobs(pool: Pool): Promise<PoolClient> {
  const client = await pool.connect()
  const alone = await client.query<{ alone: boolean }>("select pg_try_advisory_lock($1) as alone", [
    presenceKey,
  ])
  if (alone.rows[0]?.alone) {
    await client.query(`select graphile_worker.force_unlock_workers(array(
      select distinct locked_by from graphile_worker.jobs where locked_by is not null))`)
    await client.query("select pg_advisory_lock_shared($1)", [presenceKey])
    await client.query("select pg_advisory_unlock($1)", [presenceKey])
  } else {
    await client.query("select pg_advisory_lock_shared($1)", [presenceKey])
  }
  return client
}
