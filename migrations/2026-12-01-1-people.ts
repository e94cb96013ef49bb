import { type Kysely, sql } from "kysely"

/** People, how they prove who they are, and what they hold: sign-ins, tokens, links by mail. */
export async function up(db: Kysely<unknown>): Promise<void> {
  await sql`
    -- Version 7 (RFC 9562): 48 bits of milliseconds, then random bits; ids sort by creation.
    create function uuid_v7() returns uuid language sql volatile parallel safe as $$
      select encode(
        set_bit(set_bit(
          overlay(uuid_send(gen_random_uuid())
            placing substring(int8send((extract(epoch from clock_timestamp()) * 1000)::bigint) from 3)
            from 1 for 6),
          52, 1), 53, 1),
        'hex')::uuid
    $$;

    create table person (
      id uuid primary key default uuid_v7(),
      email text not null check (email like '%_@_%' and length(email) <= 254),
      name text not null check (length(name) between 1 and 200),
      orcid text check (orcid ~ '^\\d{4}-\\d{4}-\\d{4}-\\d{3}[\\dX]$'),
      password_hash text,
      email_verified_at timestamptz not null default now(),
      mail text not null default 'each' check (mail in ('each', 'digest', 'none')),
      created_at timestamptz not null default now(),
      updated_at timestamptz not null default now()
    );
    create unique index person_email on person (lower(email));

    create table identity (
      provider text not null,
      subject text not null,
      person_id uuid not null references person on delete cascade,
      created_at timestamptz not null default now(),
      primary key (provider, subject)
    );
    create index on identity (person_id);

    create table sign_in (
      id uuid primary key default uuid_v7(),
      person_id uuid not null references person on delete cascade,
      provider text not null,
      user_agent text not null default '',
      created_at timestamptz not null default now(),
      last_seen_at timestamptz not null default now(),
      expires_at timestamptz not null,
      revoked_at timestamptz
    );
    create index on sign_in (person_id);

    create table api_token (
      id uuid primary key default uuid_v7(),
      person_id uuid not null references person on delete cascade,
      name text not null check (length(name) between 1 and 100),
      hash bytea not null unique check (length(hash) = 32),
      prefix text not null,
      scope text not null check (scope in ('read', 'upload', 'all')),
      created_at timestamptz not null default now(),
      expires_at timestamptz not null,
      last_used_at timestamptz,
      revoked_at timestamptz
    );
    create index on api_token (person_id);

    create table password_reset (
      id uuid primary key default uuid_v7(),
      person_id uuid not null references person on delete cascade,
      hash bytea not null unique check (length(hash) = 32),
      created_at timestamptz not null default now(),
      expires_at timestamptz not null,
      used_at timestamptz
    );
    create index on password_reset (person_id);

    -- A person exists once the address is proved, so that nobody chooses a password for another's address.
    create table registration (
      id uuid primary key default uuid_v7(),
      email text not null check (email like '%_@_%' and length(email) <= 254),
      name text not null check (length(name) between 1 and 200),
      hash bytea not null unique check (length(hash) = 32),
      created_at timestamptz not null default now(),
      expires_at timestamptz not null,
      used_at timestamptz
    );

    create table rate_limit (
      key text primary key,
      window_ends_at timestamptz not null,
      hits integer not null
    );
    create index on rate_limit (window_ends_at);
  `.execute(db)
}
