import { type ClosureInput, type GibbsClosure, gibbsClosure } from "#app/thermo/closure.ts";
import { spellCharge } from "#app/thermo/charge.ts";
import { REFERENCE_TEMPERATURE } from "#app/thermo/constants.ts";
import { add, type Digits, digitsOf, halfUnit, places, subtract, toNumber } from "#app/thermo/digits.ts";
import { atomCount, type Formula } from "#app/thermo/formula.ts";
import { molarMass } from "#app/thermo/molarMass.ts";
import { isSolute } from "#app/thermo/speciesKey.ts";
import { sackurTetrode } from "#app/thermo/thirdLaw.ts";
import { showDigits, showNumber } from "#app/thermo/notation.ts";
import type { Property } from "#app/thermo/property.ts";
import { expandedUncertainty } from "#app/thermo/uncertainty.ts";
import {
  CLOSURE_PROPERTIES,
  closureInput,
  type ClosureProperty,
  closureSettings,
  type ClosureValues,
  withValue,
} from "./closureOf.ts";
import type { Policy } from "./policy.ts";
import { explanationSentence, ranked, type Weighed } from "./ranking.ts";
import { printedValue, slipNumber, slipWords, VALUE_SLIP_FREQUENCY, valueSlips } from "./slips.ts";
import type { Repair, Suggestion, TableView, ViewedSpecies, ViewedValue } from "./types.ts";
import { shownSigned, symbolOf } from "./words.ts";

/*
 * Which single slip would explain a Gibbs closure that fails.
 *
 * Every single slip of every proposed value is undone in turn. A repair is kept when the closure then holds with the
 * digits of the repaired value, and weighed by how common the slip is, how well the closure fits afterwards, and how
 * near the values then lie to what stands. It competes with the possibility that nothing slipped and the source simply
 * does not close very well: only what is likelier than that is shown, so that good handbooks stay in peace.
 */

/** Slips that are not of one printed number; how often a row suffers exactly this one. Common practice, by judgement. */
const FREQUENCY = {
  "entropy-of-formation-as-entropy": 0.004,
  "hydrogen-convention-left-out": 0.004,
  "enthalpy-and-gibbs-exchanged": 0.004,
  "entropy-and-heat-capacity-exchanged": 0.003,
  "joules-in-entropy-term": 0.003,
  "celsius-in-entropy-term": 0.002,
  "charge-wrong": 0.002,
  "hydrogen-count-wrong": 0.002,
} as const;

/** How often a row without any slip fails to close, and how fast that thins out per tolerance beyond the first. */
const HONEST_FAILURE = { share: 0.08, decay: 2 };

/** A slip undone on the way to an explanation. */
interface Trial {
  readonly slip: string;
  readonly frequency: number;
  readonly repaired: ClosureInput;
  readonly changes: readonly Repair[];
  /** The cause, as the start of a sentence that goes on with "would explain it". */
  readonly cause: string;
  /** The repaired value in words. */
  readonly outcome: string;
  /** Null where values change. */
  readonly formula: string | null;
  /** How far the spoilt number is from what the slip would have made of the good one, in tolerances. */
  readonly misfit?: number;
}

/** What the suggestions and the scores need to know of the case. */
interface Case {
  readonly species: ViewedSpecies;
  readonly values: ClosureValues;
  readonly view: TableView;
  readonly input: ClosureInput;
  readonly policy: Policy;
  readonly residual: number;
  readonly tolerance: number;
  /** The values that may have slipped: the proposed ones, or all where none is. */
  readonly suspects: readonly ClosureProperty[];
}

/**
 * At most three single slips that would explain a failing closure, likeliest first; equal ones share a rank.
 *
 * @param closure the closure as it fails; nothing is suggested for one that closes, was not made, or that its source
 * says was relaxed
 */
