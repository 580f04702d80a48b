import type { RouterContextProvider } from "react-router";
import type { z } from "zod";
import { config } from "#app/config.server.ts";
import type { ApiOperation } from "./apiContract.ts";
import { Invalid, NotFound } from "./errors.ts";
import { requestContext } from "./requestContext.server.ts";
import { apiError, methodNotAllowed, readQuery } from "./respond.server.ts";

/** What the framework hands to a loader or action of an API address. */
interface ApiArgs {
  request: Request;
  params: Readonly<Record<string, string | undefined>>;
  context: Readonly<RouterContextProvider>;
}

/** A request that was read: parameters of the address and of the query, as the operation declares them. */
export interface ApiRequest<Query> {
  request: Request;
  params: Readonly<Record<string, string | undefined>>;
  query: Query;
  requestId: string;
  /** The service's own origin. */
  publicUrl: string;
}

/** One operation with what answers it. */
export interface ApiHandler {
  operation: ApiOperation;
  answer: (args: ApiArgs, requestId: string) => Promise<Response>;
}

/**
 * Binds an operation to the function that answers it. The query is read by the operation's own schema: an unknown parameter
 * or one given twice is 400, a value that does not fit is 422 with a pointer.
 */
export function answering<Query extends z.ZodObject>(
  operation: ApiOperation<Query>,
  answer: (api: ApiRequest<z.output<Query>>) => Promise<Response>,
): ApiHandler {
  return {
    operation,
    answer: async ({ request, params }, requestId) => {
      const given = readQuery(request, Object.keys(operation.query.shape));
      const parsed = operation.query.safeParse(given);
      if (!parsed.success) {
        const errors = parsed.error.issues.map((issue) => ({
          pointer: `/${issue.path.map(String).join("/")}`,
          detail: issue.message,
        }));
        throw new Invalid(
          `A parameter cannot be accepted: ${errors[0]?.pointer.slice(1)}: ${errors[0]?.detail}`,
          errors,
        );
      }
      return answer({ request, params, query: parsed.data, requestId, publicUrl: config().publicUrl });
    },
  };
}

/**
 * Makes the loader and action of an API address from its operations. Whatever happens inside, the caller gets the
 * operation's answer or a problem document: never HTML, never the framework's own JSON. HEAD is answered as GET without a
 * body, OPTIONS with the methods, every other method with 405. The server puts the request's id on every answer.
 */
export function apiRoute(...handlers: readonly ApiHandler[]) {
  const byMethod = new Map(handlers.map((handler) => [handler.operation.method.toUpperCase(), handler]));
  const allowed = [...byMethod.keys(), ...(byMethod.has("GET") ? ["HEAD"] : []), "OPTIONS"];

  async function respond(args: ApiArgs): Promise<Response> {
    const { request, context } = args;
    const { id } = context.get(requestContext);
    const response = await attempt(args, id);
    if (request.method !== "HEAD" || response.body === null) return response;
    await response.body.cancel();
    return new Response(null, { status: response.status, headers: response.headers });
  }

  async function attempt(args: ApiArgs, requestId: string): Promise<Response> {
    const { method } = args.request;
    try {
      if (method === "OPTIONS") return new Response(null, { status: 204, headers: { Allow: allowed.join(", ") } });
      const handler = byMethod.get(method === "HEAD" ? "GET" : method);
      if (!handler) return methodNotAllowed(method, allowed, requestId);
      return await handler.answer(args, requestId);
    } catch (error) {
      return apiError(error, requestId);
    }
  }

  return { loader: respond, action: respond };
}

/** The loader and action for every address under /api that is none. */
export function unknownApiRoute() {
  async function respond({ request, context }: ApiArgs): Promise<Response> {
    const { id } = context.get(requestContext);
    const { pathname } = new URL(request.url);
    const response = apiError(
      new NotFound(`There is nothing at ${pathname}. The addresses of the API stand in /api/v1/openapi.json.`),
      id,
    );
    return request.method === "HEAD"
      ? new Response(null, { status: response.status, headers: response.headers })
      : response;
  }
  return { loader: respond, action: respond };
}

/** A permanent redirect inside the site (308), which keeps the method. `path` is a path with its query. */
export function movedTo(path: string): Response {
  return new Response(null, { status: 308, headers: { Location: path, "Cache-Control": "private, no-cache" } });
}
