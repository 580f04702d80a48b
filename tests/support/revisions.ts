import { database } from "#app/db/database.server.ts";
import {
  findDetailsAsOf,
  findNewestEdition,
  findSourceDetailsAsOf,
  findValuesAsOf,
} from "#app/editions/editions.queries.server.ts";
import { insertPerson, replaceRoles } from "#app/people/people.queries.server.ts";
import type { Acting, Role } from "#app/people/person.ts";
import { beginRevision, type NewLine } from "#app/review/revise.server.ts";
import { sendToReview } from "#app/review/revise.server.ts";
import { acceptLines, closeReview, type SeenLine } from "#app/review/decide.server.ts";
import { findNextEdition, publishEdition } from "#app/review/publish.server.ts";
import { findLines, findWaitingForPlace } from "#app/review/review.queries.server.ts";
import {
  detailContentOf,
  type EditionRows,
  identityOf,
  insertSpecies,
  sourceContentOf,
  valueContentOf,
} from "./editions.ts";

/*
 * The review room driven as people drive it: by its acts. Lines are written against what stands and waits, as the intake
 * and the species page write them.
 */

/** A person of Calder Point with these roles, ready to act. */
export async function actor(name: string, ...roles: Role[]): Promise<Acting> {
  const email = `${name.toLowerCase().replace(/[^a-z]+/g, ".")}@calderpoint.example`;
  const id = await insertPerson({ email, name, passwordHash: null }, database());
  await replaceRoles(id, roles, null, database());
  return { person: { id, name, email, roles }, apiKeyId: null, requestId: null };
}

/** Begins a revision with these rows as its lines and answers its number. */
export async function propose(
  acting: Acting,
  rows: Omit<EditionRows, "notes" | "licence" | "withdraws">,
  title = "Rows for a test",
): Promise<number> {
  const db = database();
  const edition = (await findNewestEdition(db))?.number ?? 0;
  const details = new Map((await findDetailsAsOf(edition, {}, db)).map((detail) => [detail.key, detail]));
  const sources = new Map((await findSourceDetailsAsOf(edition, {}, db)).map((source) => [source.sourceId, source]));
  const ids = new Map([...details].map(([key, detail]) => [key, detail.speciesId]));
  const lines: NewLine[] = [];

  const add = async (
    line: Omit<NewLine, "rowNumber" | "againstRow" | "againstVersion">,
    standingRow: string | null,
  ) => {
    const waiting = await findWaitingForPlace(line, db);
    lines.push({
      ...line,
      rowNumber: null,
      againstRow: waiting ? null : standingRow,
      againstVersion: waiting?.versionId ?? null,
    });
  };

  for (const source of rows.sources ?? []) {
    const standing = sources.get(source.id);
    if (!standing) {
      await db
        .insertInto("source")
        .values({ id: source.id })
        .onConflict((oc) => oc.doNothing())
        .execute();
    }
    await add(
      { kind: "source", speciesId: null, property: null, sourceId: source.id, content: sourceContentOf(source) },
      standing?.rowId ?? null,
    );
  }
  for (const one of rows.species ?? []) {
    const standing = details.get(one.was ?? one.key);
    const id = standing?.speciesId ?? (await insertSpecies(identityOf(one.key), db));
    ids.set(one.key, id);
    await add(
      { kind: "detail", speciesId: id, property: null, sourceId: null, content: detailContentOf(one) },
      standing?.rowId ?? null,
    );
  }
  const idOf = (key: string): string => {
    const id = ids.get(key);
    if (!id) throw new Error(`propose: no species ${key}`);
    return id;
  };
  const standingValues = await findValuesAsOf(edition, {}, db);
  const rowOf = (speciesId: string, property: string) =>
    standingValues.find((value) => value.speciesId === speciesId && value.property === property)?.rowId ?? null;
  for (const value of rows.values ?? []) {
    const speciesId = idOf(value.key);
    await add(
      { kind: "value", speciesId, property: value.property, sourceId: null, content: valueContentOf(value) },
      rowOf(speciesId, value.property),
    );
  }
  for (const { key, property, reason } of rows.withdrawals ?? []) {
    const speciesId = idOf(key);
    await add(
      { kind: "withdrawal", speciesId, property, sourceId: null, content: { kind: "withdrawal", reason } },
      rowOf(speciesId, property),
    );
  }
  return beginRevision(acting, { title, summary: "", lines });
}

/** Every line of a revision as it reads now. */
export async function seenLines(revisionId: number): Promise<SeenLine[]> {
  return (await findLines(revisionId, database())).map((line) => ({ lineId: line.id, versionId: line.versionId }));
}

/** Sends a revision, accepts every line and closes the review. */
export async function acceptAll(steward: Acting, reviewer: Acting, revisionId: number): Promise<void> {
  await sendToReview(steward, revisionId, "");
  await acceptLines(reviewer, revisionId, await seenLines(revisionId));
  await closeReview(reviewer, revisionId);
}

/** Publishes what waits. */
export async function publishWaiting(
  reviewer: Acting,
  notes = "For a test.",
  withdraws: { edition: number; reason: string } | null = null,
) {
  const next = await findNextEdition();
  return publishEdition(reviewer, {
    expectedPrevious: next.previous,
    listDigest: next.digest,
    notes,
    licence: "CC-BY-4.0",
    withdraws: withdraws?.edition ?? null,
    withdrawalReason: withdraws?.reason ?? null,
  });
}
