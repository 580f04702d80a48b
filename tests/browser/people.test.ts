import type { BrowserContextOptions, Page } from "playwright-core";
import { beforeAll, describe, expect, test } from "vitest";
import { useDatabase as makeApplicationUse } from "#app/db/database.server.ts";
import { makeKey } from "#app/people/apiKey.server.ts";
import type { Acting } from "#app/people/person.ts";
import { expectAccessible, useBrowser } from "#tests/support/browser.ts";
import { makePerson, PASSWORD } from "#tests/support/people.ts";
import { useServer } from "#tests/support/server.ts";

/*
 * An administrator's day: somebody is invited, takes the account up, gets a role, has a session ended and is switched off;
 * the record tells of all of it. Then the same pages without scripts, in the dark and in a narrow window.
 */

const people: Record<"administrator" | "analyst", Acting> = Object.create(null) as never;
const server = useServer({
  worker: true,
  prepare: async (database) => {
    makeApplicationUse(database.app);
    people.administrator = await makePerson("Pell Ostrander", "administrator");
    people.analyst = await makePerson("Mina Corvin", "analyst");
    await makeKey(people.analyst, { name: "titration-2", scopes: ["read"], days: 30 });
  },
});
const browser = useBrowser();

beforeAll(() => makeApplicationUse(server.database.app));

async function signIn(page: Page, email: string, password: string): Promise<void> {
  await page.goto("/sign-in");
  await page.getByLabel("E-mail address").fill(email);
  await page.getByLabel("Password", { exact: true }).fill(password);
  await page.locator("main").getByRole("button", { name: "Sign in" }).click();
  await page.waitForURL("/");
}

/** A window with the administrator signed in; of its own kind when options are given. */
async function office(options: BrowserContextOptions = {}): Promise<Page> {
  const first = await browser.newWindow(server.url);
  const context = await first
    .context()
    .browser()!
    .newContext({ baseURL: server.url, ...options });
  const page = await context.newPage();
  await signIn(page, people.administrator.person.email, PASSWORD);
  return page;
}

const heading = (page: Page) => page.getByRole("heading", { level: 1 });

test("an administrator's day", { timeout: 120_000 }, async () => {
  const email = "tess.marlow@calderpoint.example";
  const admin = await browser.newWindow(server.url);
  await signIn(admin, people.administrator.person.email, PASSWORD);

  // Invite, with an address mistyped first: what was typed stays.
  await admin.getByRole("link", { name: "People", exact: true }).click();
  await admin.getByLabel("Name", { exact: true }).fill("Tess Marlow");
  await admin.getByLabel("E-mail address").fill("tess.marlow@calderpoint");
  await admin.getByLabel("analyst").check();
  await admin.getByRole("button", { name: "Invite" }).click();
  await admin.getByRole("alert").waitFor();
  await expectAccessible(admin);
  expect(await admin.getByLabel("Name", { exact: true }).inputValue()).toBe("Tess Marlow");
  await admin.getByLabel("E-mail address").fill(email);
  await admin.getByRole("button", { name: "Invite" }).click();
  await admin.waitForURL(/\/people\/[0-9a-f-]{36}\?done=invite$/);
  const address = new URL(admin.url()).pathname;
  await expectAccessible(admin);

  // The letter comes; the invitation is taken up in another browser.
  const letter = (await server.letterTo(email)).text ?? "";
  await admin.goto(address);
  await admin.getByText("Not taken up yet.").waitFor();
  const invited = await browser.newWindow(server.url);
  await invited.goto(new URL(/http:\S+\/invitation\/\S+/.exec(letter)?.[0] ?? "").pathname);
  await expectAccessible(invited);
  await invited.getByLabel("Password", { exact: true }).fill("tablewright1");
  await invited.getByRole("button", { name: "Set the password" }).click();
  await invited.getByText("tried first").first().waitFor();
  await invited.getByLabel("Password", { exact: true }).fill("nine oak drawers");
  await invited.getByRole("button", { name: "Set the password" }).click();
  await invited.waitForURL(/sign-in/);
  await signIn(invited, email, "nine oak drawers");
  await invited.goto("/sheets/new");
  await invited.getByText("This needs the role steward").waitFor();

  // A role is given, after what will change was shown; it holds at once.
  await admin.goto(address);
  await admin.getByLabel("steward").check();
  await admin.getByRole("button", { name: "Change the roles…" }).click();
  await admin.getByText("Tess Marlow gets the role steward.").waitFor();
  expect(await heading(admin).textContent()).toBe("Change the roles of Tess Marlow?");
  await expectAccessible(admin);
  await admin.getByRole("link", { name: "Leave it as it is" }).click();
  await admin.getByRole("button", { name: "Change the roles…" }).waitFor();
  await admin.getByLabel("steward").check();
  await admin.getByRole("button", { name: "Change the roles…" }).click();
  await admin.getByRole("button", { name: "Change the roles", exact: true }).click();
  await admin.getByRole("status").filter({ hasText: "The roles are changed" }).waitFor();
  await invited.goto("/sheets/new");
  expect(await heading(invited).textContent()).not.toContain("Not allowed");

  // Their session is ended; the next page asks them to sign in.
  await admin.goto(address);
  await admin.getByRole("button", { name: /^End the session of/ }).click();
  await admin.waitForURL(/done=end-session/);
  await admin.getByText("Tess Marlow is not signed in anywhere.").waitFor();
  await invited.goto("/account");
  await invited.waitForURL(/\/sign-in\?to=/);

  // Switched off: nobody signs in with the account any more.
  await admin.getByRole("button", { name: "Switch off…" }).click();
  await admin.getByText("Tess Marlow can no longer sign in").waitFor();
  await expectAccessible(admin);
  await admin.getByRole("button", { name: "Switch off", exact: true }).click();
  await admin.waitForURL(/done=switch-off/);
  await expectAccessible(admin);
  await invited.goto("/sign-in");
  await invited.getByLabel("E-mail address").fill(email);
  await invited.getByLabel("Password", { exact: true }).fill("nine oak drawers");
  await invited.locator("main").getByRole("button", { name: "Sign in" }).click();
  await invited.getByText("do not belong together").waitFor();

  // The list finds them, and the record tells the whole day, whose links lead on.
  await admin.getByRole("link", { name: "All people" }).click();
  await admin.getByLabel("Account", { exact: true }).selectOption("switched off");
  await admin.getByRole("button", { name: "show" }).click();
  await admin.locator("caption", { hasText: "Accounts that fit" }).waitFor({ state: "attached" });
  expect(await admin.locator("main tbody th").allTextContents()).toEqual(["Tess Marlow"]);
  await expectAccessible(admin);
  await admin.locator("main").getByRole("link", { name: "Tess Marlow" }).click();
  await admin.getByRole("link", { name: "What was done to this account" }).click();
  await admin.getByRole("heading", { level: 1, name: "Record" }).waitFor();
  const did = await admin.locator("main tbody tr td:nth-child(4)").allTextContents();
  expect(did.reverse()).toEqual([
    "invited",
    "invitation taken up",
    "signed in",
    "roles changed",
    "sessions ended",
    "switched off",
    "sign-in failed",
  ]);
  await admin.locator("main summary").first().click();
  await admin.getByText("How to verify the chain outside").click();
  await expectAccessible(admin);
});

