import { data, redirect } from "react-router";
import { DomainError } from "#app/http/errors.ts";
import { readForm } from "#app/http/forms.server.ts";
import { requestContext } from "#app/http/requestContext.server.ts";
import { numberInPath, pageError } from "#app/http/respond.server.ts";
import { paths } from "#app/paths.ts";
import { requireActing, requireVisitor } from "#app/people/visitor.server.ts";
import type { Route } from "./+types/resources.revision.act";
import { actOnRevision } from "./revision/act.server.ts";
import type { Outcome } from "./revision/outcome.ts";

/** Whoever follows the address by hand is taken to the page. */
export async function loader({ request, params }: Route.LoaderArgs) {
  try {
    await requireActing(request, "revision:read");
    return redirect(paths.revision(numberInPath(params.revision)));
  } catch (error) {
    throw pageError(error);
  }
}

/** A form of a revision's page, sent in the background; answers with what came of it. */
export async function action({ request, params, context }: Route.ActionArgs) {
  try {
    const signer = {
      ...(await requireVisitor(request, "revision:read")),
      address: context.get(requestContext).address,
    };
    const outcome = await actOnRevision(signer, numberInPath(params.revision), await readForm(request));
    return data(outcome, { status: outcome.ok ? 200 : outcome.status });
  } catch (error) {
    if (!(error instanceof DomainError)) throw error;
    // The page stays as it is, with what was typed, and says the sentence.
    const { status, message: sentence } = error;
    const outcome: Outcome = { ok: false, status, intent: "", sentence, errors: {}, typed: {} };
    return data(outcome, { status });
  }
}
