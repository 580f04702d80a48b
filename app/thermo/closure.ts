import { REFERENCE_TEMPERATURE } from "./constants.ts";
import { type Digits, halfUnit, isZero, places, toNumber } from "./digits.ts";
import { atomCount } from "./formula.ts";
import { showDigits, showNumber } from "./notation.ts";
import { readNumber } from "./number.ts";
import { type Property, propertyInfo } from "./property.ts";
import { isConventionalZero, referenceStateOf } from "./referenceStates.ts";
import { formatKey, isSolute, readKey, type SpeciesIdentity } from "./speciesKey.ts";
import { standardUncertainty, type Uncertainty } from "./uncertainty.ts";
import { conversionFactor, type Unit } from "./unit.ts";

/**
 * The three properties of formation belong together: ΔfG° = ΔfH° − T ΔfS°, with ΔfS° from S° and the entropies of the
 * elements. A ΔfG° in a handbook is nearly always computed from the ΔfH° and S° beside it, so the arithmetic must
 * close to the printed digits, whatever the uncertainties are.
 */

/** A value as a closure needs it; callers pass their own richer values as they are. */
export interface ClosureValue {
  /** In the table's unit: kJ/mol or J/(mol K). */
  readonly digits: Digits;
  readonly uncertainty: Uncertainty | null;
  /** Text and unit of the source where they differ from the table's; null when they do not. */
  readonly given: { readonly text: string; readonly unit: Unit } | null;
  readonly sourceId: string;
  /** A zero by convention: printed without a rounding error. */
  readonly conventional: boolean;
}

/** S° of an element's reference state, as printed for the species named by `key`: per mole of H2, of P, … */
export interface ElementEntropy {
  readonly digits: Digits;
  readonly uncertainty: Uncertainty | null;
  readonly key: string;
  /** Taken from the sheet under examination itself, so that its uncertainty does not come between the two. */
  readonly fromSheet: boolean;
}

export type ElementEntropyLookup = (element: string) => ElementEntropy | undefined;

/** One element's part in an entropy of formation. */
export interface ElementPart {
  readonly element: string;
  /** The reference state that S° belongs to. */
  readonly key: string;
  /** Atoms in the formula, ν_E. */
  readonly count: number;
  /** Atoms of the element that go in, n_E: ν_E, less z for the hydrogen of a solute. */
  readonly netCount: number;
  /** S° of the reference state as printed, J/(mol K), and the atoms in its formula. */
  readonly digits: Digits;
  readonly atoms: number;
  /** S° per atom of the reference state, J/(mol K). */
  readonly entropy: number;
  /** Half a unit of its last printed place, per atom, J/(mol K). */
  readonly halfUnit: number;
  /** Standard uncertainty per atom, J/(mol K); null when none is stated. */
  readonly standardUncertainty: number | null;
  readonly fromSheet: boolean;
}

/** ΔfS° with everything that went into it. */
export interface EntropyOfFormation {
  readonly outcome: "made";
  /** S° of the species, J/(mol K). */
  readonly entropy: Digits;
  /** ΔfS°, J/(mol K). */
  readonly value: number;
  readonly parts: readonly ElementPart[];
  /** Charge number z that the H+ convention counts with; 0 for anything but a solute. */
  readonly charge: number;
  /** The term (z/2) S°(H2) of the H+ convention, J/(mol K). */
  readonly chargeTerm: number;
}

/** Why an entropy of formation cannot be made. */
export interface NotMade {
  readonly outcome: "notMade";
  /** Reference states whose S° is not in the table. */
  readonly missing: readonly string[];
  readonly sentence: string;
}

export type ClosureVerdict = "closes" | "look" | "block" | "notMade";

/** How a closure came out. Nothing in it is rounded. */
export interface GibbsClosure {
  readonly verdict: ClosureVerdict;
  /** What came out, or why nothing did, for a person. */
  readonly sentence: string;
  /** Reference states whose S° is not in the table. */
  readonly missing: readonly string[];
  /** r = ΔfG°(stated) − (ΔfH° − T ΔfS°), kJ/mol; null when not made. */
  readonly residual: number | null;
  /** t: up to this |r| the three values close, kJ/mol. */
  readonly tolerance: number | null;
  /** Above this |r| they block, kJ/mol. */
  readonly blockAbove: number | null;
  readonly parts: ClosureParts | null;
}

