import type { Database } from "#app/db/database.server.ts";
import { propertyInfo } from "#app/thermo/property.ts";
import { editionDigest, rowHash } from "./digest.ts";
import {
  findDetailsAsOf,
  findEditions,
  findSourceDetailsAsOf,
  findValuesAsOf,
  type ValueAsOf,
} from "./editions.queries.server.ts";

/** The hash a value row should carry, from its columns. */
function valueHash(row: ValueAsOf): Buffer {
  return rowHash({
    species: row.speciesId,
    property: row.property,
    digits: row.digits,
    unit: propertyInfo[row.property].unit,
    uncertainty: row.uncertainty && {
      digits: row.uncertainty.digits,
      kind: row.uncertainty.kind,
      coverageFactor: row.uncertainty.coverageFactor === null ? null : String(row.uncertainty.coverageFactor),
    },
    temperature: row.temperature,
    standardPressure: row.standardPressure,
    basis: row.basis,
    origin: row.origin,
    source: row.sourceId,
  });
}

/**
 * Recomputes every row hash and every edition's digest from what the columns say, and the chain of previous digests.
 * Answers one sentence for each thing that does not agree; an empty list means that every edition is what was published.
 */
export async function verifyEditions(db: Database): Promise<string[]> {
  const faults: string[] = [];
  const editions = (await findEditions(db)).reverse();
  let previous: Buffer | null = null;
  for (const [index, edition] of editions.entries()) {
    const n = edition.number;
    if (n !== index + 1) faults.push(`Edition ${index + 1} is missing.`);
    if (Buffer.compare(edition.previousDigest ?? Buffer.alloc(0), previous ?? Buffer.alloc(0)) !== 0) {
      faults.push(`Edition ${n} does not carry the digest of the edition before it.`);
    }
    previous = edition.digest;
    const values = await findValuesAsOf(n, {}, db);
    const details = await findDetailsAsOf(n, {}, db);
    const sources = await findSourceDetailsAsOf(n, {}, db);
    for (const row of values) {
      if (!valueHash(row).equals(row.rowHash)) {
        faults.push(`Edition ${n}: ${propertyInfo[row.property].symbol} of ${row.key} is not what was published.`);
      }
    }
    for (const row of details) {
      const { speciesId: species, key, printed, label, name, cas, inchikey, synonyms } = row;
      if (!rowHash({ species, key, printed, label, name, cas, inchikey, synonyms }).equals(row.rowHash)) {
        faults.push(`Edition ${n}: what ${key} is called is not what was published.`);
      }
    }
    for (const row of sources) {
      const { sourceId: source, citation, doi, kind, notice } = row;
      if (!rowHash({ source, citation, doi, kind, notice }).equals(row.rowHash)) {
        faults.push(`Edition ${n}: the citation of source ${source} is not what was published.`);
      }
    }
    const digest = editionDigest({
      values: values.map((row) => ({ key: row.key, property: row.property, hash: row.rowHash })),
      species: details.map((row) => ({ key: row.key, hash: row.rowHash })),
      sources: sources.map((row) => ({ id: row.sourceId, hash: row.rowHash })),
      previousDigest: edition.previousDigest,
      number: n,
      licence: edition.licence,
    });
    if (!digest.equals(edition.digest)) faults.push(`Edition ${n}: its digest is not that of its rows.`);
  }
  return faults;
}
