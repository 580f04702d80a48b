import { type Digits, add, multiply, places, roundTo, subtract, toNumber, digits } from "./digits.ts";
import { plainText } from "./typography.ts";
import { ambiguous, isTooLong, quote, read, type Reading, refused } from "./reading.ts";

/** Units of an energy per amount of substance. */
export type EnergyUnit = "kJ/mol" | "J/mol" | "kcal/mol" | "cal/mol";
/** Units of an entropy or a heat capacity per amount of substance. */
export type EntropyUnit = "J/(mol K)" | "kJ/(mol K)" | "cal/(mol K)" | "kcal/(mol K)";
/** Every unit a sheet may use. `cal` is the thermochemical calorie, 4.184 J exactly. */
export type Unit = EnergyUnit | EntropyUnit;

/** The units of the same kind of quantity as U. */
export type LikeUnit<U extends Unit> = U extends EnergyUnit ? EnergyUnit : EntropyUnit;

/** A number with its unit in its type: adding kilojoules to joules per kelvin does not compile. */
export interface Quantity<U extends Unit> {
  readonly digits: Digits;
  readonly unit: U;
}

/** One unit in joules, exact by definition. */
const IN_JOULES: Readonly<Record<Unit, { readonly kind: "energy" | "entropy"; readonly joules: string }>> = {
  "kJ/mol": { kind: "energy", joules: "1000" },
  "J/mol": { kind: "energy", joules: "1" },
  "kcal/mol": { kind: "energy", joules: "4184" },
  "cal/mol": { kind: "energy", joules: "4.184" },
  "J/(mol K)": { kind: "entropy", joules: "1" },
  "kJ/(mol K)": { kind: "entropy", joules: "1000" },
  "cal/(mol K)": { kind: "entropy", joules: "4.184" },
  "kcal/(mol K)": { kind: "entropy", joules: "4184" },
};

/** Every unit a sheet may use, energies first. */
export const UNITS = Object.keys(IN_JOULES) as readonly Unit[];

/** A number with its unit. */
export function quantity<U extends Unit>(value: Digits, unit: U): Quantity<U> {
  return { digits: value, unit };
}

/** a + b, exact, in their common unit. */
export function addQuantities<U extends Unit>(a: Quantity<U>, b: Quantity<NoInfer<U>>): Quantity<U> {
  return { digits: add(a.digits, b.digits), unit: a.unit };
}

/** a − b, exact, in their common unit. */
export function subtractQuantities<U extends Unit>(a: Quantity<U>, b: Quantity<NoInfer<U>>): Quantity<U> {
  return { digits: subtract(a.digits, b.digits), unit: a.unit };
}

/** The quantity in another unit of its kind, with the digits of `convert`. */
export function convertQuantity<U extends Unit, V extends LikeUnit<U>>(value: Quantity<U>, to: V): Quantity<V> {
  return { digits: convert(value.digits, value.unit, to).digits, unit: to };
}

/** Whether two units measure the same kind of quantity. */
export function isLikeUnit(a: Unit, b: Unit): boolean {
  return IN_JOULES[a].kind === IN_JOULES[b].kind;
}

/**
 * Converts a printed number to another unit of its kind by the exact factor, then rounds half-even to just enough
 * digits to come back: the last place is the coarsest one that is no coarser than the source's own last place.
 * `-68.315` kcal/mol becomes `-285.830` kJ/mol, and that is `-68.315` kcal/mol again.
 *
 * @returns the digits in `to`, and the step in words (`× 4.184`), null when the units are the same
 * @throws RangeError for unlike quantities (kJ/mol and J/(mol K))
 */
export function convert(value: Digits, from: Unit, to: Unit): { digits: Digits; note: string | null } {
  if (!isLikeUnit(from, to)) throw new RangeError(`${from} and ${to} measure different quantities`);
  const { factor, note } = conversionStep(from, to);
  if (note === null) return { digits: value, note };
  const place = Math.max(0, places(value) - Math.floor(Math.log10(toNumber(factor))));
  return { digits: roundTo(multiply(value, factor), place), note };
}

/**
 * How many of one unit make up another, as the nearest double: for half units and uncertainties, whose own digits do
 * not matter.
 *
 * @throws RangeError for unlike quantities
 */
export function conversionFactor(from: Unit, to: Unit): number {
  if (!isLikeUnit(from, to)) throw new RangeError(`${from} and ${to} measure different quantities`);
  return toNumber(conversionStep(from, to).factor);
}

/**
 * The exact factor from one unit to another, and how a person would write the step.
 * From a joule to a calorie the factor has no finite decimal, so it carries 30 digits.
 */
function conversionStep(from: Unit, to: Unit): { factor: Digits; note: string | null } {
  if (from === to) return { factor: digits("1"), note: null };
  const step = STEPS[`${IN_JOULES[from].joules}>${IN_JOULES[to].joules}`];
  if (step === undefined) throw new RangeError(`no factor from ${from} to ${to}`);
  return { factor: digits(step[0]), note: step[1] };
}

/** Keyed by joules in the one unit and joules in the other. */
const STEPS: Readonly<Record<string, readonly [factor: string, note: string]>> = {
  "1000>1": ["1000", "× 1000"],
  "1>1000": ["0.001", "÷ 1000"],
  "4184>4.184": ["1000", "× 1000"],
  "4.184>4184": ["0.001", "÷ 1000"],
  "4184>1000": ["4.184", "× 4.184"],
  "4.184>1": ["4.184", "× 4.184"],
  "4184>1": ["4184", "× 4184"],
  "4.184>1000": ["0.004184", "× 0.004184"],
  "1000>4184": ["0.239005736137667304015296367113", "÷ 4.184"],
  "1>4.184": ["0.239005736137667304015296367113", "÷ 4.184"],
  "1>4184": ["0.000239005736137667304015296367113", "÷ 4184"],
  "1000>4.184": ["239.005736137667304015296367113", "× 1000 ÷ 4.184"],
};

