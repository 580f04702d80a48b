import { type ChildProcess, execFile, spawn } from "node:child_process";
import { randomBytes } from "node:crypto";
import { mkdtemp, readdir, readFile, rm } from "node:fs/promises";
import { createServer } from "node:net";
import { tmpdir } from "node:os";
import path from "node:path";
import { promisify } from "node:util";
import { type ParsedMail, simpleParser } from "mailparser";
import { afterAll, beforeAll, expect } from "vitest";
import { startInbox } from "../../scripts/inbox.mjs";
import { API_BASE } from "#app/http/apiContract.ts";
import { Contract } from "./contract.ts";
import { cloneDatabase, type TestDatabase } from "./database.ts";

/** How the server of a test file is started. */
export interface ServerOptions {
  /** Start the worker beside it, so that jobs and letters are done [false]. */
  worker?: boolean;
  /** Settings on top of the usual ones; PUBLIC_URL for a service behind a proxy, for instance. */
  env?: Record<string, string>;
  /** Run on the database before the server starts: the people and editions that the tests need. */
  prepare?: (database: TestDatabase) => Promise<void>;
}

/** The built service, running for one test file on a database of its own. */
export interface TestServer {
  /** Where it listens, for example "http://127.0.0.1:41234". Also its PUBLIC_URL unless `env` says otherwise. */
  readonly url: string;
  readonly port: number;
  readonly database: TestDatabase;
  /**
   * Sends a request to a path of the service; redirects are not followed. Every answer of the API is held against the
   * contract that the service serves: status, headers, media type and body.
   */
  fetch(path: string, init?: RequestInit): Promise<Response>;
  /** The contract that answers are held against, with what was seen of it so far. */
  contract(): Promise<Contract>;
  /** The letters that have arrived so far, oldest first. */
  letters(): Promise<ParsedMail[]>;
  /** Waits for a letter to an address; the newest one when several came. */
  letterTo(address: string): Promise<ParsedMail>;
  /** Everything the processes wrote so far: their log, one JSON object a line. */
  log(): string;
}

const START_TIME = 20_000;
const LETTER_TIME = 15_000;

async function freePort(): Promise<number> {
  return new Promise((resolve, reject) => {
    const server = createServer();
    server.once("error", reject);
    server.listen(0, "127.0.0.1", () => {
      const address = server.address();
      server.close(() =>
        typeof address === "object" && address ? resolve(address.port) : reject(new Error("no port")),
      );
    });
  });
}

async function startProgram(
  name: string,
  env: NodeJS.ProcessEnv,
  write: (text: string) => void,
): Promise<ChildProcess> {
  const child = spawn(process.execPath, [path.join("build", "server", `${name}.js`)], {
    env: { ...env, TABLEWRIGHT_PROCESS: name },
    stdio: ["ignore", "pipe", "pipe", "ipc"],
  });
  let output = "";
  for (const stream of [child.stdout, child.stderr]) {
    stream?.setEncoding("utf8").on("data", (text: string) => {
      output += text;
      write(text);
    });
  }
  await new Promise<void>((resolve, reject) => {
    const late = setTimeout(
      () => reject(new Error(`The ${name} process did not start in time:\n${output}`)),
      START_TIME,
    );
    child.once("message", () => {
      clearTimeout(late);
      resolve();
    });
    child.once("exit", () => {
      clearTimeout(late);
      reject(new Error(`The ${name} process ended at its start:\n${output}`));
    });
  });
  return child;
}

async function stopProgram(child: ChildProcess): Promise<number | null> {
  if (child.exitCode !== null) return child.exitCode;
  const ended = new Promise<number | null>((resolve) => child.once("exit", resolve));
  child.kill("SIGTERM");
  return ended;
}

