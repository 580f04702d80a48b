import { type ChargedText, enclosingBracket, spellCharge, splitCharge } from "./charge.ts";
import { elementOf, isMetal } from "./elements.ts";
import {
  type Fraction,
  fractionToNumber,
  isNone,
  isOne,
  ONE,
  productOf,
  readFraction,
  spellFraction,
  sumOf,
  ZERO,
} from "./fraction.ts";
import { ambiguous, isTooLong, quote, read, type Reading, refused } from "./reading.ts";
import { markedText } from "./typography.ts";

/** A chemical formula with its charge. */
export interface Formula {
  /**
   * Plain text in the order the source gave, charge at the end: `CuSO4·5H2O`, `SO4-2`, `Na+`, `Fe0.947O`.
   * One spelling for each formula, and it reads back as itself.
   */
  readonly printed: string;
  /** Atoms of each element, as the nearest doubles; D and T count as elements of their own. */
  readonly composition: Readonly<Record<string, number>>;
  /** Charge number z. */
  readonly charge: number;
  /** Hill order with exact counts (`CdH16/3O20/3S`), without the charge: for comparing formulas. */
  readonly hill: string;
}

const LONGEST_FORMULA = 200;
const DEEPEST_BRACKET = 8;
const LARGEST_COUNT = 100_000;

/** What a hydrate's dot may be followed by when it looks like a decimal point: `CuSO4.5H2O`. */
const SOLVATE = /^\d+(?:\.\d+|\/\d+)?(?:H2O|D2O|NH3|H_\{2\}O|D_\{2\}O|NH_\{3\})(?![a-z\d])/;

/**
 * Reads a formula as sheets and handbooks spell it: brackets, hydrates behind `·`, `.` or `*` with whole, decimal or
 * fractional counts, non-stoichiometric compounds, D and T, markup, raised and lowered characters, and every usual
 * spelling of a charge (see `splitCharge`).
 *
 * Two readings are a question, never a guess (`Hg2+`, `O2-`, `SO42-`); the sentence says how to write either.
 */
export function readFormula(text: string): Reading<Formula> {
  if (isTooLong(text)) return refused(`${quote(text)} is too long for a formula.`);
  const notes: string[] = [];
  const marked = spelledPlainly(markedText(text).trim(), notes);
  const objection = notAFormula(marked, text.trim());
  if (objection !== undefined) return refused(objection);

  const split = splitCharge(marked);
  if ("sentence" in split) return refused(split.sentence);
  const readings = split.readings.flatMap(({ body, charge }) =>
    hydrateReadings(body).map((one): ChargedText => ({ body: one, charge })),
  );
  const formulas: Formula[] = [];
  let sentence = "";
  for (const { body, charge } of readings) {
    const parsed = parseBody(body);
    if (typeof parsed === "string") sentence ||= parsed;
    else if (!formulas.some((one) => one.hill === hillOf(parsed.counts) && one.charge === charge)) {
      formulas.push(buildFormula(parsed, charge));
    }
  }
  // Of two readings, one that no atoms could carry is none: H23+ is not H2 with a charge of three.
  const carried = formulas.filter((one) => one.charge <= electronsIn(one));
  const possible = carried.length > 0 ? carried : formulas;
  const [only, ...others] = possible;
  if (only === undefined) return refused(`${quote(text.trim())} cannot be read as a formula: ${sentence}`);
  if (others.length === 0) {
    const wrong = split.readings.length === 1 ? noIon(only) : undefined;
    return wrong === undefined ? read(only, [...notes, ...split.notes]) : refused(`${quote(text.trim())} ${wrong}`);
  }
  return ambiguous(possible, twoReadings(text.trim(), possible));
}

/** Brings further habits of writing to the plain one: a comma for a decimal point, a cross or colon for a hydrate's dot. */
function spelledPlainly(marked: string, notes: string[]): string {
  return marked
    .replace(/_(\d)(?![\d}])/g, "_{$1}")
    .replace(/\^(\d{1,3})(?=[A-Z])/g, "^{$1}")
    .replace(/(?<=[A-Za-z\d)\]}])\s*=$/, () => {
      notes.push("The sign = is read as two negative charges.");
      return "--";
    })
    .replace(/(?<=[A-Za-z)\]}]_?\{?\d*\}?),\s*(?=\d+\s*[HD]_?\{?2\}?O)/g, () => {
      notes.push("The comma is read as a hydrate's dot.");
      return "·";
    })
    .replace(/(?<=[·*]\s*)\.(?=\d)/g, "0.")
    .replace(/(?<=\d),(?=\d)/g, () => {
      notes.push("The comma is read as a decimal comma.");
      return ".";
    })
    .replace(/(?<=[A-Za-z\d)\]}])\s*×\s*(?=[\dA-Z(])|(?<=[A-Za-z\d)\]}])\s*x\s*(?=\d+(?:[./]\d+)?\s*[HD]_?\{?2)/g, "·")
    .replace(/(?<=[A-Za-z\d)\]}])\s*:\s*(?=\d*[A-Z(])/g, "·")
    .replace(/(?<=[·.*]\s*)\((\d+[./]\d+)\)\s*(?=[A-Z])/g, "$1");
}

