import { type Kysely, sql } from "kysely";

/*
 * The record of who did what. Entries are written as the last statement of the transaction of the act itself, under one
 * advisory lock, so that either both stand or neither does. Each entry carries the hash of the one before it: a changed,
 * missing or exchanged entry breaks the chain from there on (npm run verify).
 */
export async function up(db: Kysely<unknown>): Promise<void> {
  await sql`
    create function tg_forbid_change() returns trigger language plpgsql as $$
    begin
      raise exception 'Rows of % are never changed or removed.', tg_table_name using errcode = 'TW001';
    end
    $$;
    comment on function tg_forbid_change() is 'Guards append-only tables. Error TW001.';

    create table audit_entry (
      number bigint primary key,
      at timestamptz not null,
      actor uuid references person on delete restrict,
      api_key_id text references api_key on delete restrict,
      act text not null,
      object_kind text not null,
      object_id text not null,
      detail jsonb not null,
      request_id text,
      previous_hash bytea not null,
      hash bytea not null unique,
      constraint audit_entry_number_positive check (number > 0),
      constraint audit_entry_hash_is_sha256 check (octet_length(hash) = 32 and octet_length(previous_hash) = 32)
    );
    create index audit_entry_object on audit_entry (object_kind, object_id, number);
    create index audit_entry_actor on audit_entry (actor, number);
    comment on table audit_entry is 'Append-only record, chained by SHA-256. Numbers have no gaps.';
    comment on column audit_entry.actor is 'Null for acts of the system itself and of the command line.';
    comment on column audit_entry.previous_hash is 'Hash of the entry before; 32 zero bytes for the first.';
    comment on column audit_entry.hash is 'SHA-256 of the RFC 8785 JSON of all other columns (app/audit/chain.ts).';

    create trigger audit_entry_append_only before update or delete on audit_entry
      for each row execute function tg_forbid_change();
    create trigger audit_entry_no_truncate before truncate on audit_entry
      for each statement execute function tg_forbid_change();

    grant select, insert on audit_entry to tablewright_app;
  `.execute(db);
}
