import { type Kysely, sql } from "kysely"

/** Figures, their immutable versions, and what was computed and drawn from these. */
export async function up(db: Kysely<unknown>): Promise<void> {
  await sql`
    create table figure (
      id uuid primary key default uuid_v7(),
      manuscript_id uuid not null references manuscript on delete restrict,
      name text not null check (name ~ '^[a-z0-9][a-z0-9-]{0,79}$'),
      title text not null default '' check (length(title) <= 500),
      caption text not null default '' check (length(caption) <= 10000),
      position integer not null check (position >= 1),
      revision integer not null default 1,
      created_by uuid not null references person on delete restrict,
      created_at timestamptz not null default now(),
      updated_at timestamptz not null default now(),
      unique (manuscript_id, name),
      unique (manuscript_id, position) deferrable initially deferred
    );

    create table figure_version (
      id uuid primary key default uuid_v7(),
      figure_id uuid not null references figure on delete restrict,
      number integer not null check (number >= 1),
      spec jsonb not null,
      spec_sha256 bytea not null check (length(spec_sha256) = 32),
      message text not null default '' check (length(message) <= 2000),
      author_id uuid not null references person on delete restrict,
      based_on uuid,
      created_at timestamptz not null default now(),
      unique (figure_id, number),
      unique (id, figure_id),
      foreign key (based_on, figure_id) references figure_version (id, figure_id) on delete restrict
    );

    create table figure_version_input (
      figure_version_id uuid not null references figure_version on delete restrict,
      dataset_name text not null,
      dataset_version_id uuid not null references dataset_version on delete restrict,
      primary key (figure_version_id, dataset_name)
    );
    create index on figure_version_input (dataset_version_id);

    create table computation (
      figure_version_id uuid primary key references figure_version on delete restrict,
      state text not null default 'queued'
        check (state in ('queued', 'computing', 'done', 'failed', 'cancelled')),
      progress jsonb,
      failure jsonb,
      queued_at timestamptz not null default now(),
      started_at timestamptz,
      finished_at timestamptz,
      check (state <> 'failed' or failure is not null)
    );

    -- Documents are kept as the bytes that were hashed; jsonb would reorder them.
    create table result (
      figure_version_id uuid primary key references figure_version on delete restrict,
      document bytea not null,
      sha256 bytea not null check (length(sha256) = 32),
      series bytea not null,
      software jsonb not null,
      created_at timestamptz not null default now()
    );

    create table rendering (
      id uuid primary key default uuid_v7(),
      figure_version_id uuid not null references figure_version on delete restrict,
      format text not null check (format in ('svg', 'png', 'pdf', 'eps', 'tiff')),
      dpi integer check (dpi between 30 and 2400),
      bytes bytea not null,
      sha256 bytea not null check (length(sha256) = 32),
      width_mm double precision not null check (width_mm > 0),
      height_mm double precision not null check (height_mm > 0),
      created_at timestamptz not null default now(),
      unique nulls not distinct (figure_version_id, format, dpi)
    );
  `.execute(db)
}
