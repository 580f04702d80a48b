import { act, type ActScope } from "#app/audit/act.server.ts";
import { database } from "#app/db/database.server.ts";
import { Forbidden, Invalid, NotFound, Refused } from "#app/http/errors.ts";
import { findEdition, findNewestEdition } from "#app/editions/editions.queries.server.ts";
import { enqueueLetter } from "#app/notify/letters.server.ts";
import { editionPublishedLetter } from "#app/notify/reviewLetters.ts";
import { findAccount } from "#app/people/people.queries.server.ts";
import { demand } from "#app/people/permissions.ts";
import type { Acting } from "#app/people/person.ts";
import { keepExamination, findingsOf } from "./examine.server.ts";
import { listDigest } from "./nextEdition.ts";
import {
  insertDetails,
  insertSources,
  insertValues,
  updateDetailsOut,
  updateSourcesOut,
  updateValuesOut,
} from "./publish.queries.server.ts";
import {
  findLineBases,
  findLinesWithHandOf,
  findRevision,
  findSetAside,
  findWaitingLines,
  type LineRow,
  openEdition,
  sealEdition,
  updateLinesPublished,
} from "./review.queries.server.ts";
import { isOvertaken } from "./revise.server.ts";

/** What a publisher says and what they saw when they said it. */
export interface PublicationRequest {
  /** Number of the edition that was the newest when the list was shown; 0 before the first. */
  expectedPrevious: number;
  /** Digest of the list that was shown (`listDigest`). */
  listDigest: string;
  notes: string;
  /** SPDX licence identifier. */
  licence: string;
  /** An older edition that this one withdraws, with the reason. */
  withdraws: number | null;
  withdrawalReason: string | null;
}

/** What is ready for the next edition, as the publisher is shown it. */
export interface NextEdition {
  previous: number;
  lines: readonly LineRow[];
  digest: string;
}

/** The accepted lines of decided revisions: the next edition as it would be. */
export async function findNextEdition(): Promise<NextEdition> {
  const previous = (await findNewestEdition(database()))?.number ?? 0;
  const lines = await findWaitingLines({ decidedOnly: true }, database());
  return { previous, lines, digest: listDigest(lines) };
}

/** Blocking findings of the next edition as it would be, for the page that shows it. Writes nothing. */
export async function findNextEditionStops(lines: readonly LineRow[]) {
  const { findings } = await findingsOf(lines, [], database());
  const aside = await findSetAside([...new Set(lines.map((line) => line.revisionId))], database());
  return findings.filter((one) => one.severity === "block" && !aside.has(one.fingerprint.toString("hex")));
}

/**
 * Publishes the next edition in one transaction under one lock: the list is what was shown, every line still stands
 * against what it was written against, and the result as a whole passes the checks.
 *
 * @returns the number and digest of the new edition
 * @throws Refused when the number or the list has moved, a line is overtaken or a check stops it
 */
export async function publishEdition(
  acting: Acting,
  request: PublicationRequest,
): Promise<{ number: number; digest: string }> {
  demand(acting, "edition:publish");
  const notes = request.notes.trim();
  if (!notes)
    throw new Invalid("Say in the notes what this edition brings.", [
      { pointer: "/notes", detail: "Say what this edition brings." },
    ]);
  if (!/^[A-Za-z0-9.+-]{1,64}$/.test(request.licence)) {
    throw new Invalid("The licence is an SPDX identifier such as CC-BY-4.0.", [
      { pointer: "/licence", detail: "Give an SPDX identifier such as CC-BY-4.0." },
    ]);
  }
  return act(acting, async ({ trx, record }) => {
    await checkWithdrawal(request, trx);
    const number = await openEdition(
      {
        expectedPrevious: request.expectedPrevious,
        publisher: acting.person.id,
        notes,
        licence: request.licence,
        withdraws: request.withdraws,
        reason: request.withdrawalReason?.trim() || null,
      },
      trx,
    );
    // From here on the publication lock is held: what is read below cannot be published by anybody else.
    const lines = await findWaitingLines({ decidedOnly: true }, trx);
    if (lines.length === 0) throw new Refused("Nothing is accepted for the next edition.");
    if (listDigest(lines) !== request.listDigest) {
      throw new Refused("The list of accepted lines has changed since it was shown. Look at it again, then publish.");
    }
    await checkBases(lines, trx);
    const revisionIds = [...new Set(lines.map((line) => line.revisionId))];
    await checkFourEyes(acting, lines, revisionIds, trx);
    const { findings } = await keepExamination(null, "publish", lines, [], trx);
    const aside = await findSetAside(revisionIds, trx);
    const stops = findings.filter((one) => one.severity === "block" && !aside.has(one.fingerprint.toString("hex")));
    const [first] = stops;
    if (first) {
      throw new Refused(
        `Edition ${number} would not pass: ${first.species}: ${first.sentence}${stops.length > 1 ? ` (and ${stops.length - 1} more)` : ""}`,
      );
    }
    await bringIn(lines, number, trx);
    await updateLinesPublished(
      lines.map((line) => line.id),
      number,
      trx,
    );
    const digest = (await sealEdition(number, trx)).toString("hex");
    await tellAuthors(acting, number, revisionIds, trx);
    record({
      act: "edition.published",
      objectId: number,
      detail: {
        notes,
        licence: request.licence,
        withdraws: request.withdraws,
        reason: request.withdrawalReason,
        digest,
        revisions: revisionIds,
        lines: lines.length,
        setAside: aside.size,
      },
    });
    return { number, digest };
  });
}

