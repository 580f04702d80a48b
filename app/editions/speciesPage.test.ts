import { describe, expect, test } from "vitest";
import { digits } from "#app/thermo/digits.ts";
import type { Property } from "#app/thermo/property.ts";
import { readKey } from "#app/thermo/speciesKey.ts";
import type { HistoricValue } from "./editions.queries.server.ts";
import {
  aboveTranslation,
  closureOf,
  drawnClosure,
  historyPoints,
  speciesHistory,
  type StandingValue,
} from "./speciesPage.ts";

function standing(
  property: Property,
  printed: string,
  sourceId = "src_one",
  remark: string | null = null,
): StandingValue {
  const unit = property === "entropy" ? "J/(mol K)" : "kJ/mol";
  return {
    property,
    digits: digits(printed),
    uncertainty: null,
    givenText: printed,
    givenUnit: unit,
    sourceId,
    remark,
  };
}

function identity(key: string) {
  const reading = readKey(key);
  if (reading.outcome !== "read") throw new Error(reading.sentence);
  return reading.value;
}

// CODATA Key Values (1989).
const elements = new Map([
  ["H", { digits: digits("130.680"), uncertainty: null, key: "H2(g)", fromSheet: false }],
  ["N", { digits: digits("191.609"), uncertainty: null, key: "N2(g)", fromSheet: false }],
]);

describe("closure on the page", () => {
  const values = (gibbs: string, remark: string | null = null) => [
    standing("enthalpyOfFormation", "-45.94"),
    standing("entropy", "192.77"),
    standing("gibbsEnergyOfFormation", gibbs, "src_one", remark),
  ];
  const closure = (gibbs: string, remark: string | null = null) =>
    closureOf(identity("NH3(g)"), values(gibbs, remark), (element) => elements.get(element));

  test("ammonia's ΔfG° follows as −16.41 kJ/mol and closes", () => {
    const drawn = drawnClosure(closure("-16.41")!);
    expect(drawn).toMatchObject({ verdict: "closes", printed: { follows: "−16.41", stated: "−16.41", gap: "0.00" } });
  });

  test("far off it blocks, and only asks to look where the source relaxed the constraint", () => {
    expect(drawnClosure(closure("-36.41")!)?.verdict).toBe("block");
    expect(drawnClosure(closure("-36.41", "G-H-S constraint has been relaxed")!)?.verdict).toBe("look");
  });

  test("with one of the three missing there is nothing to close", () => {
    expect(
      closureOf(identity("NH3(g)"), values("-16.41").slice(0, 2), (element) => elements.get(element)),
    ).toBeUndefined();
  });

  test("without an element's entropy it is not made and not drawn", () => {
    const notMade = closureOf(identity("NH3(g)"), values("-16.41"), () => undefined);
    expect(notMade?.verdict).toBe("notMade");
    expect(drawnClosure(notMade!)).toBeNull();
  });
});

test("helium's entropy is that of translation (Sackur–Tetrode, 126.153 J/(mol K)); a liquid has no such floor", () => {
  expect(aboveTranslation(identity("He(g)"), digits("126.153"), 4.0026)).toBeCloseTo(0, 2);
  expect(aboveTranslation(identity("H2O(l)"), digits("69.95"), 18.015)).toBeNull();
});

describe("history", () => {
  const row = (
    since: number,
    until: number | null,
    printed: string,
    property: Property = "entropy",
  ): HistoricValue => ({
    rowId: `${since}`,
    since,
    until,
    property,
    digits: digits(printed),
    uncertainty: null,
    sourceId: "src_one",
    revisionId: since,
    writer: "S. Steward",
    decider: "R. Reviewer",
  });
  const hands = { revisionId: 4, writer: "S. Steward", decider: "R. Reviewer" };
  const values = [row(1, 2, "96.25"), row(2, 4, "96.2")];

  test("tells what came, changed by how much, and was withdrawn and why, the newest first", () => {
    const withdrawal = { property: "entropy" as const, edition: 4, reason: "Not measured here.", ...hands };
    expect(
      speciesHistory(values, [withdrawal], []).map(({ edition, what, before, after, difference, sentence }) => [
        edition,
        what,
        before?.digits ?? null,
        after?.digits ?? null,
        difference,
        sentence,
      ]),
    ).toEqual([
      [4, "withdrawn", "96.2", null, null, "Not measured here."],
      [2, "changed", "96.25", "96.2", "-0.05", null],
      [1, "came", null, "96.25", null, null],
    ]);
  });

  test("tells how it was called before", () => {
    const named = (since: number, key: string, name: string) => ({
      key,
      name,
      printed: "CaCO3",
      label: null,
      cas: null,
      inchikey: null,
      synonyms: [],
      since,
      ...hands,
    });
    const [entry] = speciesHistory([], [], [named(1, "CaCO3(cr)", "chalk"), named(2, "CaCO3(cr,calcite)", "calcite")]);
    expect(entry).toMatchObject({
      edition: 2,
      what: "called",
      sentence: "key CaCO3(cr,calcite) (was CaCO3(cr)); name calcite (was chalk)",
    });
  });

  test("only a value that changed is drawn", () => {
    expect(historyPoints(values, "entropy")?.map((point) => [point.since, point.until, point.value])).toEqual([
      [1, 2, 96.25],
      [2, 4, 96.2],
    ]);
    expect(historyPoints([row(1, null, "1.0")], "entropy")).toBeNull();
  });
});
