import { type Kysely, sql } from "kysely"

/** Uploaded bytes by content, datasets, their versions, and the columns read from them. */
export async function up(db: Kysely<unknown>): Promise<void> {
  await sql`
    create table blob (
      id uuid primary key default uuid_v7(),
      sha256 bytea not null unique check (length(sha256) = 32),
      size bigint not null check (size >= 0),
      created_at timestamptz not null default now()
    );

    -- Parts of 1 MiB arrive before the hash is known, so the blob row is written last, in the same transaction.
    create table blob_chunk (
      blob_id uuid not null references blob on delete cascade deferrable initially deferred,
      part integer not null check (part >= 0),
      data bytea not null check (length(data) between 1 and 1048576),
      primary key (blob_id, part)
    );
    alter table blob_chunk alter column data set storage external;

    create table dataset (
      id uuid primary key default uuid_v7(),
      manuscript_id uuid not null references manuscript on delete restrict,
      name text not null check (name ~ '^[A-Za-z0-9][A-Za-z0-9._-]{0,79}$'),
      description text not null default '' check (length(description) <= 10000),
      created_by uuid not null references person on delete restrict,
      created_at timestamptz not null default now(),
      unique (manuscript_id, name)
    );

    create table dataset_version (
      id uuid primary key default uuid_v7(),
      dataset_id uuid not null references dataset on delete restrict,
      number integer not null check (number >= 1),
      file_name text not null check (length(file_name) between 1 and 255),
      blob_id uuid not null references blob on delete restrict,
      state text not null default 'uploaded'
        check (state in ('uploaded', 'reading', 'proposed', 'accepted', 'refused', 'failed')),
      format text,
      reading jsonb,
      recipe jsonb,
      failure jsonb,
      rows integer check (rows >= 0),
      uploaded_by uuid not null references person on delete restrict,
      uploaded_at timestamptz not null default now(),
      accepted_by uuid references person on delete restrict,
      accepted_at timestamptz,
      unique (dataset_id, number),
      check ((state = 'accepted') = (accepted_at is not null and accepted_by is not null)),
      check (state <> 'accepted' or rows is not null),
      check (state <> 'failed' or failure is not null)
    );
    create index on dataset_version (blob_id);

    create table dataset_column (
      dataset_version_id uuid not null references dataset_version on delete cascade,
      column_index integer not null check (column_index >= 0),
      name text not null,
      unit text,
      symbol text,
      role text check (role in
        ('trajectory', 'time', 'observable', 'uncertainty', 'parameter', 'coordinate', 'weight')),
      kind text not null check (kind in ('number', 'text')),
      statistics jsonb,
      primary key (dataset_version_id, column_index),
      unique (dataset_version_id, name)
    );

    -- 65,536 rows a part: little-endian doubles, or uint32 offsets and UTF-8 for text; valid: one bit a row.
    create table column_chunk (
      dataset_version_id uuid not null,
      column_index integer not null,
      part integer not null check (part >= 0),
      n integer not null check (n between 1 and 65536),
      data bytea not null,
      valid bytea,
      min double precision,
      max double precision,
      nan_count integer not null default 0,
      primary key (dataset_version_id, column_index, part),
      foreign key (dataset_version_id, column_index)
        references dataset_column on delete cascade deferrable initially deferred
    );

    -- A server built without lz4 keeps its default, pglz: slower to write, otherwise the same.
    do $$ begin
      if exists (select from pg_settings where name = 'default_toast_compression' and 'lz4' = any (enumvals)) then
        alter table column_chunk alter column data set compression lz4;
      end if;
    end $$;
  `.execute(db)
}
