// Builds the pages and the server's programs when a source is other than at the last build.
import { createHash } from "node:crypto";
import { existsSync, mkdirSync, readdirSync, readFileSync, rmSync, writeFileSync } from "node:fs";
import path from "node:path";
import { isScript, main, root, runOrStop, say, sleep } from "./terminal.mjs";

const SOURCES = [
  "app",
  "server",
  "package.json",
  "package-lock.json",
  "tsconfig.json",
  "vite.config.ts",
  "react-router.config.ts",
  "public",
];
const STAMP = path.join(root, "build", "stamp");
const LOCK = path.join(root, ".data", "building");

function* filesBelow(item) {
  if (!existsSync(path.join(root, item))) return;
  const entries = readdirSync(path.join(root, item), { withFileTypes: true });
  for (const entry of entries.sort((a, b) => (a.name < b.name ? -1 : 1))) {
    const below = path.join(item, entry.name);
    if (entry.isDirectory()) yield* filesBelow(below);
    // Tests beside the sources are not built.
    else if (!/\.test\.tsx?$/.test(entry.name)) yield below;
  }
}

/** A digest over the names and bytes of everything that goes into a build. */
function digestOfSources() {
  const hash = createHash("sha256");
  for (const source of SOURCES) {
    const files = path.extname(source) ? [source] : [...filesBelow(source)];
    for (const file of files)
      hash
        .update(`${file}\0`)
        .update(readFileSync(path.join(root, file)))
        .update("\0");
  }
  return hash.digest("hex");
}

const isCurrent = (digest) => existsSync(STAMP) && readFileSync(STAMP, "utf8") === digest;

/** Takes the one build place of this checkout; waits while another living process holds it. */
async function takeTurn() {
  mkdirSync(path.dirname(LOCK), { recursive: true, mode: 0o700 });
  for (;;) {
    try {
      writeFileSync(LOCK, String(process.pid), { flag: "wx" });
      return;
    } catch (error) {
      if (error.code !== "EEXIST") throw error;
    }
    const holder = existsSync(LOCK) ? readFileSync(LOCK, "utf8") : "";
    if (holder !== "" && !existsSync(path.join("/proc", holder))) rmSync(LOCK, { force: true });
    else await sleep(200);
  }
}

/**
 * Builds when a source is other than at the last build. Two at once take turns.
 * @returns {Promise<boolean>} whether a build was needed
 */
export async function ensureBuild() {
  if (isCurrent(digestOfSources())) return false;
  await takeTurn();
  try {
    const digest = digestOfSources();
    if (isCurrent(digest)) return false;
    await build(digest);
    return true;
  } finally {
    rmSync(LOCK, { force: true });
  }
}

async function build(digest) {
  say("Building …");
  rmSync(STAMP, { force: true });
  await runOrStop("The build failed.", path.join(root, "node_modules", ".bin", "react-router"), ["build"], {
    env: { ...process.env, NODE_ENV: "production" },
  });
  writeFileSync(STAMP, digest);
}

if (isScript(import.meta.url)) {
  await main(async () => {
    if (!(await ensureBuild())) say("The build is up to date.");
  });
}
