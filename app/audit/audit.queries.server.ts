import { sql } from "kysely";
import type { Database } from "#app/db/database.server.ts";
import { CHAIN_START, chainHash } from "./chain.ts";

/** An entry ready to be chained. */
export interface NewEntry {
  actor: string | null;
  apiKeyId: string | null;
  act: string;
  objectKind: string;
  objectId: string;
  detail: Record<string, unknown>;
  requestId: string | null;
}

const CHAIN_LOCK = 7270918;

/**
 * Appends entries to the chain. Call it as the last thing of a transaction: it holds the chain's lock until commit, so
 * that numbers have no gaps and every entry carries the hash of the one before.
 */
export async function insertEntries(entries: readonly NewEntry[], trx: Database): Promise<void> {
  if (entries.length === 0) return;
  await sql`select pg_advisory_xact_lock(${CHAIN_LOCK})`.execute(trx);
  const last = await trx
    .selectFrom("audit_entry")
    .select(["number", "hash"])
    .orderBy("number", "desc")
    .limit(1)
    .executeTakeFirst();
  const now = await sql<{ at: Date }>`select date_trunc('milliseconds', clock_timestamp()) as at`.execute(trx);
  const at = now.rows[0]?.at ?? new Date(0);
  let number = Number(last?.number ?? 0);
  let previousHash = last ? last.hash.toString("hex") : CHAIN_START;
  const rows = entries.map((entry) => {
    number += 1;
    // The detail is hashed as JSON gives it back, so that undefined members and dates cannot make a difference later.
    const detail = JSON.parse(JSON.stringify(entry.detail)) as Record<string, unknown>;
    const hash = chainHash({ ...entry, number, at: at.toISOString(), detail, previousHash });
    const row = {
      number,
      at,
      actor: entry.actor,
      api_key_id: entry.apiKeyId,
      act: entry.act,
      object_kind: entry.objectKind,
      object_id: entry.objectId,
      detail: JSON.stringify(detail),
      request_id: entry.requestId,
      previous_hash: Buffer.from(previousHash, "hex"),
      hash: Buffer.from(hash, "hex"),
    };
    previousHash = hash;
    return row;
  });
  await trx.insertInto("audit_entry").values(rows).execute();
}

/** Entries from number `after` on, oldest first. */
export function findEntries(after: number, limit: number, db: Database) {
  return db
    .selectFrom("audit_entry")
    .selectAll()
    .where("number", ">", String(after))
    .orderBy("number")
    .limit(limit)
    .execute();
}
