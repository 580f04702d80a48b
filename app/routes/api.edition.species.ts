import { alone, keepingOf, nextLink, placeWithin, searchOf } from "./api/answer.server.ts";
import { apiPaths, apiSpecies, writeCursor } from "./api/shape.ts";
import { listSpecies } from "./api/contract.ts";
import { browseSpecies } from "#app/editions/browse.server.ts";
import { findSpeciesWithValues } from "#app/editions/read.server.ts";
import { resolveEdition, resolveSpecies } from "#app/editions/resolve.server.ts";
import { readSearch } from "#app/editions/search.ts";
import { answering, apiRoute } from "#app/http/api.server.ts";
import { jsonAnswer } from "#app/http/caching.server.ts";
import { requireKey } from "#app/people/apiKey.server.ts";

const api = apiRoute(
  answering(listSpecies, async ({ request, params, query }) => {
    await requireKey(request, "read");
    const resolved = await resolveEdition(params["edition"]);
    const { number } = resolved.edition;
    const { keeping, headers } = keepingOf(resolved, apiPaths.species(number) + searchOf(request));
    if (query.key !== undefined) {
      alone("key", query, ["q", "element", "phase", "cas", "property", "cursor"]);
      const { species, sources } = await findSpeciesWithValues(number, [await resolveSpecies(number, query.key)]);
      const found = species.map(({ detail, values }) => apiSpecies(detail, values, sources));
      return jsonAnswer(request, { edition: number, species: found, next: null }, { keeping, headers });
    }
    const { details, more } = await browseSpecies(number, {
      filter: {
        search: readSearch(query.q ?? ""),
        elements: query.element ?? [],
        phases: query.phase ?? [],
        cas: query.cas ?? null,
        holds: query.property ?? [],
        lacks: [],
      },
      after: placeWithin([number], query.cursor, 1)?.[0] ?? null,
      limit: query.limit,
    });
    const { species, sources } = await findSpeciesWithValues(number, details);
    const last = details.at(-1);
    const next = more && last ? writeCursor([String(number), last.key]) : null;
    const body = {
      edition: number,
      species: species.map(({ detail, values }) => apiSpecies(detail, values, sources)),
      next,
    };
    // Under current too the next page is of this edition: a list goes on in the table it began in.
    const link: Record<string, string> = next ? { Link: nextLink(request, apiPaths.species(number), next) } : {};
    return jsonAnswer(request, body, { keeping, headers: { ...headers, ...link } });
  }),
);

export const loader = api.loader;
export const action = api.action;
