import { describe, expect, test } from "vitest";
import { SOURCE_FORM, type SourceField } from "./sourceFields.ts";
import { cslOf, describedSource, newSource, readSourceForm, typedSource } from "./sourceForm.ts";

const read = (typed: Partial<Record<SourceField, string>>) => readSourceForm((field) => typed[field] ?? "");

const wrong = (typed: Partial<Record<SourceField, string>>): Partial<Record<SourceField, string>> => {
  const result = read(typed);
  return result.ok ? {} : Object.fromEntries(result.errors.map(({ field, detail }) => [field, detail]));
};

const article = {
  work: "article",
  title: "Single-ion thermodynamics",
  authors: "Marin, A. B.\nOkafor, C.",
  year: "2019",
  container: "Journal of Bench Calorimetry",
  volume: "12",
  issue: "3",
  pages: "101-118",
  doi: "10.5555/jbc.2019.101",
  sourceKind: "measurement",
} as const;

describe("a new source", () => {
  const source = newSource.parse({
    title: " Key values ",
    authors: "Cox, J. D.\nWagman, D. D.\nCalder Point Laboratory",
    year: "1989",
    container: "",
    publisher: "Hemisphere",
    doi: "https://doi.org/10.1063/1.555845",
    sourceKind: "evaluation",
    note: "",
  });

  test("is cited in CSL-JSON, with a bare DOI and without what is empty", () => {
    expect(cslOf(source)).toEqual({
      type: "book",
      title: "Key values",
      author: [
        { family: "Cox", given: "J. D." },
        { family: "Wagman", given: "D. D." },
        { literal: "Calder Point Laboratory" },
      ],
      issued: { "date-parts": [[1989]] },
      publisher: "Hemisphere",
      DOI: "10.1063/1.555845",
    });
  });

  test("becomes a line's content with its DOI, kind and notice", () => {
    const result = read({ ...article, notice: "Retracted in 2020." });
    expect(result.ok && describedSource(result.source)).toEqual({
      citation: {
        type: "article-journal",
        title: "Single-ion thermodynamics",
        author: [
          { family: "Marin", given: "A. B." },
          { family: "Okafor", given: "C." },
        ],
        issued: { "date-parts": [[2019]] },
        "container-title": "Journal of Bench Calorimetry",
        volume: "12",
        issue: "3",
        page: "101-118",
        DOI: "10.5555/jbc.2019.101",
      },
      doi: "10.5555/jbc.2019.101",
      sourceKind: "measurement",
      notice: "Retracted in 2020.",
    });
  });
});

describe("what is wrong is said at its field", () => {
  test.each<[string, Partial<Record<SourceField, string>>, SourceField, RegExp]>([
    ["no title", { ...article, title: " " }, "title", /Give the title/],
    ["no kind", { ...article, sourceKind: "" }, "sourceKind", /how the values came about/],
    ["a kind of work that is none", { ...article, work: "poem" }, "work", /Choose one/],
    ["a year in words", { ...article, year: "last spring" }, "year", /four digits/],
    ["an article in nothing", { ...article, container: "" }, "container", /journal/],
    ["a chapter of nothing", { ...article, work: "chapter", container: "" }, "container", /book/],
    ["a DOI without a registrant", { ...article, doi: "10.1/x" }, "doi", /begins with 10\./],
    ["a DOI with a blank", { ...article, doi: "10.1063/1. 555845" }, "doi", /begins with 10\./],
    ["an address that runs something", { ...article, url: "javascript:alert(1)" }, "url", /whole address/],
    ["an address without scheme", { ...article, url: "calderpoint.example" }, "url", /whole address/],
    ["a page of no address", { work: "webpage", title: "T", sourceKind: "estimate" }, "url", /address of the page/],
    ["a day without address", { ...article, accessed: "2026-03-12" }, "url", /on that day/],
    ["a day there is not", { ...article, url: "https://a.example/", accessed: "2026-02-30" }, "accessed", /2026-03-12/],
    ["too long a title", { ...article, title: "x".repeat(501) }, "title", /longer than the record takes/],
  ])("%s", (_what, typed, field, sentence) => {
    expect(wrong(typed)[field]).toMatch(sentence);
  });

  test("everything at once", () => {
    expect(Object.keys(wrong({ year: "x", doi: "x" })).sort()).toEqual(["doi", "sourceKind", "title", "year"]);
  });
});

describe("a source that is mended", () => {
  const standing = {
    citation: {
      type: "book",
      title: "Key vlaues",
      author: [{ family: "Berg", given: "H.", "non-dropping-particle": "van den" }],
      publisher: "Hemisphere",
      editor: [{ family: "Ito", given: "K." }],
    },
    doi: null,
    sourceKind: "evaluation",
    notice: null,
  } as const;

  test("stands in the form as it is cited, and comes back unchanged", () => {
    const typed = typedSource(standing);
    expect(typed).toMatchObject({ work: "book", title: "Key vlaues", authors: "van den Berg, H.", doi: "" });
    const result = readSourceForm((field) => typed[field]);
    expect(result.ok && describedSource(result.source, standing.citation)).toEqual(standing);
  });

  test("keeps what the form has no field for, and loses what was emptied", () => {
    const result = readSourceForm((field) => ({ ...typedSource(standing), title: "Key values", publisher: "" })[field]);
    expect(result.ok && describedSource(result.source, standing.citation).citation).toEqual({
      type: "book",
      title: "Key values",
      author: standing.citation.author,
      editor: standing.citation.editor,
    });
  });

  test("keeps a kind of work that the form does not know", () => {
    const patent = { ...standing, citation: { ...standing.citation, type: "patent" } };
    const result = readSourceForm((field) => typedSource(patent)[field]);
    expect(result.ok && describedSource(result.source, patent.citation).citation["type"]).toBe("patent");
  });
});

test("the page has a field for everything the record takes, once", () => {
  expect(SOURCE_FORM.map(({ name }) => name).sort()).toEqual(Object.keys(newSource.shape).sort());
});
