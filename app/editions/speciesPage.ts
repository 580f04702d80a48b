import {
  closureArithmetic,
  type ClosureValue,
  type ElementEntropyLookup,
  type GibbsClosure,
  gibbsClosure,
} from "#app/thermo/closure.ts";
import { type Digits, isZero, places, subtract, toNumber } from "#app/thermo/digits.ts";
import { showNumber } from "#app/thermo/notation.ts";
import { type Property, propertyInfo } from "#app/thermo/property.ts";
import { isConventionalZero } from "#app/thermo/referenceStates.ts";
import type { SpeciesIdentity } from "#app/thermo/speciesKey.ts";
import { sackurTetrode } from "#app/thermo/thirdLaw.ts";
import { expandedUncertainty, type Uncertainty } from "#app/thermo/uncertainty.ts";
import { UNITS } from "#app/thermo/unit.ts";
import { textChanges } from "./compare.ts";
import type { HistoricValue } from "./editions.queries.server.ts";
import { detailFields, type DetailTexts } from "./recordFields.ts";

/*
 * What a species' page works out from the values that stand in its edition and from those that stood before. Pure.
 */

export interface StandingValue {
  property: Property;
  digits: Digits;
  uncertainty: Uncertainty | null;
  givenText: string;
  givenUnit: string;
  sourceId: string;
  remark: string | null;
}

/** The closure of a species as its page draws it; null where there is nothing to draw. */
export interface DrawnClosure {
  follows: number;
  stated: number;
  tolerance: number;
  printed: { follows: string; stated: string; low: string; high: string; gap: string; tolerance: string };
  verdict: "closes" | "look" | "block";
  sentence: string;
  arithmetic: string[];
}

/** The remark with which the compilers of a table say that ΔfG°, ΔfH° and S° need not fit together. */
const RELAXED = /constraint\b.*\brelaxed|relaxed\b.*\bconstraint/i;

function closureValue(identity: SpeciesIdentity, value: StandingValue): ClosureValue {
  const { digits, uncertainty, givenText: text, givenUnit, sourceId, property } = value;
  const unit = UNITS.find((one) => one === givenUnit);
  return {
    digits,
    uncertainty,
    given: unit && unit !== propertyInfo[property].unit ? { text, unit } : null,
    sourceId,
    conventional: isConventionalZero(identity, property) && isZero(digits),
  };
}

/** Holds the stated ΔfG° of a species against its ΔfH° and S°; undefined unless all three stand. */
export function closureOf(
  identity: SpeciesIdentity,
  values: readonly StandingValue[],
  elementEntropy: ElementEntropyLookup,
): GibbsClosure | undefined {
  const standing = (property: Property): StandingValue | undefined => values.find((one) => one.property === property);
  const enthalpy = standing("enthalpyOfFormation");
  const entropy = standing("entropy");
  const gibbs = standing("gibbsEnergyOfFormation");
  if (!enthalpy || !entropy || !gibbs) return undefined;
  return gibbsClosure({
    identity,
    enthalpy: closureValue(identity, enthalpy),
    entropy: closureValue(identity, entropy),
    gibbs: closureValue(identity, gibbs),
    elementEntropy,
    constraintRelaxed: [enthalpy, entropy, gibbs].some((one) => RELAXED.test(one.remark ?? "")),
  });
}

/** The numbers of a closure as the drawing prints them, with the arithmetic under it. */
export function drawnClosure(closure: GibbsClosure): DrawnClosure | null {
  const { parts, residual, tolerance, verdict } = closure;
  if (parts === null || residual === null || tolerance === null || verdict === "notMade") return null;
  const follows = parts.gibbsComputed;
  const place = Math.max(2, places(parts.gibbs));
  return {
    follows,
    stated: toNumber(parts.gibbs),
    tolerance,
    printed: {
      follows: showNumber(follows, place),
      stated: showNumber(toNumber(parts.gibbs), places(parts.gibbs)),
      low: showNumber(follows - tolerance, place),
      high: showNumber(follows + tolerance, place),
      gap: showNumber(Math.abs(residual), place),
      tolerance: showNumber(tolerance, place),
    },
    verdict,
    sentence: closure.sentence,
    arithmetic: closureArithmetic(closure),
  };
}

