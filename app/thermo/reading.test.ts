import { describe, expect, it } from "vitest";
import { ambiguous, mapReading, quote, read, type Reading, refused } from "./reading.ts";

describe("carrying a reading over", () => {
  const double = (value: number): string => `${value * 2}`;

  it("keeps the outcome, the notes and the sentence", () => {
    expect(mapReading(read(2, ["a note"]), double)).toEqual({ outcome: "read", value: "4", notes: ["a note"] });
    expect(mapReading(ambiguous([1, 2], "which?"), double)).toEqual({
      outcome: "ambiguous",
      candidates: ["2", "4"],
      sentence: "which?",
    });
    const no: Reading<number> = refused("no");
    expect(mapReading(no, double)).toEqual({ outcome: "refused", sentence: "no" });
  });
});

describe("quoting", () => {
  it("cuts a long text", () => {
    expect(quote("short")).toBe("“short”");
    expect(quote("x".repeat(100))).toHaveLength(60);
  });
});