const ENERGY_SYMBOL = /^(k?)(J|cal)$/;

/**
 * Reads a unit as sheets spell it: `kJ mol-1`, `kJ·mol⁻¹`, `kJ/mol`, `J/mol/K`, `J K-1 mol-1`, `cal/mol·K`, `e.u.`,
 * `gibbs/mol` and their like. Energies per gram, per kilomole or per particle, and other calories, are refused.
 */
export function readUnit(text: string): Reading<Unit> {
  if (isTooLong(text)) return refused(`${quote(text)} is too long for a unit.`);
  const plain = plainText(text).trim();
  if (plain === "") return refused("No unit is given. Write the unit, for example kJ/mol or J/(mol K).");
  const entropyUnit = /^(?:e\.?\s?u\.?|(?:gibbs|gbs)(?:\/mole?|\s*mole?\^?-1))$/i.exec(plain);
  if (entropyUnit !== null) {
    return read("cal/(mol K)", [`${quote(text)} is the entropy unit, 1 cal/(mol K) with 1 cal = 4.184 J.`]);
  }
  if (/cal.*(?:\bIT\b|_IT)|(?:15|20)\s*°?\s*C|international/i.test(plain)) {
    return refused(
      `${quote(text)} is not the thermochemical calorie (4.184 J). Give the values in joules: 1 cal(IT) is 4.1868 J.`,
    );
  }
  const factors = unitFactors(plain);
  if (factors === undefined) return refused(unreadable(text));

  const { energy, moles, kelvins, rest } = factors;
  if (rest.length > 0 || energy === undefined) return refused(unreadable(text));
  if (energy === "Cal") {
    return ambiguous<Unit>(
      kelvins === 0 ? ["cal/mol", "kcal/mol"] : ["cal/(mol K)", "kcal/(mol K)"],
      `${quote(text)} may mean the calorie or the “large” calorie, which is a kilocalorie. Write cal or kcal.`,
    );
  }
  if (moles === 0) return refused(`${quote(text)} does not say per mole. Write for example ${energy}/mol.`);
  if (moles !== -1 || (kelvins !== 0 && kelvins !== -1)) return refused(unreadable(text));
  return read<Unit>(
    kelvins === 0 ? (`${energy}/mol` as EnergyUnit) : (`${energy}/(mol K)` as EntropyUnit),
    factors.notes,
  );
}

interface UnitFactors {
  energy: "J" | "kJ" | "cal" | "kcal" | "Cal" | undefined;
  moles: number;
  kelvins: number;
  rest: string[];
  notes: string[];
}

/** Takes a unit apart into symbols with exponents; a solidus divides by everything up to the next one. */
function unitFactors(plain: string): UnitFactors | undefined {
  const spelled = plain
    .replace(/[_(\s](?:th|thermochem(?:ical)?)\.?\)?(?=[\s/·*]|$)/gi, " ")
    .replace(/\bper\b/gi, "/")
    .replace(/[·.*×]|(?<=[a-z])-(?=[A-Za-z])/gi, " ")
    .replace(/\bmolK\b/gi, "mol K")
    .replace(/\bKmol\b/g, "K mol");
  const factors: UnitFactors = { energy: undefined, moles: 0, kelvins: 0, rest: [], notes: [] };
  const parts = spelled.split("/");
  for (const [index, part] of parts.entries()) {
    const inner = part.replace(/[()[\]]/g, " ").trim();
    if (inner === "") return undefined;
    for (const token of inner.split(/\s+/)) {
      const match = /^°?([A-Za-z]+)(?:\^?\{?([+-]?\d)\}?)?$/.exec(token);
      if (match === null) return undefined;
      const exponent = Number(match[2] ?? "1") * (index === 0 ? 1 : -1);
      if (!takeFactor(factors, match[1] ?? "", exponent)) factors.rest.push(token);
    }
  }
  return factors;
}

function takeFactor(factors: UnitFactors, symbol: string, exponent: number): boolean {
  if (/^mol(?:es?)?$/i.test(symbol)) {
    factors.moles += exponent;
    return true;
  }
  if (/^(?:K|kelvin|deg|degK|degree)$/.test(symbol)) {
    factors.kelvins += exponent;
    return true;
  }
  const energy = energySymbol(symbol);
  if (energy === undefined || exponent !== 1 || factors.energy !== undefined) return false;
  factors.energy = energy;
  if (energy !== "Cal" && !ENERGY_SYMBOL.test(symbol)) factors.notes.push(`${symbol} is read as ${energy}.`);
  return true;
}

/** Symbols are case-sensitive, but heads in capitals are common; `MJ` and `mJ` are never taken for anything else. */
function energySymbol(symbol: string): UnitFactors["energy"] {
  if (symbol === "Cal") return "Cal";
  const lower = symbol.toLowerCase();
  if (/^(?:kj|kilojoules?)$/.test(lower)) return "kJ";
  if (/^(?:j|joules?)$/.test(lower)) return "J";
  if (/^(?:kcal|kilocalories?)$/.test(lower)) return "kcal";
  if (/^(?:cal|calories?)$/.test(lower)) return "cal";
  return undefined;
}

function unreadable(text: string): string {
  return (
    `${quote(text)} is not a unit this table reads. ` +
    "Energies are read in kJ, J, kcal or cal per mol; entropies and heat capacities in the same per (mol K)."
  );
}
