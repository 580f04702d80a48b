import type { SourceKind, TableView, ViewedSpecies, ViewedValue } from "#app/checks/types.ts";
import { isZero } from "#app/thermo/digits.ts";
import type { Phase } from "#app/thermo/phase.ts";
import { PROPERTIES, type Property, propertyInfo } from "#app/thermo/property.ts";
import { isConventionalZero, isReferenceState } from "#app/thermo/referenceStates.ts";
import type { SpeciesIdentity } from "#app/thermo/speciesKey.ts";
import type { Uncertainty } from "#app/thermo/uncertainty.ts";
import { type Unit, UNITS } from "#app/thermo/unit.ts";
import type { LineContent, ValueContent } from "./content.ts";

/*
 * The table as it would be. What the checks see is the newest edition with two sheets of tracing paper laid over it:
 * first the accepted lines that wait for the next edition, which count as standing, then the lines under examination.
 */

/** A species as it stands, or its identity alone where it is only proposed. */
export interface OverlaySpecies {
  id: string;
  hill: string;
  charge: number;
  phase: Phase;
  composition: Record<string, number>;
  /** Null while no edition holds the species. */
  detail: OverlayDetail | null;
}

export interface OverlayDetail {
  key: string;
  printed: string;
  label: string | null;
  name: string;
  cas: string | null;
}

export interface OverlayValue {
  speciesId: string;
  property: Property;
  digits: ValueContent["digits"];
  uncertainty: Uncertainty | null;
  givenText: string;
  givenUnit: string;
  sourceId: string;
  remark: string | null;
}

/** A line laid over the edition. */
export interface OverlayLine {
  id: string;
  kind: LineContent["kind"];
  speciesId: string | null;
  property: Property | null;
  sourceId: string | null;
  content: LineContent;
}

export interface OverlayInput {
  species: readonly OverlaySpecies[];
  values: readonly OverlayValue[];
  sourceKinds: ReadonlyMap<string, SourceKind>;
  /** Accepted lines that wait: they count as standing. */
  waiting: readonly OverlayLine[];
  /** The lines under examination. */
  proposed: readonly OverlayLine[];
}

const isUnit = (text: string): text is Unit => UNITS.some((unit) => unit === text);

type Values = Partial<Record<Property, ViewedValue>>;

function uncertaintyOf(content: ValueContent): Uncertainty | null {
  return content.uncertainty;
}

