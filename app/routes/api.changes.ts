import { listChanges } from "./api/contract.ts";
import { apiEdition } from "./api/shape.ts";
import { findAllEditions } from "#app/editions/editions.server.ts";
import { answering, apiRoute } from "#app/http/api.server.ts";
import { jsonAnswer } from "#app/http/caching.server.ts";
import { Invalid } from "#app/http/errors.ts";
import { requireKey } from "#app/people/apiKey.server.ts";

const api = apiRoute(
  answering(listChanges, async ({ request, query: { since }, publicUrl }) => {
    await requireKey(request, "read");
    const editions = await findAllEditions();
    const newest = editions[0]?.number ?? null;
    if (since > (newest ?? 0)) {
      // A program that knows of an edition that never was is pointed at another table than it thinks.
      const detail = `There is no edition ${since}; ${newest === null ? "none is published yet" : `the newest is ${newest}`}.`;
      throw new Invalid(detail, [{ pointer: "/since", detail }]);
    }
    const later = editions.filter((edition) => edition.number > since);
    const body = { edition: newest, since, editions: later.map((edition) => apiEdition(edition, publicUrl)) };
    return jsonAnswer(request, body, { keeping: "asked" });
  }),
);

export const loader = api.loader;
export const action = api.action;
