import { describe, expect, test } from "vitest";
import { queryInWords, readTableQuery } from "./tableQuery.ts";

const read = (query: string) => readTableQuery(new URLSearchParams(query));

describe("the address of the table", () => {
  test("says nothing: every species by formula, the usual columns", () => {
    expect(read("")).toMatchObject({
      filter: { search: null, elements: [], phases: [], holds: [], lacks: [] },
      order: { by: "key", direction: "ascending" },
      columns: ["enthalpyOfFormation", "entropy", "gibbsEnergyOfFormation", "heatCapacity"],
      page: 1,
      remarks: [],
    });
  });

  test("elements may be separated as people do, or given one by one", () => {
    expect(read("element=H,+O;Na").filter.elements).toEqual(["H", "O", "Na"]);
    expect(read("element=H&element=O").filter.elements).toEqual(["H", "O"]);
  });

  test("a property present, and one missing", () => {
    expect(read("property=entropy").filter).toMatchObject({ holds: ["entropy"], lacks: [] });
    expect(read("property=-entropy").filter).toMatchObject({ holds: [], lacks: ["entropy"] });
  });

  test("what else can be missing, and several conditions at once", () => {
    expect(read("property=entropy&property=-cas&property=-uncertainty&property=-stated").filter).toMatchObject({
      holds: ["entropy"],
      lacks: [],
      bare: ["uncertainty", "cas", "stated"],
    });
  });

  test("kinds of species, several phases, and how the elements are meant", () => {
    expect(read("kind=anion&phase=g&phase=aq&how=exactly&element=S+O").filter).toMatchObject({
      charge: "anion",
      phases: ["g", "aq"],
      elementsHow: "exactly",
    });
  });

  test.each([
    ["", "every species, by key, ascending"],
    ["phase=g&sort=-entropy", "species in phase g, by S°, descending"],
    [
      "kind=ion&element=S+O&how=only&property=-cas&source=Cox&sort=hill",
      "ions with nothing but S, O with no CAS number from “Cox”, by formula, ascending",
    ],
  ])("in words: %s", (query, words) => {
    expect(queryInWords(read(query))).toBe(words);
  });

  test("order and columns; columns stand in the usual order whatever order they are given in", () => {
    expect(read("sort=-entropy").order).toEqual({ by: "entropy", direction: "descending" });
    expect(read("column=heatCapacity&column=entropy").columns).toEqual(["entropy", "heatCapacity"]);
  });

  test("what cannot be read is left out and remarked on, never an error", () => {
    const query = read("element=Xx+H&phase=plasma&property=colour&sort=taste&page=-1&column=smell&unknown=1");
    expect(query.filter).toMatchObject({ elements: ["H"], phases: [], holds: [], lacks: [] });
    expect(query).toMatchObject({ order: { by: "key" }, page: 1 });
    expect(query.remarks).toHaveLength(3);
    expect(query.remarks[0]).toContain("“Xx”");
  });
});
