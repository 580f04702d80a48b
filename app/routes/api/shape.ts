import type { ValueChange } from "#app/editions/compare.ts";
import type { DetailAsOf, Edition, SourceAsOf, Sources, ValueAsOf } from "#app/editions/editions.queries.server.ts";
import { API_BASE } from "#app/http/apiContract.ts";
import { paths } from "#app/paths.ts";
import { fullCitation } from "#app/sources/citation.ts";
import { toNumber } from "#app/thermo/digits.ts";
import { readNumber } from "#app/thermo/number.ts";
import { propertyInfo } from "#app/thermo/property.ts";
import type { ApiEdition, ApiSourceFacts, ApiSpecies, ApiValue, ApiValueChange } from "./contract.ts";

/** An address inside an edition, as a path. Keys are encoded so that a slash in one does not end the segment. */
export const apiPaths = {
  editions: () => `${API_BASE}/editions`,
  edition: (edition: number | string) => `${API_BASE}/editions/${edition}`,
  species: (edition: number | string) => `${API_BASE}/editions/${edition}/species`,
  oneSpecies: (edition: number | string, key: string) =>
    `${API_BASE}/editions/${edition}/species/${encodeURIComponent(key)}`,
  values: (edition: number | string) => `${API_BASE}/editions/${edition}/values`,
  lookup: (edition: number | string) => `${API_BASE}/editions/${edition}/lookup`,
  table: (edition: number | string) => `${API_BASE}/editions/${edition}/table.csv`,
  tableJson: (edition: number | string) => `${API_BASE}/editions/${edition}/table.json`,
  tableLines: (edition: number | string) => `${API_BASE}/editions/${edition}/table.ndjson`,
  tableDescription: (edition: number | string) => `${API_BASE}/editions/${edition}/table.csv-metadata.json`,
  source: (id: string) => `${API_BASE}/sources/${encodeURIComponent(id)}`,
  sheet: (sheet: number) => `${API_BASE}/sheets/${sheet}`,
  sheetRows: (sheet: number) => `${API_BASE}/sheets/${sheet}/rows`,
  sheetFindings: (sheet: number) => `${API_BASE}/sheets/${sheet}/findings`,
  compare: (a: number | string, b: number | string) => `${API_BASE}/editions/${a}/compare/${b}`,
} as const;

/** What the sheet said, where it says another number or unit than the table; undefined where it does not. */
function givenOf(value: ValueAsOf): ApiValue["given"] {
  const { givenText: text, givenUnit: unit, givenNote: note } = value;
  const reading = readNumber(text);
  const same = reading.outcome === "read" && reading.value.digits === value.digits;
  return same && note === null && unit === propertyInfo[value.property].unit ? undefined : { text, unit, note };
}

/** A value as the API answers it. Members without a meaning for this value are absent. */
export function apiValue(value: ValueAsOf, sources: Sources): ApiValue {
  const source = sources.get(value.sourceId);
  const given = givenOf(value);
  return {
    id: value.speciesId,
    species: value.key,
    property: value.property,
    value: toNumber(value.digits),
    digits: value.digits,
    unit: propertyInfo[value.property].unit,
    ...(given ? { given } : {}),
    uncertainty: value.uncertainty && {
      value: toNumber(value.uncertainty.digits),
      digits: value.uncertainty.digits,
      kind: value.uncertainty.kind,
      coverageFactor: value.uncertainty.coverageFactor,
    },
    temperature: toNumber(value.temperature),
    standardPressure: toNumber(value.standardPressure),
    ...(value.basis === null ? {} : { basis: value.basis }),
    ...(value.method === null ? {} : { method: value.method }),
    ...(value.remark === null ? {} : { remark: value.remark }),
    origin: value.origin,
    source: {
      id: value.sourceId,
      citation: source ? fullCitation(source.citation) : value.sourceId,
      doi: source?.doi ?? null,
    },
    since: value.since,
  };
}

/** A species with its values as the API answers it. */
export function apiSpecies(detail: DetailAsOf, values: readonly ValueAsOf[], sources: Sources): ApiSpecies {
  return {
    id: detail.speciesId,
    key: detail.key,
    formula: detail.printed,
    hill: detail.hill,
    charge: detail.charge,
    phase: detail.phase,
    label: detail.label,
    composition: detail.composition,
    name: detail.name,
    cas: detail.cas,
    inchikey: detail.inchikey,
    synonyms: detail.synonyms,
    since: detail.since,
    values: values.map((value) => apiValue(value, sources)),
  };
}

/** A source as the API answers it, without its id. */
export function apiSource({ citation, doi, kind, notice, since }: SourceAsOf): ApiSourceFacts {
  return { citation: fullCitation(citation), csl: citation, doi, kind, notice, since };
}

/** An edition as the API answers it; `publicUrl` is the service's origin. */
export function apiEdition(edition: Edition, publicUrl: string): ApiEdition {
  const { number } = edition;
  const at = (path: string): string => `${publicUrl}${path}`;
  return {
    number,
    publishedAt: edition.publishedAt.toISOString(),
    publishedBy: edition.publisher,
    notes: edition.notes,
    licence: edition.licence,
    counts: {
      species: edition.speciesCount,
      values: edition.valueCount,
      came: edition.came,
      changed: edition.changed,
      went: edition.went,
    },
    digest: edition.digest.toString("hex"),
    previousDigest: edition.previousDigest?.toString("hex") ?? null,
    withdraws:
      edition.withdraws === null ? null : { edition: edition.withdraws, reason: edition.withdrawalReason ?? "" },
    withdrawnBy:
      edition.withdrawnBy === null ? null : { edition: edition.withdrawnBy, reason: edition.withdrawnBecause ?? "" },
    links: {
      self: at(apiPaths.edition(number)),
      species: at(apiPaths.species(number)),
      values: at(apiPaths.values(number)),
      table: at(apiPaths.table(number)),
      page: at(paths.edition(number)),
    },
  };
}

/** A change as the API answers it. Citations are those of the edition each side stands in. */
export function apiValueChange(change: ValueChange<ValueAsOf>, before: Sources, after: Sources): ApiValueChange {
  return {
    what: change.what,
    id: change.speciesId,
    species: change.key,
    property: change.property,
    unit: propertyInfo[change.property].unit,
    before: change.before && apiValue(change.before, before),
    after: change.after && apiValue(change.after, after),
    aspects: [...change.aspects],
    digitsOnly: change.digitsOnly,
    difference: change.difference,
    relative: change.relative,
    normalizedError: change.normalizedError,
  };
}

/** Wraps the place after which the next page goes on; opaque to callers. */
export function writeCursor(place: readonly string[]): string {
  return Buffer.from(JSON.stringify(place), "utf8").toString("base64url");
}

/** Reads a cursor of so many parts; undefined when it is none that `writeCursor` made. */
export function readCursor(text: string, parts: number): string[] | undefined {
  try {
    const place: unknown = JSON.parse(Buffer.from(text, "base64url").toString("utf8"));
    if (!Array.isArray(place) || place.length !== parts) return undefined;
    const texts = place.filter((part) => typeof part === "string");
    // A zero byte is no text to the database, and no key holds one.
    return texts.length === parts && !texts.some((part) => part.includes("\0")) ? texts : undefined;
  } catch {
    return undefined;
  }
}