/** Everything that went into a closure, for printing the arithmetic. Energies in kJ/mol. */
export interface ClosureParts {
  readonly key: string;
  readonly enthalpy: Digits;
  readonly gibbs: Digits;
  /** T, K. */
  readonly temperature: number;
  readonly entropyOfFormation: EntropyOfFormation;
  /** ΔfG° that follows from ΔfH° and S°. */
  readonly gibbsComputed: number;
  /** d: what the last printed digits leave open. */
  readonly rounding: number;
  /** e: what the element entropies leave open. */
  readonly elements: number;
  /** c: allowance for intermediate rounding. */
  readonly allowance: number;
  /** u_c; null when the three values are from one source, which their own arithmetic must satisfy. */
  readonly combinedUncertainty: number | null;
  /** The source itself says that it relaxed the constraint. */
  readonly constraintRelaxed: boolean;
}

export interface ClosureInput {
  readonly identity: SpeciesIdentity;
  readonly enthalpy: ClosureValue;
  readonly entropy: ClosureValue;
  readonly gibbs: ClosureValue;
  readonly elementEntropy: ElementEntropyLookup;
  /** The source itself says that the three values need not fit together: a block becomes a look. */
  readonly constraintRelaxed?: boolean;
}

export interface ClosureSettings {
  /** c per √(N + 1) for N atoms, kJ/mol: intermediate rounding, and the habit of rounding to 0.01 kcal. */
  readonly allowance: number;
}

export const CLOSURE_SETTINGS: ClosureSettings = { allowance: 0.05 };

/** A residual blocks only beyond this many tolerances … */
const BLOCK_FACTOR = 5;
/** … and beyond this many kJ/mol. */
const BLOCK_FLOOR = 3;
/** So that a residual equal to the tolerance in decimals closes in binary too, kJ/mol. */
const BINARY_SLACK = 1e-9;

/**
 * Entropy of formation in J/(mol K):
 *
 *   ΔfS° = S° − Σ ν_E S°_E + (z/2) S°(H2)
 *
 * with ν_E atoms of element E, S°_E per atom of its reference state and z the charge number of a solute. The last term
 * is the H+ convention: a cation forms with z/2 of H2 given off. Na+(aq): 58.45 − 51.30 + 65.34 = 72.49 J/(mol K).
 *
 * Not made when an element's S° is missing, and for ions in the gas or in a solid, which follow other conventions.
 */
export function entropyOfFormation(
  identity: SpeciesIdentity,
  entropy: Digits,
  elementEntropy: ElementEntropyLookup,
): EntropyOfFormation | NotMade {
  const { composition, charge } = identity.formula;
  if (charge !== 0 && !isSolute(identity)) {
    return {
      outcome: "notMade",
      missing: [],
      sentence: `${formatKey(identity)} is an ion outside water; its values follow a convention that is not stated.`,
    };
  }
  const counts = new Map(Object.entries(composition));
  if (charge !== 0 && !counts.has("H")) counts.set("H", 0);

  const parts: ElementPart[] = [];
  const missing: string[] = [];
  let value = toNumber(entropy);
  for (const [element, count] of counts) {
    const found = elementEntropy(element);
    const atoms = found === undefined ? 0 : atomsOf(element, found.key);
    if (found === undefined || atoms === 0) {
      missing.push(referenceStateOf(element)?.key ?? element);
      continue;
    }
    const netCount = element === "H" ? count - charge : count;
    const uncertainty = standardUncertainty(found.uncertainty);
    const part: ElementPart = {
      element,
      key: found.key,
      count,
      netCount,
      digits: found.digits,
      atoms,
      entropy: toNumber(found.digits) / atoms,
      halfUnit: toNumber(halfUnit(found.digits)) / atoms,
      standardUncertainty: uncertainty === null ? null : uncertainty / atoms,
      fromSheet: found.fromSheet,
    };
    parts.push(part);
    value -= netCount * part.entropy;
  }
  if (missing.length > 0) {
    const verb = missing.length === 1 ? "is" : "are";
    return { outcome: "notMade", missing, sentence: `S° of ${missing.join(", ")} ${verb} not in the table.` };
  }
  const hydrogen = parts.find(({ element }) => element === "H");
  return { outcome: "made", entropy, value, parts, charge, chargeTerm: charge * (hydrogen?.entropy ?? 0) };
}

