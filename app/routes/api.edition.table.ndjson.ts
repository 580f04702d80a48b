import { keepingOf, tableFileAnswer } from "./api/answer.server.ts";
import { apiPaths } from "./api/shape.ts";
import { downloadTableLines } from "./api/contract.ts";
import { linesFormat } from "./api/tableFormats.ts";
import { resolveEdition } from "#app/editions/resolve.server.ts";
import { answering, apiRoute } from "#app/http/api.server.ts";
import { requireKey } from "#app/people/apiKey.server.ts";

const api = apiRoute(
  answering(downloadTableLines, async ({ request, params }) => {
    await requireKey(request, "read");
    const resolved = await resolveEdition(params["edition"]);
    const { edition } = resolved;
    const { keeping, headers } = keepingOf(resolved, apiPaths.tableLines(edition.number));
    return tableFileAnswer(request, edition, keeping, headers, linesFormat);
  }),
);

export const loader = api.loader;
export const action = api.action;
