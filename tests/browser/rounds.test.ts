import type { Page } from "playwright-core";
import { beforeAll, expect, test } from "vitest";
import { useDatabase as makeApplicationUse } from "#app/db/database.server.ts";
import { paths } from "#app/paths.ts";
import type { Acting } from "#app/people/person.ts";
import { commentOn } from "#app/review/comments.server.ts";
import { returnRevision } from "#app/review/decide.server.ts";
import { sendToReview, takeLineOut } from "#app/review/revise.server.ts";
import { findLines } from "#app/review/review.queries.server.ts";
import { enterAs, expectAccessible, useBrowser } from "#tests/support/browser.ts";
import { ANY_SOURCE, expanded, type ValueRow } from "#tests/support/editions.ts";
import { makePerson } from "#tests/support/people.ts";
import { acceptAll, propose, publishWaiting } from "#tests/support/revisions.ts";
import { useServer } from "#tests/support/server.ts";

/*
 * The rounds of a revision in the browser: a half-updated row that is asked about, an answer, a second round, an overtaken
 * line, two drafts made one; each state of the page held against axe. Values: CODATA Key Values for Thermodynamics (1989);
 * what differs by 10 kJ/mol is made up so that ΔfH° alone does not close.
 */

let steward: Acting;
let reviewer: Acting;
let ammonia = 0;
let overtaken = 0;
let draft = 0;
let other = 0;

const codata = (key: string, property: ValueRow["property"], text: string): ValueRow => ({
  key,
  property,
  digits: text,
  uncertainty: expanded("0.35"),
});

