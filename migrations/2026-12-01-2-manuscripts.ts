import { type Kysely, sql } from "kysely"

/** Manuscripts and who takes part in them. */
export async function up(db: Kysely<unknown>): Promise<void> {
  await sql`
    create table manuscript (
      id uuid primary key default uuid_v7(),
      title text not null check (length(title) between 1 and 500),
      abstract text not null default '' check (length(abstract) <= 10000),
      profile text not null default 'two-column-86',
      revision integer not null default 1,
      created_by uuid not null references person on delete restrict,
      created_at timestamptz not null default now(),
      updated_at timestamptz not null default now()
    );

    create table membership (
      manuscript_id uuid not null references manuscript on delete cascade,
      person_id uuid not null references person on delete restrict,
      role text not null check (role in ('corresponding-author', 'co-author', 'reader')),
      created_at timestamptz not null default now(),
      primary key (manuscript_id, person_id)
    );
    create index on membership (person_id);

    create table invitation (
      id uuid primary key default uuid_v7(),
      manuscript_id uuid not null references manuscript on delete cascade,
      email text not null check (email like '%_@_%' and length(email) <= 254),
      role text not null check (role in ('corresponding-author', 'co-author', 'reader')),
      message text not null default '' check (length(message) <= 2000),
      hash bytea not null unique check (length(hash) = 32),
      invited_by uuid not null references person on delete restrict,
      created_at timestamptz not null default now(),
      expires_at timestamptz not null,
      accepted_at timestamptz,
      accepted_by uuid references person on delete restrict,
      revoked_at timestamptz,
      check ((accepted_at is null) = (accepted_by is null)),
      check (accepted_at is null or revoked_at is null)
    );
    -- One open invitation an address; inviting again replaces the old link.
    create unique index invitation_open on invitation (manuscript_id, lower(email))
      where accepted_at is null and revoked_at is null;
  `.execute(db)
}
