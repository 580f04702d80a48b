import { createHash } from "node:crypto";
import type { SeenPair } from "./revisionPage.ts";

/** SHA-256 over the lines of a list and the versions seen of them: what "accept the clean lines" is bound to. */
export function cleanDigest(seen: readonly SeenPair[]): string {
  const hash = createHash("sha256");
  for (const { lineId, versionId } of seen) hash.update(`${lineId}:${versionId}\n`);
  return hash.digest("hex");
}
