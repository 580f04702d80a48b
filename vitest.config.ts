import { defineConfig } from "vitest/config";
import { BaseSequencer, type TestSpecification } from "vitest/node";

/** Browser tests first: they take longest, and one that began last would leave the other workers idle. */
class LongestFirst extends BaseSequencer {
  override async sort(files: TestSpecification[]): Promise<TestSpecification[]> {
    const rank = ({ moduleId }: TestSpecification): number =>
      moduleId.includes("everyPage") ? 0 : moduleId.includes("/tests/browser/") ? 1 : 2;
    return (await super.sort(files)).sort((a, b) => rank(a) - rank(b));
  }
}

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
    // A browser or server test waits for other processes half of the time, so two files at once keep two cores busy.
    maxWorkers: 2,
    sequence: { sequencer: LongestFirst },
    projects: [
      {
        test: {
          ...common,
          name: "pure",
          // Pure files keep no state, so they need no world of their own: half the time.
          isolate: false,
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
          hookTimeout: 120_000,
          expect: { poll: { timeout: 15_000 } },
        },
      },
    ],
  },
});
