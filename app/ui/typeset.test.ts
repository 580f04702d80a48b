import { describe, expect, it } from "vitest";
import { formulaPieces, type Piece } from "./formulaPieces.ts";
import { symbolPieces, typeset, unitPieces } from "./typeset.ts";

/** Pieces as text with their levels marked: "SO_{4}^{2−}", italics between slashes. */
function marked(pieces: readonly Piece[]): string {
  return pieces
    .map(({ text, as }) =>
      as === "sub" ? `_{${text}}` : as === "sup" ? `^{${text}}` : as === "italic" ? `/${text}/` : text,
    )
    .join("");
}

function set(text: string): string {
  return typeset(text)
    .map((part) =>
      part.kind === "species" ? `[${part.key}]` : part.kind === "sign" ? `<${part.sign}>` : marked(part.pieces),
    )
    .join("");
}

describe("formulas", () => {
  it.each([
    ["H2O", "H_{2}O", "a count is lowered"],
    ["SO4-2", "SO_{4}^{2−}", "the charge is raised, its sign last, with a true minus"],
    ["Na+", "Na^{+}", "a single charge has no number"],
    ["Fe+3", "Fe^{3+}", "a positive charge likewise"],
    ["Al(OH)4-", "Al(OH)_{4}^{−}", "a count after a bracket is lowered"],
    ["CuSO4·5H2O", "CuSO_{4}·5H_{2}O", "a count in front of a part stands on the line"],
    ["CdSO4·8/3H2O", "CdSO_{4}·8/3H_{2}O", "also a fraction"],
    ["Fe0.947O", "Fe_{0.947}O", "a count may have decimals"],
    ["e-", "e^{−}", "the electron"],
  ])("%s is set as %s: %s", (printed, expected) => {
    expect(marked(formulaPieces(printed))).toBe(expected);
  });
});

describe("units", () => {
  it.each([
    ["kJ/mol", "kJ\u00a0mol^{−1}"],
    ["J/(mol K)", "J\u00a0K^{−1}\u00a0mol^{−1}"],
    ["cal/(mol K)", "cal\u00a0K^{−1}\u00a0mol^{−1}"],
    ["g/mol", "g\u00a0mol^{−1}"],
    ["K", "K"],
  ])("%s carries negative powers, not a solidus (SI Brochure 5.4)", (unit, expected) => {
    expect(marked(unitPieces(unit))).toBe(expected);
  });
});

describe("symbols", () => {
  it.each([
    ["ΔfH°", "Δ_{f}/H/°"],
    ["ΔrG°", "Δ_{r}/G/°"],
    ["Cp°", "/C/_{p}°"],
    ["S°", "/S/°"],
    ["E_n", "/E/_{n}"],
    ["log10K", "log_{10}\u00a0/K/"],
    ["H°(T)−H°(0)", "/H/°(/T/) − /H/°(0)"],
  ])("%s: the f follows the Δ, letters of quantities are italic (Green Book 2.11.1)", (symbol, expected) => {
    expect(marked(symbolPieces(symbol))).toBe(expected);
  });
});

describe("sentences", () => {
  it.each([
    [
      "Two digits exchanged: ΔfH° -45.94 kJ/mol",
      "Two digits exchanged: Δ_{f}/H/° −45.94 kJ\u00a0mol^{−1}",
      "symbol, minus, unit",
    ],
    [
      "S° of SO4-2(aq) is 18.50 J/(mol K).",
      "/S/° of [SO4-2(aq)] is 18.50 J\u00a0K^{−1}\u00a0mol^{−1}.",
      "a key with its charge",
    ],
    ["N2(g) + 3 H2(g) → 2 NH3(g)", "[N2(g)] + 3 [H2(g)] <arrow> 2 [NH3(g)]", "an equation"],
    ["C(cr,graphite) and C2H6O(g,dimethyl-ether)", "[C(cr,graphite)] and [C2H6O(g,dimethyl-ether)]", "labels"],
    ["CdSO4·8/3H2O(cr)", "[CdSO4·8/3H2O(cr)]", "a hydrate"],
    ["ΔfH° − TΔfS°", "Δ_{f}/H/° − /T/Δ_{f}/S/°", "T before ΔfS°"],
    ["S°(H2)", "/S/°(H_{2})", "a formula in a symbol's brackets"],
    ["|r| ≤ t, √(U_a² + U_b²)", "|r| <atMost> t, <root>(U_{a}^{2} + U_{b}^{2})", "signs the font lacks are drawn"],
    ["kJ·mol⁻¹ in the head", "kJ·mol^{−1} in the head", "raised characters become superscripts"],
    ["E_n is 0.6", "/E/_{n} is 0.6", "the normalised error"],
  ])("%s (%#): %s", (text, expected) => {
    expect(set(text)).toBe(expected);
  });

  it.each([
    ["Row 14, column S: −16,72", "a column's own name is no symbol"],
    ["CAS 7732-18-5 stands on page 12-14", "hyphens inside numbers are not minus signs"],
    ["sheet calorimetry-2.csv by R. Reviewer (g)", "a person's words stay their own"],
    ["He said: Tables and Kings", "letters that could be units or symbols"],
    ["snake_case_names stay", "an underscore inside a longer word"],
  ])("leaves “%s” as it is: %s", (text) => {
    expect(set(text)).toBe(text);
  });

  it("renders no character that the shipped font files lack", () => {
    const all = typeset("≤ ≥ √ ≈ ≠ → ⇌ x² y⁻¹ H₂O");
    const rendered = all
      .flatMap((part) => (part.kind === "pieces" ? part.pieces.map(({ text }) => text) : []))
      .join("");
    expect(rendered).not.toMatch(/[≤≥√≈≠→⇌²⁻¹₂]/);
  });
});
