import type { z } from "zod";
import { BadRequest, Invalid, TooLarge, UnsupportedMedia } from "./errors.ts";

/** The media type of a request's body without its parameters, in small letters; empty where none is named. */
export function mediaTypeOf(request: Request): string {
  return (request.headers.get("Content-Type") ?? "").split(";", 1)[0]?.trim().toLowerCase() ?? "";
}

/**
 * The bytes of a body. The limit is held while it streams in: what goes beyond is not read.
 * @param limit in bytes
 * @param sentence what to say beyond it
 * @throws TooLarge
 */
export async function readBytes(request: Request, limit: number, sentence: string): Promise<Uint8Array> {
  if (Number(request.headers.get("Content-Length") ?? 0) > limit) throw new TooLarge(sentence);
  const reader = request.body?.getReader();
  const portions: Uint8Array[] = [];
  let length = 0;
  try {
    for (let next = await reader?.read(); next && !next.done; next = await reader?.read()) {
      length += next.value.length;
      // What is left is not cancelled, which would cut the connection off before the answer; the server lets it run out.
      if (length > limit) throw new TooLarge(sentence);
      portions.push(next.value);
    }
  } catch (error) {
    if (error instanceof TooLarge) throw error;
    throw new BadRequest("The body of the request arrived broken off. Send it again.");
  }
  return Buffer.concat(portions, length);
}

/**
 * A JSON body, read by its schema.
 * @throws UnsupportedMedia when it is sent as something else; TooLarge; BadRequest when it is no JSON; Invalid with a
 *   JSON Pointer to each value that does not fit
 */
export async function readJson<Body extends z.ZodType>(
  request: Request,
  schema: Body,
  limit: number,
): Promise<z.output<Body>> {
  if (mediaTypeOf(request) !== "application/json") {
    throw new UnsupportedMedia("Send the body as JSON, with Content-Type: application/json.");
  }
  const bytes = await readBytes(
    request,
    limit,
    `The body is larger than ${Math.floor(limit / 1_000_000)} MB. Ask for less at a time.`,
  );
  const parsed = schema.safeParse(parsedJson(bytes));
  if (parsed.success) return parsed.data;
  const errors = parsed.error.issues.slice(0, MOST_ERRORS).map((issue) => ({
    pointer: issue.path.map((part) => `/${String(part).replaceAll("~", "~0").replaceAll("/", "~1")}`).join(""),
    detail: issue.message,
  }));
  const [first] = errors;
  throw new Invalid(
    `The body cannot be accepted: ${first?.pointer ? `${first.pointer}: ` : ""}${first?.detail}`,
    errors,
  );
}

/** So many of what is wrong are named; more help nobody. */
const MOST_ERRORS = 50;

function parsedJson(bytes: Uint8Array): unknown {
  try {
    return JSON.parse(new TextDecoder("utf-8", { fatal: true }).decode(bytes));
  } catch {
    throw new BadRequest("The body is not JSON in UTF-8. Nothing was done.");
  }
}
