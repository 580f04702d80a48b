import { type Kysely, sql } from "kysely";

/*
 * A person changes the address they sign in with by a letter to the new one: only who reads it there can take it. The new
 * address stands in the link's own row, so the account keeps the old one until then.
 */
export async function up(db: Kysely<unknown>): Promise<void> {
  await sql`
    create table address_change (
      id uuid primary key default gen_random_uuid(),
      token_hash bytea not null unique,
      person_id uuid not null references person on delete restrict,
      email text not null,
      made_at timestamptz not null default now(),
      ends_at timestamptz not null,
      used_at timestamptz,
      constraint address_change_token_is_sha256 check (octet_length(token_hash) = 32),
      constraint address_change_email_form check (email = lower(email) and email ~ '^[^@[:space:][:cntrl:]]+@[^@[:space:][:cntrl:]]+$' and length(email) <= 254)
    );
    create index address_change_person on address_change (person_id);
    comment on table address_change is 'Single-use links by which a person confirms that they read letters at a new address.';
    comment on column address_change.email is 'The address that the account takes when the link is used.';
    comment on column address_change.used_at is 'When the link was used, or voided by another change of the account.';

    -- When somebody last signed in is read for every line of the list of people; ended sessions stay.
    create index session_person_begun on session (person_id, begun_at desc);
    create index invitation_person on invitation (person_id);
    -- The record of one kind of act.
    create index audit_entry_act on audit_entry (act, number);

    grant select, insert on address_change to tablewright_app;
    grant update (used_at) on address_change to tablewright_app;
  `.execute(db);
}
