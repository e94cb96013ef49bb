import { type Kysely, sql } from "kysely"

/** Drafts, what they pin, who signed off on it, and the bundles made of locked ones. */
export async function up(db: Kysely<unknown>): Promise<void> {
  await sql`
    create table draft (
      id uuid primary key default uuid_v7(),
      manuscript_id uuid not null references manuscript on delete restrict,
      number integer not null check (number >= 1),
      title text not null check (length(title) between 1 and 200),
      state text not null default 'open' check (state in ('open', 'locked')),
      digest bytea check (length(digest) = 32),
      revision integer not null default 1,
      based_on uuid references draft on delete restrict,
      created_by uuid not null references person on delete restrict,
      created_at timestamptz not null default now(),
      locked_at timestamptz,
      locked_by uuid references person on delete restrict,
      lock_reason text,
      unique (manuscript_id, number),
      check (case state
        when 'locked' then digest is not null and locked_at is not null and locked_by is not null
        else locked_at is null and locked_by is null and lock_reason is null end)
    );
    -- A manuscript works on one draft at a time.
    create unique index draft_open on draft (manuscript_id) where state = 'open';

    create table draft_figure (
      draft_id uuid not null references draft on delete restrict,
      figure_id uuid not null references figure on delete restrict,
      position integer not null check (position >= 1),
      figure_version_id uuid not null,
      caption text not null default '' check (length(caption) <= 10000),
      primary key (draft_id, figure_id),
      unique (draft_id, position) deferrable initially deferred,
      foreign key (figure_version_id, figure_id) references figure_version (id, figure_id) on delete restrict
    );
    create index on draft_figure (figure_version_id);

    create table sign_off (
      id uuid primary key default uuid_v7(),
      draft_id uuid not null references draft on delete restrict,
      person_id uuid not null references person on delete restrict,
      digest bytea not null check (length(digest) = 32),
      created_at timestamptz not null default now(),
      withdrawn_at timestamptz
    );
    create unique index sign_off_once on sign_off (draft_id, person_id, digest) where withdrawn_at is null;

    create table bundle (
      id uuid primary key default uuid_v7(),
      draft_id uuid not null references draft on delete restrict,
      state text not null default 'queued' check (state in ('queued', 'building', 'done', 'failed')),
      sha256 bytea check (length(sha256) = 32),
      size bigint check (size >= 0),
      blob_id uuid references blob on delete restrict,
      failure jsonb,
      created_by uuid not null references person on delete restrict,
      created_at timestamptz not null default now(),
      finished_at timestamptz,
      check (state <> 'done' or (sha256 is not null and size is not null and blob_id is not null)),
      check (state <> 'failed' or failure is not null)
    );
    create index on bundle (draft_id);
  `.execute(db)
}
