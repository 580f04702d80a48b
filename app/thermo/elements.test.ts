import { describe, expect, it } from "vitest";
import { elementOf, elementSymbols, isMetal } from "./elements.ts";

describe("elements", () => {
  it("are 118, with D and T", () => {
    expect(elementSymbols()).toHaveLength(120);
    expect([elementOf("Og")?.atomicNumber, elementOf("U")?.atomicNumber, elementOf("D")?.atomicNumber]).toEqual([
      118, 92, 1,
    ]);
    expect([elementOf("fe"), elementOf("Xx"), elementOf("")]).toEqual([undefined, undefined, undefined]);
  });

  it("are metals or not", () => {
    expect(["Na", "Fe", "Hg", "U", "Al"].every(isMetal)).toBe(true);
    expect(["H", "D", "C", "Si", "As", "I", "Xe"].some(isMetal)).toBe(false);
  });
});
