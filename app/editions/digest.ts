import { createHash } from "node:crypto";
import canonicalize from "canonicalize";

/*
 * The recipe of the digests, which anyone can repeat from a download:
 *
 * 1. Each row is hashed as SHA-256 of the RFC 8785 JSON of an object of strings (and nulls, and arrays of strings).
 * 2. An edition's digest is SHA-256 over: the hashes of its values in the order of the UTF-8 bytes of species key, then
 *    property; the hashes of its species details by key; the hashes of its source details by source id; the digest of
 *    the edition before (nothing for edition 1); then the number, a line feed and the licence in UTF-8.
 *
 * A value is hashed with the opaque id of its species, not with the key: renaming a species then changes the hash of
 * its detail alone, and every value row stays what it was.
 */

export interface HashedValue {
  species: string;
  property: string;
  digits: string;
  unit: string;
  uncertainty: { digits: string; kind: string; coverageFactor: string | null } | null;
  temperature: string;
  standardPressure: string;
  basis: string | null;
  origin: string;
  source: string;
}

export interface HashedSpeciesDetail {
  species: string;
  key: string;
  printed: string;
  label: string | null;
  name: string;
  cas: string | null;
  inchikey: string | null;
  synonyms: readonly string[];
}

export interface HashedSourceDetail {
  source: string;
  citation: Record<string, unknown>;
  doi: string | null;
  kind: string;
  notice: string | null;
}

/** SHA-256 of the row's RFC 8785 JSON. */
export function rowHash(row: HashedValue | HashedSpeciesDetail | HashedSourceDetail): Buffer {
  return createHash("sha256")
    .update(canonicalize(row) ?? "")
    .digest();
}

export interface EditionParts {
  values: readonly { key: string; property: string; hash: Buffer }[];
  species: readonly { key: string; hash: Buffer }[];
  sources: readonly { id: string; hash: Buffer }[];
  previousDigest: Buffer | null;
  number: number;
  licence: string;
}

/** Orders two strings by their UTF-8 bytes, as PostgreSQL's collation "C" does. */
export function compareBytes(a: string, b: string): number {
  return Buffer.compare(Buffer.from(a, "utf8"), Buffer.from(b, "utf8"));
}

/** The digest of an edition from its rows, by the recipe above. */
export function editionDigest(parts: EditionParts): Buffer {
  const hash = createHash("sha256");
  const values = [...parts.values].sort((a, b) => compareBytes(a.key, b.key) || compareBytes(a.property, b.property));
  for (const value of values) hash.update(value.hash);
  for (const one of [...parts.species].sort((a, b) => compareBytes(a.key, b.key))) hash.update(one.hash);
  for (const one of [...parts.sources].sort((a, b) => compareBytes(a.id, b.id))) hash.update(one.hash);
  if (parts.previousDigest) hash.update(parts.previousDigest);
  hash.update(`${parts.number}\n${parts.licence}`, "utf8");
  return hash.digest();
}
