/** The session's cookie. `__Host-` makes the browser insist on Secure, Path=/ and no Domain. */
export const SESSION_COOKIE = "__Host-tablewright";

const ATTRIBUTES = "Path=/; Secure; HttpOnly; SameSite=Lax";
const TOKEN = /^[A-Za-z0-9_-]{43}$/;

/** The token in a request's session cookie; null when there is none that could be one of ours. */
export function readSessionToken(request: Request): string | null {
  for (const part of (request.headers.get("Cookie") ?? "").split(";")) {
    const [name, value] = part.trim().split("=", 2);
    if (name === SESSION_COOKIE && value !== undefined && TOKEN.test(value)) return value;
  }
  return null;
}

/** The `Set-Cookie` header that hands a token to the browser. It forgets it when it is closed; the server, by its limits. */
export function sessionCookie(token: string): string {
  return `${SESSION_COOKIE}=${token}; ${ATTRIBUTES}`;
}

/** The `Set-Cookie` header that takes it back. */
export function endedSessionCookie(): string {
  return `${SESSION_COOKIE}=; ${ATTRIBUTES}; Max-Age=0`;
}
