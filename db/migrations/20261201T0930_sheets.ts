import { type Kysely, sql } from "kysely";

/*
 * A property sheet as it came. The bytes are kept untouched, in chunks of at most 1 MB; what was read stands beside them
 * row by row; a repair is a row of its own with who, when and the cell as it was. Nothing of the original is ever lost.
 */
export async function up(db: Kysely<unknown>): Promise<void> {
  await sql`
    create table sheet (
      id integer generated always as identity primary key,
      name text not null,
      byte_length bigint not null,
      sha256 bytea not null,
      uploaded_by uuid not null references person on delete restrict,
      received_at timestamptz not null default now(),
      state text not null default 'received',
      failure text,
      dialect jsonb,
      heads text[],
      plan jsonb,
      plan_confirmed_by uuid references person on delete restrict,
      plan_confirmed_at timestamptz,
      source_choice jsonb,
      settings jsonb not null default '{}',
      rows_total integer,
      rows_done integer not null default 0,
      revision_id integer,
      constraint sheet_name_form check (length(name) between 1 and 255 and name !~ '[[:cntrl:]]'),
      constraint sheet_hash_is_sha256 check (octet_length(sha256) = 32),
      constraint sheet_state_known check (state in ('received', 'planned', 'reading', 'read', 'built', 'failed')),
      constraint sheet_failure_has_reason check ((state = 'failed') = (failure is not null)),
      constraint sheet_read_has_plan check (state in ('received', 'planned', 'failed') or (plan is not null and plan_confirmed_by is not null and plan_confirmed_at is not null)),
      constraint sheet_built_has_revision check (state <> 'built' or revision_id is not null)
    );
    create index sheet_uploaded_by on sheet (uploaded_by);
    comment on table sheet is 'An uploaded property sheet: received, planned (its columns have a meaning, waiting to be confirmed), reading, read, built (a revision stands) or failed.';
    comment on column sheet.name is 'The name the file had; never used as a path.';
    comment on column sheet.dialect is 'Encoding, delimiter and decimal sign as decoded (app/intake/decode.ts).';
    comment on column sheet.plan is 'What each column means (app/intake/plan.ts); guessed until plan_confirmed_at.';
    comment on column sheet.source_choice is 'The source the sheet''s values come from: an existing id, or the citation of a new one.';
    comment on column sheet.settings is 'What the steward said of the whole sheet: temperature, standard pressure, kind of uncertainty, solute basis.';
    comment on column sheet.rows_done is 'Progress of the reading.';

    create table sheet_chunk (
      sheet_id integer not null references sheet on delete restrict,
      number integer not null,
      bytes bytea not null,
      primary key (sheet_id, number),
      constraint sheet_chunk_size check (octet_length(bytes) between 1 and 1048576),
      constraint sheet_chunk_number check (number >= 0)
    );
    comment on table sheet_chunk is 'The uploaded bytes, in order, at most 1 MB a row.';

    create table sheet_row (
      sheet_id integer not null references sheet on delete restrict,
      number integer not null,
      cells text[] not null,
      outcome text not null,
      problems jsonb not null default '[]',
      reading jsonb,
      left_out_by uuid references person on delete restrict,
      left_out_at timestamptz,
      primary key (sheet_id, number),
      constraint sheet_row_outcome_known check (outcome in ('read', 'refused', 'skipped')),
      constraint sheet_row_reading check ((outcome = 'read') = (reading is not null)),
      constraint sheet_row_reason check (outcome = 'read' or jsonb_array_length(problems) > 0),
      constraint sheet_row_left_out check ((left_out_by is null) = (left_out_at is null))
    );
    create index sheet_row_outcome on sheet_row (sheet_id, outcome, number);
    comment on table sheet_row is 'What became of each row: read, refused with reasons by cell, or skipped with a reason.';
    comment on column sheet_row.number is 'Row number as a person counts in the file: the heads are row 1.';
    comment on column sheet_row.cells is 'The cells as uploaded, to the letter. Repairs are sheet_repair.';
    comment on column sheet_row.left_out_at is 'When the steward chose to leave a refused row out.';

    create table sheet_repair (
      id bigint generated always as identity primary key,
      sheet_id integer not null,
      row_number integer not null,
      column_index integer not null,
      was text not null,
      becomes text not null,
      repaired_by uuid not null references person on delete restrict,
      repaired_at timestamptz not null default clock_timestamp(),
      note text,
      foreign key (sheet_id, row_number) references sheet_row (sheet_id, number) on delete restrict,
      constraint sheet_repair_column check (column_index >= 0)
    );
    create index sheet_repair_row on sheet_repair (sheet_id, row_number);
    comment on table sheet_repair is 'Cells mended on the page: the newest repair of a cell counts, the original stays in sheet_row.cells.';
    create trigger sheet_repair_append_only before update or delete on sheet_repair for each row execute function tg_forbid_change();
    create trigger sheet_repair_no_truncate before truncate on sheet_repair for each statement execute function tg_forbid_change();
    create trigger sheet_chunk_append_only before update or delete on sheet_chunk for each row execute function tg_forbid_change();
    create trigger sheet_chunk_no_truncate before truncate on sheet_chunk for each statement execute function tg_forbid_change();

    create table column_plan (
      id integer generated always as identity primary key,
      heads_hash bytea not null,
      heads text[] not null,
      plan jsonb not null,
      settings jsonb not null,
      saved_by uuid not null references person on delete restrict,
      saved_at timestamptz not null default now(),
      constraint column_plan_hash_is_sha256 check (octet_length(heads_hash) = 32)
    );
    create index column_plan_heads on column_plan (heads_hash, id desc);
    comment on table column_plan is 'Confirmed column plans, remembered for sheets with the same heads; the newest counts.';

    grant select, insert on sheet, sheet_chunk, sheet_row, sheet_repair, column_plan to tablewright_app;
    grant update (state, failure, dialect, heads, plan, plan_confirmed_by, plan_confirmed_at, source_choice, settings, rows_total, rows_done, revision_id) on sheet to tablewright_app;
    grant update (outcome, problems, reading, left_out_by, left_out_at) on sheet_row to tablewright_app;

    -- The uploaded bytes, their hash and who brought them are fixed from the start; and states move one way.
    create function tg_sheet_moves() returns trigger language plpgsql as $$
    begin
      if new.state <> old.state and not (
           (old.state = 'received' and new.state in ('planned', 'failed'))
        or (old.state = 'planned' and new.state in ('reading', 'failed'))
        or (old.state = 'reading' and new.state in ('read', 'failed'))
        or (old.state = 'read' and new.state in ('planned', 'built'))
        or (old.state = 'failed' and new.state in ('planned'))) then
        raise exception 'A sheet does not go from % to %.', old.state, new.state using errcode = 'TW006';
      end if;
      return new;
    end
    $$;
    comment on function tg_sheet_moves() is 'The sheet''s state machine. Error TW006.';
    create trigger sheet_moves before update on sheet for each row execute function tg_sheet_moves();
  `.execute(db);
}
