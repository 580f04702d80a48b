import { sql } from "kysely";
import type { Database } from "#app/db/database.server.ts";

/** How it comes that a source gives a value. */
export type SourceKind = "measurement" | "evaluation" | "calculation" | "estimate";

/** A source that values may be put down to. */
export interface ChoosableSource {
  sourceId: string;
  citation: Record<string, unknown>;
  doi: string | null;
  kind: SourceKind;
  notice: string | null;
  /** The open revision that proposes it; null when it stands in the edition. */
  revisionId: number | null;
  /** Whether it stands or waits accepted, so that a further revision need not propose it again. */
  named: boolean;
}

/** The sources of an edition, and those that an open revision proposes and no edition holds yet. */
export async function findChoosableSources(edition: number, db: Database): Promise<ChoosableSource[]> {
  const { rows } = await sql<ChoosableSource>`
    select d.source_id as "sourceId", d.citation, d.doi, d.kind, d.notice, null as "revisionId", true as named
      from source_detail d
     where d.since <= ${edition} and (d.until is null or d.until > ${edition})
    union all
    (select distinct on (l.source_id)
           l.source_id, v.content -> 'citation', v.content ->> 'doi', v.content ->> 'sourceKind', v.content ->> 'notice',
           l.revision_id, l.state = 'accepted'
      from revision_line l
      join lateral (select content from line_version where line_id = l.id order by version desc limit 1) v on true
     where l.kind = 'source' and l.state in ('open', 'accepted')
       and not exists (select from source_detail d where d.source_id = l.source_id
                          and d.since <= ${edition} and (d.until is null or d.until > ${edition}))
     order by l.source_id, l.state = 'accepted' desc, l.id)
    order by 1`.execute(db);
  return rows;
}

/** How many values of an edition rest on each source. */
export async function countValuesBySource(edition: number, db: Database): Promise<Map<string, number>> {
  const { rows } = await sql<{ sourceId: string; n: number }>`
    select source_id as "sourceId", count(*)::int as n from table_value
     where since <= ${edition} and (until is null or until > ${edition}) group by source_id`.execute(db);
  return new Map(rows.map((row) => [row.sourceId, row.n]));
}

/** Inserts the identity of a new source. */
export async function insertSource(id: string, trx: Database): Promise<void> {
  await trx.insertInto("source").values({ id }).execute();
}

/** The newest open revision that proposes a source; undefined where none does. */
export async function findProposalOfSource(sourceId: string, db: Database): Promise<number | undefined> {
  const row = await db
    .selectFrom("revision_line")
    .where("source_id", "=", sourceId)
    .where("state", "in", ["open", "accepted"])
    .select("revision_id as revisionId")
    .orderBy("id", "desc")
    .limit(1)
    .executeTakeFirst();
  return row?.revisionId;
}