test("the record goes home as a file whose name says how far it reaches", { timeout: 60_000 }, async () => {
  const admin = await office();
  await admin.goto("/record?act=person.signed-in");
  const [download] = await Promise.all([
    admin.waitForEvent("download"),
    admin.getByRole("button", { name: "Download as JSON Lines" }).click(),
  ]);
  expect(download.suggestedFilename()).toMatch(/^tablewright record to \d+\.jsonl$/);
  await admin.goto("/record?act=record.exported");
  expect(await admin.locator("main tbody tr").count()).toBe(1);
});

describe("one's own account", () => {
  test("name, address and password each answer for themselves", { timeout: 60_000 }, async () => {
    const page = await browser.newWindow(server.url);
    await signIn(page, people.analyst.person.email, PASSWORD);
    await page.goto("/account");
    await expectAccessible(page);
    await page.locator("main").getByLabel("New e-mail address").fill("mina.new@calderpoint.example");
    await page.locator("#address").getByLabel("Current password").fill("a wrong guess");
    await page.getByRole("button", { name: "Ask for the letter" }).click();
    await page.getByText("This is not your current password.").first().waitFor();
    // One form's fault is said once, beside that form.
    expect(await page.getByRole("alert").count()).toBe(1);
    await expectAccessible(page);
    await page.locator("#address").getByLabel("Current password").fill(PASSWORD);
    await page.getByRole("button", { name: "Ask for the letter" }).click();
    await page.waitForURL(/done=address-asked/);
    const letter = (await server.letterTo("mina.new@calderpoint.example")).text ?? "";
    await page.goto(new URL(/http:\S+\/address\/\S+/.exec(letter)?.[0] ?? "").pathname);
    await expectAccessible(page);
    await page.getByRole("button", { name: "Use this address" }).click();
    await page.waitForURL(/account\?done=address/);
    await page.getByText("mina.new@calderpoint.example · analyst").waitFor();
    await page.getByRole("textbox", { name: "Name", exact: true }).fill("Mina Corvin-Lund");
    await page.getByRole("button", { name: "Change the name" }).click();
    await page.getByRole("heading", { level: 1, name: "Mina Corvin-Lund" }).waitFor();
  });
});

test("without scripts an administrator withdraws a key and looks at the record", { timeout: 60_000 }, async () => {
  const page = await office({ javaScriptEnabled: false });
  await page.goto(`/people/${people.analyst.person.id}`);
  await page.getByRole("button", { name: "Withdraw the key titration-2" }).click();
  await page.getByText("The program “titration-2” is refused").waitFor();
  await page.getByRole("button", { name: "Withdraw the key" }).click();
  await page.waitForURL(/done=withdraw-key/);
  expect(await page.getByRole("button", { name: "Withdraw the key titration-2" }).count()).toBe(0);
  await page.goto("/record");
  await page.getByLabel("Act", { exact: true }).selectOption("key.withdrawn");
  await page.getByRole("button", { name: "show" }).click();
  await page.waitForURL(/act=key.withdrawn/);
  expect(await page.locator("main tbody tr").count()).toBe(1);
});

describe("in other windows", () => {
  test.each([
    ["light", 1440],
    ["dark", 360],
  ] as const)(
    "%s, %d px wide: axe finds nothing, and only tables scroll sideways",
    { timeout: 60_000 },
    async (colorScheme, width) => {
      const page = await office({ colorScheme, viewport: { width, height: 900 } });
      for (const path of [
        "/people",
        `/people/${people.analyst.person.id}`,
        "/account",
        "/record",
        "/people?q=nobody",
      ]) {
        await page.goto(path);
        await page.waitForLoadState("networkidle");
        await expectAccessible(page);
        expect(
          await page.evaluate(() => document.documentElement.scrollWidth - window.innerWidth),
          path,
        ).toBeLessThanOrEqual(0);
      }
    },
  );
});