/** Starts the service; `stop` ends it, drops its database, and gives the exit codes of its processes. */
export async function startServer(
  options: ServerOptions = {},
): Promise<TestServer & { stop(): Promise<(number | null)[]> }> {
  await promisify(execFile)(process.execPath, [path.join("scripts", "build.mjs")]);
  const database = await cloneDatabase();
  await options.prepare?.(database);
  const mailFolder = await mkdtemp(path.join(tmpdir(), "tablewright-mail-"));
  const inbox = await startInbox(mailFolder);
  const port = await freePort();
  const url = `http://127.0.0.1:${port}`;
  const env: NodeJS.ProcessEnv = {
    PATH: process.env["PATH"],
    TZ: process.env["TZ"],
    NODE_ENV: "production",
    DATABASE_URL: database.appUrl,
    SESSION_SECRET: randomBytes(32).toString("hex"),
    SMTP_URL: inbox.url,
    HOST: "127.0.0.1",
    PORT: String(port),
    PUBLIC_URL: url,
    ...options.env,
  };
  let log = "";
  const write = (text: string): void => void (log += text);
  const names = options.worker ? ["web", "worker"] : ["web"];
  const children = await Promise.all(names.map((name) => startProgram(name, env, write)));

  // Behind a proxy the contract is asked for as its clients do.
  const asClient = { "X-Forwarded-Host": new URL(env["PUBLIC_URL"] ?? url).host, "X-Forwarded-Proto": "https" };
  let served: Promise<Contract> | undefined;
  const contract = (): Promise<Contract> =>
    (served ??= fetch(`${url}${API_BASE}/openapi.json`, { headers: env["PUBLIC_URL"] === url ? {} : asClient }).then(
      async (answer) => new Contract(await answer.json()),
    ));
  const letters = async (): Promise<ParsedMail[]> => {
    const files = (await readdir(mailFolder)).filter((file) => file.endsWith(".eml")).sort();
    return Promise.all(files.map(async (file) => simpleParser(await readFile(path.join(mailFolder, file)))));
  };
  return {
    url,
    port,
    database,
    async fetch(where, init) {
      const answer = await fetch(`${url}${where}`, { redirect: "manual", ...init });
      if (where.startsWith("/api/")) {
        await (await contract()).check(init?.method ?? "GET", where, answer.clone());
      }
      return answer;
    },
    contract,
    letters,
    async letterTo(address) {
      const deadline = Date.now() + LETTER_TIME;
      for (;;) {
        const found = (await letters()).filter(({ to }) => [to].flat().some((one) => one?.text.includes(address)));
        const newest = found.at(-1);
        if (newest) return newest;
        if (Date.now() > deadline) throw new Error(`No letter to ${address} arrived.`);
        await new Promise((resolve) => setTimeout(resolve, 100));
      }
    },
    log: () => log,
    async stop() {
      const codes = await Promise.all(children.map(stopProgram));
      await inbox.close();
      await database.drop();
      await rm(mailFolder, { recursive: true, force: true });
      return codes;
    },
  };
}

/**
 * Gives the test file a running service of its own. At the end its processes must have stopped in good order, and their
 * log must hold no unexpected error. Read the fields inside tests and hooks only.
 */
export function useServer(options: ServerOptions = {}): TestServer {
  let running: Awaited<ReturnType<typeof startServer>> | undefined;
  beforeAll(async () => {
    running = await startServer(options);
  });
  afterAll(async () => {
    if (!running) return;
    const codes = await running.stop();
    expect(unexpectedErrors(running.log())).toEqual([]);
    expect(codes).toEqual(codes.map(() => 0));
  });
  const current = (): TestServer => {
    if (!running) throw new Error("useServer(): the server runs only while tests and hooks run.");
    return running;
  };
  return {
    get url() {
      return current().url;
    },
    get port() {
      return current().port;
    },
    get database() {
      return current().database;
    },
    fetch: (where, init) => current().fetch(where, init),
    contract: () => current().contract(),
    letters: () => current().letters(),
    letterTo: (address) => current().letterTo(address),
    log: () => current().log(),
  };
}

/** The lines of a log that tell of an error nobody foresaw. */
export function unexpectedErrors(log: string): string[] {
  return log
    .split("\n")
    .filter((line) => line.includes('"event":"unexpected-error"') || /^\s+at .*\(.*:\d+:\d+\)/.test(line));
}
