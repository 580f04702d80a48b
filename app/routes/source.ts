import { redirect } from "react-router";
import { findWhereSourceStands } from "#app/editions/sourcesPage.server.ts";
import { forPage } from "#app/http/respond.server.ts";
import { paths } from "#app/paths.ts";
import { requireActing } from "#app/people/visitor.server.ts";
import type { Route } from "./+types/source";

/** The address of a source without an edition leads to the newest edition's page of it, or to where it is proposed. */
export const loader = forPage(async ({ request, params }: Route.LoaderArgs) => {
  const where = await findWhereSourceStands(await requireActing(request, "table:read"), params.source);
  throw redirect("edition" in where ? paths.sourceIn(where.edition, params.source) : paths.revision(where.revisionId));
});
