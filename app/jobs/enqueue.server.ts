import { sql } from "kysely";
import type { Database } from "#app/db/database.server.ts";

/** The tasks the worker knows, with what each is handed. Each does one small thing and may safely run twice. */
export interface TaskPayloads {
  /** Send one letter of the outbox. */
  sendLetter: { letterId: string };
  /** Read the rows of a sheet whose plan was confirmed. */
  readSheet: { sheetId: number };
}

export type TaskName = keyof TaskPayloads;

/**
 * Hands a task to the worker, in the transaction of the act that needs it: the job exists if and only if the act does.
 * With a `jobKey`, a job of the same key that still waits is replaced and not doubled.
 */
export async function enqueueJob<Name extends TaskName>(
  name: Name,
  payload: TaskPayloads[Name],
  trx: Database,
  options: { jobKey?: string } = {},
): Promise<void> {
  await sql`
    select graphile_worker.add_job(${name}::text, payload => ${JSON.stringify(payload)}::json, job_key => ${options.jobKey ?? null}::text)
  `.execute(trx);
}