export function explainClosure(
  species: ViewedSpecies,
  values: ClosureValues,
  view: TableView,
  closure: GibbsClosure,
  policy: Policy,
): Suggestion[] {
  const input = closureInput(species, values, view);
  const { residual, tolerance } = closure;
  const fails = closure.verdict === "look" || closure.verdict === "block";
  if (!fails || residual === null || tolerance === null || input.constraintRelaxed === true) return [];
  const proposed = CLOSURE_PROPERTIES.filter((property) => values[property].lineRef !== null);
  const suspects = (proposed.length > 0 ? proposed : [...CLOSURE_PROPERTIES]).filter(
    (property) => !values[property].conventional,
  );
  const one: Case = { species, values, view, input, policy, residual, tolerance, suspects };

  const honest =
    Math.log(HONEST_FAILURE.share / tolerance) -
    HONEST_FAILURE.decay * (Math.abs(residual) / tolerance - 1) +
    standingScore(one, []);
  const explanations = trialsOf(one, closure)
    .flatMap((trial) => weigh(one, trial))
    .filter((explanation) => explanation.score > honest);
  return ranked(withoutRepeats(explanations)).map(({ item, rank }, index) => suggestion(one, item, rank, index));
}

interface Explanation extends Trial {
  readonly after: number;
}

function weigh(one: Case, trial: Trial): Weighed<Explanation>[] {
  const closure = gibbsClosure(trial.repaired, closureSettings(one.policy));
  if (closure.verdict !== "closes" || closure.residual === null || closure.tolerance === null) return [];
  const fit = 2 * ((trial.misfit ?? 0) + Math.abs(closure.residual) / closure.tolerance);
  return [
    {
      item: { ...trial, after: closure.residual },
      score:
        Math.log(trial.frequency) - (fit * fit) / 2 - Math.log(closure.tolerance) + standingScore(one, trial.changes),
    },
  ];
}

/** The best of several slips that lead to the same repair. */
function withoutRepeats(explanations: readonly Weighed<Explanation>[]): Weighed<Explanation>[] {
  const best = new Map<string, Weighed<Explanation>>();
  for (const explanation of explanations) {
    const { changes, formula } = explanation.item;
    const key = formula ?? changes.map(({ property, becomes }) => `${property} ${toNumber(becomes)}`).join(", ");
    const known = best.get(key);
    if (known === undefined || known.score < explanation.score) best.set(key, explanation);
  }
  return [...best.values()];
}

function suggestion(one: Case, explanation: Explanation, rank: number, index: number): Suggestion {
  const [first, ...also] = explanation.changes;
  const outcome = `${explanation.outcome} leaves ${shownSigned(explanation.after, 2)}`;
  return {
    property: first?.property ?? null,
    becomes: explanation.formula ?? first?.becomes ?? "",
    slip: explanation.slip,
    sentence: explanationSentence(explanation.cause, outcome, rank, index),
    also,
    rank,
    before: showNumber(one.residual, 2),
    after: showNumber(explanation.after, 2),
  };
}

/**
 * How well the values, with these changes, agree with what stands: the logarithm of a normal density as wide as both
 * uncertainties and last digits, mixed with a wide tail for values that were truly measured anew.
 */
function standingScore(one: Case, changes: readonly Repair[]): number {
  return CLOSURE_PROPERTIES.reduce((total, property) => {
    const value = one.values[property];
    const standing = one.species.standing[property];
    if (standing === undefined || value.lineRef === null) return total;
    const becomes = changes.find((change) => change.property === property)?.becomes ?? value.digits;
    const deviation = Math.abs(toNumber(subtract(becomes, standing.digits)));
    const width = Math.hypot(
      expandedUncertainty(value.uncertainty) ?? 0,
      expandedUncertainty(standing.uncertainty) ?? 0,
      toNumber(add(halfUnit(value.digits), halfUnit(standing.digits))),
    );
    const tail = width + 1 + 0.05 * Math.abs(toNumber(standing.digits));
    const near = Math.exp(-((deviation / width) ** 2) / 2) / (width * Math.sqrt(2 * Math.PI));
    return total + Math.log(0.8 * near + (0.2 * Math.exp(-deviation / tail)) / (2 * tail));
  }, 0);
}

function trialsOf(one: Case, closure: GibbsClosure): Trial[] {
  return [
    ...one.suspects.flatMap((property) => valueTrials(one, property)),
    ...entropyOfFormationTrial(one, closure),
    ...conventionTrials(one),
    ...exchangeTrials(one),
    ...computedTrials(one, closure),
    ...formulaTrials(one),
  ];
}

