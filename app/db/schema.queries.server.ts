import { readdir } from "node:fs/promises";
import path from "node:path";
import { sql } from "kysely";
import type { Database } from "./database.server.ts";

const MIGRATIONS = path.join("db", "migrations");

/**
 * How many of this version's migrations the database has not had yet. Reads the folder of the checkout the process was
 * started in.
 */
export async function countPending(db: Database): Promise<number> {
  const files = await readdir(MIGRATIONS);
  const names = files.filter((file) => file.endsWith(".ts")).map((file) => path.basename(file, ".ts"));
  const { rows } = await sql<{ name: string }>`select name from kysely_migration`.execute(db);
  const done = new Set(rows.map((row) => row.name));
  return names.filter((name) => !done.has(name)).length;
}
