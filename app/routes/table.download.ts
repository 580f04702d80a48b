import { resolveEdition } from "#app/editions/resolve.server.ts";
import { forPage } from "#app/http/respond.server.ts";
import { paths } from "#app/paths.ts";
import { requireActing } from "#app/people/visitor.server.ts";
import type { Route } from "./+types/table.download";
import { tableFileAnswer } from "./api/answer.server.ts";

/** The file of an edition for a signed-in person: the same bytes as the API's, by the session. */
export const loader = forPage(async ({ request, params }: Route.LoaderArgs) => {
  await requireActing(request, "table:read");
  const { edition } = await resolveEdition(params.edition);
  return tableFileAnswer(request, edition, "asked", {
    Link: `<${paths.tableDescription(edition.number)}>; rel="describedby"; type="application/csvm+json"`,
  });
});
