import { readCas } from "#app/thermo/cas.ts";
import { type Formula, readFormula } from "#app/thermo/formula.ts";
import type { Phase } from "#app/thermo/phase.ts";
import type { Property } from "#app/thermo/property.ts";
import { readKey, type SpeciesIdentity } from "#app/thermo/speciesKey.ts";
import type { Reading } from "#app/thermo/reading.ts";

/** What a person typed to find a species, with every reading it has. */
export interface Search {
  /** As typed, without spaces at its ends. */
  text: string;
  /** Species it names outright, such as `SO4 2-(aq)`. */
  identities: readonly SpeciesIdentity[];
  /** Formulas it may be, in Hill order; `charge` null where the text names none, so that `SO4` finds the ion. */
  formulas: readonly { hill: string; charge: number | null }[];
  /** The CAS Registry Number it may be. */
  cas: string | null;
}

/** Which species of an edition to show. Everything named must hold at once. */
export interface SpeciesFilter {
  search: Search | null;
  /** Element symbols that must all be in the formula. */
  elements: readonly string[];
  /** Any of these phases; every phase when empty. */
  phases: readonly Phase[];
  cas: string | null;
  /** Properties that must have a value. */
  holds: readonly Property[];
  /** Properties that must have none. */
  lacks: readonly Property[];
  /** How the elements are meant: all of them (unless said), nothing but them, or both. */
  elementsHow?: ElementsHow;
  /** Of this charge; any when left out. */
  charge?: ChargeKind | null;
  /** What must be missing beside values. */
  bare?: readonly Bare[];
  /** With a value from any of these sources; from any source when left out. */
  sourceIds?: readonly string[] | null;
}

export const ELEMENTS_HOW = ["all", "only", "exactly"] as const;
export type ElementsHow = (typeof ELEMENTS_HOW)[number];

export const CHARGE_KINDS = ["neutral", "ion", "cation", "anion"] as const;
export type ChargeKind = (typeof CHARGE_KINDS)[number];

/**
 * What a species can be without: the uncertainty of one of its values, a CAS number, a name, or any value that a source
 * states (all of them were derived).
 */
export const BARE = ["uncertainty", "cas", "name", "stated"] as const;
export type Bare = (typeof BARE)[number];

export const EVERY_SPECIES: SpeciesFilter = {
  search: null,
  elements: [],
  phases: [],
  cas: null,
  holds: [],
  lacks: [],
};

/** The readings of what was typed; null when nothing was. Never fails: a text that is no formula may be part of a name. */
export function readSearch(typed: string): Search | null {
  const text = typed.trim();
  if (text === "") return null;
  const cas = readCas(text);
  const identities = readings(readKey(text));
  const formulas = identities.length > 0 ? [] : readings(readFormula(text));
  return {
    text,
    identities,
    formulas: formulas.map(({ hill, charge }: Formula) => ({ hill, charge: charge === 0 ? null : charge })),
    cas: cas.outcome === "read" ? cas.value : null,
  };
}

function readings<T>(reading: Reading<T>): readonly T[] {
  switch (reading.outcome) {
    case "read":
      return [reading.value];
    case "ambiguous":
      return reading.candidates;
    case "refused":
      return [];
  }
}

/**
 * Splits a list in an address at the commas outside brackets, so that `H2O(l),C(cr,graphite)` is two keys. Keys hold no
 * space: a space inside one is a plus sign that the address lost (`Na (aq)` is `Na+(aq)`).
 */
export function splitKeys(list: string): string[] {
  const keys: string[] = [];
  let depth = 0;
  let key = "";
  for (const sign of list) {
    if (sign === "(" || sign === "[") depth += 1;
    if (sign === ")" || sign === "]") depth = Math.max(0, depth - 1);
    if (sign === "," && depth === 0) {
      keys.push(key);
      key = "";
    } else {
      key += sign;
    }
  }
  keys.push(key);
  return keys.map(plusKept).filter((one) => one !== "");
}

/** A key as an address carried it: a space inside stands for the plus sign that form encoding turned into one. */
export function plusKept(key: string): string {
  return key.trim().replace(/ /g, "+");
}
