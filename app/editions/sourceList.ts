import type { SourceKind } from "./editions.queries.server.ts";
import { fullCitation, noteOf, shortCitation, yearOf } from "#app/sources/citation.ts";

/** A source of an edition with how many values lean on it. */
export interface ListedSource {
  sourceId: string;
  citation: Record<string, unknown>;
  doi: string | null;
  kind: SourceKind;
  notice: string | null;
  values: number;
}

export const SOURCE_KINDS: readonly SourceKind[] = ["measurement", "evaluation", "calculation", "estimate"];
export const SOURCE_ORDERS = ["name", "year", "values"] as const;
type SourceOrder = (typeof SOURCE_ORDERS)[number];

/** How many sources a page of the list holds. */
export const SOURCES_PAGE = 50;

/** What the address of the list asks for. */
export interface SourceQuery {
  /** As typed. */
  q: string;
  kind: SourceKind | null;
  /** Only sources with a notice. */
  noticed: boolean;
  order: { column: SourceOrder; direction: "ascending" | "descending" };
  page: number;
}

/** The number of a page in an address; the first where it says none. */
export function readPage(text: string | null): number {
  return Number(/^[1-9]\d{0,5}$/.exec(text ?? "")?.[0] ?? 1);
}

/** Reads the query of the list; what it does not know is passed over. */
export function readSourceQuery(query: URLSearchParams): SourceQuery {
  const kind = query.get("kind");
  const sort = query.get("sort") ?? "";
  const column = SOURCE_ORDERS.find((one) => one === sort.replace(/^-/, ""));
  return {
    q: (query.get("q") ?? "").slice(0, 200),
    kind: SOURCE_KINDS.find((one) => one === kind) ?? null,
    noticed: kind === "notice",
    order: { column: column ?? "name", direction: column && sort.startsWith("-") ? "descending" : "ascending" },
    page: readPage(query.get("page")),
  };
}

/** The sources that a query lets through, in its order, and which of them stand on its page. */
export function selectSources<Source extends ListedSource>(all: readonly Source[], query: SourceQuery) {
  const words = query.q
    .toLowerCase()
    .split(/\s+/)
    .filter((word) => word !== "");
  const found = all.filter((source) => {
    if (query.kind !== null && source.kind !== query.kind) return false;
    if (query.noticed && source.notice === null) return false;
    const { sourceId, citation, doi, notice } = source;
    const said = [fullCitation(citation), noteOf(citation), doi, notice, sourceId].join(" ").toLowerCase();
    return words.every((word) => said.includes(word));
  });
  const rows = [...found].sort(compareBy(query.order));
  const pages = Math.max(1, Math.ceil(rows.length / SOURCES_PAGE));
  const page = Math.min(query.page, pages);
  return { rows: rows.slice((page - 1) * SOURCES_PAGE, page * SOURCES_PAGE), count: rows.length, page, pages };
}

/** Sources of one year or one size stand by name, whichever way the list runs. */
function compareBy({ column, direction }: SourceQuery["order"]): (a: ListedSource, b: ListedSource) => number {
  const turn = direction === "descending" ? -1 : 1;
  const name = (source: ListedSource): string => shortCitation(source.citation) || source.sourceId;
  const byName = (a: ListedSource, b: ListedSource): number => name(a).localeCompare(name(b), "en");
  const year = (source: ListedSource): number => Number(yearOf(source.citation));
  const key: Record<SourceOrder, (a: ListedSource, b: ListedSource) => number> = {
    name: byName,
    year: (a, b) => year(a) - year(b),
    values: (a, b) => a.values - b.values,
  };
  return (a, b) => turn * key[column](a, b) || byName(a, b) || (a.sourceId < b.sourceId ? -1 : 1);
}
