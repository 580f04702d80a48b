import { fullCitation } from "#app/sources/citation.ts";
import { propertyInfo } from "#app/thermo/property.ts";
import type { DetailAsOf, Edition, SourceAsOf, Sources, ValueAsOf } from "./editions.queries.server.ts";

/**
 * A form in which a whole edition is written: what stands first, what stands for each species, and what stands last. The
 * species come in the order of the bytes of their keys, each with its values in the order of the properties.
 */
export interface TableFormat {
  /** Ends the name of the file. */
  extension: string;
  contentType: string;
  head: (edition: Edition, sources: Sources, details: readonly DetailAsOf[]) => string;
  species: (
    edition: Edition,
    detail: DetailAsOf,
    values: readonly ValueAsOf[],
    sources: Sources,
    isFirst: boolean,
  ) => string;
  foot: string;
}

/** A line of the file before it is written: a value with its species and what they are read from. */
export interface FileRow {
  edition: number;
  value: ValueAsOf;
  detail: DetailAsOf;
  sources: Sources;
}

interface FileColumn {
  name: string;
  title: string;
  datatype: "string" | "decimal" | "integer" | "json";
  required: boolean;
  text: (row: FileRow) => string;
}

/**
 * The columns of an edition's CSV. They hold every field that the hash of a value is made from, so that a download can be
 * checked against the digest line by line. An empty cell means that nothing is stated; it is never a zero.
 */
const COLUMNS: readonly FileColumn[] = [
  column("edition", "Edition", "integer", (row) => String(row.edition)),
  column("id", "Opaque id of the species", "string", (row) => row.value.speciesId),
  column("species", "Species key", "string", (row) => row.detail.key),
  column("formula", "Formula as its source prints it", "string", (row) => row.detail.printed),
  column("charge", "Charge number", "integer", (row) => String(row.detail.charge)),
  column("phase", "Phase", "string", (row) => row.detail.phase),
  column("label", "Form of a solid or name of an isomer", "string", (row) => row.detail.label ?? "", false),
  column("name", "Name", "string", (row) => row.detail.name, false),
  column("cas", "CAS Registry Number", "string", (row) => row.detail.cas ?? "", false),
  column("property", "Property", "string", (row) => row.value.property),
  column("value", "Value, in the unit of its line, with its digits", "decimal", (row) => row.value.digits),
  column("unit", "Unit", "string", (row) => propertyInfo[row.value.property].unit),
  column(
    "uncertainty",
    "Uncertainty, in the unit of its line",
    "decimal",
    (row) => row.value.uncertainty?.digits ?? "",
    false,
  ),
  column(
    "uncertaintyKind",
    "Kind of uncertainty; empty: none is stated",
    "string",
    (row) => row.value.uncertainty?.kind ?? "",
    false,
  ),
  column(
    "coverageFactor",
    "Coverage factor k of an expanded uncertainty",
    "decimal",
    (row) => row.value.uncertainty?.coverageFactor?.toString() ?? "",
    false,
  ),
  column("temperature", "Temperature in kelvin", "decimal", (row) => row.value.temperature),
  column("standardPressure", "Standard pressure in pascal", "decimal", (row) => row.value.standardPressure),
  column(
    "basis",
    "Standard state of a solute: molality or concentration",
    "string",
    (row) => row.value.basis ?? "",
    false,
  ),
  column("origin", "Stated by its source, or derived", "string", (row) => row.value.origin),
  column("method", "How it was obtained", "string", (row) => row.value.method ?? "", false),
  column("givenText", "What the sheet said", "string", (row) => row.value.givenText, false),
  column("givenUnit", "The unit the sheet used", "string", (row) => row.value.givenUnit, false),
  column("givenNote", "The conversion applied", "string", (row) => row.value.givenNote ?? "", false),
  column("remark", "Remark of the source", "string", (row) => row.value.remark ?? "", false),
  column("source", "Id of the source", "string", (row) => row.value.sourceId),
  column("citation", "Citation", "string", (row) => citationOf(row), false),
  column("doi", "DOI", "string", (row) => row.sources.get(row.value.sourceId)?.doi ?? "", false),
  column("since", "Edition in which the value came in", "integer", (row) => String(row.value.since)),
  column("inchikey", "InChIKey", "string", (row) => row.detail.inchikey ?? "", false),
  column("synonyms", "Other names, as a JSON list", "json", (row) => synonymsOf(row.detail), false),
  column("hash", "SHA-256 of the value's published fields", "string", (row) => row.value.rowHash.toString("hex")),
];

