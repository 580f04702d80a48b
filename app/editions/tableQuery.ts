import { elementOf } from "#app/thermo/elements.ts";
import { PHASES, type Phase } from "#app/thermo/phase.ts";
import { isProperty, PROPERTIES, type Property, propertyInfo } from "#app/thermo/property.ts";
import { quote } from "#app/thermo/reading.ts";
import type { SpeciesOrder } from "./editions.queries.server.ts";
import {
  BARE,
  type Bare,
  CHARGE_KINDS,
  type ChargeKind,
  ELEMENTS_HOW,
  type ElementsHow,
  readSearch,
  type SpeciesFilter,
} from "./search.ts";
import { readPage } from "./sourceList.ts";

/** How many species a page of the table holds. */
export const TABLE_PAGE = 100;

/** Columns shown unless the address says otherwise. */
const USUAL_COLUMNS: readonly Property[] = ["enthalpyOfFormation", "entropy", "gibbsEnergyOfFormation", "heatCapacity"];

/** What the address of the table says, read kindly: what cannot be read is left out and remarked on. */
export interface TableQuery {
  /** As the address has it, without what could not be read: the fields of the sentence. */
  typed: {
    kind: string;
    q: string;
    how: string;
    element: string;
    phase: readonly string[];
    property: readonly string[];
    source: string;
  };
  filter: SpeciesFilter;
  order: SpeciesOrder;
  columns: readonly Property[];
  page: number;
  /** A sentence for each thing that could not be read. */
  remarks: readonly string[];
}

/** The longest text that a field of the sentence takes. */
const LONGEST = 200;
/** So many conditions on properties are heeded; an address with more was not made by hand. */
const MOST_CONDITIONS = 12;

/** Reads the query of the table page. Parameters it does not know are passed over, as links from elsewhere carry such. */
export function readTableQuery(query: URLSearchParams): TableQuery {
  const remarks: string[] = [];
  const one = <Known extends string>(name: string, known: readonly Known[], what: string): Known | "" => {
    const text = query.get(name) ?? "";
    const found = known.find((each) => each === text);
    if (text !== "" && found === undefined) remarks.push(`“${text.slice(0, 40)}” is not ${what}.`);
    return found ?? "";
  };
  const q = (query.get("q") ?? "").slice(0, LONGEST);
  const element = query.getAll("element").join(" ").slice(0, LONGEST);
  const elements = element.split(/[\s,;]+/).filter((symbol) => symbol !== "");
  const unknown = elements.filter((symbol) => !elementOf(symbol));
  if (unknown.length > 0) {
    remarks.push(
      `${unknown.map((symbol) => `“${symbol}”`).join(", ")} ${unknown.length === 1 ? "is no element symbol" : "are no element symbols"}; write them as in Na or Cl, with a space between.`,
    );
  }
  const kind = one("kind", CHARGE_KINDS, "a kind of species");
  const how = one("how", ELEMENTS_HOW, "a way to choose by element");
  const phases = several(query, "phase").flatMap((text) => {
    const phase = PHASES.find((each): each is Phase => each === text);
    if (!phase) remarks.push(`“${text.slice(0, 40)}” is not a phase.`);
    return phase ?? [];
  });
  const conditions = several(query, "property")
    .slice(0, MOST_CONDITIONS)
    .filter((text) => {
      const known = isProperty(text.replace(/^-/, "")) || BARE.some((what) => text === `-${what}`);
      if (!known) remarks.push(`“${text.slice(0, 40)}” is not a property.`);
      return known;
    });
  const sort = query.get("sort") ?? "";
  const by = sort.replace(/^-/, "");
  const columns = query.getAll("column").filter(isProperty);
  return {
    typed: {
      kind,
      q,
      how: how === "all" ? "" : how,
      element,
      phase: phases,
      property: conditions,
      source: (query.get("source") ?? "").trim().slice(0, LONGEST),
    },
    filter: {
      search: readSearch(q),
      elements: elements.filter((symbol) => elementOf(symbol)),
      elementsHow: how === "" ? "all" : how,
      phases,
      charge: kind === "" ? null : kind,
      cas: null,
      holds: conditions.filter(isProperty),
      lacks: PROPERTIES.filter((property) => conditions.includes(`-${property}`)),
      bare: BARE.filter((what) => conditions.includes(`-${what}`)),
    },
    order: {
      by: by === "name" || by === "hill" || isProperty(by) ? by : "key",
      direction: sort.startsWith("-") ? "descending" : "ascending",
    },
    columns: columns.length > 0 ? PROPERTIES.filter((property) => columns.includes(property)) : USUAL_COLUMNS,
    page: readPage(query.get("page")),
    remarks,
  };
}

function several(query: URLSearchParams, name: string): string[] {
  return [...new Set(query.getAll(name).filter((text) => text !== ""))];
}

/** What the species of a kind are called in the sentence. */
export const KIND_WORDS: Readonly<Record<ChargeKind, string>> = {
  neutral: "species without charge",
  ion: "ions",
  cation: "cations",
  anion: "anions",
};

export const HOW_WORDS: Readonly<Record<ElementsHow, string>> = {
  all: "all of",
  only: "nothing but",
  exactly: "exactly",
};

export const BARE_WORDS: Readonly<Record<Bare, string>> = {
  uncertainty: "a value without uncertainty",
  cas: "no CAS number",
  name: "no name",
  stated: "derived values only",
};

/** What a condition on properties, `entropy` or `-entropy` or `-cas`, asks for. */
export function conditionInWords(condition: string): string {
  const code = condition.replace(/^-/, "");
  const bare = BARE.find((what) => what === code);
  if (bare) return BARE_WORDS[bare];
  if (!isProperty(code)) return condition;
  return `${condition.startsWith("-") ? "no value" : "a value"} of ${propertyInfo[code].symbol}`;
}

/** The filter and order of a table in one sentence of plain text: what a file taken from it says of itself. */
export function queryInWords({ typed, order }: Pick<TableQuery, "typed" | "order">): string {
  const { kind, q, how, element, phase, property, source } = typed;
  const known = CHARGE_KINDS.find((one) => one === kind);
  const manner = ELEMENTS_HOW.find((one) => one === how) ?? "all";
  const parts = [
    known ? KIND_WORDS[known] : "species",
    q && `called ${quote(q)}`,
    element &&
      `with ${HOW_WORDS[manner]} ${element
        .split(/[\s,;]+/)
        .filter(Boolean)
        .join(", ")}`,
    phase.length > 0 && `in phase ${phase.join(" or ")}`,
    ...property.map((condition) => `with ${conditionInWords(condition)}`),
    source && `from ${quote(source)}`,
  ].filter((part) => typeof part === "string" && part !== "");
  const by = isProperty(order.by)
    ? propertyInfo[order.by].symbol
    : { key: "key", hill: "formula", name: "name" }[order.by];
  const filter = parts.length === 1 && parts[0] === "species" ? "every species" : parts.join(" ");
  return `${filter}, by ${by}, ${order.direction}`;
}
