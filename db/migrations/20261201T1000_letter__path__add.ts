import { type Kysely, sql } from "kysely";

/*
 * A letter tells of something that stands on a page, and the address of a page is known only to the process that sends
 * it (PUBLIC_URL), so the letter keeps the path. Letters that carry a secret link keep none of it: the link is made when
 * the letter is sent, and only its hash is stored.
 */
export async function up(db: Kysely<unknown>): Promise<void> {
  await sql`
    alter table letter
      add column path text,
      add column from_person uuid references person on delete restrict,
      add constraint letter_path_of_this_site check (path ~ '^/([^/\\\\]|$)' and path !~ '[[:cntrl:][:space:]]');
    comment on column letter.path is 'The page the letter is about, as a path of this site; null when there is none or the link is made on sending.';
    comment on column letter.from_person is 'On whose act the letter is written; null for the system and the command line.';
    create index letter_address on letter (to_address, made_at);
  `.execute(db);
}
