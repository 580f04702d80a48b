import { resolveEdition } from "#app/editions/resolve.server.ts";
import { streamSourceFile } from "#app/editions/sourceFile.server.ts";
import { findSourceIn } from "#app/editions/sourcesPage.server.ts";
import { forPage } from "#app/http/respond.server.ts";
import { paths } from "#app/paths.ts";
import { requireActing } from "#app/people/visitor.server.ts";
import type { Route } from "./+types/edition.source.values";

/** The values of an edition that lean on one source, as lines of that edition's CSV. */
export const loader = forPage(async ({ request, params }: Route.LoaderArgs) => {
  await requireActing(request, "table:read");
  const { edition } = await resolveEdition(params.edition);
  const source = await findSourceIn(edition, params.source);
  return new Response(streamSourceFile(edition.number, source), {
    headers: {
      "Content-Type": "text/csv; charset=utf-8; header=present",
      "Content-Disposition": `attachment; filename="tablewright-edition-${edition.number}-${source.sourceId}.csv"`,
      Link: `<${paths.tableDescription(edition.number)}>; rel="describedby"; type="application/csvm+json"`,
      "Cache-Control": "private, no-cache",
    },
  });
});
