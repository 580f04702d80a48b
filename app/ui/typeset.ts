import { formulaPieces, trueMinus, type Piece } from "./formulaPieces.ts";

/** What a plain sentence turns into: runs of text, species by key, and the few signs that are drawn. */
export type Typeset =
  | { kind: "pieces"; pieces: Piece[]; plain: string }
  | { kind: "species"; key: string }
  | { kind: "sign"; sign: DrawnSign };

/** Signs the font files lack; they are drawn (app/ui/Signs.tsx). */
export type DrawnSign = "arrow" | "equilibrium" | "atMost" | "atLeast" | "root" | "about" | "notEqual";

const drawn: Record<string, DrawnSign> = {
  "→": "arrow",
  "⇌": "equilibrium",
  "≤": "atMost",
  "≥": "atLeast",
  "√": "root",
  "≈": "about",
  "≠": "notEqual",
};

const unitNames = "kcal\\(IT\\)|cal\\(IT\\)|kcal|cal|kJ|J|kg|mg|g|mol|meV|eV|kPa|Pa|mV|V|kB|m|C|K";
// A chain of at least one division, as the data spell it: "kJ/mol", "J/(mol K)", "cal/(mol K)", "g/mol", "C/mol".
const unitPattern = `(?:${unitNames})/(?:(?:mol|K|g|kg|s)(?![A-Za-z])|\\((?:mol|K|kg|g)(?: (?:mol|K|kg|g))*\\))`;
const symbolPattern =
  "Δ[frca]?[HSGUC]p?°?|H°\\(T\\)\\s?[−-]\\s?H°\\(0\\)|(?:S|H|G)°|Cp°?|E_?n(?![a-z])|log10 ?K(?![a-z])|ln ?K(?![a-z])|χ²|T(?= ?·? ?Δ|/1000)|R(?= ln)";
const keyPattern =
  "(?:[A-Z\\[(]|\\d+(?=[A-Z]))[A-Za-z0-9()\\[\\]·*./+−-]*?\\((?:g|l|s|cr|am|vit|lc|aq)(?:,[A-Za-z0-9α-ω-]+)?\\)";
const superscripts = "⁰¹²³⁴⁵⁶⁷⁸⁹⁺⁻";
const subscripts = "₀₁₂₃₄₅₆₇₈₉";

const scanner = new RegExp(
  [
    `(?<key>(?<![A-Za-z0-9])${keyPattern})`,
    `(?<unit>(?<![A-Za-z/])${unitPattern})`,
    `(?<symbol>(?:(?<![A-Za-z])|(?=Δ))(?:${symbolPattern}))`,
    "(?<formula>(?<=°\\()[A-Z][A-Za-z]*\\d[A-Za-z0-9]*(?=\\)))",
    `(?<index>(?<=[A-Za-zΑ-ω°])_[A-Za-z0-9]{1,3}(?![A-Za-z0-9]))`,
    `(?<minus>(?<![A-Za-z0-9)\\]])-(?=\\d))`,
    `(?<raised>[${superscripts}]+)`,
    `(?<lowered>[${subscripts}]+)`,
    `(?<drawn>[${Object.keys(drawn).join("")}])`,
  ].join("|"),
  "gu",
);

const raisedDigits: Record<string, string> = Object.fromEntries(
  [...superscripts].map((c, i) => [c, "0123456789+−"[i] ?? c]),
);
const loweredDigits: Record<string, string> = Object.fromEntries([...subscripts].map((c, i) => [c, String(i)]));

/**
 * A unit as it is printed: upright, negative powers in place of the solidus. "J/(mol K)" is J K−1 mol−1 and "kJ/mol"
 * kJ mol−1 (SI Brochure, 9th edition, 5.4). Inside the unit the spaces do not break.
 */
export function unitPieces(unit: string): Piece[] {
  const slash = unit.indexOf("/");
  if (slash < 0) return [{ text: unit.replaceAll(" ", "\u00a0") }];
  const below = unit
    .slice(slash + 1)
    .replace(/[()]/g, "")
    .split(" ");
  // The trade prints kelvin before mole, although the data write "mol K".
  below.sort((a, b) => (a === "K" ? -1 : b === "K" ? 1 : 0));
  const above = unit.slice(0, slash);
  const pieces: Piece[] = above.endsWith("(IT)")
    ? [{ text: above.slice(0, -4) }, { text: "IT", as: "sub" }]
    : [{ text: above }];
  for (const name of below) pieces.push({ text: `\u00a0${name}` }, { text: "−1", as: "sup" });
  return pieces;
}

