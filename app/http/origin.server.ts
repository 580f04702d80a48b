import { type MiddlewareFunction } from "react-router";
import { config } from "#app/config.server.ts";
import { log } from "#app/log.server.ts";
import { Forbidden } from "./errors.ts";
import { requestContext } from "./requestContext.server.ts";
import { pageError } from "./respond.server.ts";

const SAFE_METHODS = new Set(["GET", "HEAD", "OPTIONS"]);
const OWN_SITES = new Set(["same-origin", "none"]);

/**
 * Whether a request that would change something comes from another site. Browsers say where it comes from in
 * Sec-Fetch-Site and Origin; a program that sends neither holds no cookie that a browser would add for it. The API is left
 * out: it takes keys only, never the cookie.
 *
 * @param publicUrl the service's own origin
 */
export function isForeign(request: Request, publicUrl: string): boolean {
  if (SAFE_METHODS.has(request.method)) return false;
  const { pathname } = new URL(request.url);
  if (pathname === "/api" || pathname.startsWith("/api/")) return false;
  const site = request.headers.get("Sec-Fetch-Site");
  const origin = request.headers.get("Origin");
  return (site !== null && !OWN_SITES.has(site)) || (origin !== null && origin !== publicUrl);
}

/** Root middleware: refuses with 403 whatever another site would have a signed-in person's browser do. */
export const refuseForeignOrigin: MiddlewareFunction<Response> = ({ request, context }, next) => {
  if (isForeign(request, config().publicUrl)) {
    const { id, address } = context.get(requestContext);
    log.warn({ event: "foreign-origin-refused", requestId: id, address, path: new URL(request.url).pathname });
    throw pageError(
      new Forbidden("This request came from another site, so nothing was changed. Open the page here and try again."),
    );
  }
  return next();
};
