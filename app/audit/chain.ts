import { createHash } from "node:crypto";
import canonicalize from "canonicalize";

/** An audit entry as it is hashed: every column but the hash itself, times as RFC 3339, bytes as hexadecimal. */
export interface ChainedEntry {
  number: number;
  at: string;
  actor: string | null;
  apiKeyId: string | null;
  act: string;
  objectKind: string;
  objectId: string;
  detail: unknown;
  requestId: string | null;
  previousHash: string;
}

/** What the first entry carries in place of the hash before it: 32 zero bytes. */
export const CHAIN_START = "0".repeat(64);

/** SHA-256 (hexadecimal) of the entry's RFC 8785 JSON. */
export function chainHash(entry: ChainedEntry): string {
  return createHash("sha256")
    .update(canonicalize(entry) ?? "")
    .digest("hex");
}
