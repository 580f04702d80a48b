import { data, redirect } from "react-router";
import { DomainError } from "#app/http/errors.ts";
import { readForm } from "#app/http/forms.server.ts";
import { forPage, numberInPath } from "#app/http/respond.server.ts";
import { paths } from "#app/paths.ts";
import { requireActing } from "#app/people/visitor.server.ts";
import type { Route } from "./+types/resources.sheet.repair";
import { repairFrom } from "./sheet/act.server.ts";
import type { RepairOutcome } from "./sheet/outcome.ts";

/** Whoever follows the address by hand is taken to the sheet. */
export const loader = forPage(async ({ request, params }: Route.LoaderArgs) => {
  await requireActing(request, "sheet:read");
  return redirect(paths.sheet(numberInPath(params.sheet)));
});

/** A cell mended in the background; the page then reads its rows again by itself. */
export async function action({ request, params }: Route.ActionArgs) {
  let outcome: RepairOutcome;
  let status = 200;
  try {
    const acting = await requireActing(request, "sheet:work");
    const said = await repairFrom(acting, numberInPath(params.sheet), await readForm(request));
    outcome = { ok: true, sentence: said };
  } catch (error) {
    if (!(error instanceof DomainError)) throw error;
    outcome = { ok: false, sentence: error.message };
    status = error.status;
  }
  return data(outcome, { status });
}