/**
 * Whether a stated ΔfG° follows from the ΔfH° and S° beside it. All in kJ/mol, T = 298.15 K:
 *
 *   r = ΔfG° − (ΔfH° − T ΔfS°)
 *   d = δ_G + δ_H + (T/1000)(δ_S + Σ |n_E| δ_E)   with δ half a unit of the last printed place in the source's own unit
 *   e = (T/1000) Σ |n_E| U(S°_E)                  left out for entropies from the sheet itself
 *   c = 0.05 √(N + 1)                             for N atoms
 *   t = 2d + c + e                                one source
 *   t = max(2d + c + e, 2 u_c)                    different sources, u_c² = u_G² + u_H² + (T/1000)²(u_S² + Σ n_E² u_E²)
 *
 * n_E = ν_E, but n_H = ν_H − z for a solute, counted once before squaring. A zero by convention has δ = 0.
 * |r| ≤ t closes; up to max(5t, 3 kJ/mol) a look; above, it blocks, or is a look where the source relaxed the
 * constraint. Missing uncertainties add nothing.
 */
export function gibbsClosure(input: ClosureInput, settings: ClosureSettings = CLOSURE_SETTINGS): GibbsClosure {
  const { identity, enthalpy, entropy, gibbs, elementEntropy, constraintRelaxed = false } = input;
  const formed = entropyOfFormation(identity, entropy.digits, elementEntropy);
  if (formed.outcome === "notMade") return notMade(formed);

  const temperature = REFERENCE_TEMPERATURE;
  const kilo = temperature / 1000;
  const gibbsComputed = toNumber(enthalpy.digits) - kilo * formed.value;
  const residual = toNumber(gibbs.digits) - gibbsComputed;

  const overElements = (amount: (part: ElementPart) => number): number =>
    formed.parts.reduce((sum, part) => sum + Math.abs(part.netCount) * amount(part), 0);
  const rounding =
    printedHalfUnit(identity, "gibbsEnergyOfFormation", gibbs) +
    printedHalfUnit(identity, "enthalpyOfFormation", enthalpy) +
    kilo * (printedHalfUnit(identity, "entropy", entropy) + overElements((part) => part.halfUnit));
  const elements = kilo * overElements((part) => (part.fromSheet ? 0 : 2 * (part.standardUncertainty ?? 0)));
  const allowance = settings.allowance * Math.sqrt(atomCount(identity.formula) + 1);

  const oneSource = new Set([enthalpy.sourceId, entropy.sourceId, gibbs.sourceId]).size === 1;
  const combinedUncertainty = oneSource
    ? null
    : Math.hypot(
        standardUncertainty(gibbs.uncertainty) ?? 0,
        standardUncertainty(enthalpy.uncertainty) ?? 0,
        kilo * (standardUncertainty(entropy.uncertainty) ?? 0),
        ...formed.parts.map((part) => kilo * part.netCount * (part.standardUncertainty ?? 0)),
      );
  const tolerance = Math.max(2 * rounding + allowance + elements, 2 * (combinedUncertainty ?? 0));
  const blockAbove = Math.max(BLOCK_FACTOR * tolerance, BLOCK_FLOOR);
  const verdict = judge(Math.abs(residual), tolerance, blockAbove, constraintRelaxed);

  const parts: ClosureParts = {
    key: formatKey(identity),
    enthalpy: enthalpy.digits,
    gibbs: gibbs.digits,
    temperature,
    entropyOfFormation: formed,
    gibbsComputed,
    rounding,
    elements,
    allowance,
    combinedUncertainty,
    constraintRelaxed,
  };
  const sentence = verdictSentence(parts, verdict, residual, tolerance);
  return { verdict, sentence, missing: [], residual, tolerance, blockAbove, parts };
}

