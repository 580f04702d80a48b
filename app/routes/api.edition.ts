import { apiEdition, apiPaths } from "./api/shape.ts";
import { readEdition } from "./api/contract.ts";
import { findCurrentEdition } from "#app/editions/editions.server.ts";
import { resolveEdition } from "#app/editions/resolve.server.ts";
import { answering, apiRoute } from "#app/http/api.server.ts";
import { jsonAnswer } from "#app/http/caching.server.ts";
import { requireKey } from "#app/people/apiKey.server.ts";

const api = apiRoute(
  answering(readEdition, async ({ request, params, publicUrl }) => {
    await requireKey(request, "read");
    const { edition, isCurrent } = await resolveEdition(params["edition"]);
    const { number } = edition;
    const newest = (await findCurrentEdition()) ?? number;
    const link = (path: string, relation: string): string => `<${publicUrl}${path}>; rel="${relation}"`;
    const neighbours = [
      ...(number > 1 ? [link(apiPaths.edition(number - 1), "predecessor-version")] : []),
      ...(number < newest ? [link(apiPaths.edition(number + 1), "successor-version")] : []),
      link(apiPaths.edition(newest), "latest-version"),
      link(apiPaths.editions(), "version-history"),
      `<https://spdx.org/licenses/${edition.licence}.html>; rel="license"`,
      `${link(apiPaths.tableDescription(number), "describedby")}; type="application/csvm+json"`,
    ];
    const body = { edition: number, ...apiEdition(edition, publicUrl) };
    return jsonAnswer(request, body, {
      keeping: "asked",
      headers: {
        Link: neighbours.join(", "),
        ...(isCurrent ? { "Content-Location": apiPaths.edition(number) } : {}),
      },
    });
  }),
);

export const loader = api.loader;
export const action = api.action;
