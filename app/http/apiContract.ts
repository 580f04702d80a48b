import type { z } from "zod";

/** The base of every address of the API, version 1. */
export const API_BASE = "/api/v1";

/** What an operation is about; the reference is grouped by it. */
export const API_GROUPS = {
  Editions: "What was published when, and what changed.",
  Species: "Species and their values as of an edition.",
  Tables: "A whole edition in one file.",
  Sources: "Where the numbers come from.",
  Sheets: "Handing in property sheets and following their reading.",
  Contract: "The contract itself.",
} as const;
export type ApiGroup = keyof typeof API_GROUPS;

/** Statuses beside its own that an operation may answer; 401, 403 and 405 go without saying. */
export type OtherStatus = 304 | 308 | 400 | 404 | 409 | 413 | 415 | 422;

/** What an operation reads from a request's body: one schema for each media type it takes. */
export interface ApiBody {
  description: string;
  content: Readonly<Record<string, { schema: z.ZodType; example?: unknown }>>;
}

/** What an operation answers when all goes well. */
export interface ApiAnswer<Body extends z.ZodType = z.ZodType> {
  description: string;
  mediaType: string;
  schema: Body;
  /** Further media types of the same address, chosen by the Accept header. */
  others?: Readonly<Record<string, z.ZodType>>;
  /** What 201 means, where the operation makes something. */
  created?: string;
}

/**
 * One operation of the API as the contract states it. The same schemas read the request, shape the answer and make the
 * OpenAPI document, so that none of the three can say something else.
 */
export interface ApiOperation<Query extends z.ZodObject = z.ZodObject, Body extends z.ZodType = z.ZodType> {
  /** Name in generated clients. */
  id: string;
  group: ApiGroup;
  method: "get" | "post";
  /** Under `API_BASE`, with `{parameters}` in braces. */
  path: string;
  summary: string;
  description: string;
  /** What stands in the braces. */
  parameters: z.ZodObject;
  /** Every query parameter the address knows; each may be given once. */
  query: Query;
  body?: ApiBody;
  answer: ApiAnswer<Body>;
  otherStatuses: readonly OtherStatus[];
  /** Headers of its answer beside those that every answer has. */
  headers?: readonly ("Link" | "Content-Disposition" | "Content-Location" | "Vary")[];
  /** The scope that its key needs; null where it answers without a key. */
  scope: "read" | "sheets:write" | null;
}

/** Declares an operation; the types of its schemas are kept. */
export function operation<Query extends z.ZodObject, Body extends z.ZodType>(
  declared: ApiOperation<Query, Body>,
): ApiOperation<Query, Body> {
  return declared;
}
