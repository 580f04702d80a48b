import { act, type ActScope } from "#app/audit/act.server.ts";
import { findDetailsAsOf, findNewestEdition } from "#app/editions/editions.queries.server.ts";
import { Invalid, NotFound, Refused } from "#app/http/errors.ts";
import { demand } from "#app/people/permissions.ts";
import type { Acting } from "#app/people/person.ts";
import { shortCitation } from "#app/sources/citation.ts";
import { insertSource } from "#app/sources/sources.queries.server.ts";
import { findSpeciesByIds, insertSpecies, lockNaming } from "#app/species/species.queries.server.ts";
import type { Phase } from "#app/thermo/phase.ts";
import { propertyInfo } from "#app/thermo/property.ts";
import { saysTheSame } from "./content.ts";
import { examineRevision } from "./examine.server.ts";
import { lineSays } from "./lineWords.ts";
import { findKeyHolders, findKnownSourceIds } from "./propose.queries.server.ts";
import {
  findLineBases,
  findLines,
  insertLines,
  insertRevision,
  type NewLine,
  updateLineBase,
} from "./review.queries.server.ts";
import { findWritable } from "./revise.server.ts";
import { findVersionContents } from "./revisionPage.queries.server.ts";
import { placeOf } from "./takeOver.ts";

/** A line written by hand. What it is written against is found when it is written, never handed in. */
export type ProposedLine = Pick<NewLine, "kind" | "speciesId" | "property" | "sourceId" | "content" | "reason"> & {
  /** The version that the person saw standing or waiting here, null for an empty place; left out, whatever is there. */
  seen?: string | null;
};

/** The identity of a species that the lines bring into the table. */
export interface ProposedSpecies {
  id: string;
  hill: string;
  composition: Readonly<Record<string, number>>;
  charge: number;
  phase: Phase;
}

/** Lines to begin a revision with, or to add to one that is still written. */
export interface Proposal {
  /** The draft or returned revision the lines go into; null begins a new draft. */
  revisionId: number | null;
  /** Title and summary of a new draft; not looked at where lines are added to one. */
  title: string;
  summary: string;
  lines: readonly ProposedLine[];
  /** Identities that do not exist yet; made in the same transaction. */
  newSpecies?: readonly ProposedSpecies[];
  newSources?: readonly string[];
}

/**
 * Begins a draft with lines written by hand, or adds them to a draft or returned revision, in one act: each line is
 * written against what stands or waits in its place at that moment, and the revision is examined at once.
 *
 * @returns the number of the revision
 * @throws Invalid without a line or with a title that cannot be one; NotFound for a revision, species or source that does
 *   not exist; Refused when the revision is not written now, when it has a line for a place already, when nothing would
 *   change, when there is nothing to withdraw, and when another species holds a key
 */
export async function proposeLines(acting: Acting, proposal: Proposal): Promise<number> {
  demand(acting, "revision:write");
  return act(acting, (scope) => insertProposal(acting, proposal, scope));
}

/** The same inside a caller's act, for a proposal whose lines are built from what the table holds at that moment. */
export async function insertProposal(acting: Acting, proposal: Proposal, { trx, record }: ActScope): Promise<number> {
  demand(acting, "revision:write");
  const { lines } = proposal;
  if (lines.length === 0) throw new Invalid("Nothing is proposed: there is no line to write.");
  const title = proposal.revisionId === null ? titleOf(proposal.title) : "";
  // Names before revisions, as everywhere, so that two people never wait for each other.
  if (lines.some((line) => line.kind === "detail")) await lockNaming(trx);
  if (proposal.revisionId !== null) await findWritable(acting, proposal.revisionId, trx);
  for (const id of proposal.newSources ?? []) await insertSource(id, trx);
  await insertSpecies(proposal.newSpecies ?? [], trx);
  await demandSubjects(lines, trx);
  await refuseDoubledPlaces(proposal, trx);
  await refuseTakenKeys(lines, trx);

  const id =
    proposal.revisionId ??
    (await insertRevision({ title, summary: proposal.summary.trim(), sheetId: null, madeBy: acting.person.id }, trx));
  const lineIds = await insertLines(
    id,
    lines.map((line) => ({ ...line, rowNumber: null, againstRow: null, againstVersion: null })),
    acting.person.id,
    trx,
  );
  await writeAgainstBases(lines, lineIds, trx);
  const { findings } = await examineRevision(id, proposal.revisionId === null ? "build" : "edit", trx);
  const written = lines.map((line, index) => ({ line: lineIds[index] ?? "", content: line.content }));
  if (proposal.revisionId === null) {
    record({
      act: "revision.begun",
      objectId: id,
      detail: { title, sheet: null, lines: lines.length, findings: findings.length, written },
    });
  } else {
    record({ act: "revision.lines-added", objectId: id, detail: { lines: lines.length, written } });
  }
  return id;
}

function titleOf(text: string): string {
  const title = text.trim();
  if (title === "" || title.length > 200 || /\p{Cc}/u.test(title)) {
    const sentence = "Give the revision a title of one line and at most 200 characters.";
    throw new Invalid(sentence, [{ pointer: "/title", detail: sentence }]);
  }
  return title;
}

