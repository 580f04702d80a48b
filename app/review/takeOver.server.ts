import { act, type ActScope } from "#app/audit/act.server.ts";
import { type Database, database } from "#app/db/database.server.ts";
import { findNewestEdition } from "#app/editions/editions.queries.server.ts";
import { Invalid, NotFound, Refused } from "#app/http/errors.ts";
import { enqueueLetter } from "#app/notify/letters.server.ts";
import { revisionTakenOverLetter } from "#app/notify/reviewLetters.ts";
import { findAccount } from "#app/people/people.queries.server.ts";
import { demand } from "#app/people/permissions.ts";
import type { Acting } from "#app/people/person.ts";
import { examineRevision } from "./examine.server.ts";
import { lineSays } from "./lineWords.ts";
import {
  findLines,
  findRevision,
  findRevisionsByState,
  findVersions,
  insertLineVersion,
  type LineRow,
  updateLinesDropped,
  updateLinesRevision,
  updateRevisionState,
} from "./review.queries.server.ts";
import { findWritable } from "./revise.server.ts";
import { aboutOf } from "./revisionPage.ts";
import { findNames } from "./revisionPage.server.ts";
import { cleanDigest } from "./revisionPageDigest.ts";
import { isWritable, type RevisionState, revisionStateWords } from "./states.ts";
import { type Choice, placeOf, sharedPlaces } from "./takeOver.ts";

/** A line as the page that takes lines over shows it. */
export interface TakenLine {
  id: string;
  about: string;
  says: string;
  by: string;
}

export interface TakeOverPage {
  into: { id: number; title: string; writable: boolean; stateWords: string };
  /** Drafts and returned revisions whose lines could be taken over. */
  candidates: readonly { id: number; title: string; state: RevisionState; by: string; lines: number }[];
  /** The one that was chosen, with its lines. */
  from: {
    id: number;
    title: string;
    by: string;
    /** Lines that come over without a question. */
    lines: readonly TakenLine[];
    /** Places that both propose something for. */
    shared: readonly { place: string; about: string; here: TakenLine; there: TakenLine }[];
    /** Declined lines; they stay where they are. */
    declined: number;
    /** Names the lines of both as they read now. */
    digest: string;
  } | null;
  edition: number;
}

/** What is asked of a person before lines are taken over. */
export interface TakeOver {
  into: number;
  from: number;
  /** Of the page that was seen. */
  digest: string;
  /** By place, for every place that both revisions have a line for. */
  choices: Readonly<Record<string, Choice>>;
}

const MOST_CANDIDATES = 1000;

/** The lines that come over: what was declined stays with the revision it was declined in. */
const comesOver = (line: Pick<LineRow, "state">): boolean => line.state === "open" || line.state === "accepted";

async function findBoth(into: number, from: number, db: Database) {
  const here = await findLines(into, db);
  const there = await findLines(from, db);
  const coming = there.filter(comesOver);
  return {
    here,
    coming,
    declined: there.length - coming.length,
    shared: sharedPlaces(here, coming),
    digest: cleanDigest([...here, ...there].map((line) => ({ lineId: line.id, versionId: line.versionId }))),
  };
}

/** What the page shows on which lines are taken over. @throws NotFound, Forbidden */
export async function findTakeOverPage(acting: Acting, id: number, from: number | null): Promise<TakeOverPage> {
  demand(acting, "revision:write");
  const db = database();
  const into = await findRevision(id, db);
  if (!into) throw new NotFound(`There is no revision ${id}.`);
  const [written, newest] = await Promise.all([
    findRevisionsByState(["draft", "returned"], MOST_CANDIDATES, db),
    findNewestEdition(db),
  ]);
  const candidates = written
    .map((one) => ({ id: one.id, title: one.title, state: one.state, by: one.madeByName, lines: Number(one.lines) }))
    .filter((one) => one.id !== id && one.lines > 0);
  return {
    into: {
      id,
      title: into.title,
      writable: isWritable(into.state),
      stateWords: revisionStateWords[into.state],
    },
    candidates,
    from: from === null ? null : await findOther(id, from),
    edition: newest?.number ?? 0,
  };
}

async function findOther(into: number, from: number): Promise<TakeOverPage["from"]> {
  const db = database();
  const other = await findRevision(from, db);
  if (!other || from === into) throw new NotFound(`There is no other revision ${from}.`);
  if (!isWritable(other.state)) return null;
  const { here, coming, declined, shared, digest } = await findBoth(into, from, db);
  const names = await findNames([...here, ...coming]);
  const makers = new Map<string, string>();
  for (const id of [into, from]) for (const one of await findVersions(id, db)) makers.set(one.lineId, one.by);
  const shown = (line: LineRow): TakenLine => ({
    id: line.id,
    about: aboutOf(line, names),
    says: lineSays(line.content, line.property),
    by: makers.get(line.id) ?? "",
  });
  const asked = new Set(shared.map((one) => one.place));
  return {
    id: from,
    title: other.title,
    by: other.madeByName,
    lines: coming.filter((line) => !asked.has(placeOf(line))).map(shown),
    shared: shared.map((one) => ({
      place: one.place,
      about: aboutOf(one.there, names),
      here: shown(one.here),
      there: shown(one.there),
    })),
    declined,
    digest,
  };
}

