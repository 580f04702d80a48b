import { expect, test } from "vitest";
import { twinsOf } from "./twins.ts";

const cited = (title: string, year: number, family: string) => ({
  title,
  issued: { "date-parts": [[year]] },
  author: [{ family }],
});

const known = [
  { sourceId: "src_a", citation: cited("Key Values: for Thermodynamics", 1989, "Cox"), doi: null },
  { sourceId: "src_b", citation: cited("Tables", 1982, "Wagman"), doi: "10.1063/1.ABC" },
];

test.each([
  [
    "the DOI in another case and as an address",
    { citation: cited("X", 2000, "Y"), doi: "https://doi.org/10.1063/1.abc" },
    ["src_b", "the same DOI"],
  ],
  [
    "the title in another case and punctuation",
    { citation: cited("key values for  thermodynamics", 1989, "COX"), doi: null },
    ["src_a", "the same title, year and first author"],
  ],
])("%s is a twin", (_what, described, [sourceId, because]) => {
  expect(twinsOf(described, known).map((twin) => [twin.source.sourceId, twin.because])).toEqual([[sourceId, because]]);
});

test.each([
  ["another year", { citation: cited("Tables", 1983, "Wagman"), doi: null }],
  ["another first author", { citation: cited("Tables", 1982, "Evans"), doi: null }],
  ["another DOI", { citation: cited("X", 2000, "Y"), doi: "10.1063/1.abcd" }],
  ["no DOI, where the known one has none either", { citation: cited("X", 1989, "Cox"), doi: null }],
])("%s is another source", (_what, described) => {
  expect(twinsOf(described, known)).toEqual([]);
});
