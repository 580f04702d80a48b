import type { Page } from "playwright-core";
import { beforeAll, describe, expect, test } from "vitest";
import { useDatabase as makeApplicationUse } from "#app/db/database.server.ts";
import type { Acting } from "#app/people/person.ts";
import { sendToReview } from "#app/review/revise.server.ts";
import { enterAs, expectAccessible, useBrowser } from "#tests/support/browser.ts";
import { ANY_SOURCE, expanded, type ValueRow } from "#tests/support/editions.ts";
import { makePerson } from "#tests/support/people.ts";
import { acceptAll, propose, publishWaiting } from "#tests/support/revisions.ts";
import { useServer } from "#tests/support/server.ts";

/*
 * The reviewer's desk by keyboard: what has the focus, what is said, and what happens when something is refused. Values:
 * CODATA Key Values for Thermodynamics (1989), with two digits of one exchanged.
 */

let reviewer: Acting;
let campaign = 0;
let long = 0;

const codata = (key: string, property: ValueRow["property"], text: string): ValueRow => ({
  key,
  property,
  digits: text,
  uncertainty: expanded("0.35"),
});

const server = useServer({
  prepare: async (database) => {
    makeApplicationUse(database.app);
    const steward = await makePerson("Ines Halvard", "steward");
    reviewer = await makePerson("Ruth Amsel", "reviewer");
    const first = await propose(steward, {
      sources: [{ id: ANY_SOURCE, title: "Calder Point Laboratory, in-house notes (invented)" }],
      species: ["H2(g)", "N2(g)", "NH3(g)"].map((key) => ({ key })),
      values: [
        codata("H2(g)", "entropy", "130.680"),
        codata("N2(g)", "entropy", "191.609"),
        codata("NH3(g)", "entropy", "192.77"),
        codata("NH3(g)", "enthalpyOfFormation", "-45.94"),
        codata("NH3(g)", "gibbsEnergyOfFormation", "-16.41"),
      ],
    });
    await acceptAll(steward, reviewer, first);
    await publishWaiting(reviewer);
    const values = [
      codata("NH3(g)", "enthalpyOfFormation", "-49.54"),
      codata("N2(g)", "heatCapacity", "29.124"),
      codata("H2(g)", "heatCapacity", "28.836"),
    ];
    campaign = await propose(steward, { values }, "Ammonia and two gases");
    await sendToReview(steward, campaign, "");
    long = await propose(steward, {
      species: Array.from({ length: 230 }, (_, index) => ({ key: `C${index + 1}H${2 * index + 4}(g)` })),
    });
    await sendToReview(steward, long, "");
  },
});
const browser = useBrowser();

beforeAll(() => makeApplicationUse(server.database.app));

let window: Page | undefined;

/** Opens an address as the reviewer, in one window for all tests. */
async function open(path: string): Promise<Page> {
  if (!window) {
    window = await browser.newWindow(server.url);
    await enterAs(window, server.url, reviewer);
  }
  await window.goto(path);
  await window.waitForLoadState("networkidle");
  return window;
}

/** What has the focus, in the words a person would hear: the row's species, or the label of a field. */
const focused = (page: Page): Promise<string> =>
  page.evaluate(() => {
    const active = document.activeElement;
    if (active instanceof HTMLTextAreaElement || active instanceof HTMLInputElement) {
      return active.labels?.[0]?.textContent ?? "";
    }
    return active?.querySelector("th .species")?.getAttribute("data-plain") ?? active?.tagName ?? "";
  });

describe("the reviewer's keys", () => {
  test("go from line to line, decide, and never lose the focus", async () => {
    const page = await open(`/revisions/${campaign}`);
    await expectAccessible(page);
    await page.keyboard.press("j");
    expect(await focused(page)).toBe("NH3(g)");

    // A line that blocks is refused where it stands, in words that are announced.
    await page.keyboard.press("a");
    await expect.poll(() => page.getByRole("alert").textContent()).toContain("would not pass");
    expect(await focused(page)).toBe("NH3(g)");
    await expectAccessible(page);

    await page.keyboard.press("j");
    expect(await focused(page)).toBe("N2(g)");
    await page.keyboard.press("a");
    await expect.poll(() => page.getByRole("status").allTextContents()).toContain("Line accepted.");
    // On to the next line without a decision.
    await expect.poll(() => focused(page)).toBe("H2(g)");
    await page.keyboard.press("k");
    expect(await focused(page)).toBe("N2(g)");
    await page.keyboard.press("j");

    await page.keyboard.press("d");
    await expect.poll(() => focused(page)).toBe("Why it is declined");
    // In a field the keys are letters.
    await page.keyboard.type("jak");
    expect(await page.getByLabel("Why it is declined").inputValue()).toBe("jak");
    await page.keyboard.press("Tab");
    await page.keyboard.press("Enter");
    await expect.poll(() => page.getByRole("status").allTextContents()).toContain("Line declined.");
    // Only the line that blocks is left.
    await expect.poll(() => focused(page)).toBe("NH3(g)");
  });

  test("can be switched off, and stay off", async () => {
    const page = await open(`/revisions/${campaign}`);
    await page.getByRole("button", { name: "keys off" }).click();
    await page.keyboard.press("j");
    expect(await focused(page)).not.toBe("NH3(g)");
    await page.reload();
    await page.getByRole("button", { name: "keys on" }).click();
    await page.keyboard.press("j");
    expect(await focused(page)).toBe("NH3(g)");
  });
});

