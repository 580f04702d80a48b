// One service at a time from one checkout: who runs it, and where it is reached.
import { existsSync, mkdirSync, readFileSync, rmSync, writeFileSync } from "node:fs";
import path from "node:path";
import { dataFolder } from "./environment.mjs";
import { say } from "./terminal.mjs";

const noteFile = path.join(dataFolder, "running.json");

/** Whether a process of this number is one of ours; after a crash the number may have gone to another program. */
function isOurs(pid) {
  const commandLine = path.join("/proc", String(pid), "cmdline");
  return existsSync(commandLine) && /scripts\/(start|dev)\.mjs/.test(readFileSync(commandLine, "utf8"));
}

function readNote() {
  try {
    return JSON.parse(readFileSync(noteFile, "utf8"));
  } catch {
    return {};
  }
}

/** Where this checkout's service is reached while it runs, else undefined. */
export function runningUrl() {
  const { pid, url } = readNote();
  return pid !== undefined && isOurs(pid) ? url : undefined;
}

/** Claims this checkout for this process. When another one holds it, says so and returns false. */
export function claim() {
  mkdirSync(dataFolder, { recursive: true, mode: 0o700 });
  for (;;) {
    try {
      writeFileSync(noteFile, JSON.stringify({ pid: process.pid }), { flag: "wx" });
      return true;
    } catch (error) {
      if (error.code !== "EEXIST") throw error;
    }
    const { pid, url } = readNote();
    if (pid !== undefined && isOurs(pid)) {
      const what = url ? `already running at ${url}` : "already being started";
      say(`Tablewright is ${what} (process ${pid}).`);
      return false;
    }
    // Left behind by a process that was ended by force.
    rmSync(noteFile, { force: true });
  }
}

/** Notes where the claimed service is reached. */
export function announce(url) {
  writeFileSync(noteFile, JSON.stringify({ pid: process.pid, url }));
}

export function release() {
  rmSync(noteFile, { force: true });
}
