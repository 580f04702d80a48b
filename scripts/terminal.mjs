// What the scripts share in speaking to the person at the terminal, and in running other programs.
import { spawn } from "node:child_process";
import { createHash } from "node:crypto";
import { realpathSync } from "node:fs";
import path from "node:path";
import { fileURLToPath } from "node:url";

/** The top of this checkout, links resolved, so that one checkout has one name. */
export const root = realpathSync(path.join(path.dirname(fileURLToPath(import.meta.url)), ".."));

/** A short name for this checkout that differs between two clones side by side. */
export const checkoutName = createHash("sha256").update(root).digest("hex").slice(0, 12);

export const isRoot = process.getuid?.() === 0;

/** Ends a script with one sentence and exit code 1; no stack, because the sentence says what to do. */
export class Stop extends Error {}

export function say(sentence) {
  process.stdout.write(`${sentence}\n`);
}

/** Runs a script's main function; a `Stop` becomes its sentence, anything else is our own mistake and shows its stack. */
export async function main(run) {
  try {
    await run();
  } catch (error) {
    process.stderr.write(`${error instanceof Stop ? error.message : (error?.stack ?? error)}\n`);
    process.exitCode = 1;
  }
}

/** True when the module at `url` is the script that was started, not one that was imported. */
export function isScript(url) {
  return process.argv[1] !== undefined && realpathSync(process.argv[1]) === realpathSync(fileURLToPath(url));
}

/**
 * Runs a program to its end. Its output goes to this terminal (`show`), or is collected.
 * @param {string} program
 * @param {string[]} args
 * @param {{ show?: boolean, input?: string, env?: NodeJS.ProcessEnv, cwd?: string, uid?: number, gid?: number }} [options]
 * @returns {Promise<{ code: number, output: string }>} `output` is standard output and standard error together
 */
export function run(program, args, options = {}) {
  const { show = false, input, env = process.env, cwd = root, uid, gid } = options;
  return new Promise((resolve, reject) => {
    const out = show ? "inherit" : "pipe";
    const child = spawn(program, args, {
      cwd,
      env,
      uid,
      gid,
      stdio: [input === undefined ? "ignore" : "pipe", out, out],
    });
    let output = "";
    child.stdout?.setEncoding("utf8").on("data", (text) => (output += text));
    child.stderr?.setEncoding("utf8").on("data", (text) => (output += text));
    child.on("error", reject);
    child.on("close", (code) => resolve({ code: code ?? 1, output }));
    if (input !== undefined) child.stdin.end(input);
  });
}

/** The end of what a program said, without the lines that tell only where in its own code it was. */
function lastWords(output) {
  const lines = output.trim().split("\n");
  return lines
    .filter((line) => !/^\s+at /.test(line))
    .slice(-30)
    .join("\n");
}

/** As `run`, but a failure stops the script with `sentence` and what the program said last. */
export async function runOrStop(sentence, program, args, options = {}) {
  const result = await run(program, args, options).catch((error) => ({ code: 1, output: String(error.message) }));
  if (result.code !== 0) {
    const tail = lastWords(result.output);
    throw new Stop(tail ? `${sentence}\n${tail}` : sentence);
  }
  return result.output;
}

export const sleep = (milliseconds) => new Promise((resolve) => setTimeout(resolve, milliseconds));
