import type { ServerResponse } from "node:http";
import { dataPolicy, pagePolicy } from "#app/http/csp.server.ts";

const YEAR = 365 * 24 * 60 * 60;

/**
 * Sets the headers that every answer carries: pages, data, files and errors alike.
 *
 * @param nonce of this answer's policy when it may be a page; null for data and files
 */
export function setStandardHeaders(
  response: ServerResponse,
  { publicUrl, requestId, nonce }: { publicUrl: string; requestId: string; nonce: string | null },
): void {
  const headers: Record<string, string> = {
    "X-Request-Id": requestId,
    "Content-Security-Policy": nonce === null ? dataPolicy : pagePolicy(nonce, import.meta.env.DEV),
    "X-Content-Type-Options": "nosniff",
    "X-Frame-Options": "DENY",
    // Browsers keep the Origin of a form sent from our own page with this, which they would not with no-referrer.
    "Referrer-Policy": "same-origin",
    "Cross-Origin-Opener-Policy": "same-origin",
    "Cross-Origin-Resource-Policy": "same-origin",
    "Permissions-Policy": "camera=(), geolocation=(), microphone=(), payment=(), usb=()",
  };
  if (publicUrl.startsWith("https:")) headers["Strict-Transport-Security"] = `max-age=${YEAR}; includeSubDomains`;
  for (const [name, value] of Object.entries(headers)) response.setHeader(name, value);
}
