import { CSL_TYPE, readSource } from "./api/contract.ts";
import { apiSource } from "./api/shape.ts";
import { findCurrentEdition } from "#app/editions/editions.server.ts";
import { findSources } from "#app/editions/read.server.ts";
import { answering, apiRoute } from "#app/http/api.server.ts";
import { textAnswer } from "#app/http/caching.server.ts";
import { NotFound } from "#app/http/errors.ts";
import { requireKey } from "#app/people/apiKey.server.ts";
import { quote } from "#app/thermo/reading.ts";

/** Whether a caller asks for the citation by itself; anything else is answered as JSON. */
const asksForCsl = (request: Request): boolean =>
  (request.headers.get("Accept") ?? "").split(",").some((one) => one.split(";")[0]?.trim().toLowerCase() === CSL_TYPE);

const api = apiRoute(
  answering(readSource, async ({ request, params }) => {
    await requireKey(request, "read");
    const id = params["source"] ?? "";
    const edition = (await findCurrentEdition()) ?? 0;
    const source = (await findSources(edition, [id])).get(id);
    if (!source) {
      throw new NotFound(
        edition === 0
          ? "No edition is published yet."
          : `Edition ${edition}, the newest, cites no source ${quote(id)}.`,
      );
    }
    const asked = { keeping: "asked", headers: { Vary: "Accept" } } as const;
    return asksForCsl(request)
      ? textAnswer(request, JSON.stringify({ ...source.citation, id, custom: { edition } }), {
          contentType: CSL_TYPE,
          ...asked,
        })
      : textAnswer(request, JSON.stringify({ edition, id, ...apiSource(source) }), {
          contentType: "application/json",
          ...asked,
        });
  }),
);

export const loader = api.loader;
export const action = api.action;
