import { describe, expect, test } from "vitest";
import type { Suggestion } from "#app/checks/types.ts";
import { digits } from "#app/thermo/digits.ts";
import type { Property } from "#app/thermo/property.ts";
import type { LineContent, ValueContent } from "./content.ts";
import {
  cleanLines,
  LINES_A_PAGE,
  type PageFinding,
  type PageLine,
  repairsOf,
  revisionPage,
  type RevisionPageInput,
} from "./revisionPage.ts";

/* Numbers: ammonia and calcium oxide of the CODATA Key Values (1989), and made-up changes of them. */

const value = (text: string, standard: string | null = null): ValueContent => ({
  kind: "value",
  digits: digits(text),
  uncertainty: standard === null ? null : { digits: digits(standard), kind: "standard", coverageFactor: null },
  temperature: digits("298.15"),
  standardPressure: digits("100000"),
  basis: null,
  origin: "stated",
  method: null,
  given: { text, unit: "kJ/mol", note: null },
  remark: null,
  sourceId: "src_one",
});

const ENTHALPY: Property = "enthalpyOfFormation";
let position = 0;
function line(id: string, speciesId: string, content: LineContent, rest: Partial<PageLine> = {}): PageLine {
  position += 1;
  return {
    id,
    position,
    kind: content.kind,
    speciesId,
    property: content.kind === "value" || content.kind === "withdrawal" ? ENTHALPY : null,
    sourceId: null,
    rowNumber: null,
    state: "open",
    publishedIn: null,
    cameFrom: null,
    cameAt: null,
    versionId: `${id}0`,
    version: 1,
    content,
    overtaken: false,
    behind: null,
    ...rest,
  };
}

const finding = (
  id: string,
  lineId: string | null,
  speciesId: string,
  severity: PageFinding["severity"],
  rest = {},
): PageFinding => ({
  id,
  lineId,
  speciesId,
  property: ENTHALPY,
  check: "gibbs-closure",
  title: "Gibbs closure",
  severity,
  sentence: "It does not close.",
  arithmetic: [],
  suggestions: [],
  setAside: null,
  ...rest,
});

const NH3 = line("1", "nh3", value("-49.54", "0.30"));
const ZNO = line("2", "zno", value("-350.1", "0.5"));
const CAO = line("3", "cao", value("-635.1", "0.4"));
const LOOKS = finding("11", "2", "zno", "look");
const BLOCKS = finding("12", "1", "nh3", "block");
const names = new Map(
  [
    ["nh3", "NH3(g)"],
    ["zno", "ZnO(cr)"],
    ["cao", "CaO(cr)"],
  ].map(([id = "", key = ""]) => [id, { key, name: "", stands: true }]),
);

function input(rest: Partial<RevisionPageInput> = {}): RevisionPageInput {
  return {
    revision: {
      id: 14,
      title: "In-house calorimetry",
      summary: "",
      state: "in_review",
      round: 1,
      sheetId: null,
      sheetName: null,
      madeBy: "ines",
      madeByName: "Ines Halvard",
      madeAt: new Date("2026-03-27T09:00:00Z"),
      sentAt: null,
      decidedAt: null,
    },
    newest: 7,
    lines: [CAO, ZNO, NH3],
    takenOut: [],
    stood: new Map([["1", { content: value("-45.94", "0.175"), since: 1, waitsIn: null }]]),
    now: new Map(),
    names,
    citations: new Map(),
    printCitation: (citation) => String(citation["title"]),
    findings: [LOOKS, BLOCKS],
    findingsBefore: [],
    decisions: [],
    versions: [],
    comments: [],
    moves: [],
    setAsides: [],
    takenOver: [],
    wentInto: [],
    hands: new Set(),
    rights: { write: false, comment: true, decide: true },
    show: "all",
    page: 1,
    ...rest,
  };
}

const keys = (rest: Partial<RevisionPageInput> = {}) =>
  revisionPage(input(rest)).groups.map((group) => group.speciesKey);

