import { Kysely, PostgresDialect } from "kysely";
import pg from "pg";
import type { DB } from "./types.ts";

/** How a connection pool is held. Times in milliseconds. */
export interface ConnectionOptions {
  /** Most connections held at once [10]. */
  max?: number;
  /** Longest time one statement may run before PostgreSQL ends it [30 000]. */
  statementTimeout?: number;
  /** Longest time a transaction may stand idle before PostgreSQL ends it [60 000]. */
  idleInTransactionTimeout?: number;
  /** What the session is called in pg_stat_activity ["tablewright"]. */
  name?: string;
}

const DATE_OID = 1082;

/**
 * Parsers for what comes back from PostgreSQL. `numeric` and `bigint` stay the strings the driver gives (a binary
 * float would lose digits); a `date` stays the string it is, because the driver's own parser would move it into the
 * machine's time zone.
 */
const types: pg.CustomTypesConfig = {
  getTypeParser(oid, format) {
    if (oid === DATE_OID) return (text: string) => text;
    return pg.types.getTypeParser(oid, format) as (text: string) => unknown;
  },
};

/**
 * Opens a pool of connections; no connection is made before the first query. Whoever calls this ends it with
 * `destroy()`.
 */
export function connect(url: string, options: ConnectionOptions = {}): Kysely<DB> {
  return new Kysely<DB>({ dialect: new PostgresDialect({ pool: openPool(url, options) }) });
}

/** The bare pool behind `connect`, for the two places that need the driver itself: COPY and the job runner. */
export function openPool(url: string, options: ConnectionOptions = {}): pg.Pool {
  const pool = new pg.Pool({
    connectionString: url,
    max: options.max ?? 10,
    statement_timeout: options.statementTimeout ?? 30_000,
    idle_in_transaction_session_timeout: options.idleInTransactionTimeout ?? 60_000,
    application_name: options.name ?? "tablewright",
    types,
  });
  // A connection that the database closes is dropped by the pool, and a query on it fails by itself; without listeners
  // it would end the process.
  pool.on("error", () => undefined);
  pool.on("connect", (client) => client.on("error", () => undefined));
  return pool;
}