/** ΔfG° that follows from ΔfH° and S°, with its standard uncertainty. */
export interface DerivedGibbsEnergy {
  readonly outcome: "made";
  /** kJ/mol. */
  readonly value: number;
  /** kJ/mol; null when ΔfH°, S° or an element's S° states none. */
  readonly standardUncertainty: number | null;
  readonly entropyOfFormation: EntropyOfFormation;
}

/**
 * ΔfG° = ΔfH° − T ΔfS° in kJ/mol at 298.15 K, and u² = u_H² + (T/1000)²(u_S² + Σ n_E² u_E²).
 *
 * Derived values of several species share the entropies of the elements and are not independent of one another.
 */
export function derivedGibbsEnergy(
  identity: SpeciesIdentity,
  enthalpy: { readonly digits: Digits; readonly uncertainty: Uncertainty | null },
  entropy: { readonly digits: Digits; readonly uncertainty: Uncertainty | null },
  elementEntropy: ElementEntropyLookup,
): DerivedGibbsEnergy | NotMade {
  const formed = entropyOfFormation(identity, entropy.digits, elementEntropy);
  if (formed.outcome === "notMade") return formed;
  const kilo = REFERENCE_TEMPERATURE / 1000;
  const contributions = [
    standardUncertainty(enthalpy.uncertainty),
    scaled(kilo, standardUncertainty(entropy.uncertainty)),
    ...formed.parts.map((part) => scaled(kilo * part.netCount, part.standardUncertainty)),
  ];
  return {
    outcome: "made",
    value: toNumber(enthalpy.digits) - kilo * formed.value,
    standardUncertainty: contributions.every((one) => one !== null) ? Math.hypot(...contributions) : null,
    entropyOfFormation: formed,
  };
}

/** The arithmetic of a closure, line by line, as plain text for people; one line when it was not made. */
export function closureArithmetic(closure: GibbsClosure): string[] {
  const { parts, residual, tolerance, blockAbove } = closure;
  if (parts === null || residual === null || tolerance === null || blockAbove === null) return [closure.sentence];
  const formed = parts.entropyOfFormation;
  const kilojoules = showNumber(formed.value / 1000, 5);
  const spread =
    `2d + c + e = 2 × ${showNumber(parts.rounding, 4)} + ${showNumber(parts.allowance, 4)} + ` +
    `${showNumber(parts.elements, 4)}`;
  return [
    entropyLine(formed),
    `ΔfH° − T ΔfS° = ${showDigits(parts.enthalpy)} − ${parts.temperature} × ${bracketed(kilojoules)} = ` +
      `${showNumber(parts.gibbsComputed, 3)} kJ/mol`,
    `r = ${showDigits(parts.gibbs)} − ${bracketed(showNumber(parts.gibbsComputed, 3))} = ${signed(residual)} kJ/mol`,
    parts.combinedUncertainty === null
      ? `t = ${spread} = ${showNumber(tolerance, 3)} kJ/mol (one source)`
      : `t = the larger of ${spread} and 2u = 2 × ${showNumber(parts.combinedUncertainty, 4)}: ` +
        `${showNumber(tolerance, 3)} kJ/mol (different sources)`,
    `closes up to ${showNumber(tolerance, 2)}, blocks above ${showNumber(blockAbove, 2)} kJ/mol`,
  ];
}

function judge(size: number, tolerance: number, blockAbove: number, relaxed: boolean): ClosureVerdict {
  if (size <= tolerance + BINARY_SLACK) return "closes";
  return size <= blockAbove + BINARY_SLACK || relaxed ? "look" : "block";
}

