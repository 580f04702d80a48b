import { resolveEdition } from "#app/editions/resolve.server.ts";
import { shownDescription, shownName } from "#app/editions/shownFile.ts";
import { shownCsv, shownJson } from "#app/editions/shownFile.server.ts";
import { streamOf } from "#app/editions/tableFile.server.ts";
import { withSources } from "#app/editions/tablePage.server.ts";
import { readTableQuery } from "#app/editions/tableQuery.ts";
import { NotFound } from "#app/http/errors.ts";
import { forPage } from "#app/http/respond.server.ts";
import { paths } from "#app/paths.ts";
import { requireActing } from "#app/people/visitor.server.ts";
import type { Route } from "./+types/table.shown";

/** What a filtered and sorted table shows, on all its pages, as a file. The address is the table's own with a file's name. */
export const loader = forPage(async ({ request, params }: Route.LoaderArgs) => {
  await requireActing(request, "table:read");
  const { edition } = await resolveEdition(params.edition);
  const n = edition.number;
  const { search, searchParams } = new URL(request.url);
  const query = await withSources(n, readTableQuery(searchParams));
  const headers = { "Cache-Control": "private, no-cache", "X-Content-Type-Options": "nosniff" };
  const saved = (extension: string) => ({
    "Content-Disposition": `attachment; filename="${shownName(n, query, extension)}"`,
  });
  switch (params.file) {
    case "shown.csv":
      return new Response(streamOf(shownCsv(edition, query)), {
        headers: {
          ...headers,
          ...saved("csv"),
          "Content-Type": "text/csv; charset=utf-8; header=present",
          Link: `<${paths.tableShown(n, "shown.csv-metadata.json")}${search}>; rel="describedby"; type="application/csvm+json"`,
        },
      });
    case "shown.json":
      return new Response(streamOf(shownJson(edition, query)), {
        headers: { ...headers, ...saved("json"), "Content-Type": "application/json" },
      });
    case "shown.csv-metadata.json":
      return new Response(JSON.stringify(shownDescription(edition, query, `shown.csv${search}`), null, 2), {
        headers: { ...headers, "Content-Type": "application/csvm+json" },
      });
    default:
      throw new NotFound("There is no such file of the table; it has shown.csv and shown.json.");
  }
});
