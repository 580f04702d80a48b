import type { Page } from "playwright-core";
import { beforeAll, expect, test } from "vitest";
import { useDatabase as makeApplicationUse } from "#app/db/database.server.ts";
import { paths } from "#app/paths.ts";
import type { Acting } from "#app/people/person.ts";
import { enterAs, expectAccessible, useBrowser } from "#tests/support/browser.ts";
import { publishThreeEditions } from "#tests/support/editions.ts";
import { makePerson } from "#tests/support/people.ts";
import { acceptAll, publishWaiting } from "#tests/support/revisions.ts";
import { useServer } from "#tests/support/server.ts";

/*
 * Sources in a browser: one is added by hand and stands on its page once it is published; a citation is mended and the
 * older edition keeps its own. The steward works in the window; reviewing and publishing are done by their acts.
 */

let steward: Acting;
let reviewer: Acting;

const server = useServer({
  prepare: async (database) => {
    makeApplicationUse(database.app);
    await publishThreeEditions(database.app);
    steward = await makePerson("Ines Halvard", "steward");
    reviewer = await makePerson("Ruth Amsel", "reviewer");
  },
});
const browser = useBrowser();

beforeAll(() => makeApplicationUse(server.database.app));

async function openAs(acting: Acting, path: string, width = 1440): Promise<Page> {
  const page = await browser.newWindow(server.url);
  await page.setViewportSize({ width, height: 900 });
  await enterAs(page, server.url, acting);
  await page.goto(path);
  await page.waitForLoadState("networkidle");
  return page;
}

/** Only tables scroll sideways, in their own region. */
const overflow = (page: Page): Promise<number> =>
  page.evaluate(() => document.documentElement.scrollWidth - document.documentElement.clientWidth);

/** The number of the revision a window shows. */
async function revisionShown(page: Page): Promise<number> {
  await page.waitForURL(/\/revisions\/\d+$/);
  return Number(new URL(page.url()).pathname.split("/").at(-1));
}

const PAGES = [
  "/editions/3/sources",
  "/editions/2/sources?q=nothing",
  "/editions/3/sources/src_nbstables1982",
  "/sources/new",
  "/sources/src_nbstables1982/mend",
];

test.each([
  ["light", 1440],
  ["dark", 320],
] as const)(
  "every page is accessible in %s colours and no wider than %i pixels",
  async (colorScheme, width) => {
    const page = await openAs(steward, "/editions/3/sources", width);
    await page.emulateMedia({ colorScheme });
    for (const path of PAGES) {
      await page.goto(path);
      await page.waitForLoadState("networkidle");
      await expectAccessible(page);
      expect([path, await overflow(page)]).toEqual([path, 0]);
    }
  },
  120_000,
);

