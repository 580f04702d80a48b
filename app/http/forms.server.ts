import { BadRequest, TooLarge, UnsupportedMedia } from "./errors.ts";

/** Largest form without a file, in bytes: a comment of any sensible length fits many times. */
const LARGEST_FORM = 1024 * 1024;

const FORM_TYPES = ["application/x-www-form-urlencoded", "multipart/form-data"];

/**
 * Reads the body of a page's form, every field as text. Uploads have their own reader; a file in this form is refused.
 *
 * @throws UnsupportedMedia when the body is not a form, TooLarge beyond 1 MB, BadRequest when it is broken or holds NUL
 */
export async function readForm(request: Request): Promise<FormData> {
  const type = (request.headers.get("Content-Type") ?? "").split(";", 1)[0]!.trim().toLowerCase();
  if (!FORM_TYPES.includes(type)) {
    throw new UnsupportedMedia("This page reads forms only. Fill in the form on the page and send it from there.");
  }
  const bytes = await readBytes(request, LARGEST_FORM);
  const form = await new Response(bytes, { headers: { "Content-Type": request.headers.get("Content-Type")! } })
    .formData()
    .catch(() => {
      throw new BadRequest("The form arrived broken off or damaged, so nothing was changed. Send it again.");
    });
  for (const [name, value] of form) {
    if (typeof value !== "string") throw new BadRequest("This form takes no file. Send it without one.");
    // PostgreSQL cannot store NUL in text, and nobody can type it.
    if (name.includes("\0") || value.includes("\0")) {
      throw new BadRequest("A field of the form holds the character NUL, which no text has. Remove it and send again.");
    }
  }
  return form;
}

/**
 * Reads a body whole, giving up as soon as it exceeds `limit` bytes.
 * @throws TooLarge, or BadRequest when the connection breaks off
 */
export async function readBytes(request: Request, limit: number): Promise<Uint8Array<ArrayBuffer>> {
  const tooLarge = (): TooLarge =>
    new TooLarge(`What was sent is larger than ${Math.floor(limit / 1024)} kB, which is the most this address takes.`);
  if (Number(request.headers.get("Content-Length") ?? 0) > limit) throw tooLarge();
  const chunks: Uint8Array[] = [];
  let size = 0;
  const reader = request.body?.getReader();
  while (reader) {
    const { done, value } = await reader.read().catch(() => {
      throw new BadRequest("The request broke off before its end, so nothing was changed. Send it again.");
    });
    if (done) break;
    size += value.byteLength;
    if (size > limit) {
      await reader.cancel();
      throw tooLarge();
    }
    chunks.push(value);
  }
  const bytes = new Uint8Array(size);
  let offset = 0;
  for (const chunk of chunks) {
    bytes.set(chunk, offset);
    offset += chunk.byteLength;
  }
  return bytes;
}

/**
 * Reads a JSON body.
 * @throws UnsupportedMedia when it is not JSON, TooLarge beyond `limit` bytes, BadRequest when it does not parse
 */
export async function readJson(request: Request, limit: number = LARGEST_FORM): Promise<unknown> {
  const type = (request.headers.get("Content-Type") ?? "").split(";", 1)[0]!.trim().toLowerCase();
  if (type !== "application/json") throw new UnsupportedMedia("Send the body as application/json.");
  const bytes = await readBytes(request, limit);
  let text: string;
  try {
    text = new TextDecoder("utf-8", { fatal: true }).decode(bytes);
  } catch {
    throw new BadRequest("The body is not valid UTF-8.");
  }
  if (/\\u0000/.test(text)) throw new BadRequest("The body holds the character NUL (\\u0000), which no text has.");
  try {
    return JSON.parse(text) as unknown;
  } catch {
    throw new BadRequest("The body is not valid JSON.");
  }
}
