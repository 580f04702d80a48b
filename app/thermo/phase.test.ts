import { describe, expect, it } from "vitest";
import { readPhase } from "./phase.ts";

describe("reading a phase", () => {
  it.each([
    ["g", { phase: "g" }],
    ["(g)", { phase: "g" }],
    ["gas", { phase: "g" }],
    ["Ideal gas", { phase: "g" }],
    ["vapour", { phase: "g" }],
    ["l", { phase: "l" }],
    ["lq", { phase: "l" }],
    ["liq.", { phase: "l" }],
    ["s", { phase: "s" }],
    ["solid", { phase: "s" }],
    ["cr", { phase: "cr" }],
    ["c", { phase: "cr" }],
    ["C", { phase: "cr" }],
    ["solid, crystalline", { phase: "cr" }],
    ["cr,graphite", { phase: "cr", label: "graphite" }],
    ["c,alpha", { phase: "cr", label: "alpha" }],
    ["c, α", { phase: "cr", label: "alpha" }],
    ["cr, II", { phase: "cr", label: "II" }],
    ["s, rhombic", { phase: "s", label: "rhombic" }],
    ["cr2", { phase: "cr", label: "form-2", handbookCode: "cr2" }],
    ["cr3", { phase: "cr", label: "form-3", handbookCode: "cr3" }],
    ["c2", { phase: "cr", label: "form-2", handbookCode: "c2" }],
    ["am", { phase: "am" }],
    ["amorphous", { phase: "am" }],
    ["vit", { phase: "vit" }],
    ["glass", { phase: "vit" }],
    ["aq", { phase: "aq" }],
    ["ao", { phase: "aq", handbookCode: "ao" }],
    ["aq, undissociated", { phase: "aq", handbookCode: "ao" }],
    ["aq, ∞", { phase: "aq" }],
    ["aq, std. state", { phase: "aq" }],
  ])("%s", (text, expected) => {
    const reading = readPhase(text);
    expect(reading.outcome === "read" && reading.value).toEqual(expected);
  });

  it.each([
    ["", "No phase"],
    ["ai", "sum of ions"],
    ["au", "undefined concentration"],
    ["aq, 100 H2O", "finite concentration"],
    ["aq,400", "finite concentration"],
    ["aq, dilute", "finite concentration"],
    ["sln", "solution"],
    ["sol", "solid or a solution"],
    ["ads", "no place"],
    ["lc", "no place"],
    ["plasma", "not a phase"],
    ["1", "not a phase"],
    ["g, l", "two phases"],
    ["g, 1 atm", "pressure or a temperature"],
    ["constructor", "not a phase"],
    ["cr,<b>", "characters"],
    ["cr²", "not a phase"],
  ])("refuses %j: %s", (text, sentence) => {
    expect(readPhase(text)).toMatchObject({ outcome: "refused", sentence: expect.stringContaining(sentence) });
  });

  it("refuses a text that is no phase before it looks into it", () => {
    expect(readPhase("x".repeat(10_000))).toMatchObject({ sentence: expect.stringContaining("too long") });
  });
});
