import { expect, test } from "vitest";
import { shownHead, shownLines, shownName } from "./shownFile.ts";
import { readTableQuery } from "./tableQuery.ts";

const species = {
  key: "Na+(aq)",
  name: '=HYPERLINK("x")',
  cas: null,
  values: {
    entropy: {
      digits: "-58.450",
      uncertainty: { digits: "0.15", kind: "expanded", coverageFactor: 2 },
      origin: "stated" as const,
      sourceId: "src_calderpoint1",
    },
  },
};

test("a line holds what is shown with its digits; a name that a spreadsheet would run is quoted off, a number is not", () => {
  expect(shownLines(3, ["entropy"], [species])).toBe(
    `3,Na+(aq),"'=HYPERLINK(""x"")",,-58.450,0.15,expanded,2,stated,src_calderpoint1\r\n`,
  );
});

test("every line has as many fields as the head, also where nothing stands", () => {
  const fields = (line: string): number => line.split(",").length;
  const bare = { ...species, name: "sodium ion", values: {} };
  expect(fields(shownLines(3, ["entropy", "heatCapacity"], [bare]))).toBe(
    fields(shownHead(["entropy", "heatCapacity"])),
  );
});

test.each([
  ["", "tablewright-edition-3-as-shown.csv"],
  ["phase=g&element=Na+Cl&property=-cas&sort=-entropy", "tablewright-edition-3-Na-Cl-g-no-cas-by-entropy.csv"],
  ["q=../../%22%0D%0Aevil", "tablewright-edition-3-evil.csv"],
])("the name says edition and filter in plain letters: %s", (query, name) => {
  expect(shownName(3, readTableQuery(new URLSearchParams(query)), "csv")).toBe(name);
});
