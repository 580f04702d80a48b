import { createHash } from "node:crypto";

/**
 * How long an answer may be kept.
 * - `frozen`: an answer about a numbered edition, which never changes;
 * - `current`: the same body under the word "current", kept for moments only;
 * - `asked`: may change; may be kept, but is asked for again each time.
 */
export type Keeping = "frozen" | "current" | "asked";

const CACHE_CONTROL: Readonly<Record<Keeping, string>> = {
  frozen: "private, max-age=31536000, immutable",
  current: "private, max-age=30, must-revalidate",
  asked: "private, no-cache",
};

/** SHA-256 of the bytes of an answer, in the two spellings that headers want. */
export interface BodyDigest {
  /** The strong entity tag: the hash in hexadecimal, in quotes. */
  etag: string;
  /** RFC 9530 `Repr-Digest`. */
  reprDigest: string;
  length: number;
}

/** The digest from a finished hash and the number of bytes that went into it. */
export function bodyDigest(sha256: Buffer, length: number): BodyDigest {
  return { etag: `"${sha256.toString("hex")}"`, reprDigest: `sha-256=:${sha256.toString("base64")}:`, length };
}

/** Whether `If-None-Match` names the entity tag (RFC 9110, 13.1.2: weak comparison, `*` matches anything). */
export function isNoneMatch(header: string | null, etag: string): boolean {
  if (header === null) return false;
  if (header.trim() === "*") return true;
  // A tag may hold commas inside its quotes, so the list is read tag by tag.
  return [...header.matchAll(/(?:W\/)?("[^"]*")/g)].some((match) => match[1] === etag);
}

export interface AnswerHead {
  contentType: string;
  keeping: Keeping;
  /** Further headers, such as Content-Location or Link. */
  headers?: Readonly<Record<string, string>>;
}

/**
 * The answer to a GET or HEAD whose digest is known: 304 where the caller has it, else 200 with the body. HEAD gets the
 * same headers and no body.
 */
export function keptAnswer(
  request: Request,
  { contentType, keeping, headers }: AnswerHead,
  digest: BodyDigest,
  body: () => BodyInit,
): Response {
  const head = new Headers({ ETag: digest.etag, "Cache-Control": CACHE_CONTROL[keeping], ...headers });
  if (isNoneMatch(request.headers.get("If-None-Match"), digest.etag))
    return new Response(null, { status: 304, headers: head });
  head.set("Content-Type", contentType);
  head.set("Content-Length", String(digest.length));
  head.set("Repr-Digest", digest.reprDigest);
  return new Response(request.method === "HEAD" ? null : body(), { status: 200, headers: head });
}

function digestOf(bytes: Buffer): BodyDigest {
  return bodyDigest(createHash("sha256").update(bytes).digest(), bytes.length);
}

/**
 * The JSON answer to something that was sent. HTTP's caches keep nothing by the body of a request, so it tells them to
 * keep nothing; the hash of its bytes still shows that the same question got the same answer.
 */
export function sentAnswer(body: unknown, status: 200 | 201, headers: Readonly<Record<string, string>> = {}): Response {
  const bytes = Buffer.from(JSON.stringify(body), "utf8");
  return new Response(new Uint8Array(bytes), {
    status,
    headers: {
      "Content-Type": "application/json",
      "Content-Length": String(bytes.length),
      "Cache-Control": "private, no-store",
      "Repr-Digest": digestOf(bytes).reprDigest,
      ...headers,
    },
  });
}

/** Text as a kept answer. */
export function textAnswer(request: Request, text: string, head: AnswerHead): Response {
  const bytes = Buffer.from(text, "utf8");
  return keptAnswer(request, head, digestOf(bytes), () => new Uint8Array(bytes));
}

/** JSON as a kept answer. The order of members is the order in which they were put in, so equal bodies have equal bytes. */
export function jsonAnswer(request: Request, body: unknown, head: Omit<AnswerHead, "contentType">): Response {
  return textAnswer(request, JSON.stringify(body), { ...head, contentType: "application/json" });
}