test("a suggestion becomes the remark with which the revision is returned", async () => {
  const page = await open(`/revisions/${campaign}`);
  await page.getByRole("link", { name: "return with this repair" }).first().click();
  await expect.poll(() => focused(page)).toBe("What should be mended");
  expect(await page.getByLabel("What should be mended").inputValue()).toContain("−45.94");
  await expectAccessible(page);
});

test("setting the finding aside lets the line be accepted, and then the review be closed", async () => {
  const page = await open(`/revisions/${campaign}`);
  await page.getByRole("link", { name: "Set the finding aside, with a reason" }).click();
  await page.getByRole("button", { name: "Set the finding aside" }).click();
  await expect.poll(() => page.getByRole("alert").textContent()).toContain("Say why the finding is set aside.");
  await page.getByLabel("Why the finding does not hold here").fill("Measured twice; the other values follow.");
  await page.getByRole("button", { name: "Set the finding aside" }).click();
  await expect.poll(() => page.getByRole("status").allTextContents()).toContain("Finding set aside.");
  await page.getByRole("button", { name: "Accept line: NH3(g) ΔfH°" }).first().click();
  await page.getByRole("button", { name: "Close the review: 2 accepted, 1 declined" }).click();
  await expect.poll(() => page.getByText("reviewed it and closed the review").isVisible()).toBe(true);
  await expectAccessible(page);
});

test("the next edition is shown once more before it is published", async () => {
  const page = await open("/publish");
  await expectAccessible(page);
  await page.getByRole("button", { name: "Publish edition 2…" }).click();
  await expect.poll(() => page.getByRole("alert").textContent()).toContain("Say what this edition brings.");
  await page.getByLabel("Notes").fill("Heat capacity of nitrogen; ammonia as measured.");
  await page.getByRole("button", { name: "Publish edition 2…" }).click();
  await expect.poll(() => page.getByRole("heading", { level: 1 }).textContent()).toBe("Publish edition 2?");
  await expectAccessible(page);
  await page.getByRole("button", { name: "Change what I wrote" }).click();
  await expect.poll(() => page.getByLabel("Notes").inputValue()).toContain("Heat capacity of nitrogen");
});

test("hundreds of clean lines are accepted together, whatever page of them is shown", async () => {
  const page = await open(`/revisions/${long}`);
  expect(await page.getByText("Lines 1 to 200 of 230").isVisible()).toBe(true);
  await page.getByRole("link", { name: "lines after" }).click();
  await page.waitForURL(/page=2/);
  await expect.poll(() => page.locator("tr[data-row]").count()).toBe(30);
  await page.getByRole("button", { name: "Accept the 230 clean lines" }).click();
  await expect.poll(() => page.getByRole("status").allTextContents()).toContain("230 clean lines accepted.");
  await page.getByRole("button", { name: "Close the review: 230 accepted, 0 declined" }).waitFor();
});

test.each([
  [320, "light"],
  [390, "dark"],
] as const)("nothing lies beyond the edge at %i px, in %s", { timeout: 60_000 }, async (width, colorScheme) => {
  for (const path of ["/revisions", `/revisions/${campaign}`, `/revisions/${long}?page=2`, "/publish"]) {
    const page = await open(path);
    await page.setViewportSize({ width, height: 800 });
    await page.emulateMedia({ colorScheme });
    // Long pages take the checker a while; the second page of the long revision has every kind of row but fewer of them.
    expect(await page.evaluate(() => document.documentElement.scrollWidth), path).toBeLessThanOrEqual(width);
    await expectAccessible(page);
  }
});
