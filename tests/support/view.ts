import { examine } from "#app/checks/examine.ts";
import type { Check, Finding, SourceKind, TableView, ViewedSpecies, ViewedValue } from "#app/checks/types.ts";
import { digits, isZero } from "#app/thermo/digits.ts";
import { PROPERTIES, type Property, propertyInfo } from "#app/thermo/property.ts";
import { isConventionalZero, isReferenceState } from "#app/thermo/referenceStates.ts";
import { readKey, type SpeciesIdentity } from "#app/thermo/speciesKey.ts";
import type { Uncertainty } from "#app/thermo/uncertainty.ts";
import { convert, type Unit } from "#app/thermo/unit.ts";
import type { PublishedRow } from "#tests/published/publishedTables.ts";

/** A cell: `-45.94`, `-45.94 ± 0.35` (expanded, k = 2), or both with a unit of its own behind, `-10.98 kcal/mol`. */
type Cell = string;

/** A row for the checks to see. */
export interface Row {
  key: string;
  /** Stands in for the identity that the key says, for keys that cannot be read. */
  identity?: SpeciesIdentity;
  name?: string;
  cas?: string;
  notice?: string;
  source?: string;
  sourceKind?: SourceKind;
  values?: Partial<Record<Property, Cell | ViewedValue>>;
}

/**
 * A `TableView` from rows written down in a test: what is proposed, laid over what stands. A proposed row that repeats a
 * property of an earlier row becomes its rival, as two rows of one sheet do.
 */
export function viewOf(proposed: readonly Row[], standing: readonly Row[] = []): TableView {
  const all = new Map<string, Draft>();
  for (const row of standing) {
    const species = draftOf(all, row);
    Object.assign(species.standing, valuesOf(row, species.identity, null));
  }
  for (const species of all.values()) species.values = { ...species.standing };
  const touched = new Set<string>();
  for (const [index, row] of proposed.entries()) {
    const species = draftOf(all, row);
    touched.add(species.id);
    species.lineRef = `line ${index + 1}`;
    for (const value of Object.values(valuesOf(row, species.identity, `line ${index + 1}`))) {
      if ((species.values[value.property]?.lineRef ?? null) === null) species.values[value.property] = value;
      else species.rivals.push(value);
    }
  }
  return view(all, touched);
}

/** Rows of a published table as rows for a view. */
export function published(rows: readonly PublishedRow[], sourceKind: SourceKind = "evaluation"): Row[] {
  return rows.map((row) => ({
    key: row.key,
    identity: row.identity,
    name: row.description,
    ...(/relaxed/.test(row.description) ? { notice: row.description } : {}),
    sourceKind,
    values: Object.fromEntries(
      Object.entries(row.values).map(([property, value]) => [
        property,
        { ...value, property: property as Property, sourceKind, lineRef: null },
      ]),
    ),
  }));
}

type Values = Partial<Record<Property, ViewedValue>>;

interface Draft extends ViewedSpecies {
  cas: string | null;
  notice: string | null;
  values: Values;
  standing: Values;
  rivals: ViewedValue[];
  lineRef: string | null;
}

function draftOf(all: Map<string, Draft>, row: Row): Draft {
  const known = all.get(row.key);
  if (known !== undefined) {
    known.cas = row.cas ?? known.cas;
    known.notice = row.notice ?? known.notice;
    return known;
  }
  const made: Draft = {
    id: `species of ${row.key}`,
    key: row.key,
    identity: row.identity ?? identityOf(row.key),
    name: row.name ?? "",
    cas: row.cas ?? null,
    values: {},
    standing: {},
    rivals: [],
    notice: row.notice ?? null,
    lineRef: null,
  };
  all.set(row.key, made);
  return made;
}

function identityOf(key: string): SpeciesIdentity {
  const reading = readKey(key);
  if (reading.outcome !== "read") throw new Error(`${key}: ${reading.sentence}`);
  return reading.value;
}

function valuesOf(row: Row, identity: SpeciesIdentity, lineRef: string | null): Values {
  const values: Values = {};
  for (const property of PROPERTIES) {
    const cell = row.values?.[property];
    if (cell === undefined) continue;
    if (typeof cell !== "string") {
      values[property] = { ...cell, lineRef };
      continue;
    }
    const match = /^(\S+)(?: ± (\S+))?(?: ([A-Za-z].*))?$/.exec(cell);
    if (match === null) throw new Error(`${cell} is no cell`);
    const canonical = propertyInfo[property].unit;
    const unit = (match[3] ?? canonical) as Unit;
    const number = digits(match[1] ?? "");
    const conventional = isConventionalZero(identity, property) && isZero(number);
    values[property] = {
      property,
      digits: convert(number, unit, canonical).digits,
      uncertainty: uncertaintyOf(match[2], unit, canonical, conventional),
      given: unit === canonical ? null : { text: number, unit },
      sourceId: row.source ?? "the sheet",
      sourceKind: row.sourceKind ?? "measurement",
      conventional,
      lineRef,
      ...(row.notice === undefined ? {} : { notice: row.notice }),
    };
  }
  return values;
}

function uncertaintyOf(text: string | undefined, from: Unit, to: Unit, conventional: boolean): Uncertainty | null {
  if (text === undefined) return conventional ? { digits: digits("0"), kind: "exact", coverageFactor: null } : null;
  return { digits: convert(digits(text), from, to).digits, kind: "expanded", coverageFactor: 2 };
}

function view(all: ReadonlyMap<string, Draft>, touched: ReadonlySet<string>): TableView {
  const species = [...all.values()];
  const byId = new Map(species.map((one) => [one.id, one]));
  const others = (id: string, isMeant: (one: Draft, other: Draft) => boolean): Draft[] => {
    const one = byId.get(id);
    return one === undefined ? [] : species.filter((other) => other.id !== id && isMeant(one, other));
  };
  const sameFormula = (one: Draft, other: Draft): boolean =>
    one.identity.formula.hill === other.identity.formula.hill &&
    one.identity.formula.charge === other.identity.formula.charge;
  return {
    species: (id) => byId.get(id),
    withKey: (key) => all.get(key),
    elementEntropy: (element) => {
      const found = species.find(
        (one) =>
          isReferenceState(one.identity) &&
          element in one.identity.formula.composition &&
          one.values.entropy !== undefined,
      );
      const entropy = found?.values.entropy;
      if (found === undefined || entropy === undefined) return undefined;
      const { digits: number, uncertainty, lineRef } = entropy;
      return { digits: number, uncertainty, key: found.key, fromSheet: lineRef !== null };
    },
    otherPhases: (id) =>
      others(id, (one, other) => sameFormula(one, other) && one.identity.phase !== other.identity.phase),
    withCas: (cas) => species.filter((one) => one.cas === cas),
    withSameFormula: (id) =>
      others(id, (one, other) => sameFormula(one, other) && one.identity.phase === other.identity.phase),
    touched: () => species.filter((one) => touched.has(one.id)),
  };
}

/** What one check finds on rows written down in a test. */
export function foundBy(check: Check, proposed: readonly Row[], standing: readonly Row[] = []): Finding[] {
  return examine(viewOf(proposed, standing), [check]);
}