/**
 * How far a gas's entropy stands above that of translation alone, J/(mol K); null for anything but a gas, or without a
 * molar mass.
 */
export function aboveTranslation(identity: SpeciesIdentity, entropy: Digits, molarMass: number | null): number | null {
  if (identity.phase !== "g" || molarMass === null) return null;
  return toNumber(entropy) - sackurTetrode(molarMass);
}

// --- History ------------------------------------------------------------------

/** One thing that an edition did to a species. */
export interface HistoryEntry extends Hands {
  edition: number;
  property: Property | null;
  /** "came", "changed", "withdrawn", "called". */
  what: "came" | "changed" | "withdrawn" | "called";
  before: { digits: Digits; uncertainty: Uncertainty | null } | null;
  after: { digits: Digits; uncertainty: Uncertainty | null } | null;
  /** After less before. */
  difference: Digits | null;
  sourceId: string | null;
  /** The reason of a withdrawal; what it is called otherwise. */
  sentence: string | null;
}

/** By which revision a change came, who wrote its line and who accepted it. */
interface Hands {
  revisionId: number;
  writer: string | null;
  decider: string | null;
}

/** The history of a species from its rows, the newest edition first. */
export function speciesHistory(
  values: readonly HistoricValue[],
  withdrawals: readonly ({ property: Property; edition: number; reason: string } & Hands)[],
  details: readonly (DetailTexts & { since: number } & Hands)[],
): HistoryEntry[] {
  const entries: HistoryEntry[] = [];
  for (const value of values) {
    const before = values.find((one) => one.property === value.property && one.until === value.since);
    entries.push({
      edition: value.since,
      property: value.property,
      what: before ? "changed" : "came",
      before: before ? { digits: before.digits, uncertainty: before.uncertainty } : null,
      after: { digits: value.digits, uncertainty: value.uncertainty },
      difference: before ? subtract(value.digits, before.digits) : null,
      sourceId: value.sourceId,
      sentence: null,
      revisionId: value.revisionId,
      writer: value.writer,
      decider: value.decider,
    });
  }
  for (const { property, edition, reason, revisionId, writer, decider } of withdrawals) {
    const before = values.find((one) => one.property === property && one.until === edition);
    entries.push({
      ...nothing,
      edition,
      property,
      what: "withdrawn",
      before: before ? { digits: before.digits, uncertainty: before.uncertainty } : null,
      sentence: reason,
      revisionId,
      writer,
      decider,
    });
  }
  for (const [index, detail] of details.entries()) {
    const before = details[index - 1];
    if (!before) continue;
    const changes = textChanges<DetailTexts>(before, detail, detailFields);
    const words = changes.map(({ field, before: was, after }) => `${field} ${after || "none"} (was ${was || "none"})`);
    entries.push({
      ...nothing,
      edition: detail.since,
      property: null,
      what: "called",
      sentence: words.join("; ") || null,
      revisionId: detail.revisionId,
      writer: detail.writer,
      decider: detail.decider,
    });
  }
  return entries.sort((a, b) => b.edition - a.edition);
}

const nothing = { before: null, after: null, difference: null, sourceId: null } as const;

/** A property's values through the editions, as the plot takes them; null where it never changed. */
export function historyPoints(values: readonly HistoricValue[], property: Property) {
  const points = values
    .filter((value) => value.property === property)
    .map(({ since, until, digits, uncertainty }) => ({
      since,
      until,
      value: toNumber(digits),
      expanded: expandedUncertainty(uncertainty),
      places: places(digits),
    }));
  return points.length < 2 ? null : points;
}
