/*
 * What the pages of the editions say of one, and how they read the form that asks for a comparison. Pure.
 */

/** The first line of an edition's notes, for a list. */
export function firstLine(notes: string): string {
  return notes.trim().split(/\r?\n/, 1)[0] ?? "";
}

export interface CitedEdition {
  number: number;
  publishedAt: Date;
  publisher: string;
  licence: string;
  digest: string;
  /** Where its page stands, with scheme and host. */
  address: string;
}

/** Day of a moment in UTC, as ISO 8601 writes it: 2026-03-12. */
function isoDay(at: Date): string {
  return at.toISOString().slice(0, 10);
}

/** The citation of an edition as plain text, ready to be pasted into a report. */
export function citationText({ number, publishedAt, publisher, licence, digest, address }: CitedEdition): string {
  return (
    `Tablewright, table of standard formation properties, edition ${number}. ` +
    `Published by ${publisher}, ${isoDay(publishedAt)}. ${address}. ` +
    `Licence ${licence}. SHA-256 ${digest}.`
  );
}

/** The same for citation programs, in CSL-JSON. */
export function citationRecord({ number, publishedAt, publisher, licence, digest, address }: CitedEdition) {
  const [year, month, day] = isoDay(publishedAt).split("-").map(Number);
  return {
    id: `tablewright-edition-${number}`,
    type: "dataset",
    title: "Tablewright, table of standard formation properties",
    edition: String(number),
    version: String(number),
    publisher,
    issued: { "date-parts": [[year, month, day]] },
    URL: address,
    license: licence,
    note: `SHA-256 ${digest}`,
  };
}

export interface RecordedEdition extends CitedEdition {
  notes: string;
  speciesCount: number;
  valueCount: number;
  /** Addresses with scheme and host: its CSV, the edition before, the edition that withdrew it. */
  download: string;
  previous: string | null;
  withdrawnBy: string | null;
}

/** An edition as data catalogues read it: JSON-LD in the terms of W3C DCAT 3 and Dublin Core. */
export function catalogueRecord(edition: RecordedEdition) {
  const { number, publishedAt, publisher, licence, digest, address, notes, speciesCount, valueCount } = edition;
  return {
    "@context": {
      dcat: "http://www.w3.org/ns/dcat#",
      dct: "http://purl.org/dc/terms/",
      foaf: "http://xmlns.com/foaf/0.1/",
      xsd: "http://www.w3.org/2001/XMLSchema#",
    },
    "@id": address,
    "@type": "dcat:Dataset",
    "dct:title": `Table of standard formation properties, edition ${number}`,
    "dct:description": notes,
    "dct:extent": `${valueCount} values of ${speciesCount} species`,
    "dct:issued": { "@value": publishedAt.toISOString(), "@type": "xsd:dateTime" },
    "dct:publisher": { "@type": "foaf:Agent", "foaf:name": publisher },
    "dct:license": { "@id": `https://spdx.org/licenses/${licence}.html` },
    "dct:identifier": `sha256:${digest}`,
    "dcat:version": String(number),
    ...(edition.previous === null ? {} : { "dcat:previousVersion": { "@id": edition.previous } }),
    ...(edition.withdrawnBy === null ? {} : { "dct:isReplacedBy": { "@id": edition.withdrawnBy } }),
    "dcat:distribution": {
      "@type": "dcat:Distribution",
      "dcat:downloadURL": { "@id": edition.download },
      "dcat:mediaType": { "@id": "https://www.iana.org/assignments/media-types/text/csv" },
    },
  };
}

/** What the form "compare edition … with edition …" asks for. */
export type AskedComparison =
  | { kind: "none" }
  | { kind: "asked"; from: number; to: number }
  /** Not to be made: why, and what stood in the two fields. */
  | { kind: "refused"; remark: string; from: string; to: string };

/**
 * Reads `from` and `to` of the address of the list of editions. A number, or the word "current" for the newest.
 * @param numbers the editions there are
 */
export function readComparison(search: URLSearchParams, numbers: readonly number[]): AskedComparison {
  const from = search.get("from")?.trim() ?? "";
  const to = search.get("to")?.trim() ?? "";
  if (from === "" && to === "") return { kind: "none" };
  const newest = Math.max(0, ...numbers);
  const numberOf = (text: string): number | undefined => {
    const number = text === "current" ? newest : /^[1-9]\d{0,8}$/.test(text) ? Number(text) : 0;
    return numbers.includes(number) ? number : undefined;
  };
  const [a, b] = [numberOf(from), numberOf(to)];
  if (a === undefined || b === undefined) {
    const wrong = a === undefined ? from : to;
    const remark =
      newest === 0
        ? "No edition is published yet, so there is nothing to compare."
        : wrong === ""
          ? "Choose both editions to compare."
          : `There is no edition “${wrong.slice(0, 40)}” to compare; the newest is edition ${newest}.`;
    return { kind: "refused", remark, from, to };
  }
  if (a === b) {
    return { kind: "refused", remark: `Choose two editions: edition ${a} does not differ from itself.`, from, to };
  }
  return { kind: "asked", from: a, to: b };
}
