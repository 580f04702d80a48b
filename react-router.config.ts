import type { Config } from "@react-router/dev/config";

export default {
  appDirectory: "app",
  ssr: true,
  // One file for each of the server's programs; vite.config.ts lists them.
  serverBuildFile: "[name].js",
  future: { v8_middleware: true },
} satisfies Config;
