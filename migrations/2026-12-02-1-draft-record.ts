import { type Kysely, sql } from "kysely"

/**
 * What a draft was when it was locked: title, people, sign-offs, figures, data. Names and titles elsewhere may change
 * later; the locked row, which the guards freeze, keeps them.
 */
export async function up(db: Kysely<unknown>): Promise<void> {
  await sql`
    alter table draft add column record jsonb,
      add check (record is null or state = 'locked');
  `.execute(db)
}
