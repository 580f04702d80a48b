import { fileDescription } from "#app/editions/tableFile.ts";
import { findBesideTheLines } from "#app/editions/tableFile.server.ts";
import { textAnswer } from "#app/http/caching.server.ts";
import { forPage } from "#app/http/respond.server.ts";
import { requireActing } from "#app/people/visitor.server.ts";
import type { Route } from "./+types/table.description";
import { pinnedEdition } from "./edition/pin.server.ts";

/** What the columns of an edition's CSV mean, for programs that read tables (W3C CSVW). */
export const loader = forPage(async ({ request, params }: Route.LoaderArgs) => {
  await requireActing(request, "table:read");
  const edition = await pinnedEdition(request, params.edition);
  return textAnswer(request, JSON.stringify(fileDescription(edition, await findBesideTheLines(edition)), null, 2), {
    contentType: "application/csvm+json",
    keeping: "asked",
  });
});
