import { database } from "#app/db/database.server.ts";
import { type Edition, findSpeciesPageAsOf } from "./editions.queries.server.ts";
import { findSpeciesWithValues, type SpeciesWithValues } from "./read.server.ts";
import { shownHead, shownLines, type ShownFigure, type ShownSpecies } from "./shownFile.ts";
import { findElementEntropies, shownValues } from "./tablePage.server.ts";
import { PROPERTIES } from "#app/thermo/property.ts";
import { queryInWords, type TableQuery } from "./tableQuery.ts";

/** Species whose values are read at a time. */
const PORTION = 1_000;
/** More species than an edition is ever likely to hold; their names alone are read at once, so that pages need no offset. */
const MOST = 1_000_000;

/** The species that a query lets through, in its order, with what stands for them, a portion at a time. */
async function* shownPortions(
  edition: Edition,
  { filter, order, columns }: TableQuery,
): AsyncGenerator<ShownSpecies[]> {
  const n = edition.number;
  const details = await findSpeciesPageAsOf(n, filter, { order, limit: MOST }, database());
  const elementEntropy = await findElementEntropies(n);
  const shownOf = (one: SpeciesWithValues): ShownSpecies => {
    const all = shownValues(one, elementEntropy);
    const values: ShownSpecies["values"] = {};
    for (const property of PROPERTIES) {
      const shown = all[property];
      if (!shown || !columns.includes(property)) continue;
      const row = one.values.find((value) => value.property === property);
      values[property] = {
        digits: shown.digits,
        uncertainty: shown.uncertainty,
        origin: row?.origin ?? "follows",
        sourceId: row?.sourceId ?? null,
      } satisfies ShownFigure;
    }
    return { key: one.detail.key, name: one.detail.name, cas: one.detail.cas, values };
  };
  for (let first = 0; first < details.length; first += PORTION) {
    const { species } = await findSpeciesWithValues(n, details.slice(first, first + PORTION));
    yield species.map(shownOf);
  }
}

/** The table as shown, as CSV. */
export async function* shownCsv(edition: Edition, query: TableQuery): AsyncGenerator<Buffer> {
  yield Buffer.from(shownHead(query.columns), "utf8");
  for await (const portion of shownPortions(edition, query)) {
    yield Buffer.from(shownLines(edition.number, query.columns, portion), "utf8");
  }
}

/** The table as shown, as JSON: edition, the filter in words, what of it could not be read, and the species in order. */
export async function* shownJson(edition: Edition, query: TableQuery): AsyncGenerator<Buffer> {
  const head = { edition: edition.number, shows: queryInWords(query), notRead: query.remarks, columns: query.columns };
  yield Buffer.from(`${JSON.stringify(head).slice(0, -1)},"species":[`, "utf8");
  let isFirst = true;
  for await (const portion of shownPortions(edition, query)) {
    yield Buffer.from((isFirst ? "\n" : ",\n") + portion.map((one) => JSON.stringify(one)).join(",\n"), "utf8");
    isFirst = false;
  }
  yield Buffer.from("\n]}\n", "utf8");
}