/** Why a stated charge is no ion's: `Li-7` and `He-3` are isotopes, `H+2` has lost more electrons than it had. */
function noIon(formula: Formula): string | undefined {
  const { composition, charge } = formula;
  if (charge > electronsIn(formula)) return "has lost more electrons than its atoms hold. Write the charge as in Fe+3.";
  const element = soleElement(formula);
  if (charge > -2 || element === undefined || composition[element] !== 1) return undefined;
  if (charge >= -4 && !isMassNumber(-charge, element)) return undefined;
  return (
    `would be ${element} with charge −${-charge}, which is no ion. ` +
    `If ${-charge} is a mass number: the table keeps no isotope but D and T apart.`
  );
}

/** Electrons of the uncharged atoms. */
function electronsIn({ composition }: Formula): number {
  return Object.entries(composition).reduce(
    (sum, [symbol, count]) => sum + count * (elementOf(symbol)?.atomicNumber ?? 0),
    0,
  );
}

/** Number of atoms in the formula. */
export function atomCount(formula: Formula): number {
  return Object.values(formula.composition).reduce((sum, count) => sum + count, 0);
}

/** The one element of a formula that holds no other, or undefined. */
export function soleElement(formula: Formula): string | undefined {
  const elements = Object.keys(formula.composition);
  return elements.length === 1 ? elements[0] : undefined;
}

function twoReadings(text: string, formulas: readonly Formula[]): string {
  const spoken = formulas.map((formula) => {
    const body = formula.printed.replace(/[+-]\d*$/, "");
    const sign = formula.charge > 0 ? "+" : "−";
    return formula.charge === 0 ? body : `${body} with charge ${sign}${Math.abs(formula.charge)}`;
  });
  return (
    `${quote(text)} has two readings: ${spoken.join(", or ")}. ` +
    `Write ${formulas.map((formula) => explicit(formula)).join(" or ")}.`
  );
}

/** The spelling that leaves no doubt even to a reader who does not know ours. */
function explicit(formula: Formula): string {
  return /[+-]$/.test(formula.printed) ? `${formula.printed}1` : formula.printed;
}

/** Texts that are recognisably something else than a formula get their own sentence. */
function notAFormula(marked: string, text: string): string | undefined {
  if (marked === "") return "No formula is given.";
  if (marked.length > LONGEST_FORMULA) return `${quote(text)} is too long for a formula.`;
  if (/^e\s*(?:\^\s*)?\{?[-(]/.test(marked)) {
    return "An electron is not a species of the table. In an equation it is written e-.";
  }
  if (/\((?:I{1,3}|I?V|VI{1,3})\)(?!\d)|I{2,3}(?![a-z])/.test(marked)) {
    return `${quote(text)} names an oxidation state in Roman numerals. Write the charge of the ion, as in Fe+3.`;
  }
  if (/\((?:g|l|s|c|cr|aq|am|vit|gas|liq|ao|ai)(?:,[^)]*)?\)$/.test(marked)) {
    return `${quote(text)} ends in a phase. Give the phase apart from the formula.`;
  }
  if (/(?:^|[·.*\s])[nx](?=H_?\{?2|D_?\{?2)/.test(marked)) {
    return `${quote(text)} leaves the amount of water open. Give the number of H2O.`;
  }
  if (/\d\s*[+-]\s*[xyδ]|(?<=[a-z\d)]|[CNOSFH])x(?=[A-Z]|$)|\)(?:n|_\{n\})$|_\{[^}]*[nxyδ][^}]*\}/.test(marked)) {
    return `${quote(text)} leaves an amount open. Give the composition in numbers, as in Fe0.947O.`;
  }
  if (/^(?:[α-ω]|alpha|beta|gamma|delta|epsilon|[a-z]{1,5}|[DL]|[\d.]+|\([+\-RSEZ±]\))-(?=[A-Z])/.test(marked)) {
    const prefix = marked.slice(0, marked.indexOf("-") + 1);
    return `${quote(text)} begins with “${prefix}”, which names a form or an isomer. Give that as the form, as in Al2O3(cr,alpha).`;
  }
  if (/(?:^|[·.*]\s*[\d./]*\s*)[HD]_?\{?20\}?$/.test(marked)) {
    return `${quote(text)} holds 20 atoms of hydrogen. Was the letter O meant, as in H2O?`;
  }
  const chlorine = chlorineWithAOne(marked);
  if (chlorine !== undefined) {
    return `${quote(text)} counts carbon with a 1. Was the letter l meant, as in ${chlorine}? If not, leave the 1 out.`;
  }
  const mass = /^\(?(\d{1,3})\)?([A-Z][a-z]?)/.exec(marked);
  if (mass !== null && isMassNumber(Number(mass[1]), mass[2] ?? "")) {
    return (
      `${quote(text)} begins with a number. A coefficient belongs to an equation; if ${mass[1]} is a mass number, ` +
      "write D or T, for the table keeps no isotope but D and T apart."
    );
  }
  // Only where it begins: C59H118O is a long alcohol, and H218O has no carbon for so much hydrogen.
  if (/^[A-Z][a-z]?\d{1,2}(?:1[78]O|13C|15N)(?![a-z])/.test(marked)) {
    return `${quote(text)} seems to hold a mass number (18O, 13C, 15N). The table keeps no isotope but D and T apart.`;
  }
  if (/-\d*\.?\d*H2O$/.test(marked)) {
    return `${quote(text)} has a hyphen before the water. Write a dot, as in CuSO4·5H2O.`;
  }
  return undefined;
}

