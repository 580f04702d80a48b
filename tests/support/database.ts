import { randomBytes } from "node:crypto";
import type { Kysely } from "kysely";
import pg from "pg";
import { afterAll, beforeAll, inject } from "vitest";
import { connect, openPool } from "#app/db/connection.server.ts";
import { useDatabase as makeApplicationUse } from "#app/db/database.server.ts";
import type { DB } from "#app/db/types.ts";
import { sqlForDatabaseRights } from "../../scripts/cluster.mjs";

/** A database of this test file's own, as its owner and as the application sees it. */
export interface TestDatabase {
  /** As the application: no DDL, no change of what is published. Acts and queries under test run on this one. */
  app: Kysely<DB>;
  /** As the owner of the tables: for looking behind the application's back, never for what is under test. */
  owner: Kysely<DB>;
  appUrl: string;
  ownerUrl: string;
}

function withDatabaseName(url: string, name: string): string {
  const address = new URL(url);
  address.pathname = `/${name}`;
  return address.href;
}

async function asSuperuser(statements: readonly string[]): Promise<void> {
  const client = new pg.Client({ connectionString: inject("cluster").superUrl });
  await client.connect();
  try {
    for (const statement of statements) await client.query(statement);
  } finally {
    await client.end();
  }
}

/** Clones the migrated template. The caller calls `drop` when done. */
export async function cloneDatabase(): Promise<TestDatabase & { drop(): Promise<void> }> {
  const { ownerUrl, appUrl } = inject("cluster");
  const template = new URL(ownerUrl).pathname.slice(1);
  const name = `test_${randomBytes(6).toString("hex")}`;
  await asSuperuser([
    `create database ${name} template ${template} owner tablewright_owner`,
    sqlForDatabaseRights(name),
  ]);
  const urls = { appUrl: withDatabaseName(appUrl, name), ownerUrl: withDatabaseName(ownerUrl, name) };
  const app = connect(urls.appUrl, { max: 10, name: "test" });
  const owner = connect(urls.ownerUrl, { max: 4, name: "test owner" });
  return {
    ...urls,
    app,
    owner,
    async drop() {
      await Promise.all([app.destroy(), owner.destroy()]);
      await asSuperuser([`drop database if exists ${name} with (force)`]);
    },
  };
}

/**
 * Gives the test file a database of its own: made before the first test, dropped after the last, and the one on which
 * the application's acts run meanwhile. Read the fields inside tests and hooks only.
 *
 * @example
 * const database = useDatabase();
 * test("…", async () => { await database.app.selectFrom("species").selectAll().execute(); });
 */
export function useDatabase(): TestDatabase {
  let clone: Awaited<ReturnType<typeof cloneDatabase>> | undefined;
  beforeAll(async () => {
    clone = await cloneDatabase();
    makeApplicationUse(clone.app);
  });
  afterAll(async () => {
    await clone?.drop();
  });
  const current = (): TestDatabase => {
    if (!clone) throw new Error("useDatabase(): the database exists only while tests and hooks run.");
    return clone;
  };
  return {
    get app() {
      return current().app;
    },
    get owner() {
      return current().owner;
    },
    get appUrl() {
      return current().appUrl;
    },
    get ownerUrl() {
      return current().ownerUrl;
    },
  };
}

/** A bare pool on a test database, for tests that need several connections or the driver's own errors. */
export function testPool(url: string): pg.Pool {
  return openPool(url, { max: 20, name: "test pool" });
}
