import type { RouteConfigEntry } from "@react-router/dev/routes";
import routes from "#app/routes.ts";

/** The address patterns of every route in the manifest, for tests that walk all of them. */
export function routePatterns(): string[] {
  const collect = (entries: readonly RouteConfigEntry[], base: string): string[] =>
    entries.flatMap((entry) => {
      const here = entry.path === undefined ? base : `${base}/${entry.path}`;
      const own = entry.index === true || entry.path !== undefined ? [here === "" ? "/" : here] : [];
      return [...own, ...collect(entry.children ?? [], here)];
    });
  return [...new Set(collect(routes, ""))];
}

/** What stands in the place of a parameter. Nothing is there: who may come in finds nothing, and nothing is changed. */
const samples: Readonly<Record<string, string>> = {
  check: "gibbs-closure",
  edition: "999999",
  file: "shown.csv",
  a: "999998",
  b: "999999",
  other: "999998",
  key: "H2O(l)",
  line: "999999",
  person: "00000000-0000-4000-8000-000000000000",
  revision: "999999",
  sheet: "999999",
  slug: "not-found",
  source: "nothing",
  token: "A".repeat(43),
};

/** An address that a pattern of the manifest answers. */
export function addressOf(pattern: string): string {
  return pattern
    .replace(/:(\w+)\??/g, (_whole, name: string) => {
      const sample = samples[name];
      if (sample === undefined) throw new Error(`Give the parameter ":${name}" a sample in tests/support/manifest.ts.`);
      return encodeURIComponent(sample);
    })
    .replace("*", "nothing/here");
}

/** The address under which the framework fetches a page's data. */
export function dataAddressOf(address: string): string {
  return `${address === "/" ? "/_root" : address}.data`;
}

/** Whether the pattern is one of the API's, which answers in its own way. */
export const isApiPattern = (pattern: string): boolean => pattern.startsWith("/api/");
