import { apiEdition } from "./api/shape.ts";
import { listEditions } from "./api/contract.ts";
import { findAllEditions } from "#app/editions/editions.server.ts";
import { answering, apiRoute } from "#app/http/api.server.ts";
import { jsonAnswer } from "#app/http/caching.server.ts";
import { requireKey } from "#app/people/apiKey.server.ts";

const api = apiRoute(
  answering(listEditions, async ({ request, publicUrl }) => {
    await requireKey(request, "read");
    const editions = await findAllEditions();
    const body = {
      edition: editions[0]?.number ?? null,
      editions: editions.map((edition) => apiEdition(edition, publicUrl)),
    };
    return jsonAnswer(request, body, { keeping: "asked" });
  }),
);

export const loader = api.loader;
export const action = api.action;
