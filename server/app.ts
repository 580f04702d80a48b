import { randomBytes, randomUUID } from "node:crypto";
import type { ServerResponse } from "node:http";
import path from "node:path";
import { createRequestHandler } from "@react-router/express";
import compression from "compression";
import express, { type ErrorRequestHandler, type Request, type RequestHandler } from "express";
import { RouterContextProvider } from "react-router";
import * as build from "virtual:react-router/server-build";
import { config } from "#app/config.server.ts";
import { countPending } from "#app/db/schema.queries.server.ts";
import { database } from "#app/db/database.server.ts";
import { explained, type Problem, PROBLEM_TYPE, problemKinds, problemOf } from "#app/http/problem.ts";
import { type RequestFacts, requestContext } from "#app/http/requestContext.server.ts";
import { stopping } from "#app/http/stopping.server.ts";
import { log } from "#app/log.server.ts";
import { HEALTH, isApi } from "./front.ts";
import { setStandardHeaders } from "./headers.ts";

const YEAR = 365 * 24 * 60 * 60 * 1000;

/** The facts of each request on its way through. */
const factsOf = new WeakMap<Request, RequestFacts>();

function facts(request: Request): RequestFacts {
  const found = factsOf.get(request);
  if (!found) throw new Error("The request did not pass through `receive`.");
  return found;
}

/** Paths that carry a secret are logged without it. */
function loggedPath(path: string): string {
  return path.replace(/^\/(reset|invitation|address)\/[^/.]+/, "/$1/(left out)");
}

/** What a client may go on sending after it was answered, in bytes. */
const MOST_UNREAD = 32 * 1024 * 1024;

/**
 * A request may be answered before its body was read: a wrong key, a body that is too large. What is left of it is let run
 * out unread, because it stands in the way of the next request on the same connection; beyond the limit the connection
 * ends.
 */
function letRunOut(request: Request): void {
  if (request.complete || request.destroyed) return;
  let left = MOST_UNREAD;
  request.removeAllListeners("data").on("data", (portion: Buffer) => {
    left -= portion.length;
    if (left < 0) request.destroy();
  });
  request.resume();
}

/** First step: gives the request its id, the answer its headers, and writes one line in the log when it is over. */
const receive: RequestHandler = (request, response, next) => {
  const begun = performance.now();
  const isHealth = HEALTH.has(request.path);
  const isPage = !isHealth && !isApi(request.path) && !request.path.startsWith("/assets/");
  const known: RequestFacts = {
    id: randomUUID(),
    address: request.ip ?? "",
    nonce: randomBytes(18).toString("base64"),
    actor: null,
  };
  factsOf.set(request, known);
  // Acts put the id on record; whatever a client sent under this name is overwritten.
  request.headers["x-request-id"] = known.id;
  setStandardHeaders(response, {
    publicUrl: config().publicUrl,
    requestId: known.id,
    nonce: isPage ? known.nonce : null,
  });
  response.on("finish", () => letRunOut(request));
  const { method, path: requested } = request;
  // A balancer asks every few seconds; that is not worth a line.
  if (isHealth) return next();
  response.on("close", () => {
    log.info({
      event: "request",
      requestId: known.id,
      actor: known.actor,
      address: known.address,
      method,
      path: loggedPath(requested),
      status: response.statusCode,
      complete: response.writableFinished,
      milliseconds: Math.round(performance.now() - begun),
    });
  });
  next();
};

/**
 * Makes the request look as it does from outside. Every address is made from PUBLIC_URL, never from what the request or a
 * proxy says of it; the host was compared before.
 */
const seeFromOutside: RequestHandler = (request, _response, next) => {
  const own = new URL(config().publicUrl);
  request.headers.host = own.host;
  delete request.headers["x-forwarded-host"];
  Object.defineProperty(request, "protocol", { value: own.protocol.slice(0, -1) });
  next();
};

