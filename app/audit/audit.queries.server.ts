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

/** Which entries of the record are looked for; what is left out does not restrict. */
export interface RecordFilter {
  act?: string | undefined;
  objectKind?: string | undefined;
  objectId?: string | undefined;
  /** Part of the actor's name or address. */
  person?: string | undefined;
  /** From the beginning of this day on, UTC ("2026-03-12"). */
  from?: string | undefined;
  /** Up to the end of this day, UTC. */
  to?: string | undefined;
  /** Entries with a smaller number only: the page after. */
  before?: string | undefined;
}

/** Entries with the names of who acted, newest first. */
export function findRecord(filter: RecordFilter, limit: number, db: Database) {
  let query = db
    .selectFrom("audit_entry as e")
    .leftJoin("person as p", "p.id", "e.actor")
    .leftJoin("api_key as k", "k.id", "e.api_key_id")
    .select((eb) => [
      "e.number",
      "e.at",
      "e.act",
      "e.object_kind as objectKind",
      "e.object_id as objectId",
      "e.request_id as requestId",
      "p.name as person",
      "p.email",
      "k.name as keyName",
      eb.ref("e.detail").$castTo<Record<string, unknown>>().as("detail"),
      eb.fn<string>("encode", ["e.hash", sql.lit("hex")]).as("hash"),
    ]);
  const { act, objectKind, objectId, person, from, to, before } = filter;
  if (act) query = query.where("e.act", "=", act);
  if (objectKind) query = query.where("e.object_kind", "=", objectKind);
  if (objectId) query = query.where("e.object_id", "=", objectId);
  if (person) {
    // The text is looked for as it is: % and _ stand for themselves.
    const part = `%${person.replace(/[\\%_]/g, "\\$&")}%`;
    query = query.where((eb) => eb.or([eb("p.name", "ilike", part), eb("p.email", "ilike", part)]));
  }
  if (from) query = query.where("e.at", ">=", sql<Date>`${from}::date at time zone 'UTC'`);
  if (to) query = query.where("e.at", "<", sql<Date>`(${to}::date + 1) at time zone 'UTC'`);
  if (before) query = query.where("e.number", "<", before);
  return query.orderBy("e.number", "desc").limit(limit).execute();
}
