import { type Property, PROPERTIES, propertyInfo } from "#app/thermo/property.ts";
import { csvRecord } from "./tableFile.ts";
import { queryInWords, type TableQuery } from "./tableQuery.ts";

/*
 * The table as it is shown, filtered, sorted and with the columns chosen, as a file: one line a species. It is not the file
 * of the edition, which holds every field and whose bytes never change. Pure.
 */

export interface ShownSpecies {
  key: string;
  name: string;
  cas: string | null;
  values: Partial<Record<Property, ShownFigure>>;
}

export interface ShownFigure {
  digits: string;
  uncertainty: { digits: string; kind: string; coverageFactor: number | null } | null;
  origin: "stated" | "derived" | "follows";
  sourceId: string | null;
}

interface ShownColumn {
  name: string;
  title: string;
  datatype: "string" | "decimal" | "integer";
  text: (edition: number, species: ShownSpecies) => string;
}

/**
 * A name that begins like a formula of a spreadsheet is quoted off with an apostrophe, so that opening the file runs
 * nothing. Numbers and keys keep their signs: a minus is the rule there.
 */
function guarded(text: string): string {
  return /^[=+\-@\t\r]/.test(text) ? `'${text}` : text;
}

/** The columns of the file: what a species is called, then what stands for each property shown, with its unit in the name. */
export function shownColumns(properties: readonly Property[]): ShownColumn[] {
  const named = (name: string, title: string, text: (species: ShownSpecies) => string): ShownColumn => ({
    name,
    title,
    datatype: "string",
    text: (_edition, species) => text(species),
  });
  return [
    { name: "edition", title: "Edition", datatype: "integer", text: (edition) => String(edition) },
    named("species", "Species key", (species) => guarded(species.key)),
    named("name", "Name", (species) => guarded(species.name)),
    named("cas", "CAS Registry Number", (species) => species.cas ?? ""),
    ...PROPERTIES.filter((one) => properties.includes(one)).flatMap((property): ShownColumn[] => {
      const { name, unit } = propertyInfo[property];
      const figure = (species: ShownSpecies) => species.values[property];
      return [
        {
          name: property,
          title: `${name}, ${unit}`,
          datatype: "decimal",
          text: (_edition, species) => figure(species)?.digits ?? "",
        },
        {
          name: `${property}Uncertainty`,
          title: `Uncertainty, ${unit}`,
          datatype: "decimal",
          text: (_edition, species) => figure(species)?.uncertainty?.digits ?? "",
        },
        named(`${property}UncertaintyKind`, "Kind of uncertainty; empty: none is stated", (species) => {
          const uncertainty = figure(species)?.uncertainty;
          return uncertainty?.kind ?? "";
        }),
        {
          name: `${property}CoverageFactor`,
          title: "Coverage factor k of an expanded uncertainty",
          datatype: "decimal",
          text: (_edition, species) => figure(species)?.uncertainty?.coverageFactor?.toString() ?? "",
        },
        named(
          `${property}Origin`,
          "Stated by its source, derived, or following from ΔfH° and S°",
          (species) => figure(species)?.origin ?? "",
        ),
        named(`${property}Source`, "Id of the source", (species) => figure(species)?.sourceId ?? ""),
      ];
    }),
  ];
}

/** The header line of the CSV. */
export function shownHead(properties: readonly Property[]): string {
  return csvRecord(shownColumns(properties).map((one) => one.name));
}

/** Lines of the CSV. */
export function shownLines(edition: number, properties: readonly Property[], species: readonly ShownSpecies[]): string {
  const columns = shownColumns(properties);
  return species.map((one) => csvRecord(columns.map((column) => column.text(edition, one)))).join("");
}

/**
 * The name of the file: its edition, and the filter in letters that every file system takes, so that two downloads of one
 * afternoon can be told apart.
 */
export function shownName(
  edition: number,
  { typed, order }: Pick<TableQuery, "typed" | "order">,
  extension: string,
): string {
  const { kind, q, how, element, phase, property, source } = typed;
  const sort = order.by === "key" ? "" : `by ${order.by}`;
  const filter = [kind, q, how, element, ...phase, ...property.map((one) => one.replace(/^-/, "no ")), source, sort]
    .join(" ")
    .normalize("NFKD")
    .replace(/[^A-Za-z0-9]+/g, "-")
    .replace(/^-+|-+$/g, "")
    .slice(0, 80)
    .replace(/-+$/, "");
  return `tablewright-edition-${edition}-${filter === "" ? "as-shown" : filter}.${extension}`;
}

/** The description of the CSV as W3C CSVW has it (Metadata Vocabulary for Tabular Data, 2015): edition, filter, columns. */
export function shownDescription(
  edition: { number: number; publishedAt: Date; licence: string },
  query: TableQuery,
  url: string,
) {
  return {
    "@context": "http://www.w3.org/ns/csvw",
    url,
    "dc:title": `Standard formation properties, edition ${edition.number}: ${queryInWords(query)}`,
    "dc:issued": edition.publishedAt.toISOString(),
    "dc:license": `https://spdx.org/licenses/${edition.licence}.html`,
    dialect: { encoding: "utf-8", lineTerminators: ["\r\n"], delimiter: ",", quoteChar: '"', header: true },
    tableSchema: {
      columns: shownColumns(query.columns).map(({ name, title, datatype }) => ({
        name,
        titles: name,
        "dc:description": title,
        datatype,
        null: "",
      })),
      primaryKey: ["species"],
    },
    notes: query.remarks,
  };
}
