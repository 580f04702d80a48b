import { checks } from "#app/checks/registry.ts";
import { database } from "#app/db/database.server.ts";
import { findNewestEdition } from "#app/editions/editions.queries.server.ts";
import { NotFound, Refused } from "#app/http/errors.ts";
import { demand, may } from "#app/people/permissions.ts";
import type { Acting } from "#app/people/person.ts";
import { fullCitation, shortCitation } from "#app/sources/citation.ts";
import { acceptLines } from "./decide.server.ts";
import type { MixtureAnswer } from "./mixture.ts";
import {
  findComments,
  findDecisions,
  findFindings,
  findLinesWithHandOf,
  findMoves,
  findNewestExamination,
  findRevision,
  findVersions,
  type LineBase,
  type LineRow,
} from "./review.queries.server.ts";
import { findLinesWithBases } from "./revise.server.ts";
import {
  cleanLines,
  type PageFinding,
  type PageLine,
  type RevisionPage,
  revisionPage,
  type Show,
  type Stood,
} from "./revisionPage.ts";
import {
  findDetailRows,
  findDroppedLines,
  findFindingsOfRound,
  findNewestCitations,
  findNewestNames,
  findProposedCitations,
  findProposedNames,
  findSetAsides,
  findSourceRows,
  findTakenOut,
  findTakenOver,
  findValueRows,
  findVersionContents,
  findWentInto,
} from "./revisionPage.queries.server.ts";
import { cleanDigest } from "./revisionPageDigest.ts";
import { comparedRound, roundsOf } from "./roundChanges.ts";

/** Where a line's base stands: a row of the table by kind, or the version of a line that waits. */
interface Place {
  line: LineRow;
  row: string | null;
  version: string | null;
}

/** What one revision's page shows to this person. @throws NotFound, Forbidden */
export async function findRevisionPage(
  acting: Acting,
  id: number,
  options: { page: number; show?: Show },
): Promise<RevisionPage & { cleanDigest: string }> {
  demand(acting, "revision:read");
  const db = database();
  const revision = await findRevision(id, db);
  if (!revision) throw new NotFound(`There is no revision ${id}.`);
  const [newest, proposed, dropped, takenOut, findings, hands] = await Promise.all([
    findNewestEdition(db),
    findLinesWithBases(id),
    findDroppedLines(id, db),
    findTakenOut(id, db),
    findPageFindings(id),
    findLinesWithHandOf(id, acting.person.id, db),
  ]);
  const taken = new Map(takenOut.map((one) => [one.lineId, one]));
  // The lines of a withdrawn revision fell with it; they stay to be read. Those taken out before are told in the history.
  const fallen = dropped
    .filter((line) => !taken.has(line.id))
    .map((line) => ({ ...line, overtaken: false, base: undefined }));
  const lines = revision.state === "withdrawn" ? fallen : proposed;

  const [stood, now] = await Promise.all([
    findStood(lines.map((line) => ({ line, row: line.againstRow, version: line.againstVersion }))),
    findStood(
      lines
        .filter((line) => line.overtaken)
        .map((line) => ({
          line,
          row: line.base?.waitingVersion ? null : (line.base?.standingRow ?? null),
          version: line.base?.waitingVersion ?? null,
        })),
    ),
  ]);
  const everyLine = [...lines, ...dropped];
  const [names, citations] = await Promise.all([findNames(everyLine), findCitations(everyLine, stood)]);
  const [decisions, versions, comments, moves, setAsides, takenOver, wentInto] = await Promise.all([
    findDecisions(id, db),
    findVersions(id, db),
    findComments(id, db),
    findMoves(id, db),
    findSetAsides(id, db),
    findTakenOver(id, db),
    findWentInto(id, db),
  ]);
  const compared = comparedRound(revision.state, roundsOf(moves));
  const findingsBefore = compared ? await findFindingsOfRound(id, compared.round, db) : [];
  const page = revisionPage({
    revision,
    newest: newest?.number ?? 0,
    lines: lines.map(pageLine),
    takenOut: dropped.flatMap((line) => {
      const told = taken.get(line.id);
      return told
        ? [{ line: pageLine({ ...line, overtaken: false }), reason: told.reason, at: told.at, by: told.by }]
        : [];
    }),
    stood,
    now,
    names,
    citations,
    printCitation: fullCitation,
    findings,
    findingsBefore: findingsBefore.map((one) => ({ ...one, title: titleOf(one.check) })),
    decisions: decisions.map((one) => ({
      ...one,
      decision: one.decision === "accept" ? "accept" : "decline",
      void: Boolean(one.void),
    })),
    versions,
    comments,
    moves,
    setAsides,
    takenOver,
    wentInto,
    hands,
    rights: {
      write: may(acting.person.roles, "revision:write"),
      comment: may(acting.person.roles, "revision:comment"),
      decide: may(acting.person.roles, "revision:decide"),
    },
    show: options.show ?? "all",
    page: options.page,
  });
  return { ...page, cleanDigest: cleanDigest(page.cleanSet.seen), cleanSet: { ...page.cleanSet, seen: [] } };
}

/**
 * Accepts every clean line of a revision: those that neither block nor ask for a look, whatever page of them was shown.
 *
 * @param digest what was seen (`cleanDigest`): one edit in between and nothing is accepted
 * @returns how many were accepted
 * @throws Refused when the clean lines have changed since, or there are none; whatever `acceptLines` throws
 */
