import { elementOf, isMetal } from "./elements.ts";
import { quote } from "./reading.ts";

/** A formula's text with its charge set apart. */
export interface ChargedText {
  readonly body: string;
  readonly charge: number;
}

export type SplitCharge =
  { readonly readings: readonly ChargedText[]; readonly notes: readonly string[] } | { readonly sentence: string };

/** No ion of a thermochemical table carries more. */
const LARGEST_CHARGE = 9;

/**
 * Takes the charge off the end of a formula. Accepted: `SO4-2`, `SO4 2-`, `SO4^2-`, `SO4^{2-}`, `SO4--`, `SO4(2-)`,
 * `SO₄²⁻`, `SO<sub>4</sub><sup>2−</sup>`, `[Fe(CN)6]4-`.
 *
 * A digit that stands plainly before a bare sign belongs to the atom or to the charge (`Hg2+`, `SO42-`), and then both
 * readings come back unless one of them is no ion at all.
 *
 * @param text text as `markedText` leaves it, trimmed
 */
export function splitCharge(text: string): SplitCharge {
  // A space before a bare sign tells nothing of the digit before it: `Hg2 +` is `Hg2+`.
  const marked = text.replace(/(?<=\d)\s+(?=[+-]$)/, "");
  const stated =
    /^(.*?)\s*(?:\^|\*\*)\s*[{(]?\s*([+-]?\s?\d*\s?[+-]*)\s*[})]?$/.exec(marked) ??
    /^(.*?)\s*[([{]\s*(\d*[+-]+|[+-]\d+)\s*[)\]}]$/.exec(marked) ??
    /^(.*?)\s+(\d*[+-]+|[+-]\s?\d+)$/.exec(marked) ??
    /^(.*[^+-])([+-]\d+)$/.exec(marked) ??
    /^(.*[^+-])(\+{2,}|-{2,})$/.exec(marked) ??
    /^(.*[}])(\d*[+-])$/.exec(marked);
  if (stated !== null) return oneReading(marked, stated[1] ?? "", stated[2] ?? "");

  const bare = /^(.*?)(\d*)([+-])$/.exec(marked);
  if (bare === null) return { readings: [{ body: marked, charge: 0 }], notes: [] };
  const [, stem = "", tail = "", sign = "+"] = bare;
  if (tail === "" || /[./]$/.test(stem)) return oneReading(marked, stem + tail, sign);
  return bareDigits(stem, tail, sign === "+" ? 1 : -1);
}

/**
 * The charge as the key prints it: `+`, `-`, `+3`, `-2`. A single charge prints its 1 where the bare sign would have
 * two readings (`I3-1` is triiodide, `Hg2+1` is not mercury(II)), so that every key reads back as itself.
 */
export function spellCharge(body: string, charge: number): string {
  if (charge === 0) return "";
  const sign = charge > 0 ? "+" : "-";
  if (Math.abs(charge) > 1) return `${sign}${Math.abs(charge)}`;
  const split = splitCharge(`${body}${sign}`);
  const [first, ...others] = "readings" in split ? split.readings : [];
  return others.length === 0 && first?.body === body && first.charge === charge ? sign : `${sign}1`;
}

function oneReading(marked: string, body: string, spelled: string): SplitCharge {
  const match = /^(?:(\d*)([+-]+)|([+-])(\d+))$/.exec(spelled.replace(/\s/g, ""));
  const signs = match?.[2] ?? match?.[3] ?? "";
  const number = match?.[1] ?? match?.[4] ?? "";
  if (match === null || (signs.length > 1 && (number !== "" || new Set(signs).size > 1))) {
    return { sentence: `The charge in ${quote(marked)} cannot be read. Write it as in SO4-2 or Fe+3.` };
  }
  const size = number === "" ? signs.length : Number(number);
  if (size === 0) return { sentence: `${quote(marked)} states a charge of zero. Leave it out for a neutral species.` };
  if (size > LARGEST_CHARGE)
    return {
      sentence: `${quote(marked)} states a charge of ${size}, more than any ion carries. A mass number is no part of a formula here.`,
    };
  return { readings: [{ body, charge: signs.startsWith("-") ? -size : size }], notes: [] };
}

