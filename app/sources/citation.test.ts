import { describe, expect, test } from "vitest";
import { type Citation, citationPieces, fullCitation, noteOf, plainCitation, shortCitation } from "./citation.ts";

// J. D. Cox, D. D. Wagman, V. A. Medvedev, CODATA Key Values for Thermodynamics, Hemisphere, New York, 1989.
const keyValues = {
  type: "book",
  title: "CODATA Key Values for Thermodynamics",
  author: [
    { family: "Cox", given: "J. D." },
    { family: "Wagman", given: "D. D." },
    { family: "Medvedev", given: "V. A." },
  ],
  publisher: "Hemisphere",
  "publisher-place": "New York",
  issued: { "date-parts": [[1989]] },
  note: "as remembered",
};

// D. D. Wagman and seven others, J. Phys. Chem. Ref. Data 11, Suppl. 2, 1982: eight authors (from memory).
const eight = ["Wagman", "Evans", "Parker", "Schumm", "Halow", "Bailey", "Churney", "Nuttall"];
const nbs = {
  type: "article-journal",
  title: "The NBS Tables of Chemical Thermodynamic Properties",
  author: eight.map((family) => ({ family })),
  "container-title": "J. Phys. Chem. Ref. Data",
  volume: "11",
  issue: "Suppl. 2",
  issued: { "date-parts": [[1982]] },
};

/** The words set in italics. */
const italics = (citation: Citation): string[] =>
  citationPieces(citation).flatMap((piece) => (piece.italic ? [piece.text] : []));

describe("the full form", () => {
  test("a book: authors, title in italics, publisher, place and year", () => {
    expect(fullCitation(keyValues)).toBe(
      "J. D. Cox, D. D. Wagman, V. A. Medvedev, CODATA Key Values for Thermodynamics, Hemisphere, New York, 1989",
    );
    expect(italics(keyValues)).toEqual(["CODATA Key Values for Thermodynamics"]);
    expect(noteOf(keyValues)).toBe("as remembered");
  });

  test("an article: its journal in italics with volume, issue and pages, as text and as numbers", () => {
    const article = {
      type: "article-journal",
      author: [
        { family: "Jenkins", given: "H. D. B." },
        { family: "Glasser", given: "L." },
      ],
      title: "Ionic hydrates",
      "container-title": "Inorg. Chem.",
      volume: 41,
      issue: "17",
      page: "4378-4388",
      issued: { "date-parts": [["2002", 8, 1]] },
    };
    expect(fullCitation(article)).toBe(
      "H. D. B. Jenkins, L. Glasser, Ionic hydrates, Inorg. Chem. 41 (17), 4378–4388, 2002",
    );
    expect(italics(article)).toEqual(["Inorg. Chem."]);
  });

  test.each<[string, Citation, string, string[]]>([
    [
      "a chapter names its book and who edited it",
      {
        type: "chapter",
        title: "Solutes",
        author: [{ family: "Ito", given: "K." }],
        "container-title": "Tables of Heat",
        editor: [
          { family: "Berg", given: "H." },
          { family: "Cole", given: "J." },
        ],
        page: "11-40",
        publisher: "Quay Press",
        issued: { "date-parts": [[1999]] },
      },
      "K. Ito, Solutes, in Tables of Heat, edited by H. Berg, J. Cole, 11–40, Quay Press, 1999",
      ["Tables of Heat"],
    ],
    [
      "a report says which one it is",
      { type: "report", title: "Salts", genre: "Technical report", number: "7", publisher: "Quay Institute" },
      "Salts, Technical report 7, Quay Institute",
      ["Salts"],
    ],
    [
      "a thesis says so and names its university",
      {
        type: "thesis",
        title: "Oxides",
        author: [{ family: "Ito", given: "K." }],
        publisher: "Quay University",
        issued: { "date-parts": [[2001]] },
      },
      "K. Ito, Oxides, thesis, Quay University, 2001",
      ["Oxides"],
    ],
    [
      "a data set says so",
      { type: "dataset", title: "Bench data", author: [{ literal: "Quay Institute" }], publisher: "Quay Institute" },
      "Quay Institute, Bench data, data set",
      [],
    ],
    [
      "a page on the web has its address and the day it was read",
      {
        type: "webpage",
        title: "Constants",
        URL: "https://tables.example/constants",
        accessed: { "date-parts": [[2026, 3, 2]] },
      },
      "Constants, https://tables.example/constants, read on 2026-03-02",
      [],
    ],
    [
      "an in-house measurement is called what it is, and its laboratory is named once",
      {
        type: "manuscript",
        title: "Bomb calorimeter, notebook 12",
        author: [{ literal: "Calder Point Laboratory" }],
        publisher: "Calder Point Laboratory",
        issued: { "date-parts": [[2026]] },
      },
      "Calder Point Laboratory, Bomb calorimeter, notebook 12, in-house record, 2026",
      [],
    ],
    [
      "a book that only editors signed stands under their names",
      { type: "book", title: "Heats", edition: "2", editor: [{ family: "Berg", given: "H." }] },
      "H. Berg (ed.), Heats, 2nd edition",
      ["Heats"],
    ],
    [
      "a number of a series stands in the series",
      { type: "book", title: "Heats", "container-title": "Quay Monographs", volume: "3" },
      "Heats, Quay Monographs 3",
      ["Quay Monographs"],
    ],
  ])("%s", (_what, citation, printed, inItalics) => {
    expect(fullCitation(citation)).toBe(printed);
    expect(italics(citation)).toEqual(inItalics);
  });

  test("eight authors are all named, in their order; of nine the first six", () => {
    expect(fullCitation(nbs)).toBe(
      `${eight.join(", ")}, The NBS Tables of Chemical Thermodynamic Properties, J. Phys. Chem. Ref. Data 11 (Suppl. 2), 1982`,
    );
    const nine = { ...nbs, author: [...nbs.author, { family: "Ninth" }] };
    expect(fullCitation(nine)).toMatch(/^Wagman, Evans, Parker, Schumm, Halow, Bailey, et al\., The NBS/);
  });

  test.each([
    [1, "1st edition"],
    [2, "2nd edition"],
    [3, "3rd edition"],
    [11, "11th edition"],
    [112, "112th edition"],
    [22, "22nd edition"],
    ["revised edition", "revised edition"],
  ])("edition %s is printed as %s", (edition, printed) => {
    expect(fullCitation({ title: "T", edition })).toBe(`T, ${printed}`);
  });
});

