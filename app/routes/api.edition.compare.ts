import { nextLink, placeWithin } from "./api/answer.server.ts";
import { apiPaths, apiValueChange, writeCursor } from "./api/shape.ts";
import { countChanges, pageOfChanges } from "#app/editions/compare.ts";
import { compareEditions } from "./api/contract.ts";
import { compareEditionsNet } from "#app/editions/read.server.ts";
import { resolveEdition } from "#app/editions/resolve.server.ts";
import { answering, apiRoute } from "#app/http/api.server.ts";
import { jsonAnswer } from "#app/http/caching.server.ts";
import { requireKey } from "#app/people/apiKey.server.ts";

const api = apiRoute(
  answering(compareEditions, async ({ request, params, query }) => {
    await requireKey(request, "read");
    const a = await resolveEdition(params["a"]);
    const b = await resolveEdition(params["b"]);
    const net = await compareEditionsNet(a.edition, b.edition);
    const within = [a.edition.number, b.edition.number];
    const place = placeWithin(within, query.cursor, 2);
    const { page, more } = pageOfChanges(net.values, place, query.limit);
    const last = page.at(-1);
    const next = more && last ? writeCursor([...within.map(String), last.key, last.property]) : null;
    const body = {
      edition: b.edition.number,
      from: a.edition.number,
      to: b.edition.number,
      counts: { ...countChanges(net.values), unchanged: net.unchanged },
      changes: page.map((change) => apiValueChange(change, net.citationsBefore, net.citationsAfter)),
      species: (place ? [] : net.species).map(({ what, before, after, texts }) => ({
        what,
        id: (after ?? before)?.speciesId ?? "",
        before: before?.key ?? null,
        after: after?.key ?? null,
        texts,
      })),
      sources: (place ? [] : net.sources).map(({ what, before, after, texts }) => ({
        what,
        id: (after ?? before)?.sourceId ?? "",
        texts,
      })),
      next,
    };
    const numbered = apiPaths.compare(a.edition.number, b.edition.number);
    return jsonAnswer(request, body, {
      keeping: "asked",
      headers: {
        ...(a.isCurrent || b.isCurrent ? { "Content-Location": numbered } : {}),
        ...(next ? { Link: nextLink(request, numbered, next) } : {}),
      },
    });
  }),
);

export const loader = api.loader;
export const action = api.action;
