import { describe, expect, it, test } from "vitest";
import { readFormula } from "./formula.ts";
import { readNumber } from "./number.ts";
import { readPhase } from "./phase.ts";
import { readAs } from "./readAs.ts";
import type { Reading } from "./reading.ts";
import { NOT_READ, type Notation, READ } from "./spellings.ts";
import { readUnit } from "./unit.ts";

const notations = Object.keys(readAs) as Notation[];

describe.each(notations)("%s: spellings with one reading", (notation) => {
  describe.each(READ[notation])("$why", ({ rows }) => {
    it.each(rows)("%j is %s", (text, reading) => {
      expect(readAs[notation](text)).toMatchObject({ outcome: "read", value: reading });
    });

    it.each(rows)("and what %j is read as is read back as itself", (_text, reading) => {
      expect(readAs[notation](reading)).toMatchObject({ outcome: "read", value: reading });
    });
  });
});

describe.each(notations)("%s: spellings that are refused or asked about", (notation) => {
  describe.each(NOT_READ[notation])("$why", ({ rows }) => {
    it.each(rows)("%j: %j", (text, expected) => {
      const reading = readAs[notation](text);
      if (typeof expected === "string") {
        expect(reading).toMatchObject({ outcome: "refused", sentence: expect.stringContaining(expected) });
      } else {
        expect(reading).toMatchObject({
          outcome: "ambiguous",
          candidates: expected,
          sentence: expect.stringMatching(/./),
        });
      }
    });
  });
});

test("at least 250 spellings are read and at least 80 refused or asked about, none listed twice", () => {
  const texts = (groups: Record<Notation, readonly { rows: readonly (readonly [string, unknown])[] }[]>) =>
    notations.flatMap((notation) =>
      groups[notation].flatMap(({ rows }) => rows.map(([text]) => `${notation} ${text}`)),
    );
  const [accepted, others] = [texts(READ), texts(NOT_READ)];
  expect(accepted.length).toBeGreaterThanOrEqual(250);
  expect(others.length).toBeGreaterThanOrEqual(80);
  expect(new Set([...accepted, ...others]).size).toBe(accepted.length + others.length);
});

test("no reader throws or dawdles, whatever is repeated", () => {
  const pieces = [
    "\\ce{",
    "<b>",
    "(",
    "1 ",
    "1,",
    "H2",
    "·5H2O",
    "[1]",
    "_{",
    "kJ ",
    "/mol",
    "e1",
    "²",
    "±",
    "k=",
    "$",
  ];
  for (const notation of notations) {
    for (const piece of pieces) {
      expect(["read", "ambiguous", "refused"]).toContain(readAs[notation](piece.repeat(120).slice(0, 480)).outcome);
      expect(readAs[notation](piece.repeat(400)).outcome).toBe("refused");
    }
  }
});

test("each group says why", () => {
  const groups = notations.flatMap((notation) => [...READ[notation], ...NOT_READ[notation]]);
  expect(groups.filter(({ why, rows }) => why.length < 3 || rows.length === 0)).toEqual([]);
});

test("a mark that is taken off, an estimate and a calorie of another kind are noted", () => {
  const noted = (reading: Reading<unknown>) => (reading.outcome === "read" ? reading.notes.join(" ") : "");
  expect(noted(readNumber("205.152*"))).toBe("Footnote mark * taken off.");
  expect(noted(readNumber("[205.15]"))).toContain("estimate");
  expect(noted(readNumber("285·83"))).toContain("raised point");
  expect(noted(readUnit("kcal(IT)/mol"))).toContain("4.1868 J");
  expect(noted(readUnit("eV"))).toContain("per particle");
  expect(noted(readFormula("Fe0,947O"))).toContain("decimal comma");
  expect(noted(readPhase("graphite"))).toContain("form of a crystal");
});
