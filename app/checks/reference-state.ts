import { type Digits, isZero } from "#app/thermo/digits.ts";
import { elementOf } from "#app/thermo/elements.ts";
import { soleElement } from "#app/thermo/formula.ts";
import { showDigits } from "#app/thermo/notation.ts";
import type { Property } from "#app/thermo/property.ts";
import {
  isConventionalZero,
  isHydrogenIon,
  isOxonium,
  isReferenceState,
  referenceStateOf,
} from "#app/thermo/referenceStates.ts";
import { expandedUncertainty } from "#app/thermo/uncertainty.ts";
import type { Check, FindingDraft, Suggestion, TableView, ViewedSpecies, ViewedValue } from "./types.ts";
import { shownValue, symbolOf } from "./words.ts";

const WATER = "H2O(l)";
const FORMATION: readonly Property[] = ["enthalpyOfFormation", "gibbsEnergyOfFormation"];
const OF_WATER: readonly Property[] = ["enthalpyOfFormation", "entropy", "gibbsEnergyOfFormation", "heatCapacity"];

export const referenceState: Check = {
  code: "reference-state",
  version: 1,
  title: "Zeros by convention",
  severities: ["block", "remark"],
  appliesTo: "Elements in any form, H+(aq) and H3O+(aq).",
  formula: [
    "an element in its reference state: ΔfH° = ΔfG° = 0 exactly, S° not zero",
    "H+(aq): ΔfH° = ΔfG° = S° = Cp° = 0 exactly",
    "any other form of an element: not zero",
    "H3O+(aq): the values of H2O(l)",
  ],
  source: "IUPAC Green Book, 3rd ed. (2007), 2.11; CODATA Key Values for Thermodynamics (1989) for the forms chosen.",
  explanation: [
    "Formation is counted from the elements in one agreed form each, so for these forms the enthalpy and Gibbs energy of formation are zero by definition and carry no uncertainty. Phosphorus is counted from white phosphorus by agreement, although it is not the stablest form.",
    "A gas atom, diamond, ozone or bromine vapour is not a reference state. A zero there usually means that the row was filed under the wrong form, or that a missing value was typed as 0.",
    "Values of single ions count from H+(aq). Some charts put the zero on H3O+(aq): that is the same convention with a water molecule added, so H3O+(aq) then carries the values of H2O(l).",
  ],
  example: {
    given: "C(cr,diamond) with ΔfH° 0",
    sentence:
      "ΔfH° of C(cr,diamond) is given as 0, but the reference state of carbon is C(cr,graphite). Is the form right, or is a value missing?",
  },
  run: (species, view) => {
    if (isOxonium(species.identity)) return zeroOxonium(species, view);
    return [...byConvention(species), ...zeroElsewhere(species), ...unnamedForm(species)];
  },
};

function byConvention(species: ViewedSpecies): FindingDraft[] {
  return Object.values(species.values)
    .filter((value) => isConventionalZero(species.identity, value.property))
    .flatMap((value) => {
      if (!isZero(value.digits)) return [notZero(species, value)];
      const uncertainty = expandedUncertainty(value.uncertainty);
      return uncertainty === null || uncertainty === 0 ? [] : [uncertainZero(species, value)];
    });
}

function notZero(species: ViewedSpecies, value: ViewedValue): FindingDraft {
  const { property } = value;
  const why = isHydrogenIon(species.identity)
    ? "because the values of all ions count from it"
    : `because it is the reference state of ${elementName(species)}`;
  return {
    severity: "block",
    property,
    sentence: `${symbolOf(property)} of ${species.key} is zero by convention, ${why}; it is given as ${shownValue(value)}. Does the value belong to another form or row?`,
    data: { value: value.digits },
  };
}

function uncertainZero(species: ViewedSpecies, value: ViewedValue): FindingDraft {
  return {
    severity: "remark",
    property: value.property,
    sentence: `${symbolOf(value.property)} of ${species.key} is zero by convention and exact; the stated uncertainty is not needed.`,
    data: { uncertainty: value.uncertainty?.digits ?? null },
  };
}

/** A zero for a form that is not the reference state. */
function zeroElsewhere(species: ViewedSpecies): FindingDraft[] {
  const { formula, phase } = species.identity;
  const element = soleElement(formula);
  if (element === undefined || formula.charge !== 0 || phase === "aq") return [];
  const reference = referenceStateOf(element);
  if (reference === undefined) return [];
  return FORMATION.filter((property) => !isConventionalZero(species.identity, property))
    .map((property) => species.values[property])
    .filter((value) => value !== undefined && isZero(value.digits))
    .flatMap((value): FindingDraft[] => {
      if (value === undefined) return [];
      const data = { value: value.digits, referenceState: reference.key };
      return [
        {
          severity: "block",
          property: value.property,
          sentence: `${symbolOf(value.property)} of ${species.key} is given as 0, but the reference state of ${elementName(species)} is ${reference.key}. Is the form right, or is a value missing?`,
          data,
        },
      ];
    });
}

/** A solid element that has several forms, filed without naming one. */
function unnamedForm(species: ViewedSpecies): FindingDraft[] {
  const { formula, label } = species.identity;
  const element = soleElement(formula);
  const reference = element === undefined ? undefined : referenceStateOf(element);
  if (label !== undefined || reference?.label === undefined || !isReferenceState(species.identity)) return [];
  return [
    {
      severity: "remark",
      property: null,
      sentence: `${species.key} does not name its form; it is taken as ${reference.key}, the reference state of ${elementName(species)}.`,
      data: { referenceState: reference.key },
    },
  ];
}

/** H3O+(aq) taken as the zero of the ions. */
function zeroOxonium(species: ViewedSpecies, view: TableView): FindingDraft[] {
  const water = view.withKey(WATER);
  return OF_WATER.map((property) => species.values[property])
    .filter((value) => value !== undefined)
    .filter((value) => isZero(value.digits))
    .map((value) => {
      const ofWater = water?.values[value.property]?.digits ?? water?.standing[value.property]?.digits;
      const number = ofWater === undefined ? "" : `, ${showDigits(ofWater)}`;
      return {
        severity: "block",
        property: value.property,
        sentence: `${species.key} is H+(aq) written with a water molecule, so its ${symbolOf(value.property)} is that of ${WATER}${number}, not 0. Give that value, or file the row as H+(aq).`,
        data: { value: value.digits, ofWater: ofWater ?? null },
        suggestions: ofWater === undefined ? [] : [asWater(value.property, ofWater)],
      };
    });
}

function asWater(property: Property, becomes: Digits): Suggestion {
  return {
    property,
    becomes,
    slip: "oxonium-as-zero",
    sentence: `The zero of the ions put on H3O+(aq) would explain it: ${symbolOf(property)} becomes that of ${WATER}, ${showDigits(becomes)}.`,
    also: [],
    rank: 1,
    before: null,
    after: null,
  };
}

function elementName(species: ViewedSpecies): string {
  const element = soleElement(species.identity.formula);
  return element === undefined ? species.key : (elementOf(element)?.name ?? element);
}
