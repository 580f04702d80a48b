// The settings and the database with which the server's programs run: the person's own, or the demo's.
import { randomBytes } from "node:crypto";
import { existsSync, mkdirSync, readdirSync, readFileSync, writeFileSync } from "node:fs";
import path from "node:path";
import { ensureCluster, stopCluster } from "./cluster.mjs";
import { root, Stop } from "./terminal.mjs";

/** What this checkout keeps between starts, beside its database. */
export const dataFolder = path.join(root, ".data");

/** Loads one of the project's own TypeScript files, which needs the installed packages. */
export async function importTypeScript(file) {
  const { createJiti } = await import("jiti");
  return createJiti(import.meta.url).import(path.join(root, file));
}

const settingsReader = () => importTypeScript("app/config.server.ts");

/** Stops with one sentence when a variable of the environment cannot be used. */
export async function checkSettings() {
  const { checkSettings: check, SettingError } = await settingsReader();
  try {
    check(process.env);
  } catch (error) {
    throw error instanceof SettingError ? new Stop(error.message) : error;
  }
}

/** The address the service is reached at when PUBLIC_URL does not say: this machine and the port. */
export async function publicUrlOf(env) {
  const { readConfig } = await settingsReader();
  return readConfig(env).publicUrl;
}

/** What went wrong in reaching a database, without anything of its address. */
function reasonOf(error) {
  if (["ECONNREFUSED", "ENOTFOUND", "EHOSTUNREACH", "EAI_AGAIN"].includes(error.code))
    return "no database answers at its address";
  if (["28P01", "28000"].includes(error.code)) return "the database does not accept its role and password";
  if (error.code === "3D000") return "the server holds no database of its name";
  return "the database did not accept the connection";
}

/** Stops with one sentence when the database that a variable names cannot be reached. */
async function requireConnection(variable, url) {
  const { default: pg } = await import("pg");
  const client = new pg.Client({ connectionString: url, connectionTimeoutMillis: 5_000 });
  client.on("error", () => undefined);
  try {
    await client.connect();
    await client.query("select 1");
  } catch (error) {
    throw new Stop(`${variable} cannot be used: ${reasonOf(error)}.`);
  } finally {
    await client.end().catch(() => undefined);
  }
}

/** Stops when the application's database lacks a migration that only its owner could run. */
async function requireSchema(appUrl) {
  const { default: pg } = await import("pg");
  const client = new pg.Client({ connectionString: appUrl });
  await client.connect();
  try {
    const { rows } = await client.query("select name from kysely_migration").catch(() => ({ rows: [] }));
    const done = new Set(rows.map((row) => row.name));
    const files = readdirSync(path.join(root, "db", "migrations")).filter((file) => file.endsWith(".ts"));
    if (files.every((file) => done.has(path.basename(file, ".ts")))) return;
  } finally {
    await client.end();
  }
  throw new Stop(
    "DATABASE_OWNER_URL is not set, and the database does not have this version's schema; set it so that the migrations can be run.",
  );
}

/** The demo's secret, and that of a service whose SESSION_SECRET is not set: made once, read by its owner only. */
function ownSecret() {
  const file = path.join(dataFolder, "session-secret");
  if (!existsSync(file)) {
    mkdirSync(dataFolder, { recursive: true, mode: 0o700 });
    writeFileSync(file, randomBytes(32).toString("hex"), { mode: 0o600 });
  }
  return readFileSync(file, "utf8");
}

/**
 * Opens the database meant and writes the environment for the server's programs.
 *
 * @returns {Promise<{ demo: boolean, env: NodeJS.ProcessEnv, superUrl?: string, ownerUrl: string | undefined, appUrl: string, started: boolean, close(): Promise<void> }>}
 *   `ownerUrl` is undefined when the person keeps the migrations to another place; `close` stops the demo's cluster, and
 *   `started` says whether it was started here
 */
export async function openEnvironment() {
  await checkSettings();
  // The owner's address and password stay with the migrations; no process that serves holds them.
  const { DATABASE_URL: givenUrl, DATABASE_OWNER_URL: givenOwnerUrl, ...rest } = process.env;
  const env = {
    ...rest,
    NODE_ENV: "production",
    SESSION_SECRET: rest.SESSION_SECRET || ownSecret(),
    // For addresses that PUBLIC_URL does not give, nothing of the caller's may stand in.
    TABLEWRIGHT_DEMO: "no",
  };
  if (givenUrl) {
    await requireConnection("DATABASE_URL", givenUrl);
    if (givenOwnerUrl) await requireConnection("DATABASE_OWNER_URL", givenOwnerUrl);
    else await requireSchema(givenUrl);
    return {
      demo: false,
      env: { ...env, DATABASE_URL: givenUrl },
      ownerUrl: givenOwnerUrl || undefined,
      appUrl: givenUrl,
      started: false,
      close: async () => undefined,
    };
  }
  const cluster = await ensureCluster();
  return {
    demo: true,
    env: {
      ...env,
      DATABASE_URL: cluster.appUrl,
      TABLEWRIGHT_DEMO: "yes",
      TABLEWRIGHT_MAIL_FOLDER: path.join(dataFolder, "mail"),
    },
    superUrl: cluster.superUrl,
    ownerUrl: cluster.ownerUrl,
    appUrl: cluster.appUrl,
    started: cluster.started,
    close: async () => void (await stopCluster()),
  };
}
