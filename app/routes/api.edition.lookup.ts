import { apiPaths, apiSpecies } from "./api/shape.ts";
import { type ApiLookupEntry, lookUpSpecies as contract, lookupQuestion } from "./api/contract.ts";
import { lookUpSpecies } from "#app/editions/lookup.server.ts";
import { resolveEdition } from "#app/editions/resolve.server.ts";
import { answering, apiRoute } from "#app/http/api.server.ts";
import { readJson } from "#app/http/body.server.ts";
import { sentAnswer } from "#app/http/caching.server.ts";
import { requireKey } from "#app/people/apiKey.server.ts";

/** A thousand items of three hundred characters fit, each written as an escape of six bytes. */
const LARGEST_QUESTION = 2_000_000;

const api = apiRoute(
  answering(contract, async ({ request, params }) => {
    await requireKey(request, "read");
    const { edition, isCurrent } = await resolveEdition(params["edition"]);
    const { number } = edition;
    const { species, phase, properties } = await readJson(request, lookupQuestion, LARGEST_QUESTION);
    const { entries, values, sources } = await lookUpSpecies(number, {
      species,
      phase: phase ?? null,
      properties: properties ?? null,
    });
    const answered = entries.map(({ asked, settled }): ApiLookupEntry => {
      switch (settled.outcome) {
        case "found": {
          const own = values.get(settled.species.speciesId) ?? [];
          const missing = [...new Set(properties)].filter(
            (property) => !own.some((value) => value.property === property),
          );
          return { asked, outcome: "found", species: apiSpecies(settled.species, own, sources), missing };
        }
        case "ambiguous":
          return {
            asked,
            outcome: "ambiguous",
            sentence: settled.sentence,
            candidates: settled.candidates.map(({ speciesId, key, name, cas }) => ({ id: speciesId, key, name, cas })),
          };
        case "unknown":
          return { asked, outcome: "unknown", sentence: settled.sentence };
      }
    });
    const named: Record<string, string> = isCurrent ? { "Content-Location": apiPaths.lookup(number) } : {};
    return sentAnswer({ edition: number, entries: answered }, 200, named);
  }),
);

export const loader = api.loader;
export const action = api.action;
