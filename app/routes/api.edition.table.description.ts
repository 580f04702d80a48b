import { keepingOf } from "./api/answer.server.ts";
import { apiPaths } from "./api/shape.ts";
import { describeTable } from "./api/contract.ts";
import { resolveEdition } from "#app/editions/resolve.server.ts";
import { fileDescription } from "#app/editions/tableFile.ts";
import { findBesideTheLines } from "#app/editions/tableFile.server.ts";
import { answering, apiRoute } from "#app/http/api.server.ts";
import { textAnswer } from "#app/http/caching.server.ts";
import { requireKey } from "#app/people/apiKey.server.ts";

const api = apiRoute(
  answering(describeTable, async ({ request, params }) => {
    await requireKey(request, "read");
    const resolved = await resolveEdition(params["edition"]);
    const { edition } = resolved;
    const kept = keepingOf(resolved, apiPaths.tableDescription(edition.number));
    return textAnswer(request, JSON.stringify(fileDescription(edition, await findBesideTheLines(edition))), {
      contentType: "application/csvm+json",
      ...kept,
    });
  }),
);

export const loader = api.loader;
export const action = api.action;
