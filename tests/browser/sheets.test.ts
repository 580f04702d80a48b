import path from "node:path";
import type { Page } from "playwright-core";
import { expect, test } from "vitest";
import { useDatabase as makeApplicationUse } from "#app/db/database.server.ts";
import { expectAccessible, useBrowser } from "#tests/support/browser.ts";
import { makePerson, PASSWORD } from "#tests/support/people.ts";
import { acceptAll, publishWaiting } from "#tests/support/revisions.ts";
import { useServer } from "#tests/support/server.ts";
import { fixture, revisionFromSheet } from "#tests/support/sheets.ts";

/*
 * A messy sheet on its way to a revision, as the steward sees it: the plan with what is missing in it, rows mended in
 * place without losing the place, and what was given up. The whole main job has a test of its own.
 */

const server = useServer({
  worker: true,
  prepare: async ({ app }) => {
    makeApplicationUse(app);
    const steward = await makePerson("S. Steward", "steward");
    const reviewer = await makePerson("R. Reviewer", "reviewer");
    const built = await revisionFromSheet(steward, { name: "codata.csv", bytes: fixture("codata-key-values.csv") });
    await acceptAll(steward, reviewer, built.revisionId);
    await publishWaiting(reviewer);
  },
});
const browser = useBrowser();

async function steward(): Promise<Page> {
  const page = await browser.newWindow(server.url);
  await page.goto("/sign-in?to=/sheets");
  await page.getByLabel("E-mail address").fill("s.steward@calderpoint.example");
  await page.getByLabel("Password").fill(PASSWORD);
  await page.getByRole("button", { name: "Sign in" }).click();
  await page.getByRole("heading", { name: "Sheets", exact: true }).waitFor();
  return page;
}

const rowGone = (page: Page, number: number) =>
  expect.poll(() => page.locator(`#row-${number}`).count(), { timeout: 10_000 }).toBe(0);

test("a messy sheet is mended in place and becomes a revision", { timeout: 90_000 }, async () => {
  const page = await steward();
  await page.setInputFiles("#sheet", path.join("fixtures", "calder-point-messy.csv"));
  await page.getByRole("button", { name: "Send the sheet" }).click();
  await page.getByRole("heading", { name: "Read the columns, then the rows" }).waitFor();
  await expectAccessible(page);

  // What is missing is told at once, with a link to each place, and takes the focus.
  await page.getByRole("button", { name: "Read the rows" }).click();
  const summary = page.getByRole("alert");
  // Temperature and pressure stand in the sheet's own title and are filled in.
  await summary.getByText("2 things to put right").waitFor();
  expect(await summary.evaluate((element) => element === document.activeElement)).toBe(true);
  await summary.getByRole("link", { name: "Kind of the uncertainties" }).click();
  expect(await page.evaluate(() => document.activeElement?.id)).toBe("uncertaintyKind");
  await expectAccessible(page);

  expect(await page.getByLabel("Temperature of the values").inputValue()).toBe("298.15");
  expect(await page.getByLabel("Standard pressure").inputValue()).toBe("100000");
  await page.getByLabel("Kind of the uncertainties").selectOption("expanded");
  await page.getByRole("combobox", { name: "Source", exact: true }).selectOption("new");
  await page.getByLabel("Title").fill("Solution calorimetry (invented)");
  await page.getByLabel("How the values came about").selectOption("measurement");
  await page.getByRole("button", { name: "Read the rows" }).click();
  await page.getByRole("heading", { name: "Mend what is wrong, then build the revision" }).waitFor();
  await expectAccessible(page);

  // One press takes a reading; the focus goes on to the next wrong cell.
  await page
    .getByRole("button", { name: /^Take SO4/ })
    .first()
    .click();
  await rowGone(page, 18);
  const cell = page.getByLabel("Row 14, S (J/mol K)", { exact: true });
  await cell.fill("no number");
  await cell.press("Enter");
  await page.getByText("“no number” is not a number.").waitFor();
  await cell.fill("41.5");
  await cell.press("Enter");
  await rowGone(page, 14);
  await expect.poll(() => page.evaluate(() => document.activeElement?.getAttribute("aria-label"))).toBe("Row 8, CAS");

  // Leaving one of two rows out settles the other.
  await page.getByRole("button", { name: "Leave row 21 out" }).click();
  await rowGone(page, 10);
  await page.getByRole("button", { name: /^Leave the 3 refused rows out/ }).click();
  await page.getByRole("heading", { name: "Every row is settled" }).waitFor();
  expect(await page.locator("#row-21").innerText()).toContain("left out");
  await expectAccessible(page);

  await page.getByRole("button", { name: /^Build the revision from \d+ rows/ }).click();
  await page.waitForURL(/\/revisions\/\d+$/);
  // Joules for kilojoules, which only the table could tell.
  await page.getByText("is 1/1000 of what stands").waitFor();
});

test("an encoding that was guessed is shown by its signs, and another can be tried", async () => {
  const page = await steward();
  await page.setInputFiles("#sheet", path.join("fixtures", "sheets", "windows-1252.csv"));
  await page.getByRole("button", { name: "Send the sheet" }).click();
  await page.getByText("Read as Windows-1252: row 1 is not valid UTF-8").waitFor();
  await expectAccessible(page);
  await page.getByLabel("Encoding").selectOption("UTF-8");
  await page.getByRole("button", { name: "Read the bytes again" }).click();
  await page.getByRole("alert").getByText("Row 1 is not valid UTF-8").waitFor();
  expect(await page.getByText("Read as Windows-1252").count()).toBe(1);
});

test("each key of a column gets its source, and its rows say so", { timeout: 60_000 }, async () => {
  const page = await steward();
  await page.setInputFiles("#sheet", path.join("fixtures", "sheets", "source-keys.csv"));
  await page.getByRole("button", { name: "Send the sheet" }).click();
  await page.getByLabel("Source of notebook 14").waitFor();
  await expectAccessible(page);
  await page.getByLabel("Temperature of the values").selectOption("298.15");
  await page.getByLabel("Standard pressure").selectOption("100000");
  await page.getByLabel("Kind of the uncertainties").selectOption("expanded");
  for (const key of ["CODATA", "Cox1989"]) {
    await page.getByLabel(`Source of ${key}`).selectOption({ label: "Calder Point Laboratory, 2026" });
  }
  await page.getByLabel("Source of notebook 14").selectOption("new");
  await page.getByRole("button", { name: "Read the rows" }).click();
  // What is missing of the new source is told at its own fields.
  await page.getByRole("alert").getByText("2 things to put right").waitFor();
  await expectAccessible(page);
  const described = page.getByRole("group", { name: "notebook 14 as a new source" });
  await described.getByLabel("Title", { exact: true }).fill("Notebook 14");
  await described.getByLabel("How the values came about").selectOption("measurement");
  await page.getByRole("button", { name: "Read the rows" }).click();
  await page.getByText("7 rows = 5 read + 2 refused + 0 skipped").waitFor();
  await page.getByText("No source was chosen for the key “notebook 3”.").waitFor();
  await expectAccessible(page);
});

test("a file that is no sheet is refused on the form", async () => {
  const page = await steward();
  await page.setInputFiles("#sheet", {
    name: "values.csv",
    mimeType: "text/csv",
    buffer: Buffer.from([0x50, 0x4b, 3, 4, 0]),
  });
  await page.getByRole("button", { name: "Send the sheet" }).click();
  await page.getByRole("alert").getByText("zip archive").waitFor();
  await expectAccessible(page);
});