test("a source added by hand is accepted, published and on its page", async () => {
  const page = await openAs(steward, "/editions/3/sources");
  await page.getByRole("link", { name: "Add a source" }).click();
  await page.getByLabel("Kind of work").selectOption("article");
  await page.getByLabel("Authors").fill("Marin, A. B.\nOkafor, C.");
  await page.getByLabel("Title", { exact: true }).fill("Heats of solution (invented)");
  await page.getByLabel("DOI").fill("10.x");
  await page.getByLabel("How the values came about").selectOption("measurement");
  browser.expectConsoleError("422");
  await page.getByRole("button", { name: "Propose the source" }).click();

  // What is wrong takes the focus, leads to its field, and nothing is lost.
  const summary = page.getByRole("alert");
  await summary.getByText("A DOI begins with 10.").waitFor();
  expect(await summary.evaluate((element) => element === document.activeElement)).toBe(true);
  await expectAccessible(page);
  await summary.getByRole("link", { name: "Journal, series or book it stands in" }).click();
  await page.keyboard.type("Journal of Bench Calorimetry");
  expect(await page.getByLabel("Title", { exact: true }).inputValue()).toBe("Heats of solution (invented)");

  // A DOI that is known is shown with its source.
  await page.getByLabel("DOI").fill("https://doi.org/10.1063/1.555845");
  browser.expectConsoleError("409");
  await page.getByRole("button", { name: "Propose the source" }).click();
  const known = page.getByRole("group", { name: "Known already?" });
  await known.getByText("A source with this DOI is there already").waitFor();
  expect(await known.evaluate((element) => element === document.activeElement)).toBe(true);
  await expectAccessible(page);

  await page.getByLabel("DOI").fill("10.5555/jbc.2019.101");
  await page.getByRole("button", { name: "Propose the source" }).click();
  const revision = await revisionShown(page);
  await page.getByText("Heats of solution (invented)").first().waitFor();
  await acceptAll(steward, reviewer, revision);
  await publishWaiting(reviewer);

  await page.goto("/sources");
  await page.waitForURL("**/editions/4/sources");
  await page.getByRole("link", { name: "Marin and Okafor", exact: true }).click();
  await page.waitForURL(/\/editions\/4\/sources\/src_/);
  await page.getByRole("heading", { level: 1, name: "Marin and Okafor" }).waitFor();
  const doi = page.getByRole("link", { name: "doi:10.5555/jbc.2019.101" });
  expect(await doi.getAttribute("href")).toBe("https://doi.org/10.5555/jbc.2019.101");
  await page.getByText("No value of edition 4 leans on it.").waitFor();
  // Older editions do not know it.
  const address = new URL(page.url()).pathname;
  browser.expectConsoleError("404");
  await page.goto(address.replace("/4/", "/3/"));
  await page.getByText("it came in with edition 4").waitFor();
}, 120_000);

test("a mended citation stands from the next edition on, with its notice beside the values; the older one keeps its own", async () => {
  const page = await openAs(steward, "/editions/1/sources/src_nbstables1982");
  const before = await page.locator("main").innerText();
  await page.goto("/sources/src_nbstables1982/mend");
  await page.getByLabel("Title", { exact: true }).fill("The NBS tables, an excerpt");
  await page.getByLabel("Notice").fill("Its ammonia value was retracted.");
  await page.getByRole("button", { name: "Show the change" }).click();
  await page.getByRole("group", { name: "The change" }).getByText("excerpt").waitFor();
  await expectAccessible(page);
  // What was typed is still there.
  expect(await page.getByLabel("Notice").inputValue()).toBe("Its ammonia value was retracted.");
  await page.getByLabel("Reason").fill("Only an excerpt was read.");
  await page.getByRole("button", { name: "Propose the change" }).click();
  const revision = await revisionShown(page);
  await acceptAll(steward, reviewer, revision);
  const { number } = await publishWaiting(reviewer);

  await page.goto(`/editions/${number}/sources/src_nbstables1982`);
  await page.getByText("The NBS tables, an excerpt").first().waitFor();
  await page.getByRole("note").getByText("Its ammonia value was retracted.").waitFor();
  await expectAccessible(page);
  // The notice stands beside the values that lean on the source.
  await page.goto(paths.species(number, "H2O(l)"));
  await page.getByRole("table", { name: "Values of H2O(l)" }).getByText("Its ammonia value was retracted.").waitFor();
  await expectAccessible(page);
  await page.goto(paths.table(number));
  expect(await page.getByRole("row", { name: /^H2O\(l\)/ }).count()).toBeGreaterThan(0);
  await page.getByRole("table").getByText("notice").first().waitFor();
  await expectAccessible(page);

  await page.goto("/editions/1/sources/src_nbstables1982");
  expect(await page.locator("main").innerText()).toBe(before);
}, 120_000);

test("a page of a source is fit for print: its reference, values and history, without buttons", async () => {
  const page = await openAs(steward, "/editions/1/sources/src_nbstables1982");
  await page.emulateMedia({ media: "print" });
  expect(await page.getByRole("link", { name: "Mend the citation" }).isVisible()).toBe(false);
  expect(await page.getByRole("navigation", { name: "Values by property" }).isVisible()).toBe(false);
  expect(await page.getByRole("table", { name: /^Values of edition 1/ }).isVisible()).toBe(true);
  expect(await page.getByText("Edition 1, published").isVisible()).toBe(true);
});
