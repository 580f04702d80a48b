import { expect, test } from "vitest";
import { useDatabase as workOn } from "#app/db/database.server.ts";
import { expectAccessible, useBrowser } from "#tests/support/browser.ts";
import { publishThreeEditions } from "#tests/support/editions.ts";
import { makePerson, PASSWORD } from "#tests/support/people.ts";
import { useServer } from "#tests/support/server.ts";

/* Reading the table in a browser: filters, order and edition live in the address, back works, nothing overflows. */

const browser = useBrowser();
const server = useServer({
  async prepare(database) {
    await publishThreeEditions(database.app);
    workOn(database.app);
    await makePerson("A Analyst", "analyst");
  },
});

async function signIn() {
  const page = await browser.newWindow(server.url);
  await page.goto("/sign-in?to=/editions/current/table");
  await page.getByLabel("E-mail address").fill("a.analyst@calderpoint.example");
  await page.getByLabel("Password").fill(PASSWORD);
  await page.getByRole("main").getByRole("button", { name: "Sign in" }).click();
  await page.waitForURL("**/editions/3/table");
  return page;
}

test("filters, order and edition are kept in the address while one reads", { timeout: 120_000 }, async () => {
  const page = await signIn();
  const rows = page.getByRole("main").locator("tbody th[scope=row]");
  await expect.poll(() => rows.count()).toBe(8);

  // A choice in the sentence filters at once.
  await page.getByLabel("Phase", { exact: true }).selectOption("g");
  await page.waitForURL(/phase=g/);
  await expect.poll(() => rows.allInnerTexts()).toEqual(["H2(g)", "H2O(g)", "NH3(g)"]);

  // The head sorts, first upwards, then downwards, and says so.
  const head = page.getByRole("columnheader", { name: /S°/ });
  await head.getByRole("button").click();
  await page.waitForURL(/sort=entropy/);
  await head.getByRole("button").click();
  await page.waitForURL(/sort=-entropy/);
  await expect.poll(() => head.getAttribute("aria-sort")).toBe("descending");
  await expect.poll(() => rows.allInnerTexts()).toEqual(["NH3(g)", "H2O(g)", "H2(g)"]);

  // Another edition, the same filter and order.
  await page.getByText("other editions").click();
  await page.getByRole("link", { name: "Edition 1", exact: true }).click();
  await page.waitForURL(/\/editions\/1\/table\?.*phase=g/);
  expect(page.url()).toContain("sort=-entropy");
  await expect.poll(() => page.getByRole("navigation", { name: "Bookmark" }).innerText()).toMatch(/1/);
  await expect.poll(() => page.getByRole("main").innerText()).toContain("−46.11");

  // A species, another edition of it, and back to the filtered table.
  await page.getByRole("link", { name: "NH3(g)" }).click();
  await page.waitForURL(/\/editions\/1\/species\/NH3/);
  await expectAccessible(page);
  await page.getByRole("link", { name: "read it there" }).click();
  await page.waitForURL(/\/editions\/3\/species\/NH3/);
  await expect.poll(() => page.getByRole("main").innerText()).toContain("−45.94(18)");
  await page.goBack();
  await page.goBack();
  await page.waitForURL(/\/editions\/1\/table\?.*phase=g/);
  await expect.poll(() => rows.allInnerTexts()).toEqual(["NH3(g)", "H2O(g)", "H2(g)"]);

  // Typing and Enter searches; what was chosen stays.
  await page.getByLabel("Name, formula or CAS number").fill("water");
  await page.keyboard.press("Enter");
  await page.waitForURL(/q=water/);
  await expect.poll(() => rows.allInnerTexts()).toEqual(["H2O(g)"]);
  await expectAccessible(page);
});

test.each([
  ["/editions/3/table", "Table of standard formation properties"],
  ["/editions/3/species/H2O(l)", "H2O(l)"],
  ["/editions/1/compare/3", "From edition 1 to edition 3"],
])("%s at 320 px: only tables scroll sideways, and axe finds nothing, light and dark", async (path, heading) => {
  const page = await signIn();
  for (const [width, colorScheme] of [
    [1440, "light"],
    [1440, "dark"],
    [320, "light"],
  ] as const) {
    await page.setViewportSize({ width, height: 900 });
    await page.emulateMedia({ colorScheme });
    await page.goto(path);
    await page.getByRole("heading", { level: 1 }).waitFor();
    expect(await page.getByRole("heading", { level: 1 }).innerText()).toBe(heading);
    expect(await page.evaluate(() => document.documentElement.scrollWidth - innerWidth)).toBeLessThanOrEqual(0);
    await expectAccessible(page);
  }
});

test("the find box by keyboard: offers, arrows, Escape, Enter", { timeout: 120_000 }, async () => {
  const page = await signIn();
  const box = page.getByRole("combobox", { name: /Find a species/ });
  await box.fill("wate");
  const options = page.getByRole("listbox", { name: "What fits" }).getByRole("option");
  await expect.poll(() => options.count()).toBe(2);
  expect(await box.getAttribute("aria-expanded")).toBe("true");
  await expectAccessible(page);
  await page.keyboard.press("ArrowDown");
  await page.keyboard.press("ArrowDown");
  await expect.poll(() => options.nth(1).getAttribute("aria-selected")).toBe("true");
  expect(await box.getAttribute("aria-activedescendant")).toBe(await options.nth(1).getAttribute("id"));
  // Escape closes the list and keeps the text; down opens it again.
  await page.keyboard.press("Escape");
  await expect.poll(() => box.getAttribute("aria-expanded")).toBe("false");
  expect(await box.inputValue()).toBe("wate");
  await page.keyboard.press("ArrowDown");
  await page.keyboard.press("Enter");
  await page.waitForURL(/\/editions\/3\/species\/H2O/);
  // With nothing chosen, Enter lists everything that fits.
  await box.fill("wate");
  await page.keyboard.press("Enter");
  await page.waitForURL(/\/find\?q=wate/);
  await expectAccessible(page);
});
