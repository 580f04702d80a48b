import type { BrowserContextOptions, Page } from "playwright-core";
import { describe, expect, test } from "vitest";
import { useDatabase as makeApplicationUse } from "#app/db/database.server.ts";
import type { Acting, Role } from "#app/people/person.ts";
import { returnRevision } from "#app/review/decide.server.ts";
import { sendToReview } from "#app/review/revise.server.ts";
import { enterAs, expectAccessible, useBrowser } from "#tests/support/browser.ts";
import { publishThreeEditions } from "#tests/support/editions.ts";
import { makePerson } from "#tests/support/people.ts";
import { acceptAll, propose } from "#tests/support/revisions.ts";
import { useServer } from "#tests/support/server.ts";

/*
 * The pages people begin at, in windows of several kinds: axe is silent, nothing is wider than the window, and the find
 * box works before and after scripts arrive.
 */

const people = new Map<Role, Acting>();
const server = useServer({
  prepare: async (database) => {
    await publishThreeEditions(database.app);
    makeApplicationUse(database.app);
    for (const role of ["analyst", "steward", "reviewer", "administrator"] as const) {
      people.set(role, await makePerson(`The ${role}`, role));
    }
    const steward = people.get("steward")!;
    const reviewer = people.get("reviewer")!;
    const entropy = (key: string, digits: string) => ({
      values: [{ key, property: "entropy" as const, digits, sourceId: "src_codata1989" }],
    });
    await acceptAll(steward, reviewer, await propose(steward, entropy("NH3(g)", "192.80"), "Ammonia"));
    await sendToReview(steward, await propose(steward, entropy("H2O(g)", "188.84"), "Steam tables"), "");
    const returned = await propose(steward, entropy("H2O(l)", "69.96"), "Water, third run");
    await sendToReview(steward, returned, "");
    await returnRevision(reviewer, returned, "The third run is missing its blank.");
  },
});
const browser = useBrowser();

/** A window of this kind in which somebody has signed in. */
async function windowOf(who: Role | null, options: BrowserContextOptions = {}): Promise<Page> {
  const first = await browser.newWindow(server.url);
  const context = await first
    .context()
    .browser()!
    .newContext({ baseURL: server.url, ...options });
  const page = await context.newPage();
  if (who) {
    await enterAs(page, server.url, people.get(who)!);
    await page.goto("/");
  }
  return page;
}

const OPEN = ["/", "/api", "/problems/invalid"];
const FOUND = ["/", "/find", "/find?q=water", "/find?q=H2O(cr)"];

describe("in every window", () => {
  test.each([
    [null, "light", 1440, OPEN],
    [null, "dark", 360, OPEN],
    ["reviewer", "light", 1440, ["/"]],
    ["steward", "dark", 360, ["/"]],
    ["analyst", "dark", 1440, FOUND],
    ["administrator", "light", 360, FOUND],
  ] as const)(
    "for %s, %s, %d px wide: axe finds nothing, and only tables scroll sideways",
    // The guide is long, and axe looks at every word of it.
    { timeout: 120_000 },
    async (who, colorScheme, width, addresses) => {
      const page = await windowOf(who, { colorScheme, viewport: { width, height: 900 } });
      for (const address of addresses) {
        await page.goto(address);
        await expectAccessible(page);
        const wide = await page.evaluate(() => document.documentElement.scrollWidth - window.innerWidth);
        expect(wide, `${address} is wider than the window`).toBeLessThanOrEqual(0);
      }
      await page.context().close();
    },
  );
});

describe("the find box", () => {
  test.each([true, false])("leads to the species that was named, scripts: %s", async (javaScriptEnabled) => {
    const page = await windowOf("analyst", { javaScriptEnabled });
    const box = page.getByRole("combobox", { name: "Find a species, source or revision" });
    await box.fill("SO4 2-(aq)");
    await box.press("Enter");
    await expect.poll(() => page.locator("h1").innerText()).toContain("Find “SO4 2-(aq)”");
    await page.getByLabel("A species, source, revision, edition or sheet").fill("Na+ (aq)");
    await page.locator("main").getByRole("button", { name: "Find" }).click();
    await page.waitForURL("/editions/3/species/Na%2B(aq)");
    await page.context().close();
  });
});