/** Slips of one printed number. */
function valueTrials(one: Case, property: ClosureProperty): Trial[] {
  const value = one.values[property];
  const mayBeNegative = property !== "entropy" || isSolute(one.species.identity);
  return valueSlips(value, mayBeNegative)
    .filter((slip) => couldClose(one, property, slip.becomes) && couldBe(one, property, slip.becomes))
    .map((slip) => ({
      slip: slip.code,
      frequency: VALUE_SLIP_FREQUENCY[slip.code],
      repaired: withValue(one.input, property, { digits: slip.becomes, given: slip.given }),
      changes: [{ property, becomes: slip.becomes }],
      cause: slipWords(slip.code, property),
      outcome: slipNumber(slip, property),
      formula: null,
    }));
}

/** A quick sum before the whole closure: the residual moves by exactly what the value moves. */
function couldClose(one: Case, property: ClosureProperty, becomes: Digits): boolean {
  const moved = toNumber(subtract(becomes, one.values[property].digits));
  const factor = { enthalpyOfFormation: -1, entropy: REFERENCE_TEMPERATURE / 1000, gibbsEnergyOfFormation: 1 }[
    property
  ];
  const after = Math.abs(one.residual + factor * moved);
  return after <= 10 * one.tolerance + 4 * toNumber(halfUnit(becomes)) * Math.abs(factor);
}

/** Whether physics allows the value at all: no pure substance has an entropy below its floor. */
function couldBe(one: Case, property: ClosureProperty, becomes: Digits): boolean {
  const { identity } = one.species;
  if (property !== "entropy" || isSolute(identity)) return true;
  const floor = identity.phase === "g" ? gasFloor(identity.formula) : one.policy.leastEntropy;
  return toNumber(becomes) >= floor;
}

/** Translation alone, less a little for a standard pressure of 1 atm and rounding; 0 where the molar mass is not known. */
function gasFloor(formula: Formula): number {
  const mass = molarMass(formula);
  return mass === undefined ? 0 : sackurTetrode(mass) - 1;
}

/** ΔfS° filed as S°. */
function entropyOfFormationTrial(one: Case, closure: GibbsClosure): Trial[] {
  const parts = closure.parts;
  if (parts === null || !one.suspects.includes("entropy")) return [];
  const stated = one.values.entropy.digits;
  const becomes = digitsOf(2 * toNumber(stated) - parts.entropyOfFormation.value, places(stated));
  return [
    replacement(one, "entropy-of-formation-as-entropy", { property: "entropy", becomes }, "ΔfS° filed as S°"),
  ].filter(() => couldBe(one, "entropy", becomes));
}

/** The (z/2) S°(H2) of an ion forgotten where its ΔfG° or S° was worked out. */
function conventionTrials(one: Case): Trial[] {
  const { identity } = one.species;
  const hydrogen = one.view.elementEntropy("H");
  const { charge } = identity.formula;
  if (!isSolute(identity) || charge === 0 || hydrogen === undefined) return [];
  const shift = (charge / 2) * toNumber(hydrogen.digits);
  const moves: Partial<Record<ClosureProperty, number>> = {
    entropy: -shift,
    gibbsEnergyOfFormation: (-REFERENCE_TEMPERATURE * shift) / 1000,
  };
  return one.suspects.flatMap((property) => {
    const move = moves[property];
    if (move === undefined) return [];
    const stated = one.values[property].digits;
    const becomes = digitsOf(toNumber(stated) + move, places(stated));
    const cause = `the H+ convention left out of ${symbolOf(property)}`;
    return [replacement(one, "hydrogen-convention-left-out", { property, becomes }, cause)];
  });
}

