import type { Page } from "playwright-core";
import { expect, test } from "vitest";
import { useDatabase as makeApplicationUse } from "#app/db/database.server.ts";
import { DEMO_PASSWORD, demoPeople } from "#app/people/demoPeople.ts";
import { expectAccessible, useBrowser } from "#tests/support/browser.ts";
import { makePerson, PASSWORD } from "#tests/support/people.ts";
import { randomFrom, seedOfRun } from "#tests/support/random.ts";
import { useServer } from "#tests/support/server.ts";
import { makeSheet } from "#tests/support/sheetMaker.ts";
import { seed as seedDemo } from "../../db/seeds/20261201_calder_point.ts";

/*
 * The whole job, through the pages, as its people and the program do it: a steward brings a sheet, mends a cell, sends
 * it; may not decide it; a reviewer decides and publishes; a program reads the new value pinned to the new edition and
 * the old one pinned to the old; an analyst compares the two. The sheet is made from a printed seed: another one each
 * run (TEST_SEED repeats a run).
 */

const seed = seedOfRun();
const sheet = makeSheet(randomFrom(seed));
process.stdout.write(`main job, seed ${seed}: ${sheet.told}\n`);

const bothHats = { name: "Vera Holt", email: "vera.holt@calderpoint.example" };

const server = useServer({
  worker: true,
  prepare: async (database) => {
    makeApplicationUse(database.app);
    await seedDemo(database.app);
    await makePerson(bothHats.name, "steward", "reviewer");
  },
});
const browser = useBrowser();

async function signIn(email: string, password: string): Promise<Page> {
  const page = await browser.newWindow(server.url);
  await page.goto("/sign-in");
  await expectAccessible(page);
  await page.getByLabel("E-mail address").fill(email);
  await page.getByLabel("Password").fill(password);
  await page.getByRole("main").getByRole("button", { name: "Sign in" }).click();
  await page.waitForURL((url) => url.pathname !== "/sign-in");
  return page;
}

/** Opens an address and holds the page against axe. */
async function open(page: Page, address: string): Promise<void> {
  await page.goto(address);
  await expectAccessible(page);
}

async function confirmPlan(page: Page): Promise<void> {
  await page.getByLabel("Temperature of the values").selectOption("298.15");
  await page.getByLabel("Standard pressure").selectOption("100000");
  const kind = page.getByLabel("Kind of the uncertainties");
  if (await kind.isVisible()) await kind.selectOption("expanded");
  await page.getByLabel("Source", { exact: true }).selectOption("new");
  await page.getByLabel("Title", { exact: true }).fill("Solution calorimeter, notebook 7");
  await page.getByLabel("Publisher or laboratory (may stay empty)").fill("Calder Point Laboratory");
  await page.getByLabel("How the values came about").selectOption("measurement");
  await page.getByLabel("Remark on the source (may stay empty)").fill("Invented numbers.");
  await page.getByRole("button", { name: "Read the rows" }).click();
}

