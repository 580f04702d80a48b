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
  const last = await findRecordHead(trx);
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
  /** The id of who acted; null for the system itself and the command line. */
  actor?: string | null | undefined;
  /** From the beginning of this day on, UTC ("2026-03-12"). */
  from?: string | undefined;
  /** Up to the end of this day, UTC. */
  to?: string | undefined;
  /** Entries with a smaller number only: the page after. */
  before?: string | undefined;
}

function filtered(filter: RecordFilter, db: Database) {
  const { act, objectKind, objectId, actor, from, to, before } = filter;
  return db
    .selectFrom("audit_entry as e")
    .leftJoin("person as p", "p.id", "e.actor")
    .leftJoin("api_key as k", "k.id", "e.api_key_id")
    .$if(act !== undefined, (query) => query.where("e.act", "=", act!))
    .$if(objectKind !== undefined, (query) => query.where("e.object_kind", "=", objectKind!))
    .$if(objectId !== undefined, (query) => query.where("e.object_id", "=", objectId!))
    .$if(actor === null, (query) => query.where("e.actor", "is", null))
    .$if(typeof actor === "string", (query) => query.where("e.actor", "=", actor!))
    .$if(from !== undefined, (query) => query.where("e.at", ">=", sql<Date>`${from}::date at time zone 'UTC'`))
    .$if(to !== undefined, (query) => query.where("e.at", "<", sql<Date>`(${to}::date + 1) at time zone 'UTC'`))
    .$if(before !== undefined, (query) => query.where("e.number", "<", before!));
}

/** Entries with the names of who acted and of whom they acted on, newest first. */
export function findRecord(filter: RecordFilter, limit: number, db: Database) {
  return filtered(filter, db)
    .select((eb) => [
      "e.number",
      "e.at",
      "e.actor",
      "e.act",
      "e.object_kind as objectKind",
      "e.object_id as objectId",
      "e.request_id as requestId",
      "p.name as person",
      "k.name as keyName",
      eb.ref("e.detail").$castTo<Record<string, unknown>>().as("detail"),
      eb.fn<string>("encode", ["e.hash", sql.lit("hex")]).as("hash"),
      eb.fn<string>("encode", ["e.previous_hash", sql.lit("hex")]).as("previousHash"),
      eb
        .case()
        .when("e.object_kind", "=", "person")
        .then(
          eb
            .selectFrom("person as o")
            .select("o.name")
            .where(sql<string>`o.id::text`, "=", eb.ref("e.object_id")),
        )
        .when("e.object_kind", "=", "key")
        .then(eb.selectFrom("api_key as o").select("o.name").whereRef("o.id", "=", "e.object_id"))
        .end()
        .as("objectName"),
    ])
    .orderBy("e.number", "desc")
    .limit(limit)
    .execute();
}

/** The newest entry's number and hash; undefined while the record is empty. */
export function findRecordHead(db: Database): Promise<{ number: string; hash: Buffer } | undefined> {
  return db.selectFrom("audit_entry").select(["number", "hash"]).orderBy("number", "desc").limit(1).executeTakeFirst();
}

/** How many entries fit. */
export async function countRecord(filter: RecordFilter, db: Database): Promise<number> {
  const { count } = await filtered(filter, db)
    .select(({ fn }) => fn.countAll<string>().as("count"))
    .executeTakeFirstOrThrow();
  return Number(count);
}

/** Whole entries that fit, with the names of who acted, oldest first, after a number. */
export function findRecordFrom(filter: RecordFilter, after: number, limit: number, db: Database) {
  return filtered(filter, db)
    .selectAll("e")
    .select("p.name as person")
    .where("e.number", ">", String(after))
    .orderBy("e.number")
    .limit(limit)
    .execute();
}

/** Everybody who has an entry of their own doing, by name. */
export function findActors(db: Database): Promise<{ id: string; name: string }[]> {
  return db
    .selectFrom("person")
    .where(({ exists, selectFrom }) =>
      exists(selectFrom("audit_entry").select("number").whereRef("audit_entry.actor", "=", "person.id")),
    )
    .select(["id", "name"])
    .orderBy("name")
    .orderBy("email")
    .limit(1000)
    .execute();
}