function exchangeTrials(one: Case): Trial[] {
  const { enthalpyOfFormation: enthalpy, entropy, gibbsEnergyOfFormation: gibbs } = one.values;
  const trials: Trial[] = [];
  if (one.suspects.includes("enthalpyOfFormation") && one.suspects.includes("gibbsEnergyOfFormation")) {
    trials.push({
      slip: "enthalpy-and-gibbs-exchanged",
      frequency: FREQUENCY["enthalpy-and-gibbs-exchanged"],
      repaired: {
        ...one.input,
        enthalpy: { ...one.input.enthalpy, digits: gibbs.digits, given: gibbs.given },
        gibbs: { ...one.input.gibbs, digits: enthalpy.digits, given: enthalpy.given },
      },
      changes: [
        { property: "enthalpyOfFormation", becomes: gibbs.digits },
        { property: "gibbsEnergyOfFormation", becomes: enthalpy.digits },
      ],
      cause: "ΔfH° and ΔfG° exchanged",
      outcome: `ΔfH° ${showDigits(gibbs.digits)} with ΔfG° ${showDigits(enthalpy.digits)}`,
      formula: null,
    });
  }
  const heatCapacity = one.species.values.heatCapacity;
  const isBesideEntropy = (heatCapacity?.lineRef === null) === (entropy.lineRef === null);
  if (one.suspects.includes("entropy") && heatCapacity !== undefined && isBesideEntropy) {
    trials.push(entropyAndHeatCapacity(one, heatCapacity));
  }
  return trials;
}

function entropyAndHeatCapacity(one: Case, heatCapacity: ViewedValue): Trial {
  const { entropy } = one.values;
  const trial = replacement(
    one,
    "entropy-and-heat-capacity-exchanged",
    { property: "entropy", becomes: heatCapacity.digits },
    "S° and Cp° exchanged",
  );
  return {
    ...trial,
    changes: [...trial.changes, { property: "heatCapacity", becomes: entropy.digits }],
    outcome: `S° ${showDigits(heatCapacity.digits)} with Cp° ${showDigits(entropy.digits)}`,
  };
}

/** ΔfG° worked out wrongly from the ΔfH° and S° beside it; the stated number must be what that slip gives. */
function computedTrials(one: Case, closure: GibbsClosure): Trial[] {
  const parts = closure.parts;
  if (parts === null || !one.suspects.includes("gibbsEnergyOfFormation")) return [];
  const { gibbsComputed } = parts;
  const enthalpy = toNumber(parts.enthalpy);
  const gibbs = toNumber(parts.gibbs);
  const entropyTerm = enthalpy - gibbsComputed;
  const becomes = digitsOf(gibbsComputed, places(one.values.gibbsEnergyOfFormation.digits));
  const trials = [
    {
      slip: "joules-in-entropy-term",
      wrong: enthalpy - 1000 * entropyTerm,
      open: 1000 * one.tolerance,
      cause: "TΔfS° in joules taken as kilojoules",
    },
    {
      slip: "celsius-in-entropy-term",
      wrong: enthalpy - (25 / REFERENCE_TEMPERATURE) * entropyTerm,
      open: one.tolerance,
      cause: "T in degrees Celsius in TΔfS°",
    },
  ] as const;
  return trials.flatMap(({ slip, wrong, open, cause }) => {
    const misfit = Math.abs(gibbs - wrong) / open;
    // The wrong number must also lie much nearer than the right one, or anything would do where TΔfS° is small.
    if (misfit > 1 || Math.abs(gibbs - wrong) >= Math.abs(one.residual) / 20) return [];
    return [{ ...replacement(one, slip, { property: "gibbsEnergyOfFormation", becomes }, cause), misfit }];
  });
}

function replacement(
  one: Case,
  slip: keyof typeof FREQUENCY,
  change: Repair & { property: ClosureProperty },
  cause: string,
): Trial {
  const { property, becomes } = change;
  const unit = printedValue(one.values[property]).unit;
  return {
    slip,
    frequency: FREQUENCY[slip],
    repaired: withValue(one.input, property, {
      digits: becomes,
      given: one.values[property].given === null ? null : { text: becomes, unit },
    }),
    changes: [change],
    cause,
    outcome: `${symbolOf(property)} ${showDigits(becomes)}`,
    formula: null,
  };
}