/** Species and sources that the lines are about, or put values down to, must exist. */
async function demandSubjects(lines: readonly ProposedLine[], trx: ActScope["trx"]): Promise<void> {
  const speciesIds = new Set(lines.flatMap((line) => (line.speciesId === null ? [] : [line.speciesId])));
  const known = new Set((await findSpeciesByIds([...speciesIds], trx)).map((one) => one.id));
  if ([...speciesIds].some((id) => !known.has(id))) throw new NotFound("There is no such species.");
  const sourceIds = new Set(
    lines.flatMap((line) => [
      ...(line.sourceId === null ? [] : [line.sourceId]),
      ...(line.content.kind === "value" ? [line.content.sourceId] : []),
    ]),
  );
  const sources = await findKnownSourceIds([...sourceIds], trx);
  if ([...sourceIds].some((id) => !sources.has(id))) throw new NotFound("There is no such source.");
}

/** One revision says a thing once. */
async function refuseDoubledPlaces({ revisionId, lines }: Proposal, trx: ActScope["trx"]): Promise<void> {
  const existing = revisionId === null ? [] : await findLines(revisionId, trx);
  const taken = new Map(existing.map((line) => [placeOf(line), line]));
  const places = new Set<string>();
  for (const line of lines) {
    const place = placeOf(line);
    const other = taken.get(place);
    if (other && revisionId !== null) {
      throw new Refused(
        `Revision ${revisionId} already has a line for ${await nameOf(line, lines, trx)}: ${lineSays(other.content, other.property)}. Change that line, or take it out first.`,
      );
    }
    if (places.has(place))
      throw new Refused(`Two lines are about ${await nameOf(line, lines, trx)}. Leave one of them.`);
    places.add(place);
  }
}

/** What a line is about, in words: "S° of H2O(l)", "the name of H2O(l)", "the source Cox and others, 1989". */
async function nameOf(line: ProposedLine, lines: readonly ProposedLine[], trx: ActScope["trx"]): Promise<string> {
  if (line.content.kind === "source") return `the source ${shortCitation(line.content.citation)}`;
  const beside = lines.find((one) => one.speciesId === line.speciesId && one.content.kind === "detail")?.content;
  const edition = (await findNewestEdition(trx))?.number ?? 0;
  const [standing] = await findDetailsAsOf(edition, { speciesIds: line.speciesId ? [line.speciesId] : [] }, trx);
  const key = standing?.key ?? (beside?.kind === "detail" ? beside.key : "this species");
  return line.property === null ? `what ${key} is called` : `${propertyInfo[line.property].symbol} of ${key}`;
}

/** A key is unique in an edition: it is refused while another species holds it for sure. */
export async function refuseTakenKeys(
  lines: readonly Pick<ProposedLine, "speciesId" | "content">[],
  trx: ActScope["trx"],
): Promise<void> {
  const wanted = new Map<string, string>();
  for (const line of lines) {
    if (line.content.kind !== "detail" || line.speciesId === null) continue;
    const twice = wanted.get(line.content.key);
    if (twice !== undefined && twice !== line.speciesId)
      throw new Refused(`Two species would be called ${line.content.key}.`);
    wanted.set(line.content.key, line.speciesId);
  }
  const holder = (await findKeyHolders([...wanted.keys()], trx)).find(
    (one) => one.settled && one.speciesId !== wanted.get(one.key),
  );
  if (!holder) return;
  throw new Refused(
    `${holder.key} is another species already${holder.revisionId === null ? "" : ` (it waits in revision ${holder.revisionId})`}. Name the form or isomer, so that the keys differ.`,
  );
}

/**
 * Puts down what each new line is written against, and refuses those that would change nothing. The base is read after
 * the line exists, by the one query that also tells later whether the line was overtaken.
 */
async function writeAgainstBases(
  lines: readonly ProposedLine[],
  lineIds: readonly string[],
  trx: ActScope["trx"],
): Promise<void> {
  const bases = await findLineBases(lineIds, trx);
  const versions = [...bases.values()].flatMap((base) => base.waitingVersion ?? base.standingVersion ?? []);
  const contents = new Map((await findVersionContents(versions, trx)).map((one) => [one.id, one.content]));
  for (const [index, line] of lines.entries()) {
    const lineId = lineIds[index];
    const base = lineId === undefined ? undefined : bases.get(lineId);
    if (lineId === undefined || !base) throw new Error("A line was inserted without a base to be found.");
    const version = base.waitingVersion ?? base.standingVersion;
    const before = version === null ? undefined : contents.get(version);
    if (line.seen !== undefined && line.seen !== version) {
      throw new Refused(
        `${capitalized(await nameOf(line, lines, trx))} was changed in the table since you opened the page. Look at what is there now, then propose again.`,
      );
    }
    const waits = base.waitingRevision === null ? "" : ` in revision ${base.waitingRevision}`;
    if (line.kind === "withdrawal" && (!before || before.kind === "withdrawal")) {
      throw new Refused(
        before
          ? `${capitalized(await nameOf(line, lines, trx))} is already withdrawn${waits}.`
          : `There is no ${await nameOf(line, lines, trx)} to withdraw.`,
      );
    }
    if (before && saysTheSame(line.content, before)) {
      throw new Refused(
        `Nothing would change: ${await nameOf(line, lines, trx)} ${base.waitingVersion ? `waits${waits}` : "stands"} with just this.`,
      );
    }
    if (base.waitingVersion !== null || base.standingRow !== null) {
      await updateLineBase(
        lineId,
        {
          againstRow: base.waitingVersion === null ? base.standingRow : null,
          againstVersion: base.waitingVersion,
        },
        trx,
      );
    }
  }
}

const capitalized = (text: string): string => text.charAt(0).toUpperCase() + text.slice(1);
