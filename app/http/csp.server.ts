/**
 * The Content-Security-Policy of a page: scripts and styles are our own files, or carry this answer's nonce. Inline
 * `style` attributes are refused like inline scripts.
 *
 * @param nonce random for each answer, at least 128 bits, base64
 * @param development true under `npm run dev`, whose hot reload opens a web socket and writes style elements
 */
export function pagePolicy(nonce: string, development = false): string {
  return [
    "default-src 'none'",
    `script-src 'self' 'nonce-${nonce}'`,
    development ? "style-src 'self' 'unsafe-inline'" : `style-src 'self' 'nonce-${nonce}'`,
    "img-src 'self' data:",
    "font-src 'self'",
    development ? "connect-src 'self' ws:" : "connect-src 'self'",
    "manifest-src 'self'",
    "form-action 'self'",
    "base-uri 'none'",
    "object-src 'none'",
    "frame-ancestors 'none'",
  ].join("; ");
}

/** The policy of everything that is not a page: nothing may be loaded, run or framed. */
export const dataPolicy = "default-src 'none'; base-uri 'none'; object-src 'none'; frame-ancestors 'none'";