describe("order", () => {
  test("what blocks stands first, then what asks to be looked at, then the clean lines", () => {
    expect(keys()).toEqual(["NH3(g)", "ZnO(cr)", "CaO(cr)"]);
  });

  test("a finding that was set aside leaves its species in place and takes the mark away", () => {
    const aside = { ...BLOCKS, setAside: { reason: "measured twice", by: "Ruth Amsel", at: new Date() } };
    const page = revisionPage(input({ findings: [aside, LOOKS] }));
    expect(page.groups.map((group) => group.speciesKey)).toEqual(["NH3(g)", "ZnO(cr)", "CaO(cr)"]);
    expect(page.groups[0]?.lines[0]?.mark).toBeNull();
    expect(page.groups[0]?.lines[0]?.hasSetAside).toBe(true);
    expect(page.counts).toMatchObject({ blocks: 0, looks: 1 });
  });

  test("a finding on the species as a whole is told under its first line", () => {
    const page = revisionPage(input({ findings: [finding("13", null, "cao", "look")] }));
    const cao = page.groups.find((group) => group.speciesKey === "CaO(cr)");
    expect(cao?.rank).toBe("look");
    expect(cao?.lines[0]?.findings).toHaveLength(1);
  });
});

describe("figures", () => {
  const first = () => revisionPage(input()).groups[0]?.lines[0];

  test("the difference is exact: −49.54 less −45.94 is −3.60, with its zero", () => {
    expect(first()?.difference).toBe("-3.60");
  });

  test("E_n is |difference| over both expanded uncertainties (ISO 13528): 3.60 / √(0.60² + 0.35²) = 5.18", () => {
    expect(first()?.normalizedError).toBeCloseTo(5.183, 3);
  });

  test("a place where nothing stood has neither", () => {
    const page = revisionPage(input({ stood: new Map() }));
    expect(page.groups[0]?.lines[0]).toMatchObject({ stood: null, difference: null, normalizedError: null });
  });
});

describe("the clean lines", () => {
  const clean = (rest: Partial<RevisionPageInput> = {}) => cleanLines(input(rest)).map((seen) => seen.lineId);

  test("are those of species without a block or a look", () => {
    expect(clean()).toEqual(["3"]);
  });

  test("leave out every line of a species of which one blocks: a set is not half accepted", () => {
    const gibbs = line("4", "nh3", value("-16.41"), { property: "gibbsEnergyOfFormation" });
    expect(clean({ lines: [CAO, NH3, gibbs] })).toEqual(["3"]);
  });

  test("leave out what is decided, overtaken, the viewer's own, or beside a declined line of the species", () => {
    const entropy = line("5", "cao", value("38.1"), { property: "entropy" });
    expect(clean({ lines: [{ ...CAO, state: "accepted" }, entropy] })).toEqual(["5"]);
    expect(clean({ lines: [{ ...CAO, overtaken: true }, entropy] })).toEqual(["5"]);
    expect(clean({ lines: [{ ...CAO, behind: 12 }, entropy] })).toEqual(["5"]);
    expect(clean({ lines: [CAO, entropy], hands: new Set(["3"]) })).toEqual(["5"]);
    expect(clean({ lines: [{ ...CAO, state: "declined" }, entropy] })).toEqual([]);
  });

  test("a remark does not keep a line from being clean", () => {
    expect(clean({ findings: [finding("14", "3", "cao", "remark")] })).toEqual(["3", "2", "1"]);
  });
});

