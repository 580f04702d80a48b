import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { foundBy } from "#tests/support/view.ts";
import { casCheckDigit } from "./cas-check-digit.ts";

const found = (cas: string) => foundBy(casCheckDigit, [{ key: "H2O(l)", cas, values: { entropy: "69.95" } }]);

describe("CAS check digit", () => {
  it("passes the number of water", () => {
    expect(found("7732-18-5")).toEqual([]);
  });

  it("blocks a number that does not end in its check digit, and shows the sum", () => {
    const [finding] = found("7732-18-6");
    expect(finding).toMatchObject({
      severity: "block",
      property: null,
      lineRef: "line 1",
      arithmetic: ["8·1 + 1·2 + 2·3 + 3·4 + 7·5 + 7·6 = 105, so the last digit is 5."],
    });
    expect(finding?.sentence).toBe(`${casCheckDigit.example.sentence} Compare it with the source.`);
  });

  it("blocks what is no CAS number at all", () => {
    expect(found("water")[0]?.sentence).toContain("“water” is not a CAS number of H2O(l).");
  });

  it("never throws, whatever was typed", () => {
    fc.assert(
      fc.property(fc.string(), (text) => {
        for (const finding of found(text)) expect(finding.severity).toBe("block");
      }),
    );
  });

  it("does not apply to a species without a number", () => {
    expect(foundBy(casCheckDigit, [{ key: "H2O(l)", values: { entropy: "69.95" } }])).toEqual([]);
  });
});
