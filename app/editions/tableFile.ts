import { fullCitation } from "#app/sources/citation.ts";
import { propertyInfo } from "#app/thermo/property.ts";
import type { DetailAsOf, Sources, ValueAsOf } from "./editions.queries.server.ts";

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
  datatype: "string" | "decimal" | "integer";
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

/** The name an edition's file is saved under. */
export function fileName(edition: number): string {
  return `tablewright-edition-${edition}.csv`;
}

/**
 * The description of the file as W3C CSVW has it (Metadata Vocabulary for Tabular Data, 2015). It holds what belongs to
 * this edition alone and nothing that a later one could change.
 */
export function fileDescription(edition: { number: number; publishedAt: Date; licence: string; digest: Buffer }) {
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
  };
}
