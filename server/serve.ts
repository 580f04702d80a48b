import { randomUUID } from "node:crypto";
import { createServer, type IncomingMessage, type RequestListener, type Server, type ServerResponse } from "node:http";
import type { Socket } from "node:net";
import express from "express";
import { type Config } from "#app/config.server.ts";
import { PROBLEM_TYPE, problemOf } from "#app/http/problem.ts";
import { log } from "#app/log.server.ts";
import { isApi, type Refusal, refusalOf } from "./front.ts";
import { setStandardHeaders } from "./headers.ts";

/** Time limits of a connection, in milliseconds. */
const HEADERS_TIMEOUT = 20_000;
/** A large sheet over a slow line takes minutes. */
const REQUEST_TIMEOUT = 10 * 60_000;
/** Longer than the minute that proxies usually keep a connection, so that they close it and not we. */
const KEEP_ALIVE_TIMEOUT = 65_000;
/** How long running requests may take to finish once the process is asked to stop. */
const GRACE = 8_000;

/** Thrown by `serve` when the address cannot be listened on; the sentence names the setting. */
export class ListenError extends Error {
  /** The exit code of a process that ends for this: 98, as the system numbers "address in use", else 1. */
  readonly exitCode: number;

  constructor(sentence: string, exitCode = 1) {
    super(sentence);
    this.exitCode = exitCode;
  }
}

/** What `serve` gives back. */
export interface Serving {
  server: Server;
  /** Stops listening, lets running requests finish for a while, then closes what is left. */
  close(): Promise<void>;
}

function answerRefusal(request: IncomingMessage, response: ServerResponse, refusal: Refusal, publicUrl: string): void {
  const requestId = randomUUID();
  setStandardHeaders(response, { publicUrl, requestId, nonce: null });
  for (const [name, value] of Object.entries(refusal.headers ?? {})) response.setHeader(name, value);
  response.setHeader("Cache-Control", "no-store");
  response.statusCode = refusal.status;
  log.info({ event: "request-refused", requestId, status: refusal.status, address: request.socket.remoteAddress });
  if (isApi(request.url ?? "")) {
    const problem = problemOf(refusal.kind, refusal.sentence, publicUrl, requestId);
    response.setHeader("Content-Type", PROBLEM_TYPE).end(JSON.stringify(problem));
  } else {
    response.setHeader("Content-Type", "text/plain; charset=utf-8").end(`${refusal.sentence}\n`);
  }
}

/** What could not even be parsed as HTTP is answered on the bare connection. */
function answerGarbage(error: Error & { code?: string }, socket: Socket): void {
  if (error.code === "ECONNRESET" || !socket.writable) {
    socket.destroy();
    return;
  }
  const status =
    error.code === "HPE_HEADER_OVERFLOW"
      ? "431 Request Header Fields Too Large"
      : error.code === "ERR_HTTP_REQUEST_TIMEOUT"
        ? "408 Request Timeout"
        : "400 Bad Request";
  socket.end(`HTTP/1.1 ${status}\r\nConnection: close\r\nContent-Length: 0\r\n\r\n`);
}

/** The first of the values that a list of proxies may have added. */
function first(header: string | string[] | undefined): string | undefined {
  return (Array.isArray(header) ? header[0] : header)?.split(",")[0]?.trim();
}

/**
 * Opens the HTTP server: refuses what must not come in, and hands on the rest.
 * @throws ListenError when the host or port cannot be listened on
 */
export async function serve(handler: RequestListener, settings: Config): Promise<Serving> {
  const { publicUrl, host, port } = settings;
  // Express compiles the list of trusted proxies; only its compiled form is used here.
  const trusts = express()
    .set("trust proxy", [...settings.trustedProxies])
    .get("trust proxy fn") as (address: string, hop: number) => boolean;

  const server = createServer((request, response) => {
    const trusted = trusts(request.socket.remoteAddress ?? "", 0);
    const refusal = refusalOf(
      {
        method: request.method ?? "",
        target: request.url ?? "",
        host: (trusted ? first(request.headers["x-forwarded-host"]) : undefined) ?? request.headers.host,
        plainHttp: trusted && first(request.headers["x-forwarded-proto"]) === "http",
        origin: request.headers.origin,
        fetchSite: first(request.headers["sec-fetch-site"]),
      },
      publicUrl,
    );
    if (refusal) answerRefusal(request, response, refusal, publicUrl);
    else handler(request, response);
  });
  server.headersTimeout = HEADERS_TIMEOUT;
  server.requestTimeout = REQUEST_TIMEOUT;
  server.keepAliveTimeout = KEEP_ALIVE_TIMEOUT;
  server.on("clientError", answerGarbage);

  await new Promise<void>((resolve, reject) => {
    server.once("error", (error: Error & { code?: string }) => reject(listenError(error, host, port)));
    server.listen(port, host, resolve);
  });
  return { server, close: () => close(server) };
}

function listenError(error: Error & { code?: string }, host: string, port: number): Error {
  if (error.code === "EADDRINUSE")
    return new ListenError(`PORT ${port} is taken by another program; set PORT to a free one.`, 98);
  if (error.code === "EACCES")
    return new ListenError(`PORT ${port} may not be used by this user; set PORT to one above 1023.`);
  if (error.code === "EADDRNOTAVAIL" || error.code === "ENOTFOUND") {
    return new ListenError(`HOST does not name an address of this machine (${host}).`);
  }
  return error;
}

async function close(server: Server): Promise<void> {
  const closed = new Promise<void>((resolve) => server.close(() => resolve()));
  server.closeIdleConnections();
  const deadline = setTimeout(() => server.closeAllConnections(), GRACE);
  // A connection that turns idle while we wait would otherwise be kept until its time runs out.
  const sweep = setInterval(() => server.closeIdleConnections(), 100);
  await closed;
  clearTimeout(deadline);
  clearInterval(sweep);
}