/** Builds the view that the checks read. Pure: the rows come in, nothing is looked up. */
export function overlayView(input: OverlayInput): TableView {
  const sourceKinds = new Map(input.sourceKinds);
  for (const line of [...input.waiting, ...input.proposed]) {
    if (line.content.kind === "source" && line.sourceId) sourceKinds.set(line.sourceId, line.content.sourceKind);
  }

  const details = new Map<string, OverlayDetail>();
  const detailLines = new Map<string, string>();
  for (const one of input.species) if (one.detail) details.set(one.id, one.detail);
  for (const line of input.waiting) {
    if (line.content.kind === "detail" && line.speciesId) details.set(line.speciesId, line.content);
  }
  for (const line of input.proposed) {
    if (line.content.kind === "detail" && line.speciesId) {
      details.set(line.speciesId, line.content);
      detailLines.set(line.speciesId, line.id);
    }
  }

  const identities = new Map<string, SpeciesIdentity>();
  for (const one of input.species) {
    const detail = details.get(one.id);
    identities.set(one.id, {
      formula: {
        printed: detail?.printed ?? one.hill,
        composition: one.composition,
        charge: one.charge,
        hill: one.hill,
      },
      phase: one.phase,
      ...(detail?.label ? { label: detail.label } : {}),
    });
  }

  const viewed = (
    speciesId: string,
    property: Property,
    value: Omit<OverlayValue, "speciesId" | "property">,
    lineRef: string | null,
  ): ViewedValue => {
    const identity = identities.get(speciesId);
    return {
      property,
      digits: value.digits,
      uncertainty: value.uncertainty,
      given:
        isUnit(value.givenUnit) && value.givenUnit !== propertyInfo[property].unit
          ? { text: value.givenText, unit: value.givenUnit }
          : null,
      sourceId: value.sourceId,
      sourceKind: sourceKinds.get(value.sourceId) ?? "evaluation",
      conventional: identity !== undefined && isConventionalZero(identity, property) && isZero(value.digits),
      lineRef,
      ...(value.remark ? { notice: value.remark } : {}),
    };
  };
  const fromLine = (line: OverlayLine, content: ValueContent, lineRef: string | null): ViewedValue =>
    viewed(
      line.speciesId ?? "",
      line.property ?? "enthalpyOfFormation",
      {
        digits: content.digits,
        uncertainty: uncertaintyOf(content),
        givenText: content.given.text,
        givenUnit: content.given.unit,
        sourceId: content.sourceId,
        remark: content.remark,
      },
      lineRef,
    );

  const standing = new Map<string, Values>();
  const valuesOf = (map: Map<string, Values>, id: string): Values => {
    const found = map.get(id);
    if (found) return found;
    const made: Values = {};
    map.set(id, made);
    return made;
  };
  for (const value of input.values) {
    valuesOf(standing, value.speciesId)[value.property] = viewed(value.speciesId, value.property, value, null);
  }
  const lay = (lines: readonly OverlayLine[], map: Map<string, Values>, mark: boolean): void => {
    for (const line of lines) {
      if (!line.speciesId || !line.property) continue;
      const values = valuesOf(map, line.speciesId);
      if (line.content.kind === "withdrawal") {
        const { [line.property]: _withdrawn, ...kept } = values;
        map.set(line.speciesId, kept);
      }
      if (line.content.kind === "value") {
        values[line.property] = fromLine(line, line.content, mark ? line.id : null);
      }
    }
  };
  lay(input.waiting, standing, false);
  const values = new Map<string, Values>([...standing].map(([id, one]) => [id, { ...one }]));
  lay(input.proposed, values, true);

  const species = new Map<string, ViewedSpecies>();
  for (const one of input.species) {
    const detail = details.get(one.id);
    const identity = identities.get(one.id);
    if (!detail || !identity) continue;
    const of = values.get(one.id) ?? {};
    species.set(one.id, {
      id: one.id,
      key: detail.key,
      identity,
      name: detail.name,
      cas: detail.cas,
      values: of,
      standing: standing.get(one.id) ?? {},
      notice: PROPERTIES.map((property) => of[property]?.notice).find((notice) => notice !== undefined) ?? null,
      lineRef: detailLines.get(one.id) ?? null,
    });
  }

  const touchedIds: string[] = [];
  const seen = new Set<string>();
  for (const line of input.proposed) {
    if (line.speciesId && !seen.has(line.speciesId)) {
      seen.add(line.speciesId);
      touchedIds.push(line.speciesId);
    }
  }
  const all = [...species.values()];
  const byFormula = new Map<string, ViewedSpecies[]>();
  for (const one of all) {
    const formula = `${one.identity.formula.hill} ${one.identity.formula.charge}`;
    byFormula.set(formula, [...(byFormula.get(formula) ?? []), one]);
  }
  const byCas = new Map<string, ViewedSpecies[]>();
  for (const one of all) if (one.cas) byCas.set(one.cas, [...(byCas.get(one.cas) ?? []), one]);
  const byKey = new Map(all.map((one) => [one.key, one]));
  const elements = new Map<string, ViewedSpecies>();
  for (const one of all) {
    const [element, ...others] = Object.keys(one.identity.formula.composition);
    if (element && others.length === 0 && isReferenceState(one.identity)) elements.set(element, one);
  }
  const sameFormula = (id: string): ViewedSpecies[] => {
    const one = species.get(id);
    if (!one) return [];
    const { hill, charge } = one.identity.formula;
    return (byFormula.get(`${hill} ${charge}`) ?? []).filter((other) => other.id !== id);
  };

  return {
    species: (id) => species.get(id),
    elementEntropy: (element) => {
      const one = elements.get(element);
      const entropy = one?.values.entropy;
      if (!one || !entropy) return undefined;
      return {
        digits: entropy.digits,
        uncertainty: entropy.uncertainty,
        key: one.key,
        fromSheet: entropy.lineRef !== null,
      };
    },
    otherPhases: (id) => {
      const one = species.get(id);
      return one ? sameFormula(id).filter((other) => isOneSubstance(one, other)) : [];
    },
    withKey: (key) => byKey.get(key),
    withCas: (cas) => byCas.get(cas) ?? [],
    withSameFormula: (id) => {
      const one = species.get(id);
      return sameFormula(id).filter((other) => other.identity.phase === one?.identity.phase);
    },
    touched: () => touchedIds.map((id) => species.get(id)).filter((one) => one !== undefined),
  };
}

/**
 * Whether two species of one Hill formula and charge are phases of one substance. CAS numbers decide where both have
 * one, then names; where neither has either, one printed formula without an isomer's label does.
 */
function isOneSubstance(one: ViewedSpecies, other: ViewedSpecies): boolean {
  if (one.identity.phase === other.identity.phase) return false;
  if (one.cas && other.cas) return one.cas === other.cas;
  if (one.name && other.name) return one.name.toLowerCase() === other.name.toLowerCase();
  const isIsomer = (species: ViewedSpecies) =>
    species.identity.label !== undefined && ["g", "l", "aq"].includes(species.identity.phase);
  return one.identity.formula.printed === other.identity.formula.printed && !isIsomer(one) && !isIsomer(other);
}
