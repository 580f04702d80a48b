import { existsSync, readdirSync } from "node:fs";
import path from "node:path";
import { reactRouter } from "@react-router/dev/vite";
import tailwindcss from "@tailwindcss/vite";
import { defineConfig } from "vite";

/** The programs that are built for the server: the two processes, and one for each file in server/commands. */
function serverPrograms(): Record<string, string> {
  const folder = "server/commands";
  const commands = existsSync(folder) ? readdirSync(folder).filter((file) => file.endsWith(".ts")) : [];
  return {
    web: "./server/web.ts",
    worker: "./server/worker.ts",
    ...Object.fromEntries(commands.map((file) => [path.basename(file, ".ts"), `./${folder}/${file}`])),
  };
}

export default defineConfig(({ isSsrBuild }) => ({
  plugins: [tailwindcss(), reactRouter()],
  // Named, so that the first page under `npm run dev` does not find them late and reload.
  optimizeDeps: { include: ["@conform-to/react", "@conform-to/zod/v4", "@tanstack/react-table", "zod"] },
  build: {
    target: isSsrBuild ? "node20" : "baseline-widely-available",
    chunkSizeWarningLimit: 1_000,
    // Nothing is inlined as a data: address, which the Content-Security-Policy would refuse for fonts.
    assetsInlineLimit: 0,
    ...(isSsrBuild ? { rollupOptions: { input: serverPrograms() } } : {}),
  },
}));