/** Whether a number may be the mass number of an element: at least a nucleon for each proton, at most three. */
function isMassNumber(mass: number, symbol: string): boolean {
  const element = elementOf(symbol) ?? elementOf(symbol[0] ?? "");
  return element !== undefined && mass >= element.atomicNumber && mass <= 3 * element.atomicNumber && mass > 1;
}

/**
 * The formula with chlorine in it, where a digit 1 stands for its letter l: at the end of `NaC1` and `C1-`, in `KC1O3`, and
 * in `MgC12`, since no metal has twelve carbon atoms and nothing else. `C1H4` and `C1O2` say what they mean.
 */
function chlorineWithAOne(marked: string): string | undefined {
  const match = /^(.*?)C1([2-9]|O[2-4]?)?((?:[-+^·.*\s({].*)?)$/.exec(marked);
  if (match === null) return undefined;
  const [, before = "", more = "", after = ""] = match;
  const metal = /([A-Z][a-z]?)[)\d]*$/.exec(before)?.[1];
  const isMeant = /^[2-9]/.test(more)
    ? metal !== undefined && isMetal(metal) && !/[HD]/.test(before)
    : before !== "" || /^\s*[-({^]/.test(after);
  return isMeant ? `${before}Cl${more}${after}` : undefined;
}

/**
 * A point between digits separates a hydrate's water (`CuSO4.5H2O`) or decimals (`Fe0.947O`). Returns the text with
 * every separating dot written `·`: once, or twice where both readings stand.
 */
function hydrateReadings(body: string): string[] {
  const dotted = body.replace(/\s*[*·]\s*/g, "·").replace(/(?<=[·.]\s*[\d./]*\d)\s+(?=[A-Z(])/g, "");
  let readings = [""];
  let start = 0;
  for (const match of dotted.matchAll(/\s*\.\s*/g)) {
    const before = dotted.slice(0, match.index);
    const after = dotted.slice(match.index + match[0].length);
    const meanings = pointMeanings(before, after, match[0] !== ".");
    const piece = dotted.slice(start, match.index);
    readings = readings.flatMap((reading) => meanings.map((mark) => reading + piece + mark));
    if (readings.length > 4) readings = readings.slice(0, 4);
    start = match.index + match[0].length;
  }
  return readings.map((reading) => reading + dotted.slice(start));
}

function pointMeanings(before: string, after: string, spaced: boolean): ("·" | "." | "0.")[] {
  const digitsBefore = /(\d+)$/.exec(before)?.[1];
  // `Fe.947O` has lost its zero, unless 947 molecules of something are meant.
  if (!spaced && /[A-Za-z]$/.test(before) && /^\d{2,}(?=[A-Z(]|$)/.test(after) && !SOLVATE.test(after))
    return ["0.", "·"];
  if (spaced || digitsBefore === undefined || !/^\d/.test(after)) return ["·"];
  const leading = before.slice(0, -digitsBefore.length);
  if (/_\{$/.test(leading)) return ["."]; // inside a marked subscript
  if (leading === "" || /[.·]$/.test(leading)) return ["."]; // the count of a part, as in ·0.5H2O
  if (digitsBefore === "0" || digitsBefore === "1") return ["."]; // nobody prints a subscript 0 or 1
  if (SOLVATE.test(after)) return ["·"];
  return /^\d+(?:$|[^\d./A-Z([])/.test(after) || /^\d+$/.test(after) ? ["."] : [".", "·"];
}

interface ParsedBody {
  printed: string;
  counts: ReadonlyMap<string, Fraction>;
}

/** @returns a sentence when the text is no formula */
function parseBody(body: string): ParsedBody | string {
  if (/\s/.test(body.trim())) return "it holds a space; a hydrate's water stands behind a dot, as in CuSO4·5H2O.";
  const parts = body.trim().split("·");
  const counts = new Map<string, Fraction>();
  const printed: string[] = [];
  for (const part of parts) {
    const multiplier = /^\d+(?:\.\d+|\/\d+)?/.exec(part)?.[0] ?? "";
    if (multiplier !== "" && parts.length === 1)
      return "it begins with a number; a coefficient belongs to an equation.";
    const times = multiplier === "" ? ONE : readFraction(multiplier);
    if (times === undefined || isNone(times)) return `“${multiplier}” is no count of molecules.`;
    const parsed = new GroupParser(part.slice(multiplier.length)).parseAll();
    if (typeof parsed === "string") return parsed;
    for (const [element, count] of parsed.counts) addTo(counts, element, productOf(count, times));
    const inner = parts.length === 1 && enclosingBracket(parsed.printed) ? parsed.printed.slice(1, -1) : parsed.printed;
    printed.push(`${isOne(times) ? "" : spellFraction(times)}${inner}`);
  }
  for (const [element, count] of counts) {
    if (fractionToNumber(count) > LARGEST_COUNT) return `it holds more than ${LARGEST_COUNT} atoms of ${element}.`;
  }
  return { printed: withoutDoubtfulPoints(printed.join("·")), counts };
}

/** A decimal count that could be taken for a hydrate's dot is printed as a ratio: `K23/10Al`, never `K2.3Al`. */
function withoutDoubtfulPoints(printed: string): string {
  const readings = hydrateReadings(printed);
  if (readings.length === 1 && readings[0] === printed) return printed;
  return printed.replace(/\d+\.\d+/g, (decimal) => {
    const count = readFraction(decimal);
    return count === undefined ? decimal : count.toFraction();
  });
}

/** Thrown and caught within this file: the first thing that is wrong with a part. */
class FormulaFault extends Error {}

/** Reads a part without dots: elements and bracketed groups, each with its count. */
class GroupParser {
  private position = 0;

  constructor(private readonly text: string) {}

  parseAll(): ParsedBody | string {
    try {
      if (this.text === "") throw new FormulaFault("a part of it is empty. The dot of a radical is left out.");
      const group = this.parseGroup(0);
      if (this.position < this.text.length) throw this.unexpected();
      return group;
    } catch (fault) {
      if (fault instanceof FormulaFault) return fault.message;
      throw fault;
    }
  }

  private parseGroup(depth: number): ParsedBody {
    if (depth > DEEPEST_BRACKET) throw new FormulaFault("its brackets are nested too deeply.");
    const counts = new Map<string, Fraction>();
    let printed = "";
    while (this.position < this.text.length && !/[)\]}]/.test(this.rest[0] ?? "")) {
      const unit = this.parseIsotope() ?? this.parseBracket(depth) ?? this.parseElement();
      const count = this.parseCount();
      for (const [element, inner] of unit.counts) addTo(counts, element, productOf(inner, count));
      printed += `${unit.printed}${isOne(count) ? "" : spellFraction(count)}`;
    }
    if (printed === "" && depth > 0) throw new FormulaFault("a bracket is empty.");
    if (printed === "") throw this.unexpected();
    return { printed, counts };
  }

  private get rest(): string {
    return this.text.slice(this.position);
  }

  /** `²H` and `[2H]` are deuterium, `³H` and `[3H]` tritium; no other isotope has its own place in the table. */
  private parseIsotope(): ParsedBody | undefined {
    const match = /^(?:\^\{(\d+)\}([A-Z][a-z]?)|\[(\d+)([A-Z][a-z]?)\])/.exec(this.rest);
    if (match === null) return undefined;
    const mass = match[1] ?? match[3] ?? "";
    const element = match[2] ?? match[4] ?? "";
    const own = element === "H" ? { "2": "D", "3": "T" }[mass] : undefined;
    if (own === undefined) {
      throw new FormulaFault(`the table keeps no isotope but D and T apart (${mass} of ${element}).`);
    }
    this.position += match[0].length;
    return { printed: own, counts: new Map([[own, ONE]]) };
  }

  private parseBracket(depth: number): ParsedBody | undefined {
    const open = this.rest[0] ?? "";
    const close = { "(": ")", "[": "]", "{": "}" }[open];
    if (close === undefined) return undefined;
    this.position += 1;
    const inner = this.parseGroup(depth + 1);
    if (this.rest[0] !== close) throw new FormulaFault(`a “${open}” is not closed.`);
    this.position += 1;
    return { printed: `${open}${inner.printed}${close}`, counts: inner.counts };
  }

  private parseElement(): ParsedBody {
    const symbol = /^[A-Z][a-z]/.exec(this.rest)?.[0] ?? this.rest[0] ?? "";
    for (const candidate of [symbol, symbol[0] ?? ""]) {
      if (elementOf(candidate) !== undefined) {
        this.position += candidate.length;
        return { printed: candidate, counts: new Map([[candidate, ONE]]) };
      }
    }
    throw this.unexpected();
  }

  private parseCount(): Fraction {
    const match = /^(?:_\{\s*(\d+(?:\.\d+|\/\d+)?)\s*\}|(\d+(?:\.\d+|\/\d+)?))/.exec(this.rest);
    if (match === null) return ONE;
    const text = match[1] ?? match[2] ?? "";
    if (/^0(?!\.)/.test(text)) {
      throw new FormulaFault(`the count “${text}” begins with a zero. Was the letter O meant?`);
    }
    const count = readFraction(text);
    if (count === undefined || isNone(count)) throw new FormulaFault(`“${text}” is no count of atoms.`);
    this.position += match[0].length;
    return count;
  }

  private unexpected(): FormulaFault {
    const rest = this.rest;
    if (/^[)\]}]/.test(rest)) return new FormulaFault(`a “${rest[0]}” closes nothing.`);
    const wrong = /^(?:[A-Za-z][a-z]?|.)/su.exec(rest)?.[0] ?? rest;
    if (/[\p{Script=Cyrillic}\p{Script=Greek}]/u.test(wrong)) {
      return new FormulaFault(`“${wrong}” is a Greek or Cyrillic letter. Was its Latin double meant?`);
    }
    if (!/[A-Za-z]/.test(wrong)) return new FormulaFault(`“${wrong}” has no place in a formula.`);
    const meant = this.meant();
    return new FormulaFault(
      `“${wrong}” is not the symbol of an element.${meant === undefined ? "" : ` Was ${meant} meant?`}`,
    );
  }

  /** The element that capitals or small letters hide: `FE` for Fe, `na` for Na. */
  private meant(): string | undefined {
    const around = this.text.slice(Math.max(0, this.position - 1), this.position + 2);
    for (const pair of [around.slice(0, 2), this.rest.slice(0, 2), this.rest.slice(0, 1)]) {
      const symbol = `${(pair[0] ?? "").toUpperCase()}${pair.slice(1).toLowerCase()}`;
      if (symbol !== pair && elementOf(symbol) !== undefined) return symbol;
    }
    return undefined;
  }
}

function addTo(counts: Map<string, Fraction>, element: string, count: Fraction): void {
  counts.set(element, sumOf(counts.get(element) ?? ZERO, count));
}

function buildFormula(parsed: ParsedBody, charge: number): Formula {
  const composition = Object.fromEntries(
    Array.from(parsed.counts, ([element, count]) => [element, fractionToNumber(count)] as const),
  );
  return {
    printed: `${parsed.printed}${spellCharge(parsed.printed, charge)}`,
    composition,
    charge,
    hill: hillOf(parsed.counts),
  };
}

/** Hill's order: carbon, then hydrogen, then the alphabet; without carbon the alphabet alone (E. A. Hill, 1900). */
function hillOf(counts: ReadonlyMap<string, Fraction>): string {
  const withCarbon = counts.has("C");
  const rank = (element: string): string =>
    withCarbon && element === "C" ? "0" : withCarbon && element === "H" ? "1" : element;
  return Array.from(counts)
    .sort(([a], [b]) => (rank(a) < rank(b) ? -1 : 1))
    .map(([element, count]) => `${element}${isOne(count) ? "" : spellFraction(count)}`)
    .join("");
}
