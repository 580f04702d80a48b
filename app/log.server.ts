import pino from "pino";

/**
 * The log: one JSON object a line on standard output, times in UTC. Secrets are left out by not being handed over;
 * the list below is a second lock for what comes with a request's headers.
 */
export const log = pino({
  level: process.env.LOG_LEVEL ?? "info",
  base: { pid: process.pid, process: process.env.TABLEWRIGHT_PROCESS },
  timestamp: pino.stdTimeFunctions.isoTime,
  redact: { paths: ["*.authorization", "*.cookie", "*.password", "*.token", "*.secret"], censor: "(left out)" },
});
