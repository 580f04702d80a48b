import { readFileSync } from "node:fs";
import path from "node:path";
import { sql } from "kysely";
import { expect, test } from "vitest";
import { useDatabase } from "#tests/support/database.ts";
import { dumpSchema } from "../../scripts/database.mjs";

/* Rules about the schema, held against the live catalogue. */

const database = useDatabase();

test("every table and function of ours has a comment", async () => {
  const bare = await sql<{ name: string }>`
    select c.relname as name from pg_class c
     where c.relnamespace = 'public'::regnamespace and c.relkind = 'r' and c.relname not like 'kysely%'
       and obj_description(c.oid, 'pg_class') is null
     order by 1`.execute(database.owner);
  expect(bare.rows.map((row) => row.name)).toEqual([]);
});

test("no foreign key removes or empties what points at it", async () => {
  const keys = await sql<{ name: string }>`
    select conname as name from pg_constraint
     where contype = 'f' and connamespace = 'public'::regnamespace and confdeltype not in ('r', 'a')
     order by 1`.execute(database.owner);
  expect(keys.rows.map((row) => row.name)).toEqual([]);
});

test("the application owns nothing, makes nothing and cannot touch what is append-only", async () => {
  const rights = await sql<{ super: boolean; makes: boolean; owns: string }>`
    select rolsuper as super,
           has_schema_privilege('tablewright_app', 'public', 'CREATE') as makes,
           (select count(*)::text from pg_class where relowner = r.oid) as owns
      from pg_roles r where rolname = 'tablewright_app'`.execute(database.owner);
  expect(rights.rows).toEqual([{ super: false, makes: false, owns: "0" }]);
  const open = await sql<{ table: string; change: string }>`
    select c.relname as table, p.change
      from pg_class c, unnest(array['UPDATE', 'DELETE', 'TRUNCATE']) as p(change)
     where c.relnamespace = 'public'::regnamespace and c.relkind = 'r'
       and c.relname in ('audit_entry', 'edition', 'species', 'source', 'line_version', 'line_decision', 'revision_move',
                         'comment', 'examination', 'finding', 'finding_set_aside', 'sheet_chunk', 'sheet_repair')
       and has_table_privilege('tablewright_app', c.oid, p.change)
     order by 1, 2`.execute(database.owner);
  expect(open.rows).toEqual([]);
});

test("db/schema.sql is what the migrations make; write it anew with npm run db:dump", async () => {
  const committed = readFileSync(path.resolve(import.meta.dirname, "../../db/schema.sql"), "utf8");
  expect(await dumpSchema(database.ownerUrl)).toBe(committed);
});