function verdictSentence(parts: ClosureParts, verdict: ClosureVerdict, residual: number, tolerance: number): string {
  const stated = `ΔfG° of ${parts.key}, ${showDigits(parts.gibbs)} kJ/mol,`;
  const computed = `${showNumber(parts.gibbsComputed, 2)} kJ/mol`;
  const apart = `${signed(residual)} kJ/mol apart where ${showNumber(tolerance, 2)} is allowed`;
  if (verdict === "closes") return `${stated} follows from its ΔfH° and S°, which give ${computed}: ${apart}.`;
  const relaxed = parts.constraintRelaxed ? " The source says that it relaxed this constraint." : "";
  return `${stated} does not follow from its ΔfH° and S°, which give ${computed}: ${apart}.${relaxed}`;
}

function notMade({ missing, sentence }: NotMade): GibbsClosure {
  return { verdict: "notMade", sentence, missing, residual: null, tolerance: null, blockAbove: null, parts: null };
}

/** δ: half a unit of the last place that the source printed, in its own unit, then in the table's. */
function printedHalfUnit(identity: SpeciesIdentity, property: Property, value: ClosureValue): number {
  const conventional = value.conventional || (isZero(value.digits) && isConventionalZero(identity, property));
  if (conventional) return 0;
  const { unit } = propertyInfo[property];
  if (value.given !== null) {
    const factor = conversionFactor(value.given.unit, unit);
    const printed = printedDigits(value.given.text, toNumber(value.digits) / factor);
    if (printed !== undefined) return factor * toNumber(halfUnit(printed));
  }
  return toNumber(halfUnit(value.digits));
}

/** The source's own digits; where its text has two readings, the one that became the table's value. */
function printedDigits(text: string, value: number): Digits | undefined {
  const reading = readNumber(text);
  if (reading.outcome === "read") return reading.value.digits;
  if (reading.outcome === "refused") return undefined;
  const distance = (digits: Digits): number => Math.abs(toNumber(digits) - value);
  return reading.candidates.map(({ digits }) => digits).sort((a, b) => distance(a) - distance(b))[0];
}

/** Atoms of the element in the species named by a key: 2 for H in `H2(g)`. Zero when it holds none. */
function atomsOf(element: string, key: string): number {
  const reference = referenceStateOf(element);
  if (reference?.key === key) return reference.atoms;
  const reading = readKey(key);
  return reading.outcome === "read" ? (reading.value.formula.composition[element] ?? 0) : 0;
}

function entropyLine(formed: EntropyOfFormation): string {
  const elements = formed.parts
    .filter(({ count }) => count !== 0)
    .map((part) => `${withoutZeros(part.count, 4, 0)} ${part.element} × ${perAtom(part, 1)}`);
  const hydrogen = formed.parts.find(({ element }) => element === "H");
  const convention =
    formed.charge === 0 || hydrogen === undefined
      ? ""
      : ` + ${bracketed(`${showNumber(formed.charge, 0)}/2`)} × ${perAtom(hydrogen, 2)} (H2)`;
  return (
    `ΔfS° = ${showDigits(formed.entropy)} − (${elements.join(" + ")})${convention} = ` +
    `${showNumber(formed.value, Math.max(2, places(formed.entropy)))} J/(mol K)`
  );
}

/** S° of so many atoms of a reference state, with the digits it was printed with. */
function perAtom(part: ElementPart, atoms: number): string {
  if (part.atoms === atoms) return showDigits(part.digits);
  return withoutZeros(part.entropy * atoms, places(part.digits) + 3, places(part.digits));
}

/** Up to so many decimals, without zeros at the end, but never fewer decimals than stated. */
function withoutZeros(value: number, most: number, fewest: number): string {
  const short = showNumber(value, most).replace(/\.?0+$/, "");
  const decimals = short.split(".")[1]?.length ?? 0;
  return decimals < fewest ? showNumber(value, fewest) : short;
}

function signed(value: number): string {
  const shown = showNumber(value, 2);
  return shown.startsWith("−") || !/[1-9]/.test(shown) ? shown : `+${shown}`;
}

function bracketed(shown: string): string {
  return shown.startsWith("−") ? `(${shown})` : shown;
}

function scaled(factor: number, uncertainty: number | null): number | null {
  return uncertainty === null ? null : factor * uncertainty;
}
