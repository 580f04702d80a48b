// What is done to a database from the command line: migrate, seed, reset, dump, types.
//
// Without DATABASE_URL each works on this checkout's own cluster, which is started for it when it does not run.
import { readFileSync, writeFileSync } from "node:fs";
import path from "node:path";
import {
  clusterFolder,
  ensureCluster,
  removeCluster,
  sqlForDatabaseRights,
  stopCluster,
  temporaryClusterFolder,
} from "./cluster.mjs";
import { requirePostgres } from "./postgres.mjs";
import { isScript, main, root, run, runOrStop, say, Stop } from "./terminal.mjs";

const bin = (name) => path.join(root, "node_modules", ".bin", name);

async function withOwner(ownerUrl, work) {
  const { default: pg } = await import("pg");
  const client = new pg.Client({ connectionString: ownerUrl });
  await client.connect();
  try {
    return await work(client);
  } finally {
    await client.end();
  }
}

/**
 * Brings a database to this checkout's schema: the project's migrations, then the job queue's, then the rights of the
 * application on the queue. Two at once wait for each other; run again, it changes nothing.
 * @param {string} ownerUrl the database as its owner
 * @returns {Promise<string>} what the migration tool said
 */
export async function migrate(ownerUrl) {
  const output = await runOrStop(
    "The database could not be migrated.",
    bin("kysely"),
    ["migrate", "latest", "--no-outdated-check"],
    {
      env: { ...process.env, DATABASE_OWNER_URL: ownerUrl },
    },
  );
  const { runMigrations, Logger } = await import("graphile-worker");
  await runMigrations({ connectionString: ownerUrl, logger: new Logger(() => () => undefined) });
  await withOwner(ownerUrl, (client) => client.query(readFileSync(path.join(root, "db", "jobs.sql"), "utf8")));
  return output;
}

/** Makes the demo's content with the application's own acts and the application's own rights. */
async function seed(appUrl, env = process.env) {
  await runOrStop("The demo's content could not be made.", bin("kysely"), ["seed", "run", "--no-outdated-check"], {
    env: { ...env, DATABASE_URL: appUrl },
  });
}

// Stands as the database's comment once the demo is whole; a start that was broken off while making it leaves none.
const WHOLE = "the demo is made";

/** Whether the demo's content is all there, none of it, or a part that a broken-off start left behind. */
export async function demoContent(ownerUrl) {
  return withOwner(ownerUrl, async (client) => {
    const { rows } = await client.query(
      `select shobj_description(oid, 'pg_database') as note, exists (select from person) as used
         from pg_database where datname = current_database()`,
    );
    if (rows[0].note === WHOLE) return "whole";
    return rows[0].used ? "part" : "none";
  });
}

/** Makes the demo's content where it is missing, on a new database where only a part of it is there. */
export async function ensureDemo({ superUrl, ownerUrl, appUrl }, env = process.env) {
  const found = await demoContent(ownerUrl);
  if (found === "whole") return;
  if (found === "part") {
    say("A start was broken off while it made the demo's content; it is made anew.");
    await replaceDatabase(superUrl);
    await migrate(ownerUrl);
  } else {
    say("Making the demo's content …");
  }
  await seed(appUrl, env);
  await withOwner(ownerUrl, (client) => client.query(`comment on database tablewright is '${WHOLE}'`));
}

async function replaceDatabase(superUrl) {
  const { default: pg } = await import("pg");
  const client = new pg.Client({ connectionString: superUrl });
  await client.connect();
  try {
    await client.query("drop database if exists tablewright with (force)");
    await client.query("create database tablewright owner tablewright_owner");
    await client.query(sqlForDatabaseRights("tablewright"));
  } finally {
    await client.end();
  }
}

/** A plain-text picture of the schema, without what differs between machines. */
export async function dumpSchema(ownerUrl) {
  const { bin: programs } = await requirePostgres();
  const args = ["--schema-only", "--schema=public", "--no-owner", "--exclude-table=kysely_migration*", ownerUrl];
  const { code, output } = await run(path.join(programs, "pg_dump"), args, { cwd: "/" });
  if (code !== 0) throw new Stop(`The schema could not be dumped.\n${output.trim()}`);
  return normaliseDump(output);
}

