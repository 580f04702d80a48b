import { type Kysely, sql } from "kysely";

/*
 * People come first: every other table names one. An account is never deleted, only switched off, so that a name beside
 * a decision can always be read. Secrets (passwords, session tokens, invitation and reset links, API keys) are stored as
 * hashes only; whoever reads this database cannot sign in with what stands in it.
 */
export async function up(db: Kysely<unknown>): Promise<void> {
  await sql`
    do $$
    begin
      if not exists (select from pg_roles where rolname = 'tablewright_app') then
        raise exception 'The role tablewright_app does not exist. Create it first: CREATE ROLE tablewright_app LOGIN PASSWORD ''…'' (see README, Configuration).';
      end if;
    end
    $$;

    -- The application may use the schema but make nothing in it.
    revoke create on schema public from public;
    grant usage on schema public to tablewright_app;

    -- Equality operators for GiST, needed by the exclusion constraints of the versioned tables.
    create extension if not exists btree_gist;

    create table person (
      id uuid primary key default gen_random_uuid(),
      email text not null,
      name text not null,
      password_hash text,
      switched_off_at timestamptz,
      created_at timestamptz not null default now(),
      constraint person_email_unique unique (email),
      constraint person_email_form check (email = lower(email) and email ~ '^[^@[:space:][:cntrl:]]+@[^@[:space:][:cntrl:]]+$' and length(email) <= 254),
      constraint person_name_form check (length(btrim(name)) between 1 and 120 and name !~ '[[:cntrl:]]')
    );
    comment on table person is 'One account per person. Never deleted and never handed on: acts keep naming it.';
    comment on column person.email is 'Lower case; the address the person signs in with.';
    comment on column person.password_hash is 'argon2id in PHC form; null until an invitation is taken up.';
    comment on column person.switched_off_at is 'When the account was switched off; null while it may be used.';

    create table person_role (
      person_id uuid not null references person on delete restrict,
      role text not null,
      given_by uuid references person on delete restrict,
      given_at timestamptz not null default now(),
      primary key (person_id, role),
      constraint person_role_known check (role in ('analyst', 'steward', 'reviewer', 'administrator'))
    );
    comment on table person_role is 'The roles a person holds now; a person may hold several. What each may do is app/people/permissions.ts.';
    comment on column person_role.given_by is 'Null when the role was given by the command line or the demo.';

    create table session (
      token_hash bytea primary key,
      person_id uuid not null references person on delete restrict,
      begun_at timestamptz not null default now(),
      seen_at timestamptz not null default now(),
      ends_at timestamptz not null,
      ended_at timestamptz,
      agent text not null default '',
      constraint session_token_is_sha256 check (octet_length(token_hash) = 32)
    );
    create index session_person on session (person_id) where ended_at is null;
    comment on table session is 'Signed-in sessions. The cookie holds the token, this table only its SHA-256.';
    comment on column session.ends_at is 'The absolute limit; the idle limit is counted from seen_at.';
    comment on column session.ended_at is 'When the session was ended by signing out, by its owner elsewhere or by an administrator.';

    create table invitation (
      id uuid primary key default gen_random_uuid(),
      token_hash bytea not null unique,
      person_id uuid not null references person on delete restrict,
      invited_by uuid references person on delete restrict,
      made_at timestamptz not null default now(),
      ends_at timestamptz not null,
      used_at timestamptz,
      constraint invitation_token_is_sha256 check (octet_length(token_hash) = 32)
    );
    comment on table invitation is 'Single-use links by which an invited person sets the first password.';

    create table password_reset (
      id uuid primary key default gen_random_uuid(),
      token_hash bytea not null unique,
      person_id uuid not null references person on delete restrict,
      made_at timestamptz not null default now(),
      ends_at timestamptz not null,
      used_at timestamptz,
      constraint password_reset_token_is_sha256 check (octet_length(token_hash) = 32)
    );
    create index password_reset_person on password_reset (person_id);
    comment on table password_reset is 'Single-use links by which a person sets a new password.';

    create table api_key (
      id text primary key,
      person_id uuid not null references person on delete restrict,
      name text not null,
      scopes text[] not null,
      secret_hash bytea not null,
      made_at timestamptz not null default now(),
      ends_at timestamptz not null,
      withdrawn_at timestamptz,
      last_used_at timestamptz,
      constraint api_key_id_form check (id ~ '^[0-9a-z]{12}$'),
      constraint api_key_name_form check (length(btrim(name)) between 1 and 80 and name !~ '[[:cntrl:]]'),
      constraint api_key_scopes_known check (cardinality(scopes) > 0 and scopes <@ array['read', 'sheets:write']),
      constraint api_key_secret_is_sha256 check (octet_length(secret_hash) = 32)
    );
    create index api_key_person on api_key (person_id);
    comment on table api_key is 'Keys by which laboratory software reads the table. The secret is shown once; here stands its SHA-256.';
    comment on column api_key.id is 'The public part of the key, used to look it up.';

    create table letter (
      id uuid primary key default gen_random_uuid(),
      kind text not null,
      to_address text not null,
      to_person uuid references person on delete restrict,
      subject text not null,
      body text not null,
      made_at timestamptz not null default now(),
      sent_at timestamptz,
      attempts integer not null default 0,
      last_error text,
      constraint letter_one_line_head check (subject !~ '[[:cntrl:]]' and to_address !~ '[[:cntrl:]]'),
      constraint letter_attempts check (attempts >= 0)
    );
    create index letter_waiting on letter (made_at) where sent_at is null;
    comment on table letter is 'The outbox: a letter is written in the transaction of the act it tells of and sent by the worker afterwards.';
    comment on column letter.sent_at is 'Null while it waits to be sent.';

    grant select, insert on person, person_role, session, invitation, password_reset, api_key, letter to tablewright_app;
    grant update (email, name, password_hash, switched_off_at) on person to tablewright_app;
    grant delete on person_role to tablewright_app;
    grant update (seen_at, ends_at, ended_at) on session to tablewright_app;
    grant update (used_at) on invitation, password_reset to tablewright_app;
    grant update (withdrawn_at, last_used_at) on api_key to tablewright_app;
    grant update (sent_at, attempts, last_error) on letter to tablewright_app;
  `.execute(db);
}