async function checkWithdrawal(request: PublicationRequest, trx: ActScope["trx"]): Promise<void> {
  if (request.withdraws === null) return;
  if (!request.withdrawalReason?.trim()) {
    throw new Invalid(`Say why edition ${request.withdraws} is withdrawn.`, [
      { pointer: "/withdrawalReason", detail: "Say why." },
    ]);
  }
  const withdrawn = await findEdition(request.withdraws, trx);
  if (!withdrawn) throw new NotFound(`There is no edition ${request.withdraws} to withdraw.`);
}

/** Every accepted line must still be written against what stands: accepted lines of one place exclude each other. */
async function checkBases(lines: readonly LineRow[], trx: ActScope["trx"]): Promise<void> {
  const bases = await findLineBases(
    lines.map((line) => line.id),
    trx,
  );
  const overtaken = lines.filter((line) => isOvertaken(line, bases.get(line.id)));
  const [first] = overtaken;
  if (first) {
    throw new Refused(
      `${overtaken.length === 1 ? "A line" : `${overtaken.length} lines`} of revision ${first.revisionId} ${overtaken.length === 1 ? "was" : "were"} written against values that no longer stand. Propose them again in a new revision.`,
    );
  }
}

async function checkFourEyes(
  acting: Acting,
  lines: readonly LineRow[],
  revisionIds: readonly number[],
  trx: ActScope["trx"],
): Promise<void> {
  let own = 0;
  for (const id of revisionIds) {
    const hands = await findLinesWithHandOf(id, acting.person.id, trx);
    own += lines.filter((line) => line.revisionId === id && hands.has(line.id)).length;
  }
  if (own === lines.length)
    throw new Forbidden("You had a hand in every line of this edition, so somebody else publishes it.");
}

/** Turns accepted lines into rows of the open edition. */
async function bringIn(lines: readonly LineRow[], edition: number, trx: ActScope["trx"]): Promise<void> {
  const values: Parameters<typeof insertValues>[0][number][] = [];
  const details: Parameters<typeof insertDetails>[0][number][] = [];
  const sources: Parameters<typeof insertSources>[0][number][] = [];
  const places: { speciesId: string; property: NonNullable<LineRow["property"]> }[] = [];
  for (const line of lines) {
    const { content, versionId: lineVersionId, speciesId, property, sourceId } = line;
    if (content.kind === "source" && sourceId) sources.push({ sourceId, content, lineVersionId });
    if (content.kind === "detail" && speciesId) details.push({ speciesId, content, lineVersionId });
    if (speciesId && property) {
      places.push({ speciesId, property });
      if (content.kind === "value") values.push({ speciesId, property, content, lineVersionId });
    }
  }
  await updateSourcesOut(
    sources.map((one) => one.sourceId),
    edition,
    trx,
  );
  await insertSources(sources, edition, trx);
  await updateDetailsOut(
    details.map((one) => one.speciesId),
    edition,
    trx,
  );
  await insertDetails(details, edition, trx);
  await updateValuesOut(places, edition, trx);
  await insertValues(values, edition, trx);
}

/** Writes to everyone whose revision the edition holds. */
async function tellAuthors(
  acting: Acting,
  number: number,
  revisionIds: readonly number[],
  trx: ActScope["trx"],
): Promise<void> {
  const byAuthor = new Map<string, number[]>();
  for (const id of revisionIds) {
    const revision = await findRevision(id, trx);
    if (revision) byAuthor.set(revision.madeBy, [...(byAuthor.get(revision.madeBy) ?? []), id]);
  }
  for (const [authorId, revisions] of byAuthor) {
    const author = await findAccount(authorId, trx);
    if (!author || author.id === acting.person.id) continue;
    await enqueueLetter(
      {
        kind: "edition-published",
        toPerson: author.id,
        toAddress: author.email,
        ...editionPublishedLetter({ number, by: acting.person.name, revisions }),
      },
      trx,
    );
  }
}
