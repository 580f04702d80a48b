// Runs one of the server's commands, or the worker apart from the web process, on the database meant:
// node scripts/command.mjs admin --email … | key --person … | worker
import { spawn } from "node:child_process";
import { existsSync } from "node:fs";
import path from "node:path";
import { ensureBuild } from "./build.mjs";
import { runningUrl } from "./claim.mjs";
import { migrate } from "./database.mjs";
import { openEnvironment, publicUrlOf } from "./environment.mjs";
import { stopRequest } from "./processes.mjs";
import { setup } from "./setup.mjs";
import { main, root, Stop } from "./terminal.mjs";

await main(async () => {
  const [name = "", ...args] = process.argv.slice(2);
  await setup({ database: !process.env.DATABASE_URL });
  const { env, ownerUrl, started, close } = await openEnvironment();
  try {
    if (ownerUrl && started) await migrate(ownerUrl);
    await ensureBuild();
    const program = path.join(root, "build", "server", `${name}.js`);
    if (!/^[a-z]+$/.test(name) || !existsSync(program)) throw new Stop(`There is no command "${name}".`);
    env.PUBLIC_URL = runningUrl() ?? (await publicUrlOf(env));
    const child = spawn(process.execPath, ["--enable-source-maps", program, ...args], {
      cwd: root,
      env: {
        ...env,
        LOG_LEVEL: process.env.LOG_LEVEL ?? (name === "worker" ? "info" : "warn"),
        TABLEWRIGHT_PROCESS: name,
      },
      stdio: "inherit",
    });
    void stopRequest().then(() => child.kill("SIGTERM"));
    process.exitCode = await new Promise((resolve, reject) => {
      child.once("error", reject);
      child.once("exit", (code) => resolve(code ?? 1));
    });
  } finally {
    // A cluster that ran before goes on running.
    if (started) await close();
  }
});
