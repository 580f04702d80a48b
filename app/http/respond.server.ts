import { data } from "react-router";
import { config } from "#app/config.server.ts";
import { log } from "#app/log.server.ts";
import { BadRequest, DomainError, NotFound, TooMany, Unauthenticated } from "./errors.ts";
import { explained, type Problem, PROBLEM_TYPE, problemFrom, problemKinds, problemOf } from "./problem.ts";

/** What a page's error boundary gets: `error.data` of a route error response. */
export interface PageProblem {
  kind: string;
  title: string;
  /** The sentence: what happened and what to do. */
  detail: string;
}

/** The headers that belong to an error whatever shape the answer takes. */
function headersFor(error: DomainError): Record<string, string> {
  if (error instanceof TooMany) return { "Retry-After": String(error.retryAfter) };
  if (error instanceof Unauthenticated) return { "WWW-Authenticate": 'Bearer realm="Tablewright"' };
  return {};
}

/**
 * For pages: what to throw from a loader or action in the place of a caught error. Named errors become an answer with
 * their status, which the error boundary shows; anything else comes back as it was.
 *
 * @example
 * try { await submitRevision(…) } catch (error) { throw pageError(error); }
 */
export function pageError(error: unknown): unknown {
  if (!(error instanceof DomainError)) return error;
  const problem: PageProblem = { kind: error.kind, title: error.title, detail: error.message };
  const { "WWW-Authenticate": _forPrograms, ...headers } = headersFor(error);
  return data(problem, { status: error.status, headers });
}

/**
 * Makes a page's loader or action: named errors leave it as answers with their status, redirects and the unexpected as
 * they are.
 *
 * @example
 * export const loader = forPage(async ({ request }: Route.LoaderArgs) => { await requireActing(request, "table:read"); … });
 */
export function forPage<Args, Answer>(work: (args: Args) => Promise<Answer>): (args: Args) => Promise<Answer> {
  return async (args) => {
    try {
      return await work(args);
    } catch (error) {
      throw pageError(error);
    }
  };
}

/** An answer that carries a problem document and is not kept by any cache. */
export function problemResponse(problem: Problem, headers: Record<string, string> = {}): Response {
  return new Response(JSON.stringify(problem), {
    status: problem.status,
    headers: { "Content-Type": PROBLEM_TYPE, "Cache-Control": "no-store", ...headers },
  });
}

/**
 * For the API: the answer to a caught error. Named errors become their problem document; a thrown `Response` is passed on;
 * anything else is logged and answered with a document that gives nothing away.
 */
export function apiError(error: unknown, requestId?: string): Response {
  const { publicUrl } = config();
  if (error instanceof Response) return error;
  if (error instanceof DomainError) {
    return problemResponse(problemFrom(error, publicUrl, requestId), headersFor(error));
  }
  log.error({ event: "unexpected-error", requestId, err: error }, "an API request ended in an unexpected error");
  return problemResponse(problemOf("unexpected", explained(problemKinds["unexpected"]!), publicUrl, requestId));
}

/** For the API: 405 with the methods that the address does answer. */
export function methodNotAllowed(method: string, allowed: readonly string[], requestId?: string): Response {
  const detail = `This address does not answer ${method}; it answers ${allowed.join(", ")}.`;
  return problemResponse(problemOf("method-not-allowed", detail, config().publicUrl, requestId), {
    Allow: allowed.join(", "),
  });
}

/**
 * Reads the one path parameter as a positive whole number.
 * @throws NotFound when it is none, because then nothing can stand at that address
 */
export function numberInPath(text: string | undefined): number {
  const number = /^[1-9]\d{0,8}$/.test(text ?? "") ? Number(text) : undefined;
  if (number === undefined) throw new NotFound("There is nothing at this address.");
  return number;
}

/**
 * Reads query parameters from a fixed list.
 * @returns each parameter that was given, as text
 * @throws BadRequest for an unknown parameter or one given twice
 */
export function readQuery<Name extends string>(
  request: Request,
  allowed: readonly Name[],
): Partial<Record<Name, string>> {
  const found: Partial<Record<Name, string>> = {};
  for (const [name, value] of new URL(request.url).searchParams) {
    const known = allowed.find((one) => one === name);
    if (known === undefined) {
      const list = allowed.length > 0 ? `it knows ${allowed.join(", ")}` : "it takes none";
      throw new BadRequest(`This address does not know the parameter "${name}"; ${list}.`);
    }
    if (Object.hasOwn(found, known)) throw new BadRequest(`The parameter "${name}" is given twice; give it once.`);
    found[known] = value;
  }
  return found;
}
