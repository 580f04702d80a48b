import type { Page } from "playwright-core";
import { beforeAll, describe, expect, test } from "vitest";
import { useDatabase as makeApplicationUse } from "#app/db/database.server.ts";
import type { Acting } from "#app/people/person.ts";
import { enterAs, expectAccessible, useBrowser } from "#tests/support/browser.ts";
import { publishThreeEditions } from "#tests/support/editions.ts";
import { makePerson } from "#tests/support/people.ts";
import { useServer } from "#tests/support/server.ts";

/*
 * The pages of the editions in a browser, at the width of a desk and of a telephone: three editions, the third of which
 * withdraws the second.
 */

let reviewer: Acting;

const server = useServer({
  prepare: async (database) => {
    makeApplicationUse(database.app);
    await publishThreeEditions(database.app);
    reviewer = await makePerson("Ruth Amsel", "reviewer");
  },
});
const browser = useBrowser();

beforeAll(() => makeApplicationUse(server.database.app));

async function openAs(path: string, width: number): Promise<Page> {
  const page = await browser.newWindow(server.url);
  await page.setViewportSize({ width, height: 900 });
  await enterAs(page, server.url, reviewer);
  await page.goto(path);
  await page.waitForLoadState("networkidle");
  return page;
}

/** Only tables scroll sideways, in their own region. */
const overflow = (page: Page): Promise<number> =>
  page.evaluate(() => document.documentElement.scrollWidth - document.documentElement.clientWidth);

describe.each([1440, 320])("at %i pixels", (width) => {
  test("the list and a withdrawn edition with all unfolded are accessible and no wider than the window", async () => {
    const page = await openAs("/editions?from=2&to=2", width);
    await expectAccessible(page);
    expect(await overflow(page)).toBe(0);
    await page.goto("/editions/2");
    await page.waitForLoadState("networkidle");
    for (const summary of await page.locator("main summary").all()) await summary.click();
    await expectAccessible(page);
    expect(await overflow(page)).toBe(0);
  });
});

test("from the list to an edition, to the one that withdrew it, and to its citation", async () => {
  const page = await openAs("/editions", 1440);
  await page.getByRole("link", { name: "Edition 2", exact: true }).first().click();
  await page.waitForURL("**/editions/2");
  await page.getByRole("link", { name: "Read edition 3" }).click();
  await page.waitForURL("**/editions/3");
  await page.getByRole("link", { name: "cite" }).click();
  expect(new URL(page.url()).hash).toBe("#cite");
  expect(await page.getByRole("heading", { name: "Cite this edition" }).isVisible()).toBe(true);
  await page.goBack();
  expect(new URL(page.url()).hash).toBe("");
});
