import { describe, expect, test } from "vitest";
import { digits } from "#app/thermo/digits.ts";
import type { LineContent } from "./content.ts";
import type { PageDecision, PageLine, PageMove } from "./revisionPage.ts";
import { historyOf, type HistoryInput } from "./revisionPageHistory.ts";

const at = (minute: number): Date => new Date(Date.UTC(2026, 2, 28, 10, minute));
const move = (to: string, minute: number, by: string, remark = "", round = 1): PageMove => ({
  from: "",
  to,
  round,
  at: at(minute),
  by,
  remark,
});
const value = (text: string): LineContent => ({
  kind: "value",
  digits: digits(text),
  uncertainty: null,
  temperature: digits("298.15"),
  standardPressure: digits("100000"),
  basis: null,
  origin: "stated",
  method: null,
  given: { text, unit: "kJ/mol", note: null },
  remark: null,
  sourceId: "src_one",
});
const line = (id: string): PageLine => ({
  id,
  position: Number(id),
  kind: "value",
  speciesId: id,
  property: "entropy",
  sourceId: null,
  rowNumber: null,
  state: "open",
  publishedIn: null,
  cameFrom: null,
  cameAt: null,
  versionId: id,
  version: 1,
  content: value("1.0"),
  overtaken: false,
  behind: null,
});
const decision = (lineId: string, minute: number, rest: Partial<PageDecision> = {}): PageDecision => ({
  lineId,
  version: 1,
  decision: "accept",
  reason: "",
  at: at(minute),
  by: "Ruth",
  void: false,
  ...rest,
});
const lines = Array.from({ length: 9 }, (_, index) => line(String(index + 1)));

const history = (rest: Partial<HistoryInput>) =>
  historyOf(
    {
      revision: { madeByName: "Ines", madeAt: at(0) },
      lines,
      takenOut: [],
      decisions: [],
      versions: [],
      comments: [],
      moves: [],
      setAsides: [],
      takenOver: [],
      ...rest,
    },
    (one) => `line ${one.id}`,
  );
const told = (rest: Partial<HistoryInput>) =>
  history(rest).map(({ round, entries }) => [round, ...entries.map((entry) => `${entry.by} ${entry.did}`)]);

describe("rounds", () => {
  test("each sending opens one; what came before is the draft", () => {
    const moves = [move("in_review", 1, "Ines"), move("returned", 5, "Ruth"), move("in_review", 9, "Ines", "", 2)];
    expect(told({ moves, decisions: [decision("1", 3)] })).toEqual([
      [0, "Ines began it"],
      [1, "Ines sent it to review", "Ruth accepted a line", "Ruth returned it"],
      [2, "Ines sent it to review"],
    ]);
  });

  test("a remark told with the sending is not told a second time as a comment", () => {
    const comment = {
      id: "1",
      lineId: null,
      round: 1,
      body: "Please.",
      at: at(1),
      by: "Ines",
      byId: "i",
      answers: null,
    };
    const moves = [move("in_review", 1, "Ines", "Please.")];
    expect(told({ moves, comments: [comment] })[1]).toEqual([1, "Ines sent it to review"]);
    expect(told({ moves, comments: [{ ...comment, body: "And this." }] })[1]).toHaveLength(3);
  });
});

describe("decisions", () => {
  test("made in one go are one entry that names six lines and counts the rest", () => {
    const decisions = lines.map((one) => decision(one.id, 3));
    const [entry] = history({ decisions })[0]?.entries.slice(1) ?? [];
    expect(entry).toMatchObject({ did: "accepted 9 lines", more: 3 });
    expect(entry?.lines).toHaveLength(6);
  });

  test("are told apart by their reason, by a return in between, and by a long pause", () => {
    const moves = [move("in_review", 1, "Ines"), move("returned", 4, "Ruth"), move("in_review", 5, "Ines", "", 2)];
    expect(told({ moves, decisions: [decision("1", 3), decision("2", 6)] }).flat()).toContain("Ruth accepted a line");
    expect(told({ decisions: [decision("1", 3), decision("2", 30)] })[0]).toHaveLength(4);
    const declined = [
      decision("1", 3, { decision: "decline", reason: "too wide" }),
      decision("2", 3, { decision: "decline", reason: "no source" }),
    ];
    expect(told({ decisions: declined })[0]).toHaveLength(4);
  });

  test("that an edit made void stay, and say so", () => {
    const decisions = [decision("1", 3, { void: true }), decision("2", 3)];
    expect(history({ decisions })[0]?.entries[1]).toMatchObject({ did: "accepted 2 lines", voided: 1 });
  });
});

describe("edits", () => {
  const version = (number: number, text: string, minute: number, reason = "") => ({
    lineId: "1",
    version: number,
    content: value(text),
    at: at(minute),
    reason,
    by: "Ines",
  });

  test("show what stood on the line beside what it says now, with the reason", () => {
    const versions = [version(1, "-49.54", 0), version(2, "-45.94", 6, "digits exchanged")];
    expect(history({ versions })[0]?.entries[1]).toMatchObject({
      did: "changed",
      words: "digits exchanged",
      before: { digits: "-49.54" },
      after: { digits: "-45.94" },
      lines: [{ about: "line 1" }],
    });
  });

  test("the same content again is a line written anew", () => {
    const versions = [version(1, "-45.94", 0), version(2, "-45.94", 6, "restated against what stands now")];
    expect(told({ versions })[0]).toContain("Ines wrote a line anew");
  });
});
