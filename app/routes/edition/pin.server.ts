import { redirect } from "react-router";
import type { Edition } from "#app/editions/editions.queries.server.ts";
import { findCurrentEdition } from "#app/editions/editions.server.ts";
import { resolveEdition } from "#app/editions/resolve.server.ts";
import { inEdition, paths } from "#app/paths.ts";

/**
 * The edition a page is pinned to. "current" in an address is only a way in: it leads to the same address with the
 * newest number, so that a link sent to a colleague shows the same numbers.
 * @throws a redirect; NotFound when there is no such edition
 */
export async function pinnedEdition(request: Request, text: string | undefined): Promise<Edition> {
  const { edition, isCurrent } = await resolveEdition(text);
  if (isCurrent) {
    const { pathname, search } = new URL(request.url);
    throw redirect(
      inEdition(pathname.replace(/\.data$/, "") + search, edition.number) ?? paths.edition(edition.number),
    );
  }
  return edition;
}

/** As `pinnedEdition`, for the page people begin at: null where "current" is asked for and nothing is published yet. */
export async function pinnedEditionOrNone(request: Request, text: string | undefined): Promise<Edition | null> {
  if (text === "current" && (await findCurrentEdition()) === null) return null;
  return pinnedEdition(request, text);
}
