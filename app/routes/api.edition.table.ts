import { keepingOf, tableFileAnswer } from "./api/answer.server.ts";
import { apiPaths } from "./api/shape.ts";
import { downloadTable } from "./api/contract.ts";
import { resolveEdition } from "#app/editions/resolve.server.ts";
import { answering, apiRoute } from "#app/http/api.server.ts";
import { requireKey } from "#app/people/apiKey.server.ts";

const api = apiRoute(
  answering(downloadTable, async ({ request, params }) => {
    await requireKey(request, "read");
    const resolved = await resolveEdition(params["edition"]);
    const { number } = resolved.edition;
    const { keeping, headers } = keepingOf(resolved, apiPaths.table(number));
    return tableFileAnswer(request, resolved.edition, keeping, {
      Link: `<${apiPaths.tableDescription(number)}>; rel="describedby"; type="application/csvm+json"`,
      ...headers,
    });
  }),
);

export const loader = api.loader;
export const action = api.action;
