import { config } from "#app/config.server.ts";
import { app } from "./app.ts";
import { runProcess } from "./process.ts";
import { serve } from "./serve.ts";

await runProcess(async () => {
  const serving = await serve(app, config());
  return { stop: () => serving.close() };
});
