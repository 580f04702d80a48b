import { Logger, run, runOnce, type Runner, type RunnerOptions, type Task, type TaskList } from "graphile-worker";
import type pg from "pg";
import { log } from "#app/log.server.ts";
import { tasks } from "./tasks.server.ts";

/** How many jobs one worker process does at once. */
const CONCURRENCY = 2;
/** The worker hears of new jobs at once; it looks by itself this often for those whose time has come. In milliseconds. */
const POLL_INTERVAL = 2_000;

const logger = new Logger((scope) => (level, message, meta) => {
  const line = {
    event: "job",
    scope: scope.label,
    task: scope.taskIdentifier,
    jobId: scope.jobId,
    error: messageOf(meta),
  };
  if (level === "error") log.error(line, message);
  else if (level === "warning") log.warn(line, message);
  else log.debug(line, message);
});

function messageOf(meta: unknown): string | undefined {
  if (typeof meta !== "object" || meta === null || !("error" in meta)) return undefined;
  return meta.error instanceof Error ? meta.error.stack : undefined;
}

/**
 * Keeps the queue's own start from changing the schema: the application's role must not, and a worker that meets another
 * schema than its own has to stop and say so.
 */
const neverMigrate: GraphileConfig.Plugin = {
  name: "NeverMigrate",
  version: "1.0.0",
  worker: {
    middleware: {
      bootstrap() {
        throw new Error("The job queue has no tables yet; run npm run db:migrate.");
      },
      async migrate(_next, event) {
        const { rows } = await event.client.query<{ latest: number | null }>(
          "select max(id) as latest from graphile_worker.migrations",
        );
        if (rows[0]?.latest !== event.ctx.maxMigrationNumber) {
          throw new Error("The job queue's tables are not those of this version; run npm run db:migrate.");
        }
      },
    },
  },
};

function options(pgPool: pg.Pool): RunnerOptions {
  const taskList: TaskList = Object.fromEntries(
    Object.entries(tasks).map(([name, work]) => [name, (payload: unknown) => work(payload as never)] as [string, Task]),
  );
  return {
    pgPool,
    taskList,
    logger,
    concurrency: CONCURRENCY,
    pollInterval: POLL_INTERVAL,
    noHandleSignals: true,
    preset: { plugins: [neverMigrate] },
  };
}

/** Starts to take jobs from the queue. `stop()` lets running jobs finish. */
export async function startRunner(pgPool: pg.Pool): Promise<Runner> {
  return run(options(pgPool));
}

/** Does the jobs whose time has come, and those they add, then ends. For tests and the seeds. */
export async function runPending(pgPool: pg.Pool): Promise<void> {
  await runOnce(options(pgPool));
}
