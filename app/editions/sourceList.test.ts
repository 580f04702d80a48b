import { describe, expect, test } from "vitest";
import { type ListedSource, readSourceQuery, selectSources, SOURCES_PAGE } from "./sourceList.ts";

const source = (id: string, family: string, year: number, rest: Partial<ListedSource> = {}): ListedSource => ({
  sourceId: id,
  citation: { title: `Work ${id}`, author: [{ family }], issued: { "date-parts": [[year]] } },
  doi: null,
  kind: "evaluation",
  notice: null,
  values: 0,
  ...rest,
});

const all = [
  source("src_c", "Wagman", 1982, { values: 5, doi: "10.5555/tables" }),
  source("src_a", "Cox", 1989, { values: 400 }),
  source("src_b", "Ångström", 1989, { kind: "measurement", notice: "Retracted by its authors." }),
];

const ids = (search: string): string[] =>
  selectSources(all, readSourceQuery(new URLSearchParams(search))).rows.map((one) => one.sourceId);

describe("the list of sources", () => {
  test.each([
    ["", ["src_b", "src_a", "src_c"], "stands by name, accents beside their letters"],
    ["sort=-name", ["src_c", "src_a", "src_b"], "by name from the end"],
    ["sort=year", ["src_c", "src_b", "src_a"], "by year, those of one year by name"],
    ["sort=-values", ["src_a", "src_c", "src_b"], "those with most values first"],
    ["sort=shoe-size", ["src_b", "src_a", "src_c"], "an order that is none is passed over"],
    ["q=cox 1989", ["src_a"], "every word must be there"],
    ["q=10.5555/TABLES", ["src_c"], "a DOI is found in any case"],
    ["q=retracted", ["src_b"], "a notice is looked through"],
    ["kind=measurement", ["src_b"], "one kind alone"],
    ["kind=notice", ["src_b"], "those with a notice"],
    ["kind=poem", ["src_b", "src_a", "src_c"], "a kind that is none is passed over"],
    ["q=nothing", [], "none"],
  ])("?%s: %j, %s", (search, expected) => {
    expect(ids(search)).toEqual(expected);
  });

  test("is paged; a page beyond the last is the last", () => {
    const many = Array.from({ length: SOURCES_PAGE + 3 }, (_, n) =>
      source(`src_${String(n).padStart(3, "0")}`, "A", 2000),
    );
    const page = selectSources(many, readSourceQuery(new URLSearchParams("page=9")));
    expect(page).toMatchObject({ count: SOURCES_PAGE + 3, page: 2, pages: 2 });
    expect(page.rows.map((one) => one.sourceId)).toEqual(["src_050", "src_051", "src_052"]);
  });

  test("an address without end is cut", () => {
    expect(readSourceQuery(new URLSearchParams({ q: "x".repeat(10_000), page: "-1" }))).toMatchObject({
      q: "x".repeat(200),
      page: 1,
    });
  });
});
