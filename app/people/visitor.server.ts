import { redirect } from "react-router";
import { Unauthenticated } from "#app/http/errors.ts";
import { paths } from "#app/paths.ts";
import { demand, type Permission } from "./permissions.ts";
import type { Acting, Person } from "./person.ts";
import { findHolder } from "./sessions.server.ts";
import { readSessionToken } from "./sessionCookie.server.ts";

/** The signed-in person behind a request. */
export interface Visitor extends Person {
  /** The session's id (the hash of its token in hexadecimal; no secret). */
  sessionId: string;
}

// All loaders of one page ask for the same request.
const found = new WeakMap<Request, Promise<Visitor | null>>();

/** Who is signed in; null when nobody is. Roles are those of this moment. The API never asks this: it takes keys only. */
export function findVisitor(request: Request): Promise<Visitor | null> {
  const known = found.get(request);
  if (known) return known;
  const asked = lookUp(request);
  found.set(request, asked);
  return asked;
}

async function lookUp(request: Request): Promise<Visitor | null> {
  const token = readSessionToken(request);
  const holder = token ? await findHolder(token) : null;
  return holder && { ...holder.person, sessionId: holder.sessionId };
}

/** The id that the server gave the request, for the record and the log. */
export function requestIdOf(request: Request): string | null {
  return request.headers.get("X-Request-Id");
}

/**
 * The first line of every loader and action that is not public: who acts, if they may.
 *
 * @throws a redirect to the sign-in page when nobody is signed in and a page was only to be read; Unauthenticated when
 *   nobody is signed in and something was to be changed; Forbidden when none of the person's roles holds the permission
 */
export async function requireActing(request: Request, permission: Permission): Promise<Acting> {
  const { acting } = await requireVisitor(request, permission);
  return acting;
}

/** As `requireActing`, with the session that the person is signed in with. */
export async function requireVisitor(
  request: Request,
  permission: Permission,
): Promise<{ acting: Acting; sessionId: string }> {
  const visitor = await findVisitor(request);
  if (!visitor) {
    if (request.method !== "GET" && request.method !== "HEAD") {
      throw new Unauthenticated("You are not signed in any more, so nothing was changed. Sign in, then do it again.");
    }
    throw redirect(paths.signIn(pathOf(request)));
  }
  const { sessionId, ...person } = visitor;
  const acting: Acting = { person, apiKeyId: null, requestId: requestIdOf(request) };
  demand(acting, permission);
  return { acting, sessionId };
}

/** The page that was asked for, without what the framework adds when it fetches only the page's data. */
function pathOf(request: Request): string | undefined {
  const { pathname, search } = new URL(request.url);
  const query = new URLSearchParams(search);
  query.delete("_routes");
  query.delete("index");
  const path = pathname.replace(/(?:^\/_root|\/_)?\.data$/, "") || "/";
  const text = query.toString();
  return path === "/" && text === "" ? undefined : `${path}${text === "" ? "" : `?${text}`}`;
}
