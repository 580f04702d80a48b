/**
 * What is looked at before anything else sees a request: the method, the target, the host, and where it was sent from.
 * Pure, so that each rule is tested by itself.
 */

/** The parts of a request that decide whether it is let in. */
export interface Head {
  method: string;
  /** The request target as it came, for example "/editions?x=1". */
  target: string;
  /** The host asked for: the Host header, or X-Forwarded-Host when a trusted proxy gave one. */
  host: string | undefined;
  /** True when a trusted proxy says that the client came over plain http. */
  plainHttp: boolean;
  /** The Origin header: the site whose page made the browser send this. */
  origin?: string | undefined;
  /** The Sec-Fetch-Site header: how far that site is from ours. */
  fetchSite?: string | undefined;
}

/** Why a request is turned away. */
export interface Refusal {
  status: 400 | 403 | 405 | 308;
  kind: "bad-request" | "forbidden" | "method-not-allowed";
  sentence: string;
  headers?: Record<string, string>;
}

export const METHODS = ["GET", "HEAD", "POST", "PUT", "PATCH", "DELETE", "OPTIONS"];

const bad = (sentence: string): Refusal => ({ status: 400, kind: "bad-request", sentence });

/** Addresses that a load balancer asks for under whatever name it knows the machine by. */
export const HEALTH: ReadonlySet<string> = new Set(["/healthz", "/readyz"]);

function decodes(text: string): boolean {
  try {
    return !decodeURIComponent(text).includes("\0");
  } catch {
    return false;
  }
}

/** Whether the address is one for programs, so that a refusal is a problem document. "/api" itself is their guide, a page. */
export function isApi(target: string): boolean {
  return /^\/api\/+[^/?]/.test(target);
}

const SAFE_METHODS = new Set(["GET", "HEAD", "OPTIONS"]);
const OWN_SITES = new Set(["same-origin", "none"]);

/**
 * Whether a request that would change something was sent from another site. Browsers say where it comes from in
 * Sec-Fetch-Site and Origin; a program that sends neither holds no cookie that a browser would add for it. The API is left
 * out: it takes keys only, never the cookie.
 */
export function isForeign({ method, target, origin, fetchSite }: Head, publicUrl: string): boolean {
  if (SAFE_METHODS.has(method) || isApi(target)) return false;
  return (fetchSite !== undefined && !OWN_SITES.has(fetchSite)) || (origin !== undefined && origin !== publicUrl);
}

/**
 * Decides whether a request is let in.
 * @param publicUrl the service's own origin
 * @returns the refusal, or undefined when it is let in
 */
export function refusalOf(head: Head, publicUrl: string): Refusal | undefined {
  const { method, target, host } = head;
  const own = new URL(publicUrl);
  if (!METHODS.includes(method)) {
    return {
      status: 405,
      kind: "method-not-allowed",
      sentence: `This service does not answer the method ${method}.`,
      headers: { Allow: METHODS.join(", ") },
    };
  }
  const [path = "", ...query] = target.split("?");
  if (HEALTH.has(target)) return undefined;
  if (!target.startsWith("/") || target.startsWith("//") || /[\\\s]/.test(target)) {
    return bad("The address in the request is not a path of this service; it must begin with one slash.");
  }
  if (!decodes(path) || !decodes(query.join("?").replaceAll("+", " "))) {
    return bad("The address in the request holds a percent escape that is not valid UTF-8 text.");
  }
  if (!URL.canParse(target, publicUrl)) return bad("The address in the request cannot be read.");
  if (host?.toLowerCase() !== own.host) {
    return bad(`This service answers at ${own.host} only; the request asked for another host.`);
  }
  if (head.plainHttp && own.protocol === "https:") {
    // A program that sends its key in the clear must hear of it; a person is sent on to the right address.
    if (isApi(target) || !["GET", "HEAD"].includes(method)) {
      return bad(`Use ${own.origin}; this service does not answer over plain http.`);
    }
    return { ...bad("Use https."), status: 308, headers: { Location: own.origin + target } };
  }
  // The framework has a rule of its own for this, but for pages only, and it answers as if we had failed.
  if (isForeign(head, publicUrl)) {
    return {
      status: 403,
      kind: "forbidden",
      sentence: "This request came from another site, so nothing was changed. Open the page here and try again.",
    };
  }
  return undefined;
}
