import { createContext } from "react-router";

/** What the server knows of a request beside the request itself. */
export interface RequestFacts {
  /** The request's id: on the answer as X-Request-Id, in the log and in the record. */
  readonly id: string;
  /** Where it came from: the client's address as trusted proxies report it. */
  readonly address: string;
  /** The nonce of the answer's Content-Security-Policy. */
  readonly nonce: string;
  /** The id of the person who acts, put here for the log by whatever finds out who it is. */
  actor: string | null;
}

/** Filled by the server for every request; `context.get(requestContext)` in middleware, loaders and actions. */
export const requestContext = createContext<RequestFacts>();
