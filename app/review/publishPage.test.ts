import { describe, expect, test } from "vitest";
import { digits } from "#app/thermo/digits.ts";
import type { LineContent } from "./content.ts";
import { countsInWords, LISTED_LINES, nextEditionContent, type WaitingLine } from "./publishPage.ts";
import type { Stood } from "./revisionPage.ts";

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
const waiting = (id: string, revisionId: number, content: LineContent): WaitingLine => ({
  id,
  revisionId,
  kind: content.kind,
  speciesId: "nh3",
  property: content.kind === "value" || content.kind === "withdrawal" ? "enthalpyOfFormation" : null,
  sourceId: null,
  content,
});
const revision = (id: number) => ({ id, title: `Revision ${id}`, madeByName: "Ines", decided: null });
const content = (lines: readonly WaitingLine[], stood: ReadonlyMap<string, Stood> = new Map()) =>
  nextEditionContent({
    lines,
    revisions: new Map([12, 13].map((id) => [id, revision(id)])),
    stood,
    names: new Map([["nh3", { key: "NH3(g)", name: "ammonia", stands: true }]]),
    printCitation: () => "",
  });

describe("the next edition", () => {
  const stands = { content: value("-45.94"), since: 1, waitsIn: null } as const;

  test("tells what is new from what changes and what goes, revision by revision", () => {
    const lines = [
      waiting("1", 12, value("-45.90")),
      waiting("2", 12, value("1.0")),
      waiting("3", 13, { kind: "withdrawal", reason: "no source" }),
    ];
    const next = content(
      lines,
      new Map([
        ["1", stands],
        ["3", stands],
      ]),
    );
    expect(next.revisions.map((one) => [one.id, ...one.lines.map((line) => line.what)])).toEqual([
      [12, "changed", "new"],
      [13, "withdrawn"],
    ]);
    expect(next.revisions[0]?.lines[0]).toMatchObject({ about: "NH3(g) ΔfH°", difference: "0.04" });
    expect(countsInWords(next.counts)).toBe("1 new value, 1 changed value, 1 value taken out");
  });

  test("a value set where one was only proposed to be taken out is new", () => {
    const gone = { content: { kind: "withdrawal", reason: "x" }, since: null, waitsIn: 12 } as const;
    expect(content([waiting("1", 13, value("1.0"))], new Map([["1", gone]])).counts).toMatchObject({ newValues: 1 });
  });

  test("a long revision is cut in the list and counted whole", () => {
    const lines = Array.from({ length: LISTED_LINES + 5 }, (_, index) => waiting(String(index), 12, value("1.0")));
    const next = content(lines);
    expect(next.revisions[0]).toMatchObject({ more: 5 });
    expect(next.counts.lines).toBe(LISTED_LINES + 5);
  });
});
