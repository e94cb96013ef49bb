import { type Kysely, sql } from "kysely"

/** What a group says about its figures, and who hears of it. */
export async function up(db: Kysely<unknown>): Promise<void> {
  await sql`
    create table thread (
      id uuid primary key default uuid_v7(),
      figure_version_id uuid not null references figure_version on delete restrict,
      anchor jsonb,
      must_settle boolean not null default false,
      created_by uuid not null references person on delete restrict,
      created_at timestamptz not null default now(),
      resolved_at timestamptz,
      resolved_by uuid references person on delete restrict,
      check ((resolved_at is null) = (resolved_by is null))
    );
    create index on thread (figure_version_id);

    create table comment (
      id uuid primary key default uuid_v7(),
      thread_id uuid not null references thread on delete cascade,
      author_id uuid not null references person on delete restrict,
      body text not null check (length(body) between 1 and 20000),
      created_at timestamptz not null default now(),
      edited_at timestamptz
    );
    create index on comment (thread_id);

    create table mention (
      comment_id uuid not null references comment on delete cascade,
      person_id uuid not null references person on delete cascade,
      primary key (comment_id, person_id)
    );
    create index on mention (person_id);

    create table subscription (
      manuscript_id uuid not null references manuscript on delete cascade,
      person_id uuid not null references person on delete cascade,
      mail text not null check (mail in ('each', 'digest', 'none')),
      primary key (manuscript_id, person_id)
    );
  `.execute(db)
}
