import type { Page } from "playwright-core";
import { beforeAll, expect, test } from "vitest";
import { useDatabase as makeApplicationUse } from "#app/db/database.server.ts";
import { paths } from "#app/paths.ts";
import type { Acting } from "#app/people/person.ts";
import { enterAs, expectAccessible, useBrowser } from "#tests/support/browser.ts";
import { ANY_SOURCE, expanded, type ValueRow } from "#tests/support/editions.ts";
import { makePerson } from "#tests/support/people.ts";
import { acceptAll, propose, publishWaiting } from "#tests/support/revisions.ts";
import { useServer } from "#tests/support/server.ts";

/*
 * A change begun on the page of a species, through the pages, to the edition that holds it. Values: CODATA Key Values for
 * Thermodynamics (1989).
 */

let steward: Acting;
let reviewer: Acting;

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
      species: [{ key: "H2(g)" }, { key: "N2(g)" }, { key: "NH3(g)", name: "ammonia" }],
      values: [
        codata("H2(g)", "entropy", "130.680"),
        codata("N2(g)", "entropy", "191.609"),
        codata("NH3(g)", "entropy", "192.77"),
        codata("NH3(g)", "enthalpyOfFormation", "-45.94"),
      ],
    });
    await acceptAll(steward, reviewer, first);
    await publishWaiting(reviewer);
  },
});
const browser = useBrowser();

beforeAll(() => makeApplicationUse(server.database.app));

async function signIn(person: Acting): Promise<Page> {
  const page = await browser.newWindow(server.url);
  await enterAs(page, server.url, person);
  return page;
}

test("from the page of a species to the edition that shows it", { timeout: 240_000 }, async () => {
  const page = await signIn(steward);
  await page.goto(paths.species(1, "NH3(g)"));
  await page.getByRole("link", { name: "Propose a change" }).click();
  await page.waitForURL(/\/propose\?/);
  await expectAccessible(page);

  // Two digits exchanged, and an entry with two readings: what is wrong is said, and nothing typed is lost.
  const entropy = page.getByRole("group", { name: /^S° entropy/ });
  await entropy.getByLabel("Value").fill("1,927");
  await page.getByRole("button", { name: "Propose and examine" }).click();
  browser.expectConsoleError("422");
  await page.getByRole("alert").waitFor();
  await expectAccessible(page);
  expect(await page.getByRole("alert").textContent()).toContain("can be read as 1.927 or as 1927");
  expect(await entropy.getByLabel("Value").inputValue()).toBe("1,927");
  expect(await entropy.getByRole("radio").count()).toBe(2);
  await entropy.getByLabel("Value").fill("");

  const enthalpy = page.getByRole("group", { name: /^ΔfH° enthalpy/ });
  await enthalpy.getByLabel("Value").fill("−45.49");
  await enthalpy.getByLabel("Uncertainty").fill("0.30");
  await page.getByLabel("Kind of the uncertainty").selectOption("expanded");
  await page.getByLabel("Source", { exact: true }).selectOption(ANY_SOURCE);
  await page.getByLabel("Reason", { exact: true }).fill("Measured again, notebook 12.");
  await page.getByLabel("Title of the new draft").fill("Ammonia, notebook 12");
  await page.getByRole("button", { name: "Propose and examine" }).click();
  await page.waitForURL(/\/revisions\/\d+$/);
  await expectAccessible(page);
  const revision = new URL(page.url()).pathname;
  expect(await page.getByRole("main").textContent()).toContain("Measured again, notebook 12.");

  // The name goes into the same draft; then the line is put right on its own page.
  await page.goto(paths.propose({ species: "NH3(g)", what: "names" }));
  await expectAccessible(page);
  await page.getByLabel("CAS number").fill("7664-41-7");
  await page.getByLabel("Synonyms").fill("azane");
  await page.getByLabel("Reason", { exact: true }).fill("As registered.");
  await page
    .getByLabel("Goes into")
    .selectOption({ label: `revision ${revision.split("/")[2]}: Ammonia, notebook 12` });
  await page.getByRole("button", { name: "Propose and examine" }).click();
  await page.waitForURL((url) => url.pathname === revision);
  await page.getByRole("link", { name: "Change the name of NH3(g)" }).first().click();
  await page.waitForURL(/\/lines\/\d+$/);
  await expectAccessible(page);
  await page.getByLabel("Name", { exact: false }).first().fill("ammonia, the gas");
  await page.getByLabel("Reason", { exact: true }).fill("To tell it from the solution.");
  await page.getByRole("button", { name: "Change the line" }).click();
  await page.waitForURL((url) => url.pathname === revision);
  expect(await page.getByRole("main").locator("ins").allTextContents()).toContain("7664-41-7");

  for (const what of ["withdrawal", "other"]) {
    await page.goto(paths.propose({ species: "NH3(g)", what }));
    await expectAccessible(page);
  }
  await page.goto(paths.propose());
  await expectAccessible(page);
  await page.getByLabel("Formula", { exact: true }).fill("NH3(aq)");
  await page.getByLabel("Name", { exact: false }).first().fill("ammonia");
  await page.getByLabel("Reason", { exact: true }).fill("The solution is wanted too.");
  await page.getByRole("button", { name: "Propose and examine" }).click();
  await page.waitForURL(/\/revisions\/\d+$/);

  // Sent, accepted, published, as its people do it (the review's own pages are tested beside).
  const id = Number(revision.split("/")[2]);
  await acceptAll(steward, reviewer, id);
  await publishWaiting(reviewer);
  await page.goto(paths.species(2, "NH3(g)"));
  await expectAccessible(page);
  const shown = (await page.getByRole("main").textContent()) ?? "";
  expect(shown).toContain("CAS 7664-41-7");
  expect(shown).toMatch(/−45\.49/);
  expect(shown).toContain("ammonia, the gas");
  await page.goto(paths.species(1, "NH3(g)"));
  const before = (await page.getByRole("main").textContent()) ?? "";
  expect(before).toMatch(/−45\.94/);
  expect(before).not.toContain("7664-41-7");
});
