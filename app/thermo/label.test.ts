import { describe, expect, it } from "vitest";
import { normalizeLabel } from "./label.ts";

describe("labels", () => {
  it.each([
    ["Alpha quartz", "alpha-quartz", "one word, small letters"],
    ["RUTILE", "rutile", "capitals of a sheet"],
    ["α", "alpha", "Greek letters spelled out"],
    ["insoluble, anhydrite", "insoluble,anhydrite", "a comma stays, its space goes"],
    ["II", "II", "short words keep their capitals"],
    ["2,2-dimethylpropane", "2,2-dimethylpropane", "an isomer's name"],
    ["  red ", "red", "spaces around it"],
  ])("%s is %s: %s", (text, expected) => {
    expect(normalizeLabel(text)).toBe(expected);
  });

  it.each(["", " ", "-", "a(b)", "a/b", "<b>", "x".repeat(61)])("refuses %j", (text) => {
    expect(normalizeLabel(text)).toBeUndefined();
  });

  it("does not change what it has normalised", () => {
    for (const text of ["Alpha quartz", "β-rhombohedral", "E-2-butene"]) {
      const once = normalizeLabel(text);
      expect(once && normalizeLabel(once)).toBe(once);
    }
  });
});