/** A plain digit before a bare sign: of the atom, of the charge, or either. */
function bareDigits(stem: string, tail: string, sign: 1 | -1): SplitCharge {
  const ofAtom: ChargedText = { body: stem + tail, charge: sign };
  const ofCharge: ChargedText = { body: stem + tail.slice(0, -1), charge: sign * Number(tail.slice(-1)) };
  switch (whoseDigit(stem, tail, sign)) {
    case "atom":
      return { readings: [ofAtom], notes: [] };
    case "charge": {
      if (elementOf(stem) === undefined) return { readings: [ofCharge], notes: [] }; // [Fe(CN)6]4- leaves no doubt
      const printed = `${sign > 0 ? "+" : "−"}${Math.abs(ofCharge.charge)}`;
      return {
        readings: [ofCharge],
        notes: [`The ${tail.slice(-1)} before the sign is read as the charge, ${printed}.`],
      };
    }
    case "either":
      return { readings: [ofCharge, ofAtom], notes: [] };
  }
}

function whoseDigit(stem: string, tail: string, sign: 1 | -1): "atom" | "charge" | "either" {
  const size = Number(tail.slice(-1));
  if (tail.length > 1) {
    // Nobody prints a subscript 1, a charge of 0, or meets a polyatomic ion of charge 5: C6H12+, C6H10+, C3H25+.
    return size === 0 || size > 4 || tail === `1${size}` || tail.startsWith("0") ? "atom" : "either";
  }
  if (size < 2) return size === 1 ? "charge" : "atom";
  const enclosed = enclosingBracket(stem);
  if (enclosed === "[") return "charge";
  if (enclosed !== undefined) return "either";

  const element = elementOf(stem);
  if (element !== undefined) {
    if (sign > 0 && size > element.atomicNumber) return "atom"; // more electrons lost than the atom has: H2+, H3+
    if (sign > 0) return ORDINARY_CATIONS.has(`${stem}${size}`) ? "charge" : "either";
    return size > 4 ? "atom" : "either";
  }
  // Polyatomic. An anion that ends in a single atom or group and carries two charges or more is not met outside square
  // brackets, so NO3- and Al(OH)4- have one reading.
  // Cations may (VO2+ is two ions of vanadium, AlF2+ two complexes), but only of a metal, and to three charges.
  if (sign < 0 || size > 3) return "atom";
  return (stem.match(/[A-Z][a-z]?/g) ?? []).some(isMetal) ? "either" : "atom";
}

/** The bracket that holds the whole text, as in `[Fe(CN)6]`; undefined when none does. */
export function enclosingBracket(text: string): "[" | "(" | "{" | undefined {
  const first = text[0];
  if (first !== "[" && first !== "(" && first !== "{") return undefined;
  let depth = 0;
  for (const [index, character] of Array.from(text).entries()) {
    if ("([{".includes(character)) depth += 1;
    if (")]}".includes(character)) depth -= 1;
    if (depth === 0) return index === text.length - 1 ? first : undefined;
  }
  return undefined;
}

/**
 * Ions of one metal atom that are everyday species in water; their clusters with a single charge (Fe3 with +1) are not,
 * so `Fe3+` has one reading. Mercury is missing on purpose: Hg2 is an everyday ion too. So are the metals whose small
 * clusters are known ions (Ag, Au, the alkali metals). Common practice.
 */
const ORDINARY_CATIONS: ReadonlySet<string> = new Set(
  (
    "Be2 Mg2 Ca2 Sr2 Ba2 Ra2 Al3 Ga3 In3 Tl3 Sn2 Sn4 Pb2 Bi3 Sc3 Y3 Ti2 Ti3 V2 V3 Cr2 Cr3 Mn2 Mn3 Fe2 Fe3 Co2 Co3 " +
    "Ni2 Cu2 Zn2 Cd2 Pd2 Pt2 Rh3 Ru3 Zr4 Hf4 La3 Ce3 Ce4 Pr3 Nd3 Pm3 Sm2 Sm3 Eu2 Eu3 Gd3 Tb3 Dy3 Ho3 Er3 Tm3 Yb2 Yb3 " +
    "Lu3 Th4 Pa4 U3 U4 Np3 Np4 Pu3 Pu4 Am3 Cm3"
  ).split(" "),
);
