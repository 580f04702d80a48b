import { describe, expect, it } from "vitest";
import type { SourceKind } from "./types.ts";
import { foundBy } from "#tests/support/view.ts";
import { weakerSource } from "./weaker-source.ts";

function found(proposed: SourceKind, standing: SourceKind) {
  const values = { enthalpyOfFormation: "-157.3" };
  return foundBy(
    weakerSource,
    [{ key: "CuO(cr)", sourceKind: proposed, values }],
    [{ key: "CuO(cr)", sourceKind: standing, values }],
  );
}

describe("Weaker source than what stands", () => {
  it("asks to look where an estimate would replace an evaluation", () => {
    expect(found("estimate", "evaluation")).toMatchObject([
      { severity: "look", sentence: weakerSource.example.sentence },
    ]);
    expect(found("estimate", "calculation")).toHaveLength(1);
    expect(found("calculation", "measurement")).toHaveLength(1);
  });

  it("passes a source of equal or greater weight", () => {
    expect(found("measurement", "evaluation")).toEqual([]);
    expect(found("evaluation", "measurement")).toEqual([]);
    expect(found("measurement", "estimate")).toEqual([]);
    expect(found("estimate", "estimate")).toEqual([]);
  });

  it("does not apply to a value that is new", () => {
    expect(foundBy(weakerSource, [{ key: "CuO(cr)", sourceKind: "estimate", values: { entropy: "42.6" } }])).toEqual(
      [],
    );
  });
});