/**
 * Takes the lines of one draft or returned revision over into another, in one act. A line stays itself: its versions,
 * their makers and its comments go with it. One that was accepted is decided anew, and says so in a new version. Of two
 * lines for one place the chosen one stays; the other is taken out, on record. The emptied revision ends as withdrawn and
 * says where its lines went.
 *
 * @returns how many lines came over
 * @throws Invalid without a choice for every shared place; Refused when either is not written now, when a line changed
 *   since the page was read, and when nothing would come over
 */
export async function takeOver(acting: Acting, asked: TakeOver): Promise<number> {
  demand(acting, "revision:write");
  const { into, from } = asked;
  if (into === from) throw new Invalid("A revision cannot take over its own lines.");
  return act(acting, async (scope) => {
    const { trx, record } = scope;
    // Both rows are held in the order of their numbers, so that two people who take over each other's lines do not wait
    // for each other.
    for (const id of [into, from].toSorted((a, b) => a - b)) await findWritable(acting, id, trx);
    const emptied = await findRevision(from, trx);
    if (!emptied) throw new NotFound(`There is no revision ${from}.`);
    const { coming, declined, shared, digest } = await findBoth(into, from, trx);
    if (coming.length === 0) throw new Refused(`Revision ${from} has no line to take over.`);
    if (digest !== asked.digest) {
      throw new Refused(
        "A line of these revisions was changed since you opened the page. Look at them, then take over.",
      );
    }
    const undecided = shared.filter(({ place }) => asked.choices[place] === undefined);
    if (undecided.length > 0) {
      throw new Invalid(
        undecided.length === 1
          ? "Both revisions have a line for one place. Choose which one stays."
          : `Both revisions have lines for ${undecided.length} places. Choose which ones stay.`,
        undecided.map(({ place }) => ({ pointer: `/keep.${place}`, detail: "Choose which line stays." })),
      );
    }
    const stays = shared.filter(({ place }) => asked.choices[place] === "here").map((one) => one.there);
    const goes = shared.filter(({ place }) => asked.choices[place] === "there").map((one) => one.here);
    const staying = new Set(stays.map((line) => line.id));
    const moved = coming.filter((line) => !staying.has(line.id));
    await dropOthers(stays, goes, asked, scope);
    await updateLinesRevision(
      moved.map((line) => line.id),
      into,
      trx,
    );
    for (const line of moved.filter((one) => one.state === "accepted")) {
      await insertLineVersion(
        {
          id: line.id,
          version: line.version + 1,
          content: line.content,
          madeBy: acting.person.id,
          reason: `taken over from revision ${from}, where it was accepted; it is decided anew`,
        },
        trx,
      );
    }
    const remark = remarkOf(moved.length, into, stays.length + declined);
    await updateLinesDropped(
      (await findLines(from, trx)).map((line) => line.id),
      trx,
    );
    await updateRevisionState(
      { id: from, from: emptied.state, to: "withdrawn", round: emptied.round, by: acting.person.id, remark },
      trx,
    );
    await examineRevision(into, "edit", trx);
    await tellAuthor(acting, { ...emptied, into, lines: moved.length }, trx);
    record({
      act: "revision.lines-taken-over",
      objectId: into,
      detail: { from, lines: moved.map((line) => line.id), chosen: asked.choices },
    });
    record({ act: "revision.withdrawn", objectId: from, detail: { reason: remark, into, lines: moved.length } });
    return moved.length;
  });
}

function remarkOf(moved: number, into: number, left: number): string {
  const went =
    moved === 0
      ? `None of its lines was taken over: revision ${into} kept its own.`
      : `${moved === 1 ? "Its line" : `${moved} of its lines`} went into revision ${into}.`;
  return left === 0 ? went : `${went} ${left === 1 ? "One line" : `${left} lines`} stayed here and ended with it.`;
}

/** Takes the lines out that were not chosen, each with its own entry in the record. */
async function dropOthers(
  stays: readonly LineRow[],
  goes: readonly LineRow[],
  { into, from }: Pick<TakeOver, "into" | "from">,
  { trx, record }: ActScope,
): Promise<void> {
  await updateLinesDropped(
    [...stays, ...goes].map((line) => line.id),
    trx,
  );
  for (const line of [...stays, ...goes]) {
    const of = line.revisionId === into ? into : from;
    record({
      act: "revision.line-taken-out",
      objectId: of,
      detail: {
        line: line.id,
        content: line.content,
        reason: `The line of revision ${of === into ? from : into} for the same place was chosen when the two were made one.`,
      },
    });
  }
}

/** Writes to the author of the emptied revision, unless they did it themselves. */
async function tellAuthor(
  acting: Acting,
  emptied: { id: number; title: string; madeBy: string; into: number; lines: number },
  trx: ActScope["trx"],
): Promise<void> {
  if (emptied.madeBy === acting.person.id) return;
  const author = await findAccount(emptied.madeBy, trx);
  if (!author) return;
  await enqueueLetter(
    {
      kind: "revision-taken-over",
      toPerson: author.id,
      toAddress: author.email,
      fromPerson: acting.person.id,
      ...revisionTakenOverLetter({ ...emptied, by: acting.person.name }),
    },
    trx,
  );
}
