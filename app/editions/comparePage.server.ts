import { demand } from "#app/people/permissions.ts";
import type { Acting } from "#app/people/person.ts";
import { shortCitation } from "#app/sources/citation.ts";
import { countChanges } from "./compare.ts";
import { drawnDifferences, shownChange, wordRuns } from "./comparePage.ts";
import type { Edition } from "./editions.queries.server.ts";
import { findFrame } from "./frame.server.ts";
import { compareEditionsNet } from "./read.server.ts";

/** Changes on one page of the comparison. */
export const COMPARE_PAGE = 200;

/** What lies between two editions, as its page shows it. `page` counts from 1. */
export async function findComparePage(acting: Acting, from: Edition, to: Edition, page: number) {
  demand(acting, "table:read");
  const net = await compareEditionsNet(from, to);
  const cited = [...net.citationsBefore, ...net.citationsAfter].map(
    ([id, source]) => [id, shortCitation(source.citation) || id] as const,
  );
  return {
    from: await findFrame(from),
    to: await findFrame(to),
    counts: { ...countChanges(net.values), unchanged: net.unchanged },
    digitsOnly: net.values.filter((change) => change.digitsOnly).length,
    beyond: net.values.filter((change) => change.normalizedError !== null && change.normalizedError > 1).length,
    changes: net.values.slice((page - 1) * COMPARE_PAGE, page * COMPARE_PAGE).map(shownChange),
    page,
    pageSize: COMPARE_PAGE,
    pages: Math.max(1, Math.ceil(net.values.length / COMPARE_PAGE)),
    drawn: drawnDifferences(net.values),
    species: net.species.map(({ what, before, after, texts }) => ({
      what,
      id: (after ?? before)?.speciesId ?? "",
      before: before?.key ?? null,
      after: after?.key ?? null,
      name: (after ?? before)?.name ?? "",
      texts: texts.map((text) => ({ field: text.field, runs: wordRuns(text) })),
    })),
    sources: net.sources.map(({ what, before, after, texts }) => ({
      what,
      id: (after ?? before)?.sourceId ?? "",
      /** Whether the second edition has it. */
      after: after !== null,
      citation: shortCitation((after ?? before)?.citation ?? {}),
      texts: texts.map((text) => ({ field: text.field, runs: wordRuns(text) })),
    })),
    citations: Object.fromEntries(cited),
  };
}

export type ComparePage = Awaited<ReturnType<typeof findComparePage>>;
