import { expect, test } from "vitest";
import { fullCitation, noteOf, shortCitation } from "./citation.ts";

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

test("a book is cited with its authors, publisher, place and year", () => {
  expect(fullCitation(keyValues)).toBe(
    "J. D. Cox, D. D. Wagman, V. A. Medvedev, CODATA Key Values for Thermodynamics, Hemisphere, New York, 1989",
  );
  expect(shortCitation(keyValues)).toBe("Cox and others, 1989");
  expect(noteOf(keyValues)).toBe("as remembered");
});

test("an article names its journal with volume, issue and page", () => {
  const article = {
    author: [
      { family: "Jenkins", given: "H. D. B." },
      { family: "Glasser", given: "L." },
    ],
    title: "Ionic hydrates",
    "container-title": "Inorg. Chem.",
    volume: "41",
    issue: 17,
    page: "4378",
    issued: { "date-parts": [["2002", 8, 1]] },
  };
  expect(fullCitation(article)).toBe("H. D. B. Jenkins, L. Glasser, Ionic hydrates, Inorg. Chem. 41 (17), 4378, 2002");
  expect(shortCitation(article)).toBe("Jenkins and Glasser, 2002");
});

test("what nobody signed is cited by its title, and fields of a wrong form are left out", () => {
  expect(shortCitation({ title: "Cell 3, notebook 12" })).toBe("Cell 3, notebook 12");
  expect(fullCitation({ title: "Cell 3", author: "somebody", issued: 1989, volume: {} })).toBe("Cell 3");
  expect(shortCitation({ author: [{ literal: "Calder Point Laboratory" }], issued: { raw: "spring 2026" } })).toBe(
    "Calder Point Laboratory, 2026",
  );
});
