// npm test: the whole definition of done, from a clean checkout. With arguments it runs only the tests they name:
// npm test -- tests/database
import { existsSync } from "node:fs";
import path from "node:path";
import { ensureBuild } from "./build.mjs";
import { setup } from "./setup.mjs";
import { main, root, run, say } from "./terminal.mjs";

const bin = (name) => path.join(root, "node_modules", ".bin", name);

/** The tests see none of the settings with which somebody may be running a service here. */
const SETTINGS = [
  ...["DATABASE_URL", "DATABASE_OWNER_URL", "DATABASE_READ_URL", "PUBLIC_URL", "TRUSTED_PROXIES", "SMTP_URL"],
  ...["MAIL_FROM", "PORT", "HOST", "SESSION_SECRET", "NODE_ENV", "LOG_LEVEL"],
];

const seconds = (since) => `${((performance.now() - since) / 1000).toFixed(1)} s`;

/** Runs one stage and says how long it took; what it printed is shown only when it failed. */
async function stage(name, work) {
  const begun = performance.now();
  const { code, output } = await work();
  say(`${code === 0 ? "ok    " : "FAILED"} ${name} (${seconds(begun)})`);
  if (code !== 0) say(output.trimEnd());
  return code === 0;
}

/** The stages of one lane follow each other; each runs whatever became of the one before. */
async function lane(...stages) {
  let ok = true;
  for (const [name, work] of stages) ok = (await stage(name, work)) && ok;
  return ok;
}

const build = () =>
  ensureBuild().then(
    () => ({ code: 0, output: "" }),
    (error) => ({ code: 1, output: error.message }),
  );

await main(async () => {
  const begun = performance.now();
  const named = process.argv.slice(2);
  const { chromium } = await setup({ browser: true });
  say(`ok     setup (${seconds(begun)})`);

  const env = Object.fromEntries(Object.entries(process.env).filter(([name]) => !SETTINGS.includes(name)));
  Object.assign(env, { CHROMIUM: chromium, LOG_LEVEL: "silent" });
  const tool = (name, ...args) => [`${name} ${args[0] ?? ""}`.trim(), () => run(bin(name), args, { env })];

  let ok = true;
  if (named.length === 0) {
    // The page types are generated first: both the compiler and the type-aware lint rules read them.
    ok = await lane(tool("react-router", "typegen"), ["build", build]);
    const lanes = await Promise.all([
      lane(["lint", () => run(bin("eslint"), ["--max-warnings=0", "."], { env })]),
      lane(
        ["types", () => run(bin("tsc"), ["--noEmit"], { env })],
        ["format", () => run(bin("prettier"), ["--check", "--log-level=warn", "."], { env })],
        ...(existsSync(path.join(root, "knip.json")) ? [["unused code", () => run(bin("knip"), [], { env })]] : []),
      ),
    ]);
    ok = ok && lanes.every(Boolean);
  } else {
    ok = await lane(["build", build]);
  }
  const tests = performance.now();
  const { code } = await run(bin("vitest"), ["run", ...named], { env, show: true });
  say(`${code === 0 ? "ok    " : "FAILED"} tests (${seconds(tests)})`);
  say(`${ok && code === 0 ? "Everything passed" : "Something above FAILED"}, in ${seconds(begun)}.`);
  if (!ok || code !== 0) process.exitCode = 1;
});
