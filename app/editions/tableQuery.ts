import { elementOf } from "#app/thermo/elements.ts";
import { PHASES, type Phase } from "#app/thermo/phase.ts";
import { isProperty, PROPERTIES, type Property } from "#app/thermo/property.ts";
import type { SpeciesOrder } from "./editions.queries.server.ts";
import { readSearch, type SpeciesFilter } from "./search.ts";

/** How many species a page of the table holds. */
export const TABLE_PAGE = 100;

/** Columns shown unless the address says otherwise. */
const USUAL_COLUMNS: readonly Property[] = ["enthalpyOfFormation", "entropy", "gibbsEnergyOfFormation", "heatCapacity"];

/** What the address of the table says, read kindly: what cannot be read is left out and remarked on. */
export interface TableQuery {
  /** As typed, for the fields of the sentence. */
  typed: { q: string; element: string; phase: string; property: string };
  filter: SpeciesFilter;
  order: SpeciesOrder;
  columns: readonly Property[];
  page: number;
  /** A sentence for each thing that could not be read. */
  remarks: readonly string[];
}

/** Reads the query of the table page. Parameters it does not know are passed over, as links from elsewhere carry such. */
export function readTableQuery(query: URLSearchParams): TableQuery {
  const remarks: string[] = [];
  const q = (query.get("q") ?? "").slice(0, 200);
  const element = query.getAll("element").join(" ").slice(0, 200);
  const elements = element.split(/[\s,;]+/).filter((one) => one !== "");
  const unknown = elements.filter((one) => !elementOf(one));
  if (unknown.length > 0) {
    remarks.push(
      `${unknown.map((one) => `“${one}”`).join(", ")} ${unknown.length === 1 ? "is no element symbol" : "are no element symbols"}; write them as in Na or Cl, with a space between.`,
    );
  }
  const phase = query.get("phase") ?? "";
  const phases = phase === "" ? [] : PHASES.filter((one): one is Phase => one === phase);
  if (phase !== "" && phases.length === 0) remarks.push(`“${phase.slice(0, 40)}” is not a phase.`);
  const property = query.get("property") ?? "";
  const code = property.replace(/^-/, "");
  if (property !== "" && !isProperty(code)) remarks.push(`“${property.slice(0, 40)}” is not a property.`);
  const named = isProperty(code) ? [code] : [];
  const sort = query.get("sort") ?? "";
  const by = sort.replace(/^-/, "");
  const page = Number(/^[1-9]\d{0,5}$/.exec(query.get("page") ?? "")?.[0] ?? 1);
  const columns = query.getAll("column").filter(isProperty);
  return {
    typed: {
      q,
      element,
      phase: phases[0] ?? "",
      property: named.length > 0 ? property : "",
    },
    filter: {
      search: readSearch(q),
      elements: elements.filter((one) => elementOf(one)),
      phases,
      cas: null,
      holds: property.startsWith("-") ? [] : named,
      lacks: property.startsWith("-") ? named : [],
    },
    order: {
      by: by === "name" || isProperty(by) ? by : "key",
      direction: sort.startsWith("-") ? "descending" : "ascending",
    },
    columns: columns.length > 0 ? PROPERTIES.filter((one) => columns.includes(one)) : USUAL_COLUMNS,
    page,
    remarks,
  };
}
