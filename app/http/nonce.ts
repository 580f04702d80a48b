import { createContext, useContext } from "react";

/**
 * The nonce of this answer's Content-Security-Policy. The server entry provides it while rendering; in the browser it is
 * undefined, because the browser hides nonces from scripts and nothing new needs one there.
 */
export const NonceContext = createContext<string | undefined>(undefined);

/** The nonce for inline scripts of this answer, if there is one. */
export function useNonce(): string | undefined {
  return useContext(NonceContext);
}
