import { checks } from "#app/checks/registry.ts";
import { database } from "#app/db/database.server.ts";
import { findDetailsAsOf, findNewestEdition } from "#app/editions/editions.queries.server.ts";
import { demand, may } from "#app/people/permissions.ts";
import type { Acting } from "#app/people/person.ts";
import {
  countFindingsByCheck,
  countFindingsSetAside,
  findAcceptancesIn,
  findExaminationOf,
  findFindingsSetAside,
  findHandsIn,
  findRevisionsIn,
} from "./editionPage.queries.server.ts";
import { type CheckRun, checksRun, type RevisionBehind, revisionsBehind } from "./editionPage.ts";
import { nextCounts } from "./homePage.ts";
import type { NextCounts } from "./publishPage.ts";
import { countNextLines } from "./review.queries.server.ts";

/** Findings set aside that are shown; their revisions have them all. */
const MOST_ASIDE = 50;

/** A finding that did not stop the edition because a reviewer set it aside. */
export interface FindingAside {
  id: string;
  /** Key of the species as the edition has it; null where it is not in it. */
  species: string | null;
  check: string;
  title: string;
  severity: "block" | "look" | "remark";
  sentence: string;
  arithmetic: readonly string[];
  revisionId: number;
  by: string;
  at: Date;
  reason: string;
}

/** The examination that an edition passed. */
export interface EditionExamination {
  at: Date;
  policy: number;
  lines: number;
  blocks: number;
  looks: number;
  remarks: number;
  /** SHA-256 of what the checks saw. */
  inputDigest: string;
  checks: readonly CheckRun[];
  aside: readonly FindingAside[];
  /** How many were set aside altogether. */
  asideCount: number;
}

/** Who and what stands behind an edition. */
export interface EditionReview {
  revisions: readonly RevisionBehind[];
  /** Null where the edition was made otherwise than by publishing. */
  examination: EditionExamination | null;
}

/** The people, the findings set aside and the checks behind edition n. @throws Forbidden */
export async function findEditionReview(acting: Acting, n: number): Promise<EditionReview> {
  demand(acting, "revision:read");
  const db = database();
  const [revisions, hands, acceptances, examination] = await Promise.all([
    findRevisionsIn(n, db),
    findHandsIn(n, db),
    findAcceptancesIn(n, db),
    findExaminationOf(n, db),
  ]);
  return {
    revisions: revisionsBehind(revisions, hands, acceptances),
    examination: examination ? await findExamination(n, examination) : null,
  };
}

async function findExamination(
  n: number,
  examination: NonNullable<Awaited<ReturnType<typeof findExaminationOf>>>,
): Promise<EditionExamination> {
  const { id, at, policy, lines, blocks, looks, remarks, inputDigest } = examination;
  const db = database();
  const [counts, aside, asideCount] = await Promise.all([
    countFindingsByCheck(id, db),
    findFindingsSetAside(n, id, MOST_ASIDE, db),
    countFindingsSetAside(n, id, db),
  ]);
  const details = await findDetailsAsOf(n, { speciesIds: [...new Set(aside.map((one) => one.speciesId))] }, db);
  const keys = new Map(details.map((detail) => [detail.speciesId, detail.key]));
  const titles = new Map(checks.map((check) => [check.code, check.title]));
  return {
    at,
    policy,
    lines,
    blocks,
    looks,
    remarks,
    inputDigest: inputDigest.toString("hex"),
    checks: checksRun(examination.checks, counts, titles),
    aside: aside.map(({ speciesId, ...finding }) => ({
      id: finding.id,
      species: keys.get(speciesId) ?? null,
      check: finding.check,
      title: titles.get(finding.check) ?? finding.check,
      severity: finding.severity,
      sentence: finding.sentence,
      arithmetic: finding.arithmetic,
      revisionId: finding.revisionId,
      by: finding.by,
      at: finding.at,
      reason: finding.reason,
    })),
    asideCount,
  };
}

/** What waits for the next edition. */
export interface NextEditionCount {
  number: number;
  counts: NextCounts;
  revisions: number;
}

/** What waits for the next edition, told to those who publish; null for everybody else. @throws Forbidden */
export async function findNextEditionCount(acting: Acting): Promise<NextEditionCount | null> {
  demand(acting, "revision:read");
  if (!may(acting.person.roles, "edition:publish")) return null;
  const [lines, newest] = await Promise.all([countNextLines(database()), findNewestEdition(database())]);
  return {
    number: (newest?.number ?? 0) + 1,
    counts: nextCounts(lines),
    revisions: new Set(lines.map((line) => line.revisionId)).size,
  };
}