/** Half of T·S°(H2), 19.48 kJ/mol: what one charge or one hydrogen atom too many or too few moves a closure by. */
function formulaTrials(one: Case): Trial[] {
  const { species } = one;
  const hydrogen = one.view.elementEntropy("H");
  // A species that stands in the table has had its formula looked at before.
  if (hydrogen === undefined || Object.keys(species.standing).length > 0) return [];
  const step = (REFERENCE_TEMPERATURE * toNumber(hydrogen.digits)) / 2000;
  const count = Math.round(one.residual / step);
  if (count === 0 || Math.abs(count) > 4 || Math.abs(one.residual - count * step) > 2 * one.tolerance) return [];
  return [...chargeTrials(one, -count), ...hydrogenTrials(one, count)];
}

/** The closure moves by +19.48 for each unit of charge added. */
function chargeTrials(one: Case, change: number): Trial[] {
  const { identity } = one.species;
  const charge = identity.formula.charge + change;
  if (!isSolute(identity) || Math.abs(charge) > 4) return [];
  // A single atom in water is an ion.
  if (charge === 0 && atomCount(identity.formula) === 1) return [];
  const body = identity.formula.printed.replace(/[+-]\d*$/, "");
  const formula = { ...identity.formula, charge, printed: `${body}${spellCharge(body, charge)}` };
  return [
    formulaTrial(
      one,
      "charge-wrong",
      formula,
      change,
      `a charge of ${chargeInWords(identity.formula.charge)} written for ${chargeInWords(charge)}`,
    ),
  ];
}

function hydrogenTrials(one: Case, change: number): Trial[] {
  const { formula } = one.species.identity;
  const before = formula.composition["H"] ?? 0;
  const after = before + change;
  if (before === 0 || after < 0 || Object.keys(formula.composition).length === 1) return [];
  const composition = { ...formula.composition, H: after };
  const body = hillOrder(composition);
  const mended: Formula = {
    ...formula,
    composition,
    hill: body,
    printed: `${body}${spellCharge(body, formula.charge)}`,
  };
  const atoms = `${counted(Math.abs(change))} hydrogen atom${Math.abs(change) === 1 ? "" : "s"}`;
  return [
    formulaTrial(
      one,
      "hydrogen-count-wrong",
      mended,
      change,
      `${atoms} ${change > 0 ? "missing" : "too many"} in the formula`,
    ),
  ];
}

function formulaTrial(
  one: Case,
  slip: "charge-wrong" | "hydrogen-count-wrong",
  formula: Formula,
  change: number,
  cause: string,
): Trial {
  return {
    slip,
    // Two or more at once are rarer by far than one.
    frequency: FREQUENCY[slip] / 2 ** (Math.abs(change) - 1),
    repaired: { ...one.input, identity: { ...one.input.identity, formula } },
    changes: [],
    cause,
    outcome: formula.printed,
    formula: formula.printed,
  };
}

function chargeInWords(charge: number): string {
  return charge === 0 ? "0" : shownSigned(charge, 0);
}

function counted(count: number): string {
  return ["no", "one", "two", "three", "four"][count] ?? String(count);
}

/** Carbon, hydrogen, then the rest by letter (Hill 1900); without carbon, all by letter. */
function hillOrder(composition: Readonly<Record<string, number>>): string {
  const first = (composition["C"] ?? 0) > 0 ? ["C", "H"] : [];
  const rest = Object.keys(composition)
    .filter((element) => !first.includes(element))
    .sort();
  return [...first, ...rest]
    .filter((element) => (composition[element] ?? 0) > 0)
    .map((element) => (composition[element] === 1 ? element : `${element}${composition[element] ?? ""}`))
    .join("");
}

/** The property a failing closure is filed under: the only proposed one, else the one a repair would change. */
export function suspectProperty(values: ClosureValues, suggestions: readonly Suggestion[]): Property {
  const proposed = CLOSURE_PROPERTIES.filter((property) => values[property].lineRef !== null);
  const [only, ...others] = proposed;
  if (only !== undefined && others.length === 0) return only;
  return (
    suggestions[0]?.property ??
    (proposed.includes("gibbsEnergyOfFormation") ? "gibbsEnergyOfFormation" : (only ?? "gibbsEnergyOfFormation"))
  );
}