const server = useServer({
  prepare: async (database) => {
    makeApplicationUse(database.app);
    steward = await makePerson("Ines Halvard", "steward");
    reviewer = await makePerson("Ruth Amsel", "reviewer");
    const first = await propose(steward, {
      sources: [{ id: ANY_SOURCE, title: "Calder Point Laboratory, in-house notes (invented)" }],
      species: ["H2(g)", "N2(g)", "O2(g)", "NH3(g)"].map((key) => ({ key })),
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
    ammonia = await propose(
      steward,
      {
        values: [
          codata("NH3(g)", "enthalpyOfFormation", "-55.94"),
          codata("NH3(g)", "gibbsEnergyOfFormation", "-26.41"),
          codata("N2(g)", "heatCapacity", "29.124"),
        ],
      },
      "Ammonia, both values",
    );
    await sendToReview(steward, ammonia, "");
    overtaken = await propose(steward, { values: [codata("O2(g)", "heatCapacity", "29.38")] }, "Oxygen, late");
    const early = await propose(steward, { values: [codata("O2(g)", "heatCapacity", "29.36")] }, "Oxygen, early");
    await acceptAll(steward, reviewer, early);
    draft = await propose(steward, { values: [codata("H2(g)", "heatCapacity", "28.836")] }, "Hydrogen");
    other = await propose(
      await makePerson("Tom Breckan", "steward"),
      { values: [codata("H2(g)", "heatCapacity", "28.84"), codata("H2(g)", "enthalpyIncrement", "8.468")] },
      "Hydrogen again",
    );
  },
});
const browser = useBrowser();

/** Forms are examined on the server before they answer. */
const SOON = { timeout: 10_000 };

beforeAll(() => makeApplicationUse(server.database.app));

async function windowOf(acting: Acting): Promise<Page> {
  const page = await browser.newWindow(server.url);
  await enterAs(page, server.url, acting);
  return page;
}

async function open(page: Page, path: string): Promise<void> {
  await page.goto(path);
  await page.waitForLoadState("networkidle");
}

test("half of a set is asked about with its arithmetic, and accepted with a reason", async () => {
  const page = await windowOf(reviewer);
  await open(page, paths.revision(ammonia));
  await page.getByRole("button", { name: "Accept line: NH3(g) ΔfH°" }).first().click();
  const question = page.getByRole("alert");
  await expect.poll(() => question.textContent(), SOON).toContain("Only part of what is proposed for this species");
  expect(await question.textContent()).toContain("Gibbs closure");
  await expectAccessible(page);
  // Without a reason it is asked again, and nothing is accepted.
  await page.getByRole("button", { name: "Accept all the same" }).click();
  await expect.poll(() => question.textContent(), SOON).toContain("Say why what blocks is set aside.");
  await page.getByLabel("Why this may stand all the same").fill("ΔfG° follows with the next sheet.");
  await page.getByRole("button", { name: "Accept all the same" }).click();
  await expect.poll(() => page.getByRole("status").allTextContents(), SOON).toContain("Line accepted.");
  await expect.poll(() => page.getByText("Part of this set is accepted: 1 of 2 lines").isVisible(), SOON).toBe(true);
  await expectAccessible(page);
});

test("a comment is answered beside its line, and the second round begins with what changed", async () => {
  const lines = await findLines(ammonia, server.database.app);
  const nitrogen = lines.find((line) => line.property === "heatCapacity");
  const gibbs = lines.find((line) => line.property === "gibbsEnergyOfFormation");
  await commentOn(reviewer, { revisionId: ammonia, lineId: nitrogen?.id ?? "", body: "Which calorimeter?" });
  await returnRevision(reviewer, ammonia, "Answer, and leave the rest.");
  const page = await windowOf(steward);
  await open(page, paths.revision(ammonia));
  expect(await page.getByText("One comment waits for an answer").isVisible()).toBe(true);
  await page.getByRole("link", { name: "Answer what Ruth Amsel wrote" }).click();
  await expectAccessible(page);
  await page.getByRole("textbox", { name: "Answer" }).fill("The adiabatic one.");
  await page.getByRole("button", { name: "Write the answer" }).click();
  await expect.poll(() => page.getByRole("status").allTextContents(), SOON).toContain("Answer written.");
  await expect.poll(() => page.getByText("One comment waits for an answer").count(), SOON).toBe(0);
  await takeLineOut(steward, ammonia, gibbs?.id ?? "", "with the next sheet");
  await sendToReview(steward, ammonia, "Answered.");

  const desk = await windowOf(reviewer);
  await open(desk, paths.revision(ammonia));
  const changed = desk.getByRole("region", { name: "What changed since the first round" });
  const text = await changed.innerText();
  expect(text).toMatch(/Taken out\s+NH3\(g\) ΔfG°/);
  expect(text).toContain("“The adiabatic one.”");
  expect(text).toContain("One line was decided before and stays decided.");
  await expectAccessible(desk);
});

test("an overtaken line says what stands now, is shown alone, and is restated", async () => {
  const page = await windowOf(steward);
  await open(page, `${paths.revision(overtaken)}?show=overtaken`);
  expect(await page.getByText(/Another proposal for this place/).isVisible()).toBe(true);
  await expectAccessible(page);
  await page.getByRole("button", { name: /Restate against revision/ }).click();
  await expect.poll(() => page.getByRole("status").allTextContents(), SOON).toContain("One line restated.");
  await expect.poll(() => page.getByText("No line is overtaken.").isVisible(), SOON).toBe(true);
  await expectAccessible(page);
});

test("two drafts are made one, with a choice for the place that both propose", async () => {
  const page = await windowOf(steward);
  await open(page, paths.revision(draft));
  await page.getByRole("link", { name: "Take over another draft" }).click();
  await page.getByRole("link", { name: `${other} · Hydrogen again` }).click();
  await page.getByRole("group").waitFor();
  await expectAccessible(page);
  await page.getByLabel(/28\.84 /).check();
  await page.getByRole("button", { name: `Take over into revision ${draft}` }).click();
  await page.waitForURL((url) => url.pathname === paths.revision(draft));
  await expect.poll(() => page.getByText("with its history.").count(), SOON).toBe(2);
  await expectAccessible(page);
  await open(page, paths.revision(other));
  expect(await page.getByRole("link", { name: `See them in revision ${draft}` }).isVisible()).toBe(true);
  await expectAccessible(page);
});

test("the list of revisions is narrowed by state and person, in the address", async () => {
  const page = await windowOf(steward);
  await open(page, paths.revisions());
  await page.getByLabel("State").selectOption("withdrawn");
  await page.getByRole("button", { name: "Show", exact: true }).click();
  await page.waitForURL(/show=withdrawn/);
  await expect.poll(() => page.getByRole("heading", { level: 2 }).allTextContents(), SOON).toEqual(["Withdrawn"]);
  await expectAccessible(page);
});

test.each([
  [390, "dark"],
  [320, "light"],
] as const)("nothing lies beyond the edge at %i px, in %s", { timeout: 60_000 }, async (width, colorScheme) => {
  const fresh = await propose(steward, { values: [codata("N2(g)", "enthalpyIncrement", "8.670")] });
  await sendToReview(steward, fresh, "");
  await returnRevision(reviewer, fresh, "Once more.");
  const page = await windowOf(steward);
  await page.setViewportSize({ width, height: 800 });
  await page.emulateMedia({ colorScheme });
  for (const path of [
    paths.revisions(),
    paths.revision(ammonia),
    paths.revision(draft),
    paths.takeOver(draft),
    paths.takeOver(draft, fresh),
  ]) {
    await open(page, path);
    expect(await page.evaluate(() => document.documentElement.scrollWidth), path).toBeLessThanOrEqual(width);
    await expectAccessible(page);
  }
});
