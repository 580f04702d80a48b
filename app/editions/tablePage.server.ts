import { database } from "#app/db/database.server.ts";
import { demand } from "#app/people/permissions.ts";
import type { Acting } from "#app/people/person.ts";
import { fullCitation, holdsWords } from "#app/sources/citation.ts";
import type { ElementEntropyLookup } from "#app/thermo/closure.ts";
import type { Digits } from "#app/thermo/digits.ts";
import type { Property } from "#app/thermo/property.ts";
import { quote } from "#app/thermo/reading.ts";
import type { Uncertainty } from "#app/thermo/uncertainty.ts";
import { pageOfSpecies } from "./browse.server.ts";
import { type Edition, findDetailsAsOf, findSourceDetailsAsOf, findValuesAsOf } from "./editions.queries.server.ts";
import { elementEntropies, followingGibbsEnergy, referenceHills } from "./follows.ts";
import { findFrame } from "./frame.server.ts";
import { identityOf } from "./identity.ts";
import { findSpeciesWithValues, type SpeciesWithValues } from "./read.server.ts";
import { TABLE_PAGE, type TableQuery } from "./tableQuery.ts";

/** A value as a table shows it. */
export interface ShownValue {
  digits: Digits;
  uncertainty: Uncertainty | null;
  /** It follows from ΔfH° and S° and is not stated. */
  derived?: boolean;
}

export interface TableRow {
  speciesId: string;
  key: string;
  name: string;
  values: Partial<Record<Property, ShownValue>>;
  /** Numbers of the sources its values come from, as the foot of the table lists them. */
  sources: readonly number[];
}

/** S° of the elements in edition n, with which a ΔfG° that follows is computed. */
export async function findElementEntropies(n: number): Promise<ElementEntropyLookup> {
  const details = await findDetailsAsOf(n, { hill: referenceHills() }, database());
  const speciesIds = details.map((detail) => detail.speciesId);
  const values = await findValuesAsOf(n, { speciesIds, properties: ["entropy"] }, database());
  const bySpecies = new Map(values.map((value) => [value.speciesId, value]));
  return elementEntropies(details.map((detail) => ({ ...detail, entropy: bySpecies.get(detail.speciesId) })));
}

/**
 * The query with the sources it names looked up: by id, or by words of their citations. A text that names none leaves the
 * filter open and is remarked on.
 */
export async function withSources(n: number, query: TableQuery): Promise<TableQuery> {
  const { source } = query.typed;
  if (source === "") return query;
  const all = await findSourceDetailsAsOf(n, {}, database());
  const exact = all.filter((one) => one.sourceId === source);
  const found =
    exact.length > 0
      ? exact
      : all.filter((one) => holdsWords(`${fullCitation(one.citation)} ${one.doi ?? ""}`, source));
  if (found.length === 0) {
    const remark = `No source of edition ${n} is cited as ${quote(source)}; write an author, a year or a word of the title.`;
    return { ...query, remarks: [...query.remarks, remark] };
  }
  return { ...query, filter: { ...query.filter, sourceIds: found.map((one) => one.sourceId) } };
}

/** A species with its values as a table shows them: the stated ones, and a ΔfG° that follows where none is stated. */
export function shownValues(
  { detail, values }: SpeciesWithValues,
  elementEntropy: ElementEntropyLookup,
): Partial<Record<Property, ShownValue>> {
  const shown: Partial<Record<Property, ShownValue>> = {};
  for (const { property, digits, uncertainty } of values) shown[property] = { digits, uncertainty };
  const { enthalpyOfFormation: enthalpy, entropy, gibbsEnergyOfFormation: gibbs } = shown;
  if (enthalpy && entropy && !gibbs) {
    const follows = followingGibbsEnergy(identityOf(detail), enthalpy, entropy, elementEntropy);
    if (follows !== null) shown.gibbsEnergyOfFormation = { digits: follows, uncertainty: null, derived: true };
  }
  return shown;
}

/** One page of the table of an edition as the address asks for it. */
export async function findTablePage(acting: Acting, edition: Edition, asked: TableQuery) {
  demand(acting, "table:read");
  const n = edition.number;
  const query = await withSources(n, asked);
  const { filter, order, page } = query;
  const [{ details, count }, elementEntropy, frame] = await Promise.all([
    pageOfSpecies(n, { filter, order, page, size: TABLE_PAGE }),
    findElementEntropies(n),
    findFrame(edition),
  ]);
  const { species, sources } = await findSpeciesWithValues(n, details);

  const numbers = new Map<string, number>();
  const numberOf = (sourceId: string): number => {
    const known = numbers.get(sourceId) ?? numbers.size + 1;
    numbers.set(sourceId, known);
    return known;
  };
  const rows = species.map((one): TableRow => {
    const { detail, values } = one;
    const leantOn = values.filter((value) => query.columns.includes(value.property));
    return {
      speciesId: detail.speciesId,
      key: detail.key,
      name: detail.name,
      values: shownValues(one, elementEntropy),
      sources: [...new Set(leantOn.map((value) => numberOf(value.sourceId)))].sort((a, b) => a - b),
    };
  });
  return {
    frame,
    rows,
    count,
    page,
    pages: Math.max(1, Math.ceil(count / TABLE_PAGE)),
    pageSize: TABLE_PAGE,
    columns: query.columns,
    typed: query.typed,
    order,
    remarks: query.remarks,
    sources: [...numbers].map(([sourceId, number]) => {
      const source = sources.get(sourceId);
      return {
        number,
        sourceId,
        citation: source ? fullCitation(source.citation) : sourceId,
        notice: source?.notice ?? null,
      };
    }),
  };
}

export type TablePage = Awaited<ReturnType<typeof findTablePage>>;
