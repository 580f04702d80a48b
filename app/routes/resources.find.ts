import { data } from "react-router";
import { forPage } from "#app/http/respond.server.ts";
import { requireActing } from "#app/people/visitor.server.ts";
import { findEverything } from "#app/review/findPage.server.ts";
import type { Route } from "./+types/resources.find";
import { suggestionsOf } from "./find/suggestions.ts";

/** What the find box offers for what is typed so far; the page /find lists all of it. */
export const loader = forPage(async ({ request }: Route.LoaderArgs) => {
  const acting = await requireActing(request, "table:read");
  const typed = new URL(request.url).searchParams.get("q") ?? "";
  const found = await findEverything(acting, typed);
  return data(
    { text: found.text, suggestions: found.text === "" ? [] : suggestionsOf(found) },
    { headers: { "Cache-Control": "no-store" } },
  );
});