export async function acceptCleanLines(
  acting: Acting,
  id: number,
  digest: string,
  answer: MixtureAnswer | null = null,
): Promise<number> {
  demand(acting, "revision:decide");
  if (!(await findRevision(id, database()))) throw new NotFound(`There is no revision ${id}.`);
  const [lines, findings, hands] = await Promise.all([
    findLinesWithBases(id),
    findPageFindings(id),
    findLinesWithHandOf(id, acting.person.id, database()),
  ]);
  const clean = cleanLines({ lines: lines.map(pageLine), findings, hands });
  if (clean.length === 0) throw new Refused("No clean line is left to accept.");
  if (cleanDigest(clean) !== digest) {
    throw new Refused(
      `The clean lines have changed since you opened this page; there are ${clean.length} now. Look at them, then accept.`,
    );
  }
  await acceptLines(acting, id, clean, answer);
  return clean.length;
}

const titles = new Map(checks.map((check) => [check.code, check.title]));
const titleOf = (check: string): string => titles.get(check) ?? check;

/** The findings of the newest examination, with the titles of their checks. */
export async function findPageFindings(revisionId: number): Promise<PageFinding[]> {
  const examination = await findNewestExamination(revisionId, database());
  if (!examination) return [];
  const rows = await findFindings(examination.id, database());
  return rows.map((row) => ({
    id: row.id,
    lineId: row.lineId,
    speciesId: row.speciesId,
    property: row.property,
    check: row.check,
    title: titleOf(row.check),
    severity: row.severity,
    sentence: row.sentence,
    arithmetic: row.arithmetic,
    suggestions: row.suggestions,
    setAside:
      row.setAsideAt && row.setAsideBy
        ? { reason: row.setAsideReason ?? "", by: row.setAsideBy, at: row.setAsideAt }
        : null,
  }));
}

function pageLine(line: LineRow & { overtaken: boolean; base?: LineBase | undefined }): PageLine {
  return {
    id: line.id,
    position: line.position,
    kind: line.kind,
    speciesId: line.speciesId,
    property: line.property,
    sourceId: line.sourceId,
    rowNumber: line.rowNumber,
    state: line.state,
    publishedIn: line.publishedIn,
    cameFrom: line.cameFrom,
    cameAt: line.cameAt,
    versionId: line.versionId,
    version: line.version,
    content: line.content,
    // A line that was decided has its answer; what comes into its place later is no concern of it.
    overtaken: line.overtaken && line.state === "open",
    behind: line.state === "open" && line.base?.waitingVersion ? line.base.waitingRevision : null,
  };
}

/** What stands behind these places, by line id. */
export async function findStood(places: readonly Place[]): Promise<Map<string, Stood>> {
  const db = database();
  const rowsOf = (...kinds: readonly LineRow["kind"][]): string[] =>
    places.flatMap(({ line, row }) => (row !== null && kinds.includes(line.kind) ? [row] : []));
  const [values, details, sources, versions] = await Promise.all([
    findValueRows(rowsOf("value", "withdrawal"), db),
    findDetailRows(rowsOf("detail"), db),
    findSourceRows(rowsOf("source"), db),
    findVersionContents(
      places.flatMap(({ version }) => (version === null ? [] : [version])),
      db,
    ),
  ]);
  // The three tables number their rows independently, so a row is looked up under the kind of its line.
  const byKind = {
    value: new Map(values.map((row) => [row.id, row])),
    detail: new Map(details.map((row) => [row.id, row])),
    source: new Map(sources.map((row) => [row.id, row])),
  };
  const byVersion = new Map(versions.map((version) => [version.id, version]));
  const stood = new Map<string, Stood>();
  for (const { line, row, version } of places) {
    const waited = version === null ? undefined : byVersion.get(version);
    if (waited) {
      const { content, publishedIn, revisionId } = waited;
      stood.set(line.id, { content, since: publishedIn, waitsIn: publishedIn === null ? revisionId : null });
      continue;
    }
    const found = row === null ? undefined : byKind[line.kind === "withdrawal" ? "value" : line.kind].get(row);
    if (found) stood.set(line.id, { content: found.content, since: found.since, waitsIn: null });
  }
  return stood;
}

/** What the species of these lines are called: as proposed here, else as they stand, else as proposed elsewhere. */
export async function findNames(lines: readonly LineRow[]) {
  const ids = [...new Set(lines.flatMap((line) => line.speciesId ?? []))];
  const [standing, proposed] = await Promise.all([
    findNewestNames(ids, database()),
    findProposedNames(ids, database()),
  ]);
  const stands = new Set(standing.filter((one) => one.stands).map((one) => one.speciesId));
  const names = new Map<string, { key: string; name: string; stands: boolean }>();
  for (const { speciesId, key, name } of [...proposed, ...standing]) {
    names.set(speciesId, { key, name, stands: stands.has(speciesId) });
  }
  for (const { speciesId, content, state } of lines) {
    // A species about to be renamed is still found under the name that stands.
    if (speciesId && content.kind === "detail" && state !== "dropped" && !stands.has(speciesId)) {
      names.set(speciesId, { key: content.key, name: content.name, stands: false });
    }
  }
  return names;
}

/** How the sources of these lines are cited, by source id. */
export async function findCitations(lines: readonly LineRow[], stood: ReadonlyMap<string, Stood>) {
  const ids = new Set<string>();
  for (const line of lines) {
    if (line.sourceId) ids.add(line.sourceId);
    if (line.content.kind === "value") ids.add(line.content.sourceId);
    const before = stood.get(line.id)?.content;
    if (before?.kind === "value") ids.add(before.sourceId);
  }
  const list = [...ids];
  const [proposed, standing] = await Promise.all([
    findProposedCitations(list, database()),
    findNewestCitations(list, database()),
  ]);
  return new Map(
    [...proposed, ...standing].map(({ sourceId, citation }) => [
      sourceId,
      { short: shortCitation(citation) || sourceId, full: fullCitation(citation) || sourceId },
    ]),
  );
}
