import type { Page } from "playwright-core";
import { matchRoutes } from "react-router";
import { beforeAll, describe, expect, test } from "vitest";
import { useDatabase as makeApplicationUse } from "#app/db/database.server.ts";
import { paths } from "#app/paths.ts";
import { DEMO_PASSWORD, demoPeople } from "#app/people/demoPeople.ts";
import { may } from "#app/people/permissions.ts";
import type { Role } from "#app/people/person.ts";
import { type Door, routePermissions } from "#app/people/routePermissions.ts";
import { expectAccessible, useBrowser } from "#tests/support/browser.ts";
import { isApiPattern, routePatterns } from "#tests/support/manifest.ts";
import { useServer } from "#tests/support/server.ts";
import { seed as seedDemo } from "../../db/seeds/20261201_calder_point.ts";

/*
 * Everybody's walk through the demo: from Home along the links that the pages show, as nobody and as each role. Every page
 * that the table of permissions opens to somebody is reached by links alone, no link leads to an error, every page leads on,
 * and axe finds nothing.
 */

const server = useServer({
  prepare: async (database) => {
    makeApplicationUse(database.app);
    await seedDemo(database.app);
  },
});
const browser = useBrowser();

beforeAll(() => makeApplicationUse(server.database.app));

/** Addresses of one pattern that are tried: the first in the window, the others by their text alone. */
const TRIED = 3;

/** Reached otherwise than by a link on a page: by a letter, by a button, or not meant for people. */
const NOT_BY_LINKS: Readonly<Record<string, string>> = {
  "/reset/:token": "stands in a letter",
  "/invitation/:token": "stands in a letter",
  "/address/:token": "stands in a letter",
  "/sign-out": "a button",
  "/ui": "development",
  "/sources/:source": "leads on to the edition; links name it",
  "/inbox": "printed by the start command, and closed where letters are really sent",
  "/*": "what is not there",
};

const manifest = routePatterns().map((pattern) => ({ path: pattern, id: pattern }));

function patternOf(address: string): string {
  const path = address.split("?")[0] ?? "";
  const found = matchRoutes(manifest, path)?.at(-1)?.route.path;
  if (found === undefined) throw new Error(`${address} matches no route of the manifest.`);
  return found;
}

function isOpen(door: Door, role: Role | null): boolean {
  if (door === null || typeof door === "object") return false;
  return door === "public" || (role !== null && may([role], door));
}

/** Pages that were looked at in a window: by their pattern and by the controls on them, which differ by role. */
const lookedAt = new Set<string>();

/** Whether the page as served offers what no page of its pattern offered to anybody before. */
function isNewSight(html: string, pattern: string): boolean {
  const main = html.slice(html.indexOf("<main"), html.indexOf("</main>"));
  const controls = [
    ...main.matchAll(/<(button|input|select|textarea|summary|form)\b[^>]*?(?:\sname="([^"]*)")?[^>]*>/g),
  ];
  const sight = `${pattern} ${[...new Set(controls.map(([, tag, name = ""]) => `${tag} ${name}`))].sort().join()}`;
  if (lookedAt.has(sight)) return false;
  lookedAt.add(sight);
  return true;
}

/** Where the links of a page as served lead: same site, fragments gone, in the order of the page. */
function linksOf(html: string, address: string): string[] {
  const hrefs = [...html.matchAll(/<a\b[^>]*?\shref="([^"]+)"/g)].map(([, href = ""]) => href.replaceAll("&amp;", "&"));
  const own = hrefs
    .map((href) => new URL(href, `${server.url}${address}`))
    .filter(({ origin }) => origin === server.url);
  return [...new Set(own.map(({ pathname, search }) => pathname + search))];
}

async function walk(page: Page, role: Role | null): Promise<Set<string>> {
  const first = [paths.home(), ...(role === null ? [] : [paths.find("water")])];
  const queue = first.map((address) => ({ address, from: "the start" }));
  const seen = new Set(first);
  const visits = new Map<string, number>();
  for (let next = queue.shift(); next; next = queue.shift()) {
    const { address, from } = next;
    const pattern = patternOf(address);
    const visit = (visits.get(pattern) ?? 0) + 1;
    visits.set(pattern, visit);
    if (visit > TRIED) continue;

    const answer = await page.context().request.get(address, { maxRedirects: 3 });
    expect(answer.status(), `${address}, linked from ${from}`).toBe(200);
    const isPage = answer.headers()["content-type"]?.startsWith("text/html") ?? false;
    if (!isPage || isApiPattern(pattern)) continue;
    const html = await answer.text();
    expect(html.match(/<h1\b/g)?.length, `heads of ${address}`).toBe(1);
    expect(html, address).toMatch(/<title>[^<]*Tablewright<\/title>/);
    if (visit === 1 && isNewSight(html, pattern)) {
      await page.goto(address);
      await expectAccessible(page);
    }
    const links = linksOf(html, address);
    expect(links.filter((link) => link !== address).length, `${address} leads nowhere`).toBeGreaterThan(0);
    for (const link of links) {
      if (seen.has(link)) continue;
      seen.add(link);
      queue.push({ address: link, from: address });
    }
  }
  return new Set(visits.keys());
}

const visitors = [
  [null, null],
  ["analyst", demoPeople.analyst.email],
  ["steward", demoPeople.steward.email],
  ["reviewer", demoPeople.reviewer.email],
  ["administrator", demoPeople.administrator.email],
] as const;

describe("from Home along the links", () => {
  test.each(visitors)("%s reaches every page, and none is a dead end", { timeout: 300_000 }, async (role, email) => {
    const page = await browser.newWindow(server.url);
    if (email !== null) {
      await page.goto(paths.signIn());
      await page.getByLabel("E-mail address").fill(email);
      await page.getByLabel("Password", { exact: true }).fill(DEMO_PASSWORD);
      await page.locator("main").getByRole("button", { name: "Sign in" }).click();
      await page.waitForURL("/");
    }
    const reached = await walk(page, role);
    const open = Object.entries(routePermissions)
      .filter(
        ([pattern, { read }]) => isOpen(read, role) && !pattern.startsWith("/resources/") && !isApiPattern(pattern),
      )
      .map(([pattern]) => pattern)
      .filter((pattern) => !(pattern in NOT_BY_LINKS))
      // Who has signed in is led past these.
      .filter((pattern) => role === null || !["/sign-in", "/forgotten"].includes(pattern));
    expect(open.filter((pattern) => !reached.has(pattern))).toEqual([]);
  });
});
