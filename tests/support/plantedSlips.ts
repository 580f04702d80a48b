import { derivedGibbsEnergy } from "#app/thermo/closure.ts";
import {
  type Digits,
  digits,
  digitsOf,
  isZero,
  multiply,
  negate,
  places,
  readDigits,
  roundTo,
  toNumber,
} from "#app/thermo/digits.ts";
import { codata, elementEntropyFrom, nbs, type PublishedRow } from "#tests/published/publishedTables.ts";

/*
 * Good rows of published tables with one slip planted in each, to see whether the examination finds it. Nothing in
 * app/checks knows how this is done.
 */

export type Planted = "enthalpyOfFormation" | "entropy" | "gibbsEnergyOfFormation";
const PLANTABLE: readonly Planted[] = ["enthalpyOfFormation", "entropy", "gibbsEnergyOfFormation"];

/** A row with its three values. */
export interface GoodRow {
  readonly row: PublishedRow;
  readonly values: Readonly<Record<Planted, Digits>>;
}

export interface PlantedRow {
  readonly kind: string;
  readonly good: GoodRow;
  /** The property whose value was spoilt; the first of the two where two were exchanged. */
  readonly property: Planted;
  readonly values: Readonly<Record<Planted, Digits>>;
}

export const elementEntropies = elementEntropyFrom(codata, nbs);

/** Rows of both tables that close: CODATA with the ΔfG° that follows, rounded to two decimals, and the NBS excerpt. */
export function goodRows(): GoodRow[] {
  const derived = codata.flatMap((row): GoodRow[] => {
    const { enthalpyOfFormation: enthalpy, entropy } = row.values;
    if (enthalpy === undefined || entropy === undefined || enthalpy.conventional) return [];
    const gibbs = derivedGibbsEnergy(row.identity, enthalpy, entropy, elementEntropies);
    if (gibbs.outcome === "notMade") return [];
    const place = Math.min(2, places(enthalpy.digits));
    return [goodRow(row, enthalpy.digits, entropy.digits, digitsOf(gibbs.value, place))];
  });
  const stated = nbs.flatMap((row): GoodRow[] => {
    const { enthalpyOfFormation: enthalpy, entropy, gibbsEnergyOfFormation: gibbs } = row.values;
    if (enthalpy === undefined || entropy === undefined || gibbs === undefined || enthalpy.conventional) return [];
    const unfit = /relaxed/.test(row.description) || ["KCl(cr)", "N2H4(l)"].includes(row.key);
    return unfit ? [] : [goodRow(row, enthalpy.digits, entropy.digits, gibbs.digits)];
  });
  return [...derived, ...stated];
}

function goodRow(row: PublishedRow, enthalpy: Digits, entropy: Digits, gibbs: Digits): GoodRow {
  return { row, values: { enthalpyOfFormation: enthalpy, entropy, gibbsEnergyOfFormation: gibbs } };
}

/** Numbers in [0, 1) from a seed (mulberry32), so that a run can be repeated. */
export function random(seed: number): () => number {
  let state = seed >>> 0;
  return () => {
    state = (state + 0x6d2b79f5) >>> 0;
    let mixed = Math.imul(state ^ (state >>> 15), state | 1);
    mixed ^= mixed + Math.imul(mixed ^ (mixed >>> 7), mixed | 61);
    return ((mixed ^ (mixed >>> 14)) >>> 0) / 4_294_967_296;
  };
}

type Spoil = (value: Digits, property: Planted, next: () => number, good: GoodRow) => Digits | undefined;

const pick = <T>(from: readonly T[], next: () => number): T | undefined => from[Math.floor(next() * from.length)];

const VALUE_SLIPS: Readonly<Record<string, Spoil>> = {
  "sign lost": (value, property) => (property === "entropy" ? undefined : negate(value)),
  "digits exchanged": (value, _property, next) => {
    const at = digitPlaces(value);
    const index = Math.floor(next() * (at.length - 1));
    const [a = 0, b = 0] = [at[index], at[index + 1]];
    const characters = Array.from(value);
    [characters[a], characters[b]] = [characters[b] ?? "", characters[a] ?? ""];
    return changed(characters.join(""), value);
  },
  "digit misread": (value, _property, next) => {
    const at = pick(digitPlaces(value), next) ?? 0;
    return changed(value.slice(0, at) + String(Math.floor(next() * 10)) + value.slice(at + 1), value);
  },
  "decimal point moved": (value, _property, next) =>
    next() < 0.5
      ? multiply(value, "0.1")
      : places(value) > 0
        ? roundTo(multiply(value, "10"), places(value) - 1)
        : undefined,
  "thousand times": (value) => roundTo(multiply(value, "1000"), Math.max(0, places(value) - 3)),
  "a thousandth": (value) => multiply(value, "0.001"),
  "calories filed as joules": (value) => digitsOf(toNumber(value) / 4.184, Math.max(places(value), 2)),
  "ΔfS° filed as S°": (value, property, _next, { row, values }) => {
    if (property !== "entropy") return undefined;
    const formed = derivedGibbsEnergy(
      row.identity,
      { digits: values.enthalpyOfFormation, uncertainty: null },
      { digits: values.entropy, uncertainty: null },
      elementEntropies,
    );
    return formed.outcome === "made" ? digitsOf(formed.entropyOfFormation.value, places(value)) : undefined;
  },
  "H+ convention left out": (value, property, _next, { row }) => {
    const { charge } = row.identity.formula;
    if (row.identity.phase !== "aq" || charge === 0 || property === "enthalpyOfFormation") return undefined;
    const shift = (charge / 2) * 130.68;
    return digitsOf(toNumber(value) + (property === "entropy" ? shift : 0.29815 * shift), places(value));
  },
};

/** One slip of each kind planted so many times into rows picked at random. */
export function plant(times: number, seed: number): PlantedRow[] {
  const next = random(seed);
  const rows = goodRows();
  const planted: PlantedRow[] = [];
  for (const [kind, spoil] of Object.entries(VALUE_SLIPS)) {
    for (let made = 0, tries = 0; made < times && tries < times * 50; tries += 1) {
      const good = pick(rows, next);
      const property = pick(PLANTABLE, next);
      if (good === undefined || property === undefined || isZero(good.values[property])) continue;
      const value = spoil(good.values[property], property, next, good);
      if (value === undefined || toNumber(value) === toNumber(good.values[property])) continue;
      planted.push({ kind, good, property, values: { ...good.values, [property]: value } });
      made += 1;
    }
  }
  for (let made = 0; made < times; made += 1) {
    const good = pick(rows, next);
    if (good === undefined) continue;
    const { enthalpyOfFormation, gibbsEnergyOfFormation } = good.values;
    planted.push({
      kind: "ΔfH° and ΔfG° exchanged",
      good,
      property: "enthalpyOfFormation",
      values: {
        ...good.values,
        enthalpyOfFormation: gibbsEnergyOfFormation,
        gibbsEnergyOfFormation: enthalpyOfFormation,
      },
    });
  }
  return planted;
}

function digitPlaces(value: string): number[] {
  return Array.from(value).flatMap((character, index) => (/\d/.test(character) ? [index] : []));
}

function changed(text: string, from: Digits): Digits | undefined {
  const value = /^-?0\d/.test(text) ? undefined : readDigits(text);
  return value === undefined || value === from || isZero(value) ? undefined : digits(value);
}
