import { sql } from "kysely";
import { describe, expect, test } from "vitest";
import { useDatabase } from "#tests/support/database.ts";

const database = useDatabase();

describe("the application's role", () => {
  test("is nobody special: no superuser, makes neither databases nor roles, passes no row-level security", async () => {
    const { rows } = await sql`
      select rolsuper, rolcreatedb, rolcreaterole, rolreplication, rolbypassrls
      from pg_roles where rolname = current_user`.execute(database.app);
    expect(rows).toEqual([
      { rolsuper: false, rolcreatedb: false, rolcreaterole: false, rolreplication: false, rolbypassrls: false },
    ]);
  });

  test.each([
    ["a table", "create table mine (id int)"],
    ["a temporary table", "create temporary table mine (id int)"],
    ["a schema", "create schema mine"],
    ["a change to the job queue", "alter table graphile_worker._private_jobs add column mine int"],
  ])("cannot make %s", async (_what, statement) => {
    // 42501 is PostgreSQL's insufficient_privilege.
    await expect(sql.raw(statement).execute(database.app)).rejects.toMatchObject({ code: "42501" });
  });

  test("adds a job and sees it, although the queue's tables are row-level-secured", async () => {
    await sql`select graphile_worker.add_job('nothing', '{}'::json)`.execute(database.app);
    const { rows } = await sql`select task_identifier from graphile_worker.jobs`.execute(database.app);
    expect(rows).toEqual([{ task_identifier: "nothing" }]);
  });
});
