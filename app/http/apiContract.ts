import type { z } from "zod";

/** The base of every address of the API, version 1. */
export const API_BASE = "/api/v1";

/**
 * One operation of the API as the contract states it. The same schemas read the request, shape the answer and make the
 * OpenAPI document, so that none of the three can say something else.
 */
export interface ApiOperation<Query extends z.ZodObject = z.ZodObject, Body extends z.ZodType = z.ZodType> {
  /** Name in generated clients. */
  id: string;
  method: "get" | "post";
  /** Under `API_BASE`, with `{parameters}` in braces. */
  path: string;
  summary: string;
  description: string;
  /** What stands in the braces. */
  parameters: z.ZodObject;
  /** Every query parameter the address knows; each may be given once. */
  query: Query;
  answer: { description: string; mediaType: string; schema: Body };
  /** Statuses other than 200, 401, 403 and 405 that it answers. */
  otherStatuses: readonly (304 | 308 | 400 | 404 | 422)[];
  /** Whether it answers without a key. */
  open?: boolean;
}

/** Declares an operation; the types of its schemas are kept. */
export function operation<Query extends z.ZodObject, Body extends z.ZodType>(
  declared: ApiOperation<Query, Body>,
): ApiOperation<Query, Body> {
  return declared;
}
