import { type Kysely, sql } from "kysely";

/*
 * Counts tries (sign-in, reset letters) in windows of time, shared by all web processes. Who tries is kept as a hash
 * only: people type passwords into the address field, and a source address is nobody's business after the window.
 */
export async function up(db: Kysely<unknown>): Promise<void> {
  await sql`
    create table try_count (
      limit_name text not null,
      subject_hash bytea not null,
      began_at timestamptz not null,
      tries integer not null,
      primary key (limit_name, subject_hash),
      constraint try_count_subject_is_sha256 check (octet_length(subject_hash) = 32),
      constraint try_count_positive check (tries > 0)
    );
    create index try_count_began on try_count (began_at);
    comment on table try_count is 'How often something limited was tried in the running window; rows of past windows are cleared away.';
    comment on column try_count.limit_name is 'Which limit, a name of app/people/limits.ts.';
    comment on column try_count.subject_hash is 'SHA-256 of what the limit counts by: a source, an address, or both.';

    grant select, insert, update, delete on try_count to tablewright_app;
  `.execute(db);
}
