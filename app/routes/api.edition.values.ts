import { keepingOf, searchOf } from "./api/answer.server.ts";
import { apiPaths, apiValue } from "./api/shape.ts";
import { listValues } from "./api/contract.ts";
import { findValuesWithSources } from "#app/editions/read.server.ts";
import { resolveEdition, resolveMany } from "#app/editions/resolve.server.ts";
import { answering, apiRoute } from "#app/http/api.server.ts";
import { jsonAnswer } from "#app/http/caching.server.ts";
import { requireKey } from "#app/people/apiKey.server.ts";

const api = apiRoute(
  answering(listValues, async ({ request, params, query }) => {
    await requireKey(request, "read");
    const resolved = await resolveEdition(params["edition"]);
    const { number } = resolved.edition;
    const speciesIds = query.species && (await resolveMany(number, query.species));
    const { values, sources } = await findValuesWithSources(number, {
      ...(speciesIds ? { speciesIds } : {}),
      ...(query.property ? { properties: query.property } : {}),
    });
    const body = { edition: number, values: values.map((value) => apiValue(value, sources)) };
    return jsonAnswer(request, body, keepingOf(resolved, apiPaths.values(number) + searchOf(request)));
  }),
);

export const loader = api.loader;
export const action = api.action;
