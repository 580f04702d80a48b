import { database } from "#app/db/database.server.ts";
import { textChanges } from "#app/editions/compare.ts";
import { type TextRun, wordRuns } from "#app/editions/comparePage.ts";
import { findNewestEdition, findSourceDetailsAsOf } from "#app/editions/editions.queries.server.ts";
import { sourceFields } from "#app/editions/recordFields.ts";
import { Invalid, NotFound } from "#app/http/errors.ts";
import { demand } from "#app/people/permissions.ts";
import type { Acting } from "#app/people/person.ts";
import { newSourceId } from "#app/sources/newId.server.ts";
import { type DescribedSource, describedSource, type NewSource } from "#app/sources/sourceForm.ts";
import { type ChoosableSource, findChoosableSources } from "#app/sources/sources.queries.server.ts";
import { holderOfDoi, type Twin, twinsOf } from "#app/sources/twins.ts";
import { findWritableRevisions } from "./propose.queries.server.ts";
import { proposeLines } from "./propose.server.ts";
import { findWaitingForPlace } from "./review.queries.server.ts";

/** Where a proposal goes and why it is made. */
export interface ProposalFrame {
  /** One of the person's drafts or returned revisions; null begins a new one. */
  revisionId: number | null;
  /** Title of a new draft. */
  title: string;
  reason: string;
}

/** The person's own revisions that are written now, the newest first. @throws Forbidden */
export async function findOpenDrafts(acting: Acting): Promise<{ id: number; title: string }[]> {
  demand(acting, "revision:write");
  const own = await findWritableRevisions(acting.person.id, null, database());
  return own.map(({ id, title }) => ({ id, title }));
}

/** What came of proposing a new source. */
export type NewSourceOutcome =
  | { kind: "proposed"; revisionId: number; sourceId: string }
  /** It looks like one that is known; nothing was proposed. */
  | { kind: "twins"; twins: Twin<ChoosableSource>[] };

/**
 * Proposes a source described by hand. One that looks like a source of the table, or like one that an open revision
 * proposes, is shown first; `anyway` says that it is another all the same. A DOI names one work, so two sources never
 * share one.
 * @throws Forbidden; Invalid; Refused
 */
export async function proposeNewSource(
  acting: Acting,
  source: NewSource,
  frame: ProposalFrame,
  anyway: boolean,
): Promise<NewSourceOutcome> {
  demand(acting, "revision:write");
  const described = describedSource(source);
  const twins = twinsOf(described, await findOthers(null));
  if (twins.length > 0 && (!anyway || twins.some((twin) => twin.because === "the same DOI"))) {
    return { kind: "twins", twins };
  }
  const sourceId = newSourceId();
  const revisionId = await proposeLines(acting, {
    ...frame,
    summary: frame.reason,
    newSources: [sourceId],
    lines: [
      {
        kind: "source",
        speciesId: null,
        property: null,
        sourceId,
        reason: frame.reason,
        content: { kind: "source", ...described },
      },
    ],
  });
  return { kind: "proposed", revisionId, sourceId };
}

/** The sources that stand or are proposed; `except` is the one that is being mended. */
async function findOthers(except: string | null): Promise<ChoosableSource[]> {
  const edition = (await findNewestEdition(database()))?.number ?? 0;
  return (await findChoosableSources(edition, database())).filter((one) => one.sourceId !== except);
}

/** A source as it is cited now, or will be once what waits is published. */
export interface MendableSource {
  sourceId: string;
  before: DescribedSource;
  /** The version of the line it comes from; what is proposed is written against it. */
  seen: string;
  /** The edition that cites it so; null while it waits accepted. */
  edition: number | null;
  /** The revision in which it waits accepted; null when it stands. */
  revisionId: number | null;
}

/**
 * The source that a mended citation is written against.
 * @throws Forbidden; NotFound for a source that neither stands nor waits, which is mended in the revision that proposes it
 */
export async function findMendableSource(acting: Acting, sourceId: string): Promise<MendableSource> {
  demand(acting, "revision:write");
  const edition = (await findNewestEdition(database()))?.number ?? 0;
  const waiting = await findWaitingForPlace({ speciesId: null, property: null, sourceId }, database());
  if (waiting?.content.kind === "source") {
    const { kind: _kind, ...before } = waiting.content;
    return { sourceId, before, seen: waiting.versionId, edition: null, revisionId: waiting.revisionId };
  }
  const [standing] = await findSourceDetailsAsOf(edition, { ids: [sourceId] }, database());
  if (!standing) {
    throw new NotFound(
      `There is no source ${sourceId} in the table yet. One that is only proposed is mended in its revision.`,
    );
  }
  const { citation, doi, kind: sourceKind, notice } = standing;
  return {
    sourceId,
    before: { citation, doi, sourceKind, notice },
    seen: standing.lineVersionId,
    edition,
    revisionId: null,
  };
}

/** What a record of a source says otherwise, field by field and word by word. */
export type SourceChange = { field: string; runs: TextRun[] }[];

/** Holds a source as it would be described against how it is cited now. */
export function changeOf({ before }: MendableSource, source: NewSource): SourceChange {
  const after = describedSource(source, before.citation);
  const texts = ({ sourceKind, ...rest }: DescribedSource) => ({ ...rest, kind: sourceKind });
  return textChanges(texts(before), texts(after), sourceFields).map((change) => ({
    field: change.field,
    runs: wordRuns(change),
  }));
}

/**
 * Proposes that a source be cited otherwise from the next edition on; the editions that are out keep their citation.
 * `seen` is the version whose citation the person had before them.
 * @throws Forbidden; NotFound; Invalid without a reason or with a DOI that another source has; Refused when somebody was
 *   quicker, or when nothing would change
 */
export async function proposeMendedSource(
  acting: Acting,
  mended: { sourceId: string; seen: string; source: NewSource },
  frame: ProposalFrame,
): Promise<number> {
  const { before } = await findMendableSource(acting, mended.sourceId);
  if (frame.reason.trim() === "") {
    const sentence = "Say why the citation is mended.";
    throw new Invalid(sentence, [{ pointer: "/reason", detail: sentence }]);
  }
  const described = describedSource(mended.source, before.citation);
  const holder = holderOfDoi(described.doi, await findOthers(mended.sourceId));
  if (holder) {
    const sentence = `Another source has this DOI already (${holder.sourceId}).`;
    throw new Invalid(sentence, [{ pointer: "/doi", detail: sentence }]);
  }
  return proposeLines(acting, {
    ...frame,
    summary: frame.reason,
    lines: [
      {
        kind: "source",
        speciesId: null,
        property: null,
        sourceId: mended.sourceId,
        reason: frame.reason,
        seen: mended.seen,
        content: { kind: "source", ...described },
      },
    ],
  });
}
