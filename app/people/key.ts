/** What a key may be used for. */
export const SCOPES = ["read", "sheets:write"] as const;
export type Scope = (typeof SCOPES)[number];

/** What each scope lets a program do, in words, and the permission its owner must hold for it. */
export const scopeInfo = {
  read: { sentence: "Read the table, editions and comparisons.", permission: "table:read" },
  "sheets:write": { sentence: "Hand in property sheets and follow their reading.", permission: "sheet:work" },
} as const satisfies Record<Scope, { sentence: string; permission: string }>;

/** Longest and usual life of a key, in days. */
export const LONGEST_KEY_DAYS = 730;
export const USUAL_KEY_DAYS = 365;
/** Most keys in use that one person may hold. */
export const MOST_KEYS = 20;
/** How often at most the time of last use is written, in milliseconds. */
export const USED_EVERY = 60 * 1000;

/** A key as a program sends it, in its two parts. */
export interface KeyParts {
  id: string;
  secret: string;
}

/** Writes a key: a mark by which it is recognised, the public id, the secret. */
export function formatApiKey({ id, secret }: KeyParts): string {
  return `twk_${id}_${secret}`;
}

/** Reads a key; undefined when the text is none. */
export function readApiKey(text: string): KeyParts | undefined {
  const [, id, secret] = /^twk_([0-9a-z]{12})_([A-Za-z0-9_-]{43})$/.exec(text) ?? [];
  return id && secret ? { id, secret } : undefined;
}
