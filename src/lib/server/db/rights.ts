import { type Kysely, sql } from "kysely"

/** The role that the web server and the workers use. */
export const applicationRole = "afterquench_app"

/** What the application role may do with each table; what is not listed it may not. */
const rights: Record<string, string> = {
  person: "select, insert, update",
  identity: "select, insert",
  sign_in: "select, insert, update",
  api_token: "select, insert, update",
  password_reset: "select, insert, update",
  registration: "select, insert, update",
  rate_limit: "select, insert, update, delete",
  manuscript: "select, insert, update",
  membership: "select, insert, update, delete",
  invitation: "select, insert, update",
  blob: "select, insert",
  blob_chunk: "select, insert, delete",
  dataset: "select, insert, update",
  dataset_version: "select, insert, update",
  dataset_column: "select, insert, update, delete",
  column_chunk: "select, insert, delete",
  figure: "select, insert, update",
  figure_version: "select, insert",
  figure_version_input: "select, insert",
  computation: "select, insert, update",
  result: "select, insert",
  rendering: "select, insert",
  thread: "select, insert, update",
  comment: "select, insert, update",
  mention: "select, insert, delete",
  subscription: "select, insert, update, delete",
  draft: "select, insert, update",
  draft_figure: "select, insert, update, delete",
  sign_off: "select, insert, update",
  bundle: "select, insert, update",
  event: "select, insert",
  outbox: "select, insert, update",
  idempotency_key: "select, insert, update, delete",
}

/** Gives the application role exactly the rights listed, and the use of the job queue's own schema. */
export async function grantRights(db: Kysely<unknown>): Promise<void> {
  const role = sql.id(applicationRole)
  // Roles belong to the cluster: another database of it may be creating the same one at this moment.
  await sql`do $$ begin
    if not exists (select from pg_roles where rolname = ${sql.lit(applicationRole)}) then
      create role ${role} nologin;
    end if;
  exception when duplicate_object or unique_violation then null;
  end $$`.execute(db)
  await sql`revoke all on all tables in schema public from ${role}`.execute(db)
  await sql`grant usage on schema public to ${role}`.execute(db)
  for (const [table, privileges] of Object.entries(rights))
    await sql`grant ${sql.raw(privileges)} on ${sql.table(table)} to ${role}`.execute(db)
  await grantQueue(db)
}

/** The queue's tables have row security with no policy, so grants alone would show the role empty tables. */
async function grantQueue(db: Kysely<unknown>): Promise<void> {
  const role = sql.id(applicationRole)
  await sql`
    grant usage on schema graphile_worker to ${role};
    grant select, insert, update, delete on all tables in schema graphile_worker to ${role};
    grant usage on all sequences in schema graphile_worker to ${role};
    grant execute on all functions in schema graphile_worker to ${role};
  `.execute(db)
  const secured = await sql<{ name: string }>`
    select relname as name from pg_class
    where relnamespace = 'graphile_worker'::regnamespace and relrowsecurity
      and not exists (select from pg_policy where polrelid = pg_class.oid and polname = 'application')`.execute(
    db,
  )
  for (const { name } of secured.rows)
    await sql`create policy application on ${sql.table(`graphile_worker.${name}`)}
      to ${role} using (true) with check (true)`.execute(db)
}
