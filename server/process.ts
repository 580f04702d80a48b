import { SettingError } from "#app/config.server.ts";
import { closeDatabase } from "#app/db/database.server.ts";
import { beginStopping } from "#app/http/stopping.server.ts";
import { log } from "#app/log.server.ts";
import { ListenError } from "./serve.ts";

/** What a process that runs until it is asked to stop gives to `runProcess`. */
export interface Running {
  /** Lets what runs finish, and ends it. */
  stop(): Promise<void>;
}

/** Longest time from the request to stop to the end of the process, in milliseconds. */
const LONGEST_STOP = 20_000;

/**
 * Runs a long-lived process: starts it, tells the parent when it is up, and ends it in good order on SIGTERM, SIGINT or
 * when the parent is gone. A setting that cannot be used ends it with one sentence.
 */
export async function runProcess(start: () => Promise<Running>): Promise<void> {
  let running: Running | undefined;
  let asked = false;
  const stop = async (): Promise<void> => {
    if (asked) return;
    asked = true;
    beginStopping();
    setTimeout(() => {
      log.error({ event: "stop-forced" }, "the process did not stop in time and was ended");
      process.exit(1);
    }, LONGEST_STOP).unref();
    await running?.stop();
    await closeDatabase();
    log.info({ event: "stopped" });
    process.exit(0);
  };
  process.on("SIGTERM", () => void stop());
  process.on("SIGINT", () => void stop());
  process.on("disconnect", () => void stop());
  process.on("unhandledRejection", (error) => {
    log.error({ event: "unexpected-error", err: error }, "a promise failed and nobody was waiting for it");
  });
  process.on("uncaughtException", (error) => {
    log.fatal({ event: "unexpected-error", err: error }, "an error reached the top of the process");
    process.exitCode = 1;
    void stop();
  });
  try {
    running = await start();
    log.info({ event: "started" });
    process.send?.("ready");
  } catch (error) {
    const known = error instanceof SettingError || error instanceof ListenError;
    process.stderr.write(`${known ? error.message : String((error as Error).stack ?? error)}\n`);
    process.exit(error instanceof ListenError ? error.exitCode : 1);
  }
}
