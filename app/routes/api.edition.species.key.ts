import { keepingOf } from "./api/answer.server.ts";
import { apiPaths, apiSpecies } from "./api/shape.ts";
import { readSpecies } from "./api/contract.ts";
import { findSpeciesWithValues } from "#app/editions/read.server.ts";
import { resolveEdition, resolveSpecies } from "#app/editions/resolve.server.ts";
import { answering, apiRoute, movedTo } from "#app/http/api.server.ts";
import { jsonAnswer } from "#app/http/caching.server.ts";
import { NotFound } from "#app/http/errors.ts";
import { requireKey } from "#app/people/apiKey.server.ts";

const api = apiRoute(
  answering(readSpecies, async ({ request, params }) => {
    await requireKey(request, "read");
    const resolved = await resolveEdition(params["edition"]);
    const { number } = resolved.edition;
    const asked = params["key"] ?? "";
    const detail = await resolveSpecies(number, asked);
    if (detail.key !== asked) return movedTo(apiPaths.oneSpecies(params["edition"] ?? number, detail.key));
    const { species, sources } = await findSpeciesWithValues(number, [detail]);
    const [found] = species;
    if (!found) throw new NotFound(`Edition ${number} has no species ${asked}.`);
    const body = { edition: number, ...apiSpecies(found.detail, found.values, sources) };
    return jsonAnswer(request, body, keepingOf(resolved, apiPaths.oneSpecies(number, detail.key)));
  }),
);

export const loader = api.loader;
export const action = api.action;