/**
 * Drops what a dump says about the program that wrote it (versions, session settings, the random key that newer
 * versions print), so that two machines write the same bytes.
 */
export function normaliseDump(text) {
  return (
    text
      .split("\n")
      .filter((line) => !/^(SET |SELECT pg_catalog\.set_config|\\(un)?restrict |-- Dumped (from|by) )/.test(line))
      .join("\n")
      .replace(/\n{3,}/g, "\n\n")
      .trim() + "\n"
  );
}

/** Runs `work` with the addresses of the database meant: the environment's, or this checkout's own cluster. */
async function withDatabase(work) {
  const { DATABASE_URL: appUrl, DATABASE_OWNER_URL: ownerUrl } = process.env;
  if (ownerUrl) return work({ ownerUrl, appUrl });
  if (appUrl)
    throw new Stop("DATABASE_OWNER_URL is not set; with DATABASE_URL set it must name the same database as its owner.");
  const cluster = await ensureCluster();
  try {
    return await work(cluster);
  } finally {
    if (cluster.started) await stopCluster();
  }
}

/** Runs `work` on a freshly migrated database in a cluster of its own, which is removed afterwards. */
async function withFreshDatabase(work) {
  const folder = temporaryClusterFolder();
  try {
    const cluster = await ensureCluster({ folder, throwaway: true });
    await migrate(cluster.ownerUrl);
    return await work(cluster);
  } finally {
    await removeCluster(folder);
  }
}

function refuseWithDatabaseUrl(command) {
  if (process.env.DATABASE_URL || process.env.DATABASE_OWNER_URL) {
    throw new Stop(`${command} works on the demo's own database only; DATABASE_URL is set, so nothing was done.`);
  }
}

const commands = {
  async migrate() {
    await withDatabase(async ({ ownerUrl }) => {
      await migrate(ownerUrl);
      say("The database has this version's schema.");
    });
  },
  async seed() {
    refuseWithDatabaseUrl("npm run db:seed");
    await withDatabase(async (cluster) => {
      await migrate(cluster.ownerUrl);
      if ((await demoContent(cluster.ownerUrl)) === "whole") {
        throw new Stop("The demo's database is not empty, so nothing was added; npm run db:reset empties it first.");
      }
      await ensureDemo(cluster);
      say("The demo's content was made.");
    });
  },
  async reset() {
    refuseWithDatabaseUrl("npm run db:reset");
    await withDatabase(async (cluster) => {
      await replaceDatabase(cluster.superUrl);
      await migrate(cluster.ownerUrl);
      await ensureDemo(cluster);
      say(`The demo's database in ${clusterFolder()} was made anew.`);
    });
  },
  async dump() {
    await withFreshDatabase(async ({ ownerUrl }) =>
      writeFileSync(path.join(root, "db", "schema.sql"), await dumpSchema(ownerUrl)),
    );
    say("Wrote db/schema.sql.");
  },
  async types() {
    await withFreshDatabase(async ({ ownerUrl }) => {
      await runOrStop("The table types could not be written.", bin("kysely-codegen"), [
        ...["--dialect", "postgres", "--url", ownerUrl, "--out-file", path.join("app", "db", "types.ts")],
        ...["--default-schema", "public", "--include-pattern", "public.*", "--exclude-pattern", "*kysely_migration*"],
        ...["--date-parser", "string", "--log-level", "error"],
        // A number would lose the digits of a value on its way in; only text is accepted.
        ...["--type-mapping", JSON.stringify({ numeric: "string" })],
      ]);
      await runOrStop("The table types could not be formatted.", bin("prettier"), ["--write", "app/db/types.ts"]);
    });
    say("Wrote app/db/types.ts.");
  },
};

if (isScript(import.meta.url)) {
  await main(async () => {
    const name = process.argv[2];
    if (!Object.hasOwn(commands, name))
      throw new Stop(`Usage: node scripts/database.mjs ${Object.keys(commands).join(" | ")}`);
    await commands[name]();
  });
}
