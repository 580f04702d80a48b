import { sql } from "kysely";
import { openPool } from "#app/db/connection.server.ts";
import { runPending } from "#app/jobs/runner.server.ts";
import type { TestDatabase } from "./database.ts";

/**
 * Does every job that waits in the test's database, as the application's own role.
 * @throws when a job failed, with what it said
 */
export async function runJobs(database: TestDatabase): Promise<void> {
  const pool = openPool(database.appUrl, { max: 4, name: "test worker" });
  try {
    await runPending(pool);
  } finally {
    await pool.end();
  }
  const { rows } = await sql<{ task_identifier: string; last_error: string }>`
    select task_identifier, last_error from graphile_worker.jobs where last_error is not null
  `.execute(database.owner);
  if (rows.length > 0) {
    throw new Error(rows.map((row) => `The job ${row.task_identifier} failed: ${row.last_error}`).join("\n"));
  }
}
