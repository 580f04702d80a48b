import type { RouteConfigEntry } from "@react-router/dev/routes";
import { matchPath, matchRoutes } from "react-router";
import { describe, expect, it } from "vitest";
import { inEdition, paths } from "#app/paths.ts";
import routes from "#app/routes.ts";

/** Every pattern of the manifest, children joined to their parents. */
function patterns(): string[] {
  const collect = (entries: readonly RouteConfigEntry[], base: string): string[] =>
    entries.flatMap((entry) => {
      const here = entry.path === undefined ? base : `${base}/${entry.path}`.replace(/\/+/g, "/");
      const own = entry.index === true || entry.path !== undefined ? [here === "" ? "/" : here] : [];
      return [...own, ...collect(entry.children ?? [], here)];
    });
  return [...new Set(collect(routes, ""))];
}

/** One address from each function of `paths`, made with arguments that need care in an address. */
const samples: Record<keyof typeof paths, string> = {
  home: paths.home(),
  table: paths.table(7, { phase: "g" }),
  tableDownload: paths.tableDownload("current"),
  tableDescription: paths.tableDescription(7),
  tableShown: paths.tableShown(7, "shown.csv"),
  species: paths.species(7, "CdSO4·8/3H2O(cr)"),
  editions: paths.editions(),
  edition: paths.edition(7),
  compare: paths.compare(6, 7),
  find: paths.find("NH3 (g)"),
  sheets: paths.sheets(),
  newSheet: paths.newSheet(),
  sheet: paths.sheet(21),
  sheetOriginal: paths.sheetOriginal(21),
  sheetFindings: paths.sheetFindings(21),
  revisions: paths.revisions(),
  revision: paths.revision(14),
  takeOver: paths.takeOver(14, 12),
  revisionLine: paths.revisionLine(14, "417"),
  propose: paths.propose({ species: "Na+(aq)", what: "names" }),
  publish: paths.publish(),
  sources: paths.sources(),
  newSource: paths.newSource(),
  source: paths.source("codata-1989"),
  mendSource: paths.mendSource("codata-1989"),
  sourcesIn: paths.sourcesIn(7, { kind: "measurement" }),
  sourceIn: paths.sourceIn(7, "codata-1989", { page: 2 }),
  sourceValues: paths.sourceValues(7, "codata-1989"),
  conventions: paths.conventions(),
  conventionsSymbols: paths.conventionsSymbols(),
  conventionsStates: paths.conventionsStates(),
  conventionsUnits: paths.conventionsUnits(),
  conventionsUncertainty: paths.conventionsUncertainty(),
  conventionsSpellings: paths.conventionsSpellings(),
  conventionsChecks: paths.conventionsChecks(),
  conventionsCheck: paths.conventionsCheck("gibbs-closure"),
  signIn: paths.signIn("/revisions/14"),
  signOut: paths.signOut(),
  forgotten: paths.forgotten(),
  reset: paths.reset("token"),
  invitation: paths.invitation("token"),
  newAddress: paths.newAddress("token"),
  account: paths.account(),
  keys: paths.keys(),
  people: paths.people(),
  person: paths.person("00000000-0000-4000-8000-000000000000"),
  record: paths.record({ page: 2 }),
  inbox: paths.inbox(),
  apiGuide: paths.apiGuide(),
  api: paths.api("editions"),
  problem: paths.problem("not-found"),
  resource: paths.resource("progress"),
  specimens: paths.specimens(),
};

// Answers for programs and fetchers have many addresses each; their prefix is in `paths`.
const prefixes = ["/api/", "/resources/"];

const withoutQuery = (address: string): string => address.replace(/\?.*$/, "");

describe("the address space", () => {
  it("has a route for every link function", () => {
    const known = patterns().filter((pattern) => pattern !== "/*");
    const dead = Object.entries(samples)
      .filter(([, address]) => !prefixes.some((prefix) => address.startsWith(prefix)))
      .filter(([, address]) => !known.some((pattern) => matchPath(pattern, withoutQuery(address))))
      .map(([name, address]) => `paths.${name}() gives ${address}, which no route answers`);
    expect(dead, "give it a route module in app/routes.ts, or drop the link function").toEqual([]);
  });

  it("has a link function for every page of the manifest", () => {
    const lonely = patterns()
      .filter((pattern) => pattern !== "/*" && !prefixes.some((prefix) => pattern.startsWith(prefix)))
      .filter((pattern) => !Object.values(samples).some((address) => matchPath(pattern, withoutQuery(address))));
    expect(lonely, "add a function to app/paths.ts").toEqual([]);
  });

  it("brings a species key back whole, with its slash and its charge", () => {
    const route = [{ path: "/editions/:edition/species/:key" }];
    const match = (key: string) => matchRoutes(route, paths.species("current", key))?.[0]?.params["key"];
    expect(match("CdSO4·8/3H2O(cr)")).toBe("CdSO4·8/3H2O(cr)");
    expect(match("SO4-2(aq)")).toBe("SO4-2(aq)");
    expect(match("Na+(aq)")).toBe("Na+(aq)");
  });

  it("leaves empty filters out of an address", () => {
    expect(paths.table("current", { element: "", phase: null, q: "water" })).toBe("/editions/current/table?q=water");
    expect(paths.table(7, { element: ["H", "O"] })).toBe("/editions/7/table?element=H&element=O");
  });
});

describe("changing the edition of an address", () => {
  it.each([
    ["/editions/7/table?phase=g", "/editions/6/table?phase=g", "filters stay"],
    ["/editions/current/species/H2O(l)", "/editions/6/species/H2O(l)", "the species stays"],
    ["/editions/7", "/editions/6", "an edition's own page"],
  ])("%s becomes %s: %s", (from, to) => {
    expect(inEdition(from, 6)).toBe(to);
  });

  it.each(["/sheets/7", "/editions", "/editions/6/compare/7"])("%s is not pinned to one edition", (address) => {
    expect(inEdition(address, 6)).toBeNull();
  });
});