describe("what may be done", () => {
  const may = (rest: Partial<RevisionPageInput>) => {
    const page = revisionPage(input(rest));
    const cao = page.groups.find((group) => group.speciesKey === "CaO(cr)")?.lines[0];
    return { page: page.may, accept: cao?.mayAccept, decline: cao?.mayDecline, edit: cao?.mayEdit };
  };
  const steward = { write: true, comment: true, decide: false };

  test("a reviewer decides lines in review, and closes once all are decided", () => {
    expect(may({})).toMatchObject({ accept: true, decline: true, edit: false, page: { decide: true, close: false } });
    expect(may({ lines: [{ ...CAO, state: "accepted" }] })).toMatchObject({
      accept: false,
      decline: true,
      page: { close: true },
    });
  });

  test("whoever had a hand in a line decides neither it nor the review's end", () => {
    const own = may({ lines: [{ ...CAO, state: "accepted" }, ZNO], hands: new Set(["3"]) });
    expect(own).toMatchObject({ accept: false, decline: false, page: { close: false } });
  });

  test("an overtaken line can be declined and not accepted, and says what happened", () => {
    const overtaken = { ...CAO, overtaken: true };
    const now = new Map([["3", { content: value("-634.9"), since: null, waitsIn: 12 }]]);
    const page = revisionPage(input({ lines: [overtaken], now, findings: [] }));
    expect(page.groups[0]?.lines[0]).toMatchObject({
      mayAccept: false,
      mayDecline: true,
      overtaken: "Another proposal for this place (−634.9 kJ/mol) was accepted since and waits in revision 12.",
    });
  });

  test("a steward writes in a draft and not in review", () => {
    const draft = { ...input().revision, state: "draft" as const };
    expect(may({ rights: steward, revision: draft })).toMatchObject({
      accept: false,
      edit: true,
      page: { send: true, withdraw: true },
    });
    expect(may({ rights: steward })).toMatchObject({ edit: false, page: { send: false, withdraw: true } });
    const decided = { ...draft, state: "decided" as const };
    expect(may({ rights: steward, revision: decided }).page).toMatchObject({ send: false, withdraw: false });
  });

  test("only a block can be set aside, and not by whoever had a hand in a line of its species", () => {
    const aside = (hands: string[]) =>
      revisionPage(input({ hands: new Set(hands) })).groups.map((group) => group.lines[0]?.findings[0]?.maySetAside);
    expect(aside([])).toEqual([true, false, undefined]);
    expect(aside(["1"])).toEqual([false, false, undefined]);
  });
});

describe("words", () => {
  const detail = (name: string, cas: string | null): LineContent => ({
    kind: "detail",
    key: "CuO(cr)",
    printed: "CuO",
    label: null,
    name,
    cas,
    inchikey: null,
    synonyms: [],
  });
  const changesOf = (content: LineContent, before?: LineContent) => {
    const stood = new Map(before ? [["7", { content: before, since: 1, waitsIn: null }]] : []);
    return revisionPage(input({ lines: [line("7", "cuo", content)], stood })).groups[0]?.lines[0]?.changes;
  };

  test("a new species says its name and numbers; its key stands at the head of the row", () => {
    expect(changesOf(detail("copper(II) oxide", "1317-38-0"))).toEqual([
      { label: "name", before: null, after: "copper(II) oxide" },
      { label: "CAS", before: null, after: "1317-38-0" },
    ]);
  });

  test("a species called otherwise says only what changes", () => {
    expect(changesOf(detail("copper(II) oxide", "1317-38-0"), detail("cupric oxide", "1317-38-0"))).toEqual([
      {
        label: "name",
        before: "cupric oxide",
        after: "copper(II) oxide",
        runs: expect.arrayContaining([{ kind: "same", text: " oxide" }]),
      },
    ]);
  });
});

describe("suggestions", () => {
  const suggestion = (also: Suggestion["also"] = []): Pick<Suggestion, "property" | "becomes" | "also"> => ({
    property: ENTHALPY,
    becomes: "-45.94",
    also,
  });
  const gibbs = { property: "gibbsEnergyOfFormation" as const, becomes: digits("-49.54") };

  test("name the lines they rewrite", () => {
    expect(repairsOf(suggestion(), [NH3])).toEqual([{ line: NH3, becomes: "-45.94" }]);
  });

  test("cannot be taken where the revision has no line for one of the values", () => {
    expect(repairsOf(suggestion([gibbs]), [NH3])).toBeNull();
    expect(repairsOf({ ...suggestion(), property: null }, [NH3])).toBeNull();
  });
});

test("a long revision is read in pages, and no species is torn apart", () => {
  const lines = Array.from({ length: 2 * LINES_A_PAGE + 1 }, (_, index) => [
    line(`${1000 + 2 * index}`, `s${index}`, value("1.0")),
    line(`${1001 + 2 * index}`, `s${index}`, value("1.0"), { property: "entropy" }),
  ]).flat();
  const page = (number: number) => revisionPage(input({ lines, findings: [], page: number }));
  expect(page(1).pages).toEqual({ page: 1, pages: 5, from: 1, to: LINES_A_PAGE });
  expect(page(5).groups).toHaveLength(1);
  expect(page(99).pages.page).toBe(5);
  // What is accepted together does not depend on the page that is shown.
  expect(page(2).cleanSet.count).toBe(lines.length);
});