/** Written without Express, which would add a charset that JSON does not have. */
function sendProblem(response: ServerResponse, problem: Problem): void {
  response.statusCode = problem.status;
  response.setHeader("Content-Type", PROBLEM_TYPE).end(JSON.stringify(problem));
}

/** The framework's own way of fetching a page's data must not reach the API, which answers in its own form only. */
const keepFrameworkFromApi: RequestHandler = (request, response, next) => {
  if (!request.path.startsWith("/api/") || !request.path.endsWith(".data")) return next();
  sendProblem(
    response,
    problemOf("not-found", "There is nothing at this address.", config().publicUrl, facts(request).id),
  );
};

/** Alive: answers without touching anything else. */
const answerHealth: RequestHandler = (_request, response) => {
  response.set("Cache-Control", "no-store").json({ status: "ok" });
};

/** Ready to serve: the database answers and has this version's schema, and the process is not about to stop. */
const answerReadiness: RequestHandler = async (_request, response) => {
  response.set("Cache-Control", "no-store");
  const reason = await (async () => {
    if (stopping.aborted) return "stopping";
    try {
      return (await countPending(database())) === 0 ? undefined : "the database does not have this version's schema";
    } catch {
      return "the database does not answer";
    }
  })();
  response.status(reason ? 503 : 200).json(reason ? { status: "not ready", reason } : { status: "ready" });
};

/** Last step: whatever was thrown outside the framework becomes an answer that gives nothing away. */
const answerError: ErrorRequestHandler = (error: unknown, request, response, _next) => {
  const requestId = factsOf.get(request)?.id;
  const given = typeof error === "object" && error !== null && "status" in error ? Number(error.status) : 500;
  const status = given >= 400 && given < 500 ? given : 500;
  if (status === 500)
    log.error({ event: "unexpected-error", requestId, err: error }, "a request ended in an unexpected error");
  if (response.headersSent) {
    response.destroy();
    return;
  }
  const kind = status === 500 ? "unexpected" : status === 404 ? "not-found" : "bad-request";
  response.status(status).set("Cache-Control", "no-store");
  const { title } = problemKinds[kind]!;
  const sentence = explained(problemKinds[kind]!);
  if (isApi(request.originalUrl)) {
    const problem = problemOf(kind, sentence, config().publicUrl, requestId);
    sendProblem(response, { ...problem, status });
  } else {
    response.type("text/plain").send(`${title}. ${sentence}\nRequest ${requestId ?? "unknown"}\n`);
  }
};

function createApp(): express.Express {
  const app = express();
  app.disable("x-powered-by");
  app.disable("etag");
  app.set("trust proxy", [...config().trustedProxies]);
  app.use(receive);
  app.get("/healthz", answerHealth);
  app.get("/readyz", answerReadiness);
  app.use(keepFrameworkFromApi);
  // API answers keep their bytes, which their ETags are made from; event streams must not wait in a buffer.
  app.use(
    compression({
      filter: (request, response) =>
        !isApi(request.url) &&
        !String(response.getHeader("Content-Type") ?? "").startsWith("text/event-stream") &&
        compression.filter(request, response),
    }),
  );
  if (!import.meta.env.DEV) {
    const client = path.resolve(build.assetsBuildDirectory);
    const files = { index: false as const, redirect: false, etag: true };
    // File names under assets hold a hash of their content.
    app.use(
      "/assets",
      express.static(path.join(client, "assets"), { ...files, immutable: true, maxAge: YEAR, fallthrough: false }),
    );
    app.use(express.static(client, { ...files, maxAge: 0 }));
  }
  app.use(seeFromOutside);
  app.use(
    createRequestHandler({
      build,
      getLoadContext: (request) => {
        const context = new RouterContextProvider();
        context.set(requestContext, facts(request));
        return context;
      },
    }),
  );
  app.use(answerError);
  return app;
}

/** The application behind the front door: headers, files, pages, API. Rebuilt under `npm run dev` when a file changes. */
export const app = createApp();
