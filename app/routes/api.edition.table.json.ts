import { keepingOf, tableFileAnswer } from "./api/answer.server.ts";
import { apiPaths } from "./api/shape.ts";
import { downloadTableJson } from "./api/contract.ts";
import { jsonFormat } from "./api/tableFormats.ts";
import { resolveEdition } from "#app/editions/resolve.server.ts";
import { answering, apiRoute } from "#app/http/api.server.ts";
import { requireKey } from "#app/people/apiKey.server.ts";

const api = apiRoute(
  answering(downloadTableJson, async ({ request, params }) => {
    await requireKey(request, "read");
    const resolved = await resolveEdition(params["edition"]);
    const { edition } = resolved;
    const { keeping, headers } = keepingOf(resolved, apiPaths.tableJson(edition.number));
    return tableFileAnswer(request, edition, keeping, headers, jsonFormat);
  }),
);

export const loader = api.loader;
export const action = api.action;
