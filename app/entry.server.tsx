import { PassThrough } from "node:stream";
import { createReadableStreamFromReadable } from "@react-router/node";
import { isbot } from "isbot";
import { renderToPipeableStream } from "react-dom/server";
import {
  type EntryContext,
  type HandleErrorFunction,
  isRouteErrorResponse,
  type RouterContextProvider,
  ServerRouter,
} from "react-router";
import { NonceContext } from "#app/http/nonce.ts";
import { requestContext } from "#app/http/requestContext.server.ts";
import { log } from "#app/log.server.ts";

/** How long a loader that was not waited for may take before its part of the page is given up, in milliseconds. */
export const streamTimeout = 10_000;

/** Renders a page and streams it. Its inline scripts carry the nonce that the answer's policy names. */
export default function handleRequest(
  request: Request,
  status: number,
  headers: Headers,
  routerContext: EntryContext,
  context: RouterContextProvider,
): Promise<Response> | Response {
  headers.set("Content-Type", "text/html; charset=utf-8");
  // Pages show what the signed-in person may see; no cache may hand them to another.
  if (!headers.has("Cache-Control")) headers.set("Cache-Control", "private, no-store");
  if (request.method === "HEAD") return new Response(null, { status, headers });

  const { nonce } = context.get(requestContext);
  const waitForAll = isbot(request.headers.get("User-Agent") ?? "");
  return new Promise((resolve, reject) => {
    let answered = false;
    const begin = (): void => {
      answered = true;
      const body = new PassThrough({
        final(done) {
          clearTimeout(deadline);
          done();
        },
      });
      pipe(body);
      resolve(new Response(createReadableStreamFromReadable(body), { status, headers }));
    };
    const { pipe, abort } = renderToPipeableStream(
      <NonceContext value={nonce}>
        <ServerRouter context={routerContext} url={request.url} nonce={nonce} />
      </NonceContext>,
      {
        nonce,
        [waitForAll ? "onAllReady" : "onShellReady"]: begin,
        onShellError: reject,
        onError(error: unknown) {
          status = 500;
          // Before the shell the promise above is rejected, and handleError logs it.
          if (answered) logUnexpected(error, request, context);
        },
      },
    );
    const deadline = setTimeout(abort, streamTimeout + 1_000);
  });
}

function logUnexpected(error: unknown, request: Request, context: RouterContextProvider): void {
  const { id } = context.get(requestContext);
  log.error(
    { event: "unexpected-error", requestId: id, method: request.method, err: error },
    "a page ended in an unexpected error",
  );
}

/**
 * Called by the framework for every error that no route answered. A request that was given up is no error of ours, nor is
 * one that the framework itself refused (a form sent to a page that takes none).
 */
export const handleError: HandleErrorFunction = (error, { request, context }) => {
  if (isRouteErrorResponse(error) && error.status < 500) return;
  if (!request.signal.aborted) logUnexpected(error, request, context as RouterContextProvider);
};
