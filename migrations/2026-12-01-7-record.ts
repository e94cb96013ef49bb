import { type Kysely, sql } from "kysely"

/** The history, mail on its way, and answers kept for repeated requests. */
export async function up(db: Kysely<unknown>): Promise<void> {
  await sql`
    create table event (
      id bigint generated always as identity primary key,
      at timestamptz not null default now(),
      manuscript_id uuid references manuscript on delete restrict,
      person_id uuid references person on delete restrict,
      kind text not null,
      subject text,
      data jsonb not null default '{}'
    );
    create index on event (manuscript_id, id);
    create index on event (person_id, id);

    create function event_notify() returns trigger language plpgsql as $$ begin
      perform pg_notify('afterquench_event', json_build_object(
        'id', new.id, 'manuscriptId', new.manuscript_id, 'personId', new.person_id,
        'kind', new.kind, 'subject', left(new.subject, 200))::text);
      return null;
    end $$;
    create trigger event_notify after insert on event for each row execute function event_notify();

    create table outbox (
      id uuid primary key default uuid_v7(),
      recipient text not null,
      subject text not null,
      text text not null,
      html text,
      headers jsonb not null default '{}',
      state text not null default 'queued' check (state in ('queued', 'sent', 'failed')),
      attempts integer not null default 0,
      last_error text,
      send_after timestamptz not null default now(),
      created_at timestamptz not null default now(),
      sent_at timestamptz
    );
    create index on outbox (send_after) where state = 'queued';

    create table idempotency_key (
      person_id uuid not null references person on delete cascade,
      key text not null check (length(key) between 1 and 200),
      request_sha256 bytea not null check (length(request_sha256) = 32),
      status integer,
      headers jsonb,
      body text,
      created_at timestamptz not null default now(),
      primary key (person_id, key)
    );
    create index on idempotency_key (created_at);
  `.execute(db)
}
