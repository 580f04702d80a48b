import type { Database } from "#app/db/database.server.ts";
import { findEntries } from "./audit.queries.server.ts";
import { CHAIN_START, chainHash } from "./chain.ts";

const BATCH = 1000;

/**
 * Walks the record from its first entry and recomputes the chain. Answers one sentence for each entry that is missing,
 * changed or out of its place, and how many entries were read with the hash of the last.
 */
export async function verifyRecord(db: Database): Promise<{ faults: string[]; entries: number; head: string }> {
  const faults: string[] = [];
  let previousHash = CHAIN_START;
  let number = 0;
  for (;;) {
    const batch = await findEntries(number, BATCH, db);
    for (const entry of batch) {
      const found = Number(entry.number);
      if (found !== number + 1) faults.push(`Entry ${number + 1} of the record is missing.`);
      const carried = entry.previous_hash.toString("hex");
      if (carried !== previousHash) faults.push(`Entry ${found} does not follow the entry before it.`);
      const hash = chainHash({
        number: found,
        at: entry.at.toISOString(),
        actor: entry.actor,
        apiKeyId: entry.api_key_id,
        act: entry.act,
        objectKind: entry.object_kind,
        objectId: entry.object_id,
        detail: entry.detail,
        requestId: entry.request_id,
        previousHash: carried,
      });
      if (hash !== entry.hash.toString("hex")) faults.push(`Entry ${found} of the record was changed.`);
      previousHash = entry.hash.toString("hex");
      number = found;
    }
    if (batch.length < BATCH) return { faults, entries: number, head: previousHash };
  }
}
