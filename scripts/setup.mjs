// Makes this checkout able to run: Node.js, packages, PostgreSQL, and for the tests a browser. Needs no package itself.
import { existsSync, readFileSync } from "node:fs";
import path from "node:path";
import { installPackages, requirePostgres } from "./postgres.mjs";
import { isRoot, root, runOrStop, say, Stop } from "./terminal.mjs";

const OLDEST_NODE = [20, 19];

export function requireNode() {
  const [major, minor] = process.versions.node.split(".").map(Number);
  if (major < OLDEST_NODE[0] || (major === OLDEST_NODE[0] && minor < OLDEST_NODE[1])) {
    throw new Stop(`Node.js ${OLDEST_NODE.join(".")} or newer is needed; this is ${process.versions.node}.`);
  }
}

const readJson = (file) => JSON.parse(readFileSync(path.join(root, file), "utf8"));

/** Whether node_modules holds what the lock file asks for: npm notes there what it installed last. */
function packagesInstalled() {
  const note = path.join("node_modules", ".package-lock.json");
  if (!existsSync(path.join(root, note))) return false;
  const wanted = readJson("package-lock.json").packages;
  const installed = readJson(note).packages;
  return Object.entries(wanted).every(
    ([where, entry]) =>
      where === "" || entry.optional || entry.devOptional || installed[where]?.version === entry.version,
  );
}

/** Installs the packages of the lock file when they are missing or others. No package runs a script of its own. */
export async function requirePackages() {
  if (packagesInstalled()) return;
  say("Installing packages …");
  const args = ["ci", "--include=dev", "--ignore-scripts", "--no-audit", "--no-fund", "--loglevel=error"];
  await runOrStop("The packages could not be installed (npm ci).", "npm", args);
}

/**
 * Debian's Chromium, or the program that CHROMIUM names; as root it is installed when missing.
 * @returns {Promise<string>} the program's path
 */
export async function requireChromium() {
  const find = () => {
    if (process.env.CHROMIUM) return existsSync(process.env.CHROMIUM) ? process.env.CHROMIUM : undefined;
    const folders = [...new Set([...(process.env.PATH ?? "").split(path.delimiter).filter(Boolean), "/usr/bin"])];
    return ["chromium", "chromium-browser", "google-chrome"]
      .flatMap((name) => folders.map((folder) => path.join(folder, name)))
      .find((file) => existsSync(file));
  };
  const found = find();
  if (found) return found;
  if (process.env.CHROMIUM)
    throw new Stop("CHROMIUM does not name a program; set it to Chromium's path or leave it unset.");
  if (!isRoot) {
    throw new Stop(
      "Chromium was not found, and the browser tests need it; install Debian's package `chromium` (as root: apt-get install chromium).",
    );
  }
  say("Chromium is not installed; installing Debian's package chromium …");
  await installPackages(["chromium"]);
  const installed = find();
  if (!installed) throw new Stop("Debian's package chromium was installed, but the program was not found.");
  return installed;
}

/**
 * @param {{ database?: boolean, browser?: boolean }} needs `database`: false when one that runs elsewhere is used
 * @returns {Promise<{ chromium?: string }>}
 */
export async function setup({ database = true, browser = false } = {}) {
  requireNode();
  // What an ordinary user must have installed by hand is looked for first, before minutes go into the packages.
  if (database) await requirePostgres();
  const chromium = browser ? await requireChromium() : undefined;
  await requirePackages();
  return { chromium };
}
