import { createHash } from "node:crypto";
import { type HashedSourceDetail, type HashedSpeciesDetail, type HashedValue } from "#app/editions/digest.ts";
import { type Property, propertyInfo } from "#app/thermo/property.ts";
import type { DetailContent, SourceContent, ValueContent } from "./content.ts";

/** The digest of the list a publisher was shown: every waiting line in its order, as its version says it. */
export function listDigest(lines: readonly { versionId: string; contentHash: Buffer }[]): string {
  const hash = createHash("sha256");
  for (const line of lines) hash.update(`${line.versionId}:${line.contentHash.toString("hex")}\n`);
  return hash.digest("hex");
}

/** The published fields of a value, as they are hashed. */
export function hashedValue(speciesId: string, property: Property, content: ValueContent): HashedValue {
  const { uncertainty } = content;
  return {
    species: speciesId,
    property,
    digits: content.digits,
    unit: propertyInfo[property].unit,
    uncertainty: uncertainty && {
      digits: uncertainty.digits,
      kind: uncertainty.kind,
      coverageFactor: uncertainty.coverageFactor === null ? null : String(uncertainty.coverageFactor),
    },
    temperature: content.temperature,
    standardPressure: content.standardPressure,
    basis: content.basis,
    origin: content.origin,
    source: content.sourceId,
  };
}

/** The published fields of what a species is called, as they are hashed. */
export function hashedSpeciesDetail(speciesId: string, content: DetailContent): HashedSpeciesDetail {
  return {
    species: speciesId,
    key: content.key,
    printed: content.printed,
    label: content.label,
    name: content.name,
    cas: content.cas,
    inchikey: content.inchikey,
    synonyms: content.synonyms,
  };
}

/** The published fields of a source, as they are hashed. */
export function hashedSourceDetail(sourceId: string, content: SourceContent): HashedSourceDetail {
  return {
    source: sourceId,
    citation: content.citation,
    doi: content.doi,
    kind: content.sourceKind,
    notice: content.notice,
  };
}
