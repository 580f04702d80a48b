import { keepingOf } from "#app/editions/apiAnswer.server.ts";
import { apiPaths } from "#app/editions/apiShape.ts";
import { downloadTable } from "#app/editions/contract.ts";
import { resolveEdition } from "#app/editions/resolve.server.ts";
import { tableFileAnswer } from "#app/editions/tableFile.server.ts";
import { answering, apiRoute } from "#app/http/api.server.ts";
import { requireKey } from "#app/people/apiKey.server.ts";

export const { loader, action } = apiRoute(
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
