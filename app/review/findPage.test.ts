import { describe, expect, test } from "vitest";
import { holdsWords } from "#app/sources/citation.ts";
import { readDoi, readNumbers } from "./findPage.ts";

describe("numbers", () => {
  test.each([
    ["sheet 3", { edition: null, revision: null, sheet: 3, named: true }],
    ["edition 2", { edition: 2, revision: null, sheet: null, named: true }],
    ["Ed. 2", { edition: 2, revision: null, sheet: null, named: true }],
    ["revision 14", { edition: null, revision: 14, sheet: null, named: true }],
    ["rev.14", { edition: null, revision: 14, sheet: null, named: true }],
    ["Revision no. 14", { edition: null, revision: 14, sheet: null, named: true }],
    ["#14", { edition: 14, revision: 14, sheet: 14, named: false }],
    [" 14 ", { edition: 14, revision: 14, sheet: 14, named: false }],
  ])("%s may be %o", (text, numbers) => {
    expect(readNumbers(text)).toEqual(numbers);
  });

  // A number beyond what the database counts to, a CAS number, and words that only begin alike are no numbers of ours.
  test.each(["0", "edition", "edition 0", "12345678901", "7732-18-5", "edited 2", "H2O", "-1", "2.5", ""])(
    "%s is none",
    (text) => {
      expect(readNumbers(text)).toEqual({ edition: null, revision: null, sheet: null, named: false });
    },
  );
});

describe("words", () => {
  const title = "CODATA Key Values for Thermodynamics, 1989";

  test.each(["codata", "key codata", "thermo", "1989", "Key VALUES"])("%s are found", (typed) => {
    expect(holdsWords(title, typed)).toBe(true);
  });

  test.each(["nbs", "codata nbs", "C", "89", "", "  "])("%s are not", (typed) => {
    expect(holdsWords(title, typed)).toBe(false);
  });

  test("a short part is found as a whole word", () => {
    expect(holdsWords("Ions in D2 gas", "in")).toBe(true);
    expect(holdsWords("Inner salts", "in")).toBe(false);
  });
});

test.each([
  ["10.1063/1.555845", "10.1063/1.555845"],
  ["https://doi.org/10.1063/1.555845", "10.1063/1.555845"],
  ["doi: 10.1063/ABC", "10.1063/abc"],
  ["10.5", null],
  ["CODATA", null],
])("%s is the DOI %s", (text, doi) => {
  expect(readDoi(text)).toBe(doi);
});
