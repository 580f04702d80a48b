import { expect, test } from "vitest";
import { digits } from "#app/thermo/digits.ts";
import { type ComparedValue, valueChange } from "./compare.ts";
import { leadingChanges } from "./leadingChanges.ts";

const value = (key: string, text: string, u: string | null, hash: number): ComparedValue => ({
  speciesId: `sp_${key}`,
  key,
  property: "entropy",
  digits: digits(text),
  uncertainty: u === null ? null : { digits: digits(u), kind: "standard", coverageFactor: null },
  temperature: digits("298.15"),
  standardPressure: digits("100000"),
  basis: null,
  origin: "stated",
  sourceId: "src_any",
  rowHash: Buffer.from([hash]),
});

test("changed values come first, those furthest beyond their uncertainties at their head; then what went, then what came", () => {
  const changes = [
    valueChange(null, value("came", "1.0", "0.1", 1)),
    valueChange(value("unknown", "1.0", null, 1), value("unknown", "9.0", null, 2)),
    valueChange(value("near", "10.0", "0.1", 1), value("near", "10.1", "0.1", 2)),
    valueChange(value("went", "1.0", "0.1", 1), null),
    valueChange(value("far", "10.0", "0.1", 1), value("far", "8.0", "0.1", 2)),
  ].filter((change) => change !== null);
  const keys = (limit: number) => leadingChanges(changes, limit).map((change) => change.key);
  expect(keys(9)).toEqual(["far", "near", "unknown", "went", "came"]);
  expect(keys(2)).toEqual(["far", "near"]);
  expect(leadingChanges(changes, 1)[0]).toMatchObject({
    what: "changed",
    before: { digits: "10.0" },
    after: { digits: "8.0" },
    difference: "-2.0",
  });
});