test(
  "a sheet becomes an edition that a program reads, and the old edition stays what it was",
  { timeout: 240_000 },
  async () => {
    // The steward who also holds the reviewer's role brings the sheet.
    const steward = await signIn(bothHats.email, PASSWORD);
    await expectAccessible(steward);
    await open(steward, "/sheets");
    await open(steward, "/sheets/new");
    await steward
      .getByLabel("Sheet", { exact: true })
      .setInputFiles({ name: sheet.name, mimeType: "text/csv", buffer: sheet.bytes });
    await steward.getByRole("main").getByRole("button", { name: "Send the sheet" }).click();
    await steward.waitForURL(/\/sheets\/\d+$/);
    await expectAccessible(steward);
    const sheetAddress = new URL(steward.url()).pathname;
    await confirmPlan(steward);

    // The worker reads it; one cell cannot be read, and is mended where it stands.
    const { unreadable, slip, clean } = sheet;
    const wrong = steward.getByRole("textbox", { name: `Row ${unreadable.row}, ${unreadable.head}` });
    await wrong.waitFor({ timeout: 30_000 });
    await expectAccessible(steward);
    expect(await wrong.inputValue()).toBe(unreadable.text);
    await wrong.fill(unreadable.meant);
    await wrong.press("Enter");
    await wrong.waitFor({ state: "detached" });

    // The original is still what was sent, byte for byte.
    const original = await steward.request.get(`${sheetAddress}/original`);
    expect(Buffer.compare(await original.body(), sheet.bytes)).toBe(0);

    await steward.getByLabel("Title", { exact: true }).fill("Solution calorimetry");
    await steward.getByRole("button", { name: /^Build the revision/ }).click();
    await steward.waitForURL(/\/revisions\/\d+$/);
    await expectAccessible(steward);
    const revisionAddress = new URL(steward.url()).pathname;
    await steward.getByText("Send to review").first().click();
    await steward.getByLabel("Remark for the reviewers").fill("Seven species from notebook 7.");
    await steward.getByRole("button", { name: "Send to review" }).last().click();
    await steward.getByText("your own hand").first().waitFor();
    await expectAccessible(steward);

    // Deciding the own revision is refused, on the page and behind it.
    expect(await steward.getByRole("button", { name: /^Accept/ }).count()).toBe(0);
    const line = await server.database.app
      .selectFrom("line_version as v")
      .innerJoin("revision_line as l", "l.id", "v.line_id")
      .select(["l.id", "v.id as versionId"])
      .where("l.revision_id", "=", Number(revisionAddress.split("/").at(-1)))
      .executeTakeFirstOrThrow();
    const own = await steward.request.post(revisionAddress, {
      form: { intent: "accept", seen: `${line.id}:${line.versionId}` },
      headers: { origin: server.url },
    });
    expect(own.status()).toBe(403);
    expect(await own.text()).toContain("had a hand in this line");

    // The reviewer is written to, and decides: the slip is declined with the reason, the rest is accepted.
    const letter = await server.letterTo(demoPeople.reviewer.email);
    expect(letter.subject).toContain("waits for review");
    const reviewer = await signIn(demoPeople.reviewer.email, DEMO_PASSWORD);
    await open(reviewer, "/revisions");
    await open(reviewer, revisionAddress);
    await decide(reviewer, slip.key);
    await expectAccessible(reviewer);
    await reviewer.getByRole("button", { name: /^Close the review/ }).click();
    await reviewer
      .getByText(/Review closed: /)
      .first()
      .waitFor();

    // Published: first what will change, then the confirmation.
    await open(reviewer, "/publish");
    await reviewer.getByLabel("Notes").fill("Solution calorimetry, notebook 7.");
    await reviewer
      .getByRole("button", { name: /publish/i })
      .last()
      .click();
    await reviewer.getByRole("heading", { name: "Publish edition 3?" }).waitFor();
    await expectAccessible(reviewer);
    await reviewer.getByRole("button", { name: "Publish edition 3" }).click();
    await reviewer.waitForURL(/\/editions\/3$/);
    await expectAccessible(reviewer);

    // An analyst makes a key, and the program reads: the new value in the new edition, the old one in the old.
    const analyst = await signIn(demoPeople.analyst.email, DEMO_PASSWORD);
    await open(analyst, "/account/keys");
    await analyst.getByLabel("Program").fill("titration bench");
    await analyst.getByRole("button", { name: "Make the key" }).click();
    const key = await analyst.getByText(/^twk_[a-z0-9]{12}_\S{20,}$/).innerText();
    await expectAccessible(analyst);
    const ask = async (address: string) => {
      const answer = await server.fetch(`/api/v1/${address}`, { headers: { authorization: `Bearer ${key}` } });
      expect(answer.status).toBe(200);
      return (await answer.json()) as { edition: number; values: { property: string; digits: string }[] };
    };
    const enthalpyIn = async (edition: number, speciesKey: string) =>
      (await ask(`editions/${edition}/species/${encodeURIComponent(speciesKey)}`)).values.find(
        (value) => value.property === "enthalpyOfFormation",
      )?.digits;
    const before = new Map<string, string | undefined>();
    for (const one of [...clean, unreadable, slip]) before.set(one.key, await enthalpyIn(2, one.key));
    for (const one of [...clean, unreadable]) {
      expect([one.key, await enthalpyIn(3, one.key)]).toEqual([one.key, one.enthalpy]);
      expect(before.get(one.key)).not.toBe(one.enthalpy);
    }
    expect(await enthalpyIn(3, slip.key)).toBe(before.get(slip.key));

    // The comparison tells of the accepted values and of nothing else.
    await open(analyst, "/editions/2/compare/3");
    const compared = await analyst.getByRole("main").innerText();
    for (const one of [...clean, unreadable]) expect(compared).toContain(one.enthalpy.replace("-", "−"));
    expect(compared).not.toContain(slip.enthalpy.replace("-", "−"));
    await open(analyst, "/editions/3/table");
    await open(analyst, `/editions/3/species/${encodeURIComponent(clean[0]?.key ?? "")}`);
    await open(analyst, "/editions/2/table");
    await open(analyst, "/");
    expect(await analyst.getByRole("main").innerText()).not.toBe("");
  },
);

/** Declines the line with the slip, accepts the clean lines together and every other line by itself. */
async function decide(page: Page, slipKey: string): Promise<void> {
  await page.getByRole("link", { name: `Decline line: ${slipKey} ΔfH°` }).click();
  await page.getByLabel("Why it is declined").fill("Two digits look exchanged; please read the notebook again.");
  await page.getByRole("button", { name: "Decline line" }).click();
  await page.getByText("Line declined.").waitFor();
  const together = page.getByRole("button", { name: /^Accept the (clean line|\d+ clean lines)$/ });
  if ((await together.count()) > 0) {
    await together.click();
    await page.getByText(/clean lines accepted|clean line is accepted/).waitFor();
  }
  // Each open line by its own name, from the page as it now stands: the list shortens while the lines are decided.
  await page.reload();
  const names = await page
    .getByRole("button", { name: /^Accept line: / })
    .evaluateAll((buttons) => buttons.map((button) => button.getAttribute("aria-label") ?? ""));
  for (const name of names) {
    const accept = page.getByRole("button", { name, exact: true });
    await accept.click();
    await accept.waitFor({ state: "detached" });
  }
}
