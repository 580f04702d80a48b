// Runs the server's programs as children: starts them, begins them anew when they fall over, ends them together.
import { spawn } from "node:child_process";
import path from "node:path";
import { root, say, sleep, Stop } from "./terminal.mjs";

/** A child that does not end by itself when asked is ended after this time, in milliseconds. */
const LONGEST_STOP = 25_000;
/** A child that fell over this often within a minute is not begun anew. */
const MOST_FALLS = 5;

/**
 * A long-lived program of build/server.
 *
 * @param {string} name "web" or "worker"
 * @param {NodeJS.ProcessEnv} env
 * @param {(sentence: string) => void} giveUp called when it fell over too often
 */
export function startProgram(name, env, giveUp) {
  let child;
  let stopping = false;
  let up = false;
  let falls = [];
  let settle;
  const ready = new Promise((resolve, reject) => (settle = { resolve, reject }));

  const begin = () => {
    child = spawn(process.execPath, ["--enable-source-maps", path.join("build", "server", `${name}.js`)], {
      cwd: root,
      env: { ...env, TABLEWRIGHT_PROCESS: name },
      // The channel tells when the child is up, and ends the child should this process vanish.
      stdio: ["ignore", "inherit", "inherit", "ipc"],
      // A group of its own: Ctrl-C reaches this process, which then ends its children in order.
      detached: true,
    });
    child.on("message", (message) => {
      if (message !== "ready") return;
      up = true;
      settle.resolve();
    });
    child.on("error", (error) => settle.reject(error));
    child.on("exit", async (code) => {
      if (stopping) return;
      // Before it was up for the first time it has said itself what is wrong.
      if (!up) return settle.reject(Object.assign(new Stop(`The ${name} process did not start.`), { code }));
      falls = [...falls.filter((time) => Date.now() - time < 60_000), Date.now()];
      if (falls.length > MOST_FALLS) return giveUp(`The ${name} process ended ${falls.length} times within a minute.`);
      say(`The ${name} process ended unexpectedly; starting it again.`);
      await sleep(500);
      if (!stopping) begin();
    });
  };
  begin();

  return {
    ready,
    async stop() {
      stopping = true;
      settle.resolve();
      if (child.exitCode !== null || child.signalCode !== null) return;
      const ended = new Promise((resolve) => child.once("exit", resolve));
      child.kill("SIGTERM");
      const force = setTimeout(() => child.kill("SIGKILL"), LONGEST_STOP);
      await ended;
      clearTimeout(force);
    },
  };
}

/** Resolves at the first request to stop; a second one changes nothing, because stopping is already under way. */
export function stopRequest() {
  return new Promise((resolve) => {
    for (const signal of ["SIGINT", "SIGTERM", "SIGHUP"]) process.on(signal, () => resolve(signal));
  });
}