/** A quantity's symbol as it is printed: letters of quantities in italics, what belongs to them lowered. "ΔfH°", "Cp°", "E_n". */
export function symbolPieces(symbol: string): Piece[] {
  const compact = symbol.replaceAll(" ", "");
  if (/^H°\(T\)/.test(compact)) {
    return [
      { text: "H", as: "italic" },
      { text: "°(" },
      { text: "T", as: "italic" },
      { text: ") − " },
      { text: "H", as: "italic" },
      { text: "°(0)" },
    ];
  }
  const delta = /^Δ([frca]?)([HSGUC])(p?)(°?)$/.exec(compact);
  if (delta) {
    const [, kind = "", letter = "", p = "", standard = ""] = delta;
    return [
      { text: "Δ" },
      ...(kind ? [{ text: kind, as: "sub" as const }] : []),
      { text: letter, as: "italic" },
      ...(p ? [{ text: p, as: "sub" as const }] : []),
      ...(standard ? [{ text: standard }] : []),
    ];
  }
  const heatCapacity = /^Cp(°?)$/.exec(compact);
  if (heatCapacity) {
    return [{ text: "C", as: "italic" }, { text: "p", as: "sub" }, ...(heatCapacity[1] ? [{ text: "°" }] : [])];
  }
  if (/^E_?n$/.test(compact))
    return [
      { text: "E", as: "italic" },
      { text: "n", as: "sub" },
    ];
  if (compact === "log10K")
    return [{ text: "log" }, { text: "10", as: "sub" }, { text: "\u00a0" }, { text: "K", as: "italic" }];
  if (compact === "lnK") return [{ text: "ln\u00a0" }, { text: "K", as: "italic" }];
  if (compact === "χ²") return [{ text: "χ" }, { text: "2", as: "sup" }];
  const plain = /^([A-Z])(°?)$/.exec(compact);
  if (plain) return [{ text: plain[1] ?? "", as: "italic" }, ...(plain[2] ? [{ text: "°" }] : [])];
  return [{ text: symbol }];
}

/**
 * Typesets a plain sentence of the data: symbols of quantities, units, species keys, minus signs before figures, and the
 * signs that are drawn. Everything else passes unchanged, so a person's own words stay their own.
 */
export function typeset(text: string): Typeset[] {
  const result: Typeset[] = [];
  const plain = (run: string) => {
    if (run !== "") result.push({ kind: "pieces", pieces: [{ text: run }], plain: run });
  };
  let last = 0;
  for (const match of text.matchAll(scanner)) {
    const groups = match.groups ?? {};
    const whole = match[0];
    plain(text.slice(last, match.index));
    last = match.index + whole.length;
    if (groups["key"] !== undefined) result.push({ kind: "species", key: whole });
    else if (groups["unit"] !== undefined) result.push({ kind: "pieces", pieces: unitPieces(whole), plain: whole });
    else if (groups["symbol"] !== undefined) result.push({ kind: "pieces", pieces: symbolPieces(whole), plain: whole });
    else if (groups["index"] !== undefined) {
      result.push({ kind: "pieces", pieces: [{ text: whole.slice(1), as: "sub" }], plain: whole });
    } else if (groups["formula"] !== undefined) {
      result.push({ kind: "pieces", pieces: formulaPieces(whole), plain: whole });
    } else if (groups["minus"] !== undefined) result.push({ kind: "pieces", pieces: [{ text: "−" }], plain: "-" });
    else if (groups["raised"] !== undefined) {
      const raised = [...whole].map((c) => raisedDigits[c] ?? c).join("");
      result.push({ kind: "pieces", pieces: [{ text: raised, as: "sup" }], plain: trueMinus(raised) });
    } else if (groups["lowered"] !== undefined) {
      const lowered = [...whole].map((c) => loweredDigits[c] ?? c).join("");
      result.push({ kind: "pieces", pieces: [{ text: lowered, as: "sub" }], plain: lowered });
    } else {
      const sign = drawn[whole];
      if (sign) result.push({ kind: "sign", sign });
    }
  }
  plain(text.slice(last));
  return result;
}
