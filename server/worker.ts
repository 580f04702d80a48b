import { config } from "#app/config.server.ts";
import { openPool } from "#app/db/connection.server.ts";
import { startRunner } from "#app/jobs/runner.server.ts";
import { enqueueWaitingLetters } from "#app/notify/letters.server.ts";
import { runProcess } from "./process.ts";

/** A job may run a long statement, such as reading a large sheet. In milliseconds. */
const LONGEST_STATEMENT = 10 * 60_000;

await runProcess(async () => {
  const pool = openPool(config().databaseUrl, { name: "tablewright worker", statementTimeout: LONGEST_STATEMENT });
  const runner = await startRunner(pool);
  // Letters that found no mail server before.
  if (config().smtpUrl) await enqueueWaitingLetters();
  return {
    async stop() {
      await runner.stop();
      await pool.end();
    },
  };
});
