import { type Kysely, sql } from "kysely"

/** Tables whose rows are written once and never changed, by anyone. */
const writtenOnce = ["blob", "figure_version", "figure_version_input", "result", "rendering", "event"]
/** Tables that a lock or an acceptance freezes; no one may empty them either. */
const freezing = [
  "blob_chunk",
  "dataset_version",
  "dataset_column",
  "column_chunk",
  "draft",
  "draft_figure",
  "sign_off",
]

/**
 * The rules that must never break, whoever asks. SQLSTATE AQ423 says "frozen", AQ409 "does not fit the present state";
 * both carry a sentence for the reader. Functions are `security definer` because they lock rows that the application
 * role may only read.
 *
 * Locks: whoever pins, signs or draws holds the draft row FOR SHARE; locking a draft updates that row and so waits for
 * them, and they for it, and then see its new state.
 */
export async function up(db: Kysely<unknown>): Promise<void> {
  await sql`
    create function refuse_change() returns trigger language plpgsql as $$ begin
      raise exception using errcode = 'AQ423',
        message = format('Rows of %s are kept as they were written.', tg_table_name);
    end $$;

    create function refuse_if_draft_locked(draft_id uuid) returns void
    language plpgsql security definer set search_path = public, pg_temp as $$
    declare found_draft record;
    begin
      select number, state into found_draft from draft where id = draft_id for share;
      if found_draft.state = 'locked' then
        raise exception using errcode = 'AQ423',
          message = format('Draft %s is locked.', found_draft.number);
      end if;
    end $$;

    create function guard_draft() returns trigger
    language plpgsql security definer set search_path = public, pg_temp as $$
    declare missing text;
    begin
      if tg_op = 'INSERT' then
        if new.state <> 'open' then
          raise exception using errcode = 'AQ409', message = 'A draft starts open.';
        end if;
        return new;
      end if;
      if old.state = 'locked' then
        raise exception using errcode = 'AQ423', message = format('Draft %s is locked.', old.number);
      end if;
      if tg_op = 'DELETE' then return old; end if;
      if (new.id, new.manuscript_id, new.number) is distinct from (old.id, old.manuscript_id, old.number) then
        raise exception using errcode = 'AQ409', message = 'A draft keeps its manuscript and its number.';
      end if;
      if new.state = 'locked' then
        if not exists (select from draft_figure where draft_id = new.id) then
          raise exception using errcode = 'AQ409', message = 'A draft without figures cannot be locked.';
        end if;
        select string_agg(figure.name, ', ' order by pinned.position) into missing
          from draft_figure pinned join figure on figure.id = pinned.figure_id
          where pinned.draft_id = new.id
            and not exists (select from result where result.figure_version_id = pinned.figure_version_id);
        if missing is not null then
          raise exception using errcode = 'AQ409',
            message = format('Pinned versions without results: %s.', missing);
        end if;
      end if;
      return new;
    end $$;
    create trigger guard_draft before insert or update or delete on draft
      for each row execute function guard_draft();

    create function guard_draft_figure() returns trigger
    language plpgsql security definer set search_path = public, pg_temp as $$ begin
      if tg_op <> 'INSERT' then perform refuse_if_draft_locked(old.draft_id); end if;
      if tg_op = 'DELETE' then return old; end if;
      perform refuse_if_draft_locked(new.draft_id);
      -- Waits for results and renderings of this version that are being written (they hold FOR KEY SHARE).
      perform from figure_version where id = new.figure_version_id for update;
      if (select manuscript_id from figure where id = new.figure_id)
         is distinct from (select manuscript_id from draft where id = new.draft_id) then
        raise exception using errcode = 'AQ409', message = 'A draft pins figures of its own manuscript.';
      end if;
      return new;
    end $$;
    create trigger guard_draft_figure before insert or update or delete on draft_figure
      for each row execute function guard_draft_figure();

    create function guard_sign_off() returns trigger
    language plpgsql security definer set search_path = public, pg_temp as $$ begin
      if tg_op <> 'INSERT' then perform refuse_if_draft_locked(old.draft_id); end if;
      if tg_op = 'DELETE' then return old; end if;
      perform refuse_if_draft_locked(new.draft_id);
      if tg_op = 'UPDATE' and (new.id, new.draft_id, new.person_id, new.digest, new.created_at)
         is distinct from (old.id, old.draft_id, old.person_id, old.digest, old.created_at) then
        raise exception using errcode = 'AQ423', message = 'A sign-off holds for one person and one digest.';
      end if;
      return new;
    end $$;
    create trigger guard_sign_off before insert or update or delete on sign_off
      for each row execute function guard_sign_off();

    create function guard_made_of_version() returns trigger
    language plpgsql security definer set search_path = public, pg_temp as $$
    declare pinning record;
    begin
      perform from figure_version where id = new.figure_version_id for key share;
      for pinning in
        select draft.number, draft.state from draft
        where draft.id in (select draft_id from draft_figure where figure_version_id = new.figure_version_id)
        for share of draft
      loop
        if pinning.state = 'locked' then
          raise exception using errcode = 'AQ423',
            message = format('This figure version is pinned by draft %s, which is locked.', pinning.number);
        end if;
      end loop;
      return new;
    end $$;
    create trigger guard_result before insert on result
      for each row execute function guard_made_of_version();
    create trigger guard_rendering before insert on rendering
      for each row execute function guard_made_of_version();

    -- Inputs belong to the version from the start: none comes later, all are accepted, all of the same manuscript.
    create function guard_figure_version_input() returns trigger
    language plpgsql security definer set search_path = public, pg_temp as $$ begin
      if exists (select from computation where figure_version_id = new.figure_version_id)
         or exists (select from result where figure_version_id = new.figure_version_id) then
        raise exception using errcode = 'AQ423', message = 'The inputs of a figure version are fixed.';
      end if;
      if not exists (
        select from dataset_version
          join dataset on dataset.id = dataset_version.dataset_id
          join figure_version on figure_version.id = new.figure_version_id
          join figure on figure.id = figure_version.figure_id
        where dataset_version.id = new.dataset_version_id and dataset_version.state = 'accepted'
          and dataset.manuscript_id = figure.manuscript_id and dataset.name = new.dataset_name
      ) then
        raise exception using errcode = 'AQ409',
          message = format('A figure uses accepted versions of its manuscript''s datasets; %s is not one.',
            new.dataset_name);
      end if;
      return new;
    end $$;
    create trigger guard_figure_version_input before insert on figure_version_input
      for each row execute function guard_figure_version_input();

    create function guard_dataset_version() returns trigger language plpgsql as $$ begin
      if old.state = 'accepted' then
        raise exception using errcode = 'AQ423',
          message = format('Version %s of the dataset is accepted and never changes.', old.number);
      end if;
      if tg_op = 'DELETE' then return old; end if;
      if (new.id, new.dataset_id, new.number, new.blob_id, new.file_name, new.uploaded_by, new.uploaded_at)
         is distinct from
         (old.id, old.dataset_id, old.number, old.blob_id, old.file_name, old.uploaded_by, old.uploaded_at) then
        raise exception using errcode = 'AQ423', message = 'An uploaded file keeps its place and its bytes.';
      end if;
      return new;
    end $$;
    create trigger guard_dataset_version before update or delete on dataset_version
      for each row execute function guard_dataset_version();

    create function refuse_if_accepted(version_id uuid) returns void
    language plpgsql security definer set search_path = public, pg_temp as $$
    declare found_version record;
    begin
      select number, state into found_version from dataset_version where id = version_id for share;
      if found_version.state = 'accepted' then
        raise exception using errcode = 'AQ423',
          message = format('Version %s of the dataset is accepted and never changes.', found_version.number);
      end if;
    end $$;

    -- Columns are corrected before the version is accepted, in the same transaction if need be.
    create function guard_read_data() returns trigger language plpgsql as $$ begin
      if tg_op <> 'INSERT' then perform refuse_if_accepted(old.dataset_version_id); end if;
      if tg_op = 'DELETE' then return old; end if;
      perform refuse_if_accepted(new.dataset_version_id);
      return new;
    end $$;
    create trigger guard_dataset_column before insert or update or delete on dataset_column
      for each row execute function guard_read_data();
    create trigger guard_column_chunk before insert or update or delete on column_chunk
      for each row execute function guard_read_data();

    -- Parts may come and go until their blob is written down; from then on its hash speaks for them.
    create function guard_blob_chunk() returns trigger
    language plpgsql security definer set search_path = public, pg_temp as $$
    declare row_blob uuid := case when tg_op = 'INSERT' then new.blob_id else old.blob_id end;
    begin
      if tg_op = 'UPDATE' or exists (select from blob where id = row_blob) then
        raise exception using errcode = 'AQ423', message = 'Stored bytes never change.';
      end if;
      return case when tg_op = 'DELETE' then old else new end;
    end $$;
    create trigger guard_blob_chunk before insert or update or delete on blob_chunk
      for each row execute function guard_blob_chunk();

    create function guard_corresponding_author() returns trigger
    language plpgsql security definer set search_path = public, pg_temp as $$ begin
      if old.role = 'corresponding-author' then
        perform from manuscript where id = old.manuscript_id for no key update;
        if found and not exists (select from membership
            where manuscript_id = old.manuscript_id and role = 'corresponding-author') then
          raise exception using errcode = 'AQ409', message = 'A manuscript keeps a corresponding author.';
        end if;
      end if;
      return null;
    end $$;
    create trigger guard_corresponding_author after update or delete on membership
      for each row execute function guard_corresponding_author();
  `.execute(db)
  for (const table of writtenOnce)
    await sql`create trigger written_once before update or delete on ${sql.table(table)}
      for each row execute function refuse_change()`.execute(db)
  for (const table of [...writtenOnce, ...freezing])
    await sql`create trigger never_emptied before truncate on ${sql.table(table)}
      execute function refuse_change()`.execute(db)
}
