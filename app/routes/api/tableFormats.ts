import type { DetailAsOf, Edition, SourceAsOf, Sources, ValueAsOf } from "#app/editions/editions.queries.server.ts";
import type { TableFormat } from "#app/editions/tableFile.ts";
import type { ApiEditionFacts, ApiTableLine, ApiTableSource, ApiTableSpecies, ApiTableValue } from "./contract.ts";
import { apiSource, apiSpecies, apiValue } from "./shape.ts";

/*
 * A whole edition as JSON: as one document, and as a document a line. Everything in it belongs to the edition alone, so its
 * bytes never change; who published it and what withdrew it later stand in the edition's record. Pure.
 */

function editionFacts(edition: Edition): ApiEditionFacts {
  const { number, publishedAt, notes, licence, digest, previousDigest, withdraws, withdrawalReason } = edition;
  return {
    edition: number,
    publishedAt: publishedAt.toISOString(),
    notes,
    licence,
    digest: digest.toString("hex"),
    previousDigest: previousDigest?.toString("hex") ?? null,
    withdraws: withdraws === null ? null : { edition: withdraws, reason: withdrawalReason ?? "" },
  };
}

function sourceFacts(source: SourceAsOf): ApiTableSource {
  return { ...apiSource(source), hash: source.rowHash.toString("hex") };
}

function speciesFacts(detail: DetailAsOf): ApiTableSpecies {
  const { key: _key, values: _values, ...facts } = apiSpecies(detail, [], new Map());
  return { ...facts, hash: detail.rowHash.toString("hex") };
}

function valueFacts(value: ValueAsOf, sources: Sources): ApiTableValue {
  const { id: _id, species: _species, property: _property, source, ...facts } = apiValue(value, sources);
  const lost = (["temperature", "standardPressure"] as const).filter((name) => String(facts[name]) !== value[name]);
  return {
    ...facts,
    source: source.id,
    ...(lost.length > 0 ? { digitsOf: Object.fromEntries(lost.map((name) => [name, value[name]])) } : {}),
    hash: value.rowHash.toString("hex"),
  };
}

/** `{"a":1,` … the members of an object that goes on, or `{` for none. */
function opened(facts: object): string {
  const text = JSON.stringify(facts);
  return text === "{}" ? "{" : `${text.slice(0, -1)},`;
}

/** One JSON document: sources by id, species by key, values by key and property. */
export const jsonFormat: TableFormat = {
  extension: "json",
  contentType: "application/json",
  head: (edition, sources, details) =>
    opened({
      ...editionFacts(edition),
      sources: Object.fromEntries([...sources].map(([id, source]) => [id, sourceFacts(source)])),
      species: Object.fromEntries(details.map((detail) => [detail.key, speciesFacts(detail)])),
    }) + '"values":{',
  species: (_edition, detail, values, sources, isFirst) => {
    const byProperty = Object.fromEntries(values.map((value) => [value.property, valueFacts(value, sources)]));
    return `${isFirst ? "" : ","}${JSON.stringify(detail.key)}:${JSON.stringify(byProperty)}`;
  },
  foot: "}}\n",
};

const line = (facts: ApiTableLine): string => `${JSON.stringify(facts)}\n`;

/** A JSON document a line: the edition, its sources, then each species with its values behind it. */
export const linesFormat: TableFormat = {
  extension: "ndjson",
  contentType: "application/x-ndjson",
  head: (edition, sources) =>
    [
      line({ kind: "edition", ...editionFacts(edition) }),
      ...[...sources].map(([id, source]) => {
        const { kind, ...facts } = sourceFacts(source);
        return line({ kind: "source", id, sourceKind: kind, ...facts });
      }),
    ].join(""),
  species: (_edition, detail, values, sources) =>
    [
      line({ kind: "species", key: detail.key, ...speciesFacts(detail) }),
      ...values.map((value) =>
        line({ kind: "value", species: detail.key, property: value.property, ...valueFacts(value, sources) }),
      ),
    ].join(""),
  foot: "",
};