function column(
  name: string,
  title: string,
  datatype: FileColumn["datatype"],
  text: FileColumn["text"],
  required = true,
): FileColumn {
  return { name, title, datatype, required, text };
}

/** Names hold commas and semicolons, so a list of them is written as JSON. */
function synonymsOf({ synonyms }: DetailAsOf): string {
  return synonyms.length === 0 ? "" : JSON.stringify(synonyms);
}

function citationOf({ value, sources }: FileRow): string {
  const source = sources.get(value.sourceId);
  return source ? fullCitation(source.citation) : "";
}

/** One record of RFC 4180: fields quoted where they must be, ended by CRLF. */
export function csvRecord(fields: readonly string[]): string {
  return `${fields.map((field) => (/[",\r\n]/.test(field) ? `"${field.replaceAll('"', '""')}"` : field)).join(",")}\r\n`;
}

/** The header line. */
export function fileHead(): string {
  return csvRecord(COLUMNS.map((one) => one.name));
}

/** The line of one value. */
export function fileLine(row: FileRow): string {
  return csvRecord(COLUMNS.map((one) => one.text(row)));
}

/** The edition as CSV: one header line, one line a value. */
export const csvFormat: TableFormat = {
  extension: "csv",
  contentType: "text/csv; charset=utf-8; header=present",
  head: () => fileHead(),
  species: (edition, detail, values, sources) =>
    values.map((value) => fileLine({ edition: edition.number, value, detail, sources })).join(""),
  foot: "",
};

/** The name an edition's file is saved under. */
export function fileName(edition: number, { extension }: Pick<TableFormat, "extension"> = csvFormat): string {
  return `tablewright-edition-${edition}.${extension}`;
}

/** What belongs to an edition beside the lines of its CSV. */
export interface BesideTheLines {
  sources: readonly SourceAsOf[];
  speciesWithoutValues: readonly DetailAsOf[];
}

/**
 * The description of the file as W3C CSVW has it (Metadata Vocabulary for Tabular Data, 2015). It holds what belongs to
 * this edition alone and nothing that a later one could change. Its notes hold what the lines do not: the citations as
 * CSL-JSON, species without a value and the previous digest, so that the digest can be made again from both files.
 */
export function fileDescription(
  edition: Pick<Edition, "number" | "publishedAt" | "licence" | "digest" | "previousDigest">,
  { sources, speciesWithoutValues }: BesideTheLines,
) {
  return {
    "@context": "http://www.w3.org/ns/csvw",
    url: "table.csv",
    "dc:title": `Standard formation properties, edition ${edition.number}`,
    "dc:issued": edition.publishedAt.toISOString(),
    "dc:license": `https://spdx.org/licenses/${edition.licence}.html`,
    "dc:identifier": `sha256:${edition.digest.toString("hex")}`,
    dialect: { encoding: "utf-8", lineTerminators: ["\r\n"], delimiter: ",", quoteChar: '"', header: true },
    tableSchema: {
      columns: COLUMNS.map(({ name, title, datatype, required }) => ({
        name,
        titles: name,
        "dc:description": title,
        datatype,
        required,
        ...(required ? {} : { null: "" }),
      })),
      primaryKey: ["species", "property"],
    },
    notes: [
      {
        previousDigest: edition.previousDigest?.toString("hex") ?? null,
        sources: sources.map(({ sourceId: id, citation, doi, kind, notice }) => ({ id, citation, doi, kind, notice })),
        speciesWithoutValues: speciesWithoutValues.map(
          ({ speciesId: id, key, printed: formula, label, name, cas, inchikey, synonyms }) => ({
            ...{ id, species: key, formula, label, name, cas, inchikey, synonyms },
          }),
        ),
      },
    ],
  };
}