describe("the DOI", () => {
  test("stands at the end as a link whose characters are safe in an address", () => {
    expect(citationPieces({ title: "T" }, "10.1002/(SICI)1<1::AID#3?x>3.0")).toEqual([
      { text: "T" },
      { text: ", " },
      {
        text: "doi:10.1002/(SICI)1<1::AID#3?x>3.0",
        href: "https://doi.org/10.1002/(SICI)1%3C1::AID%233%3Fx%3E3.0",
      },
    ]);
  });

  test("takes the place of another address, and is an address in the text to paste elsewhere", () => {
    const citation = { title: "T", URL: "https://tables.example/t" };
    expect(plainCitation(citation, "10.1063/1.555845")).toBe("T, https://doi.org/10.1063/1.555845");
    expect(plainCitation(citation, null)).toBe("T, https://tables.example/t");
  });

  test("an address that is none is not linked to", () => {
    expect(citationPieces({ title: "T", URL: "javascript:alert(1)" })).toEqual([{ text: "T" }]);
  });
});

describe("the short form", () => {
  test.each<[string, Citation, string]>([
    ["three authors", keyValues, "Cox et al., 1989"],
    [
      "two authors",
      { author: [{ family: "Pitzer" }, { family: "Mayorga" }], issued: { raw: "in 1973" } },
      "Pitzer and Mayorga, 1973",
    ],
    [
      "one author with a particle",
      { author: [{ family: "Berg", "non-dropping-particle": "van den" }] },
      "van den Berg",
    ],
    ["nobody", { title: "Cell 3, notebook 12" }, "Cell 3, notebook 12"],
    ["only editors", { editor: [{ family: "Ito" }], title: "T" }, "Ito"],
    [
      "a body and no year that can be read",
      { author: [{ literal: "Calder Point Laboratory" }], issued: { raw: "spring 2026" } },
      "Calder Point Laboratory, 2026",
    ],
  ])("%s", (_who, citation, printed) => {
    expect(shortCitation(citation)).toBe(printed);
  });
});

test("fields of a wrong form are left out", () => {
  const broken = { title: "Cell 3", author: "somebody", editor: [7], issued: 1989, volume: {}, page: [], accessed: 3 };
  expect(fullCitation(broken)).toBe("Cell 3");
  expect(fullCitation({})).toBe("");
});
