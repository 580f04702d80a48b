import type { Kysely, Transaction } from "kysely";
import { connect } from "./connection.server.ts";
import type { DB } from "./types.ts";

/** What a query takes last: the open database or a transaction in it. */
export type Database = Kysely<DB> | Transaction<DB>;

let opened: Kysely<DB> | undefined;

/** The application's database as `DATABASE_URL` names it; opened at first use. */
export function database(): Kysely<DB> {
  if (!opened) {
    const url = process.env.DATABASE_URL;
    if (!url) throw new Error("DATABASE_URL is not set; npm start and the test support set it.");
    opened = connect(url);
  }
  return opened;
}

/** Puts another open database in the place of the configured one; tests and the seeds give theirs. */
export function useDatabase(other: Kysely<DB>): void {
  opened = other;
}

/** Closes every connection; the process is about to end. */
export async function closeDatabase(): Promise<void> {
  await opened?.destroy();
  opened = undefined;
}
