// npm run dev: the demo from its sources, reloaded as they change; the worker runs in the same process.
import { createServer as createViteServer } from "vite";
import { announce, claim, release } from "./claim.mjs";
import { freePort } from "./cluster.mjs";
import { ensureDemo, migrate } from "./database.mjs";
import { openEnvironment, publicUrlOf } from "./environment.mjs";
import { startInbox } from "./inbox.mjs";
import { stopRequest } from "./processes.mjs";
import { main, root, say } from "./terminal.mjs";

await main(async () => {
  const stopping = stopRequest();
  if (!claim()) return;
  const undo = [release];
  try {
    const { demo, env, superUrl, ownerUrl, appUrl, close } = await openEnvironment();
    undo.push(close);
    if (ownerUrl) await migrate(ownerUrl);
    if (demo) await ensureDemo({ superUrl, ownerUrl, appUrl }, env);
    if (demo && !env.SMTP_URL) {
      const inbox = await startInbox(env.TABLEWRIGHT_MAIL_FOLDER);
      undo.push(inbox.close);
      env.SMTP_URL = inbox.url;
    }
    Object.assign(process.env, env, { NODE_ENV: "development", PUBLIC_URL: await publicUrlOf(env) });

    const ours = process.listeners("SIGTERM");
    const vite = await createViteServer({
      root,
      appType: "custom",
      // Hot reload speaks over a web socket on a port of its own, so that two clones do not meet.
      server: { middlewareMode: true, hmr: { port: await freePort() } },
    });
    undo.push(() => vite.close());
    // The framework's plug-in starts a server inside that would end this process before the database is stopped.
    for (const other of process.listeners("SIGTERM")) if (!ours.includes(other)) process.off("SIGTERM", other);
    const { config } = await vite.ssrLoadModule("/app/config.server.ts");
    const { serve } = await vite.ssrLoadModule("/server/serve.ts");
    const { openPool } = await vite.ssrLoadModule("/app/db/connection.server.ts");
    const { startRunner } = await vite.ssrLoadModule("/app/jobs/runner.server.ts");

    const serving = await serve((request, response) => {
      vite.middlewares(request, response, async () => {
        try {
          const { app } = await vite.ssrLoadModule("/server/app.ts");
          app(request, response);
        } catch (error) {
          vite.ssrFixStacktrace(error);
          console.error(error);
          response.statusCode = 500;
          response.end(String(error.stack));
        }
      });
    }, config());
    undo.push(() => serving.close());
    const pool = openPool(config().databaseUrl, { name: "tablewright worker" });
    undo.push(() => pool.end());
    const runner = await startRunner(pool);
    undo.push(() => runner.stop());

    announce(process.env.PUBLIC_URL);
    say(`Tablewright runs from its sources at ${process.env.PUBLIC_URL}; Ctrl-C stops it.`);
    await stopping;
  } finally {
    for (const step of undo.reverse()) await step();
  }
  // The database pools of reloaded modules would keep the process waiting.
  process.exit();
});
