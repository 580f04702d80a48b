import { data } from "react-router";
import { forPage, numberInPath } from "#app/http/respond.server.ts";
import { findProgress } from "#app/intake/sheetPage.server.ts";
import { requireActing } from "#app/people/visitor.server.ts";
import type { Route } from "./+types/resources.sheet.progress";

/** How far the reading of a sheet is; the page asks every second while it goes on. */
export const loader = forPage(async ({ request, params }: Route.LoaderArgs) => {
  const acting = await requireActing(request, "sheet:read");
  return data(await findProgress(acting, numberInPath(params.sheet)), { headers: { "Cache-Control": "no-store" } });
});
