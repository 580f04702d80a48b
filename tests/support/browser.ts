import { existsSync } from "node:fs";
import path from "node:path";
import { AxeBuilder } from "@axe-core/playwright";
import { type Browser, type BrowserContext, chromium, type Page } from "playwright-core";
import { afterAll, afterEach, beforeAll, expect } from "vitest";
import type { Acting } from "#app/people/person.ts";
import { signedIn } from "./people.ts";

const FLAGS = [
  "--headless",
  "--no-sandbox",
  "--disable-gpu",
  "--disable-quic",
  "--no-first-run",
  "--disable-background-networking",
  "--disable-component-update",
  "--disable-sync",
];

/** WCAG 2.2 level AA, as far as a program can judge it. */
const AXE_TAGS = ["wcag2a", "wcag2aa", "wcag21a", "wcag21aa", "wcag22aa"];

/** What a person's browser offers to a test. */
export interface TestBrowser {
  /** A person's browser window: cookies of its own, nothing shared with another window. */
  newWindow(baseUrl: string): Promise<Page>;
  /** Says that the next console message holding `text` is meant to come, and is no failure. */
  expectConsoleError(text: string): void;
}

function findChromium(): string {
  const named = process.env["CHROMIUM"];
  const found = named
    ? [named]
    : ["chromium", "chromium-browser", "google-chrome"].map((name) => path.join("/usr/bin", name));
  const program = found.find((file) => existsSync(file));
  // npm test has found or installed it before; alone, a missing browser fails the test and never skips it.
  if (!program)
    throw new Error("Chromium was not found; install Debian's package chromium, or set CHROMIUM to its path.");
  return program;
}

/**
 * Gives the test file a browser. Any console error, page error or refused script that the test did not announce fails the
 * test in which it came.
 */
export function useBrowser(): TestBrowser {
  let browser: Browser | undefined;
  const windows: BrowserContext[] = [];
  const complaints: string[] = [];
  const foreseen: string[] = [];

  beforeAll(async () => {
    browser = await chromium.launch({ executablePath: findChromium(), args: FLAGS });
  });
  afterEach(() => {
    const unforeseen = complaints.filter((line) => !foreseen.some((text) => line.includes(text)));
    complaints.length = 0;
    foreseen.length = 0;
    expect(unforeseen).toEqual([]);
  });
  afterAll(async () => {
    await Promise.all(windows.map((window) => window.close()));
    await browser?.close();
  });

  return {
    async newWindow(baseUrl) {
      if (!browser) throw new Error("useBrowser(): the browser runs only while tests and hooks run.");
      const window = await browser.newContext({
        baseURL: baseUrl,
        locale: "en-GB",
        timezoneId: "UTC",
        acceptDownloads: true,
      });
      windows.push(window);
      const page = await window.newPage();
      listen(page, complaints);
      return page;
    },
    expectConsoleError(text) {
      foreseen.push(text);
    },
  };
}

/** Collects what the page complains of. */
function listen(page: Page, complaints: string[]): void {
  // Chromium writes every answer from 400 on to the console. That a page or a fetch was refused is what tests look at;
  // a missing file is a fault.
  const refused = new Set<string>();
  page.on("response", (response) => {
    const kind = response.request().resourceType();
    if (response.status() >= 400 && response.status() < 500 && ["document", "fetch", "xhr"].includes(kind)) {
      refused.add(response.url());
    }
  });
  page.on("console", (message) => {
    if (message.type() !== "error") return;
    if (message.text().startsWith("Failed to load resource") && refused.has(message.location().url)) return;
    complaints.push(`${message.text()} (${message.location().url})`);
  });
  page.on("pageerror", (error) => complaints.push(`page error: ${error.message}`));
}

/**
 * Signs somebody in in this window without the page for it, which tests of that page go through: a session begins, and its
 * cookie is put where the page would have put it. The application must use the server's database.
 */
export async function enterAs(page: Page, baseUrl: string, acting: Acting): Promise<void> {
  const cookie = await signedIn(acting);
  const at = cookie.indexOf("=");
  const { hostname: domain } = new URL(baseUrl);
  await page
    .context()
    .addCookies([
      { name: cookie.slice(0, at), value: cookie.slice(at + 1), domain, path: "/", secure: true, httpOnly: true },
    ]);
}

/** Fails when axe finds anything against WCAG 2.2 AA on the page as it stands. */
export async function expectAccessible(page: Page): Promise<void> {
  // axe takes a link that is half under a sticky bar at this moment's scroll position for a small one.
  const stuck = ".decision-bar, .bookmark, .table thead th { position: static !important }";
  await page.evaluate((rules) => {
    const sheet = new CSSStyleSheet();
    sheet.replaceSync(rules);
    document.adoptedStyleSheets = [...document.adoptedStyleSheets, sheet];
  }, stuck);
  // Without frames the older way of running sees the same, and spares opening a page for each look.
  const { violations } = await new AxeBuilder({ page }).setLegacyMode(true).withTags(AXE_TAGS).analyze();
  await page.evaluate(() => {
    document.adoptedStyleSheets = document.adoptedStyleSheets.slice(0, -1);
  });
  const found = violations.map(
    ({ id, help, nodes }) => `${id}: ${help} — ${nodes.map((node) => node.target.join(" ")).join(", ")}`,
  );
  expect(found, `axe on ${page.url()}`).toEqual([]);
}
