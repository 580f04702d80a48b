// Finds PostgreSQL's programs on this machine, or installs Debian's package when we may.
import { existsSync, mkdirSync, readdirSync, writeFileSync } from "node:fs";
import path from "node:path";
import { isRoot, run, runOrStop, say, Stop } from "./terminal.mjs";

const OLDEST_MAJOR = 14;
const DEBIAN_FOLDER = "/usr/lib/postgresql";

/** Folders that may hold the programs. POSTGRES_BIN, when set, is the only one looked at. */
function candidateFolders() {
  if (process.env.POSTGRES_BIN) return [process.env.POSTGRES_BIN];
  const debian = existsSync(DEBIAN_FOLDER)
    ? readdirSync(DEBIAN_FOLDER).map((version) => path.join(DEBIAN_FOLDER, version, "bin"))
    : [];
  return [...(process.env.PATH ?? "").split(path.delimiter).filter(Boolean), ...debian];
}

/**
 * @returns {Promise<{ bin: string, major: number } | undefined>} the folder with initdb, pg_ctl, psql and postgres of
 *   the newest version found, or undefined when there is none from 14 on
 */
export async function findPostgres() {
  const found = [];
  for (const bin of new Set(candidateFolders())) {
    if (!["initdb", "pg_ctl", "postgres", "psql"].every((program) => existsSync(path.join(bin, program)))) continue;
    const { code, output } = await run(path.join(bin, "postgres"), ["--version"], { cwd: "/" });
    const major = Number(/(\d+)(\.|\D*$)/.exec(output)?.[1]);
    if (code === 0 && major >= OLDEST_MAJOR) found.push({ bin, major });
  }
  return found.sort((a, b) => b.major - a.major)[0];
}

/**
 * PostgreSQL's programs; as root they are installed from Debian's packages when missing. An ordinary user cannot
 * install them and gets a sentence.
 */
export async function requirePostgres() {
  const found = await findPostgres();
  if (found) return found;
  if (!isRoot || process.env.POSTGRES_BIN) {
    throw new Stop(
      "PostgreSQL 14 or newer was not found; install Debian's package `postgresql` (as root: apt-get install postgresql) " +
        "and start again, or set DATABASE_URL to a database that runs elsewhere.",
    );
  }
  say("PostgreSQL is not installed; installing Debian's package postgresql …");
  // Without this the package makes and starts a cluster of its own, which nobody here would use.
  mkdirSync("/etc/postgresql-common", { recursive: true });
  const settings = "/etc/postgresql-common/createcluster.conf";
  if (!existsSync(settings)) writeFileSync(settings, "create_main_cluster = false\n");
  await installPackages(["postgresql"]);
  const installed = await findPostgres();
  if (!installed) throw new Stop("Debian's package postgresql was installed, but its programs were not found.");
  return installed;
}

/** Installs Debian packages as root; reads the package lists anew only when the first try fails. */
export async function installPackages(names) {
  const env = { ...process.env, DEBIAN_FRONTEND: "noninteractive" };
  const install = ["install", "-y", "--no-install-recommends", ...names];
  const first = await run("apt-get", install, { env, cwd: "/" }).catch(() => ({ code: 1 }));
  if (first.code === 0) return;
  await runOrStop(
    `The Debian package lists could not be read (apt-get update), which ${names.join(", ")} needs.`,
    "apt-get",
    ["update"],
    { env, cwd: "/" },
  );
  await runOrStop(`Debian's package ${names.join(", ")} could not be installed.`, "apt-get", install, {
    env,
    cwd: "/",
  });
}
