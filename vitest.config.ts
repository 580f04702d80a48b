import { defineConfig } from "vitest/config";

const common = {
  environment: "node" as const,
  env: { NODE_ENV: "test", LOG_LEVEL: "silent" },
  restoreMocks: true,
  // Long enough for a machine that is busy with something else: no test is about time.
  testTimeout: 30_000,
};

/**
 * Two projects: the pure files need nothing, so they run at once and without a database; everything else shares one
 * PostgreSQL cluster that globalSetup makes and removes.
 */
export default defineConfig({
  test: {
    reporters: ["default"],
    // A browser or server test mostly waits for another process, so two files at once keep two cores busy.
    maxWorkers: 2,
    projects: [
      {
        test: {
          ...common,
          name: "pure",
          include: [
            "app/**/*.test.ts",
            "app/**/*.test.tsx",
            "server/**/*.test.ts",
            "tests/published/**/*.test.ts",
            "tests/conventions/**/*.test.ts",
          ],
        },
      },
      {
        test: {
          ...common,
          name: "served",
          include: ["tests/{database,routes,api,browser}/**/*.test.ts"],
          globalSetup: ["tests/support/globalSetup.ts"],
          hookTimeout: 60_000,
        },
      },
    ],
  },
});
