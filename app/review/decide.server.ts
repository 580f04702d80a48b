import { act, type ActScope } from "#app/audit/act.server.ts";
import { checks } from "#app/checks/registry.ts";
import { Forbidden, Invalid, NotFound, Refused } from "#app/http/errors.ts";
import { enqueueLetter } from "#app/notify/letters.server.ts";
import { revisionDecidedLetter, revisionReturnedLetter } from "#app/notify/reviewLetters.ts";
import { demand } from "#app/people/permissions.ts";
import type { Acting } from "#app/people/person.ts";
import { findAccount } from "#app/people/people.queries.server.ts";
import { findingsOf } from "./examine.server.ts";
import { type MixtureAnswer, MixtureRefused, questionAbout, questionInWords } from "./mixture.ts";
import {
  findFinding,
  findFindings,
  findGroundless,
  findLineBases,
  findLines,
  findLinesWithHandOf,
  findNewestExamination,
  findRevisionForUpdate,
  findSetAside,
  findWaitingLines,
  insertComment,
  insertDecisions,
  insertSetAside,
  type LineRow,
  updateRevisionState,
} from "./review.queries.server.ts";
import { isOvertaken } from "./revise.server.ts";
import { mayMove, revisionStateWords } from "./states.ts";

/** A line as the reviewer saw it: deciding another version than the one shown is refused. */
export interface SeenLine {
  lineId: string;
  versionId: string;
}

async function findInReview(acting: Acting, id: number, trx: ActScope["trx"]) {
  demand(acting, "revision:decide");
  const revision = await findRevisionForUpdate(id, trx);
  if (!revision) throw new NotFound(`There is no revision ${id}.`);
  if (revision.state !== "in_review") {
    throw new Refused(
      `Revision ${id} is ${revisionStateWords[revision.state]}; lines are decided while it is in review.`,
    );
  }
  return revision;
}

/** The lines a reviewer named, as they stand; refused when one was edited, is decided by its own author or is gone. */
async function findSeen(
  acting: Acting,
  revisionId: number,
  seen: readonly SeenLine[],
  trx: ActScope["trx"],
): Promise<LineRow[]> {
  const lines = new Map((await findLines(revisionId, trx)).map((line) => [line.id, line]));
  const own = await findLinesWithHandOf(revisionId, acting.person.id, trx);
  return seen.map(({ lineId, versionId }) => {
    const line = lines.get(lineId);
    if (!line) throw new NotFound(`Revision ${revisionId} has no such line.`);
    if (line.versionId !== versionId)
      throw new Refused("A line was edited since you opened this page. Look at what it says now, then decide.");
    if (own.has(lineId)) throw new Forbidden("You had a hand in this line, so somebody else decides it.");
    return line;
  });
}

/**
 * Accepts lines together. Refused as a whole when one of them was overtaken or edited, when the acting person had a hand
 * in one, or when the table as it would then be (what stands, what waits, and the accepted part of this revision) fails
 * a check that nobody set aside: so a half-updated species cannot slip through.
 *
 * @param answer to the question that an earlier try came back with
 * @throws MixtureRefused when the checks find something in the mixture that the page of the revision does not say: what
 *   blocks must be set aside with a reason, what asks for a look be confirmed
 */
export async function acceptLines(
  acting: Acting,
  revisionId: number,
  seen: readonly SeenLine[],
  answer: MixtureAnswer | null = null,
): Promise<void> {
  if (seen.length === 0) throw new Invalid("Choose at least one line.");
  await act(acting, async ({ trx, record }) => {
    await findInReview(acting, revisionId, trx);
    const chosen = await findSeen(acting, revisionId, seen, trx);
    const bases = await findLineBases(
      chosen.map((line) => line.id),
      trx,
    );
    for (const line of chosen) {
      if (!isOvertaken(line, bases.get(line.id))) continue;
      const waits = bases.get(line.id)?.waitingRevision;
      throw new Refused(
        waits
          ? `Another value for this place was accepted since and waits in revision ${waits}. Return the revision so that the steward can restate the line.`
          : "What stands has changed since this line was written. Return the revision so that the steward can restate it.",
      );
    }
    const mixture = await demandMixture(
      acting,
      {
        revisionId,
        touched: speciesOf(chosen),
        accepts: (line) => line.state === "accepted" || chosen.some((one) => one.id === line.id),
        deciding: "With only these lines accepted",
      },
      answer,
      trx,
    );
    await insertDecisions(
      chosen.map((line) => ({
        versionId: line.versionId,
        decision: "accept" as const,
        reason: "",
        decidedBy: acting.person.id,
      })),
      trx,
    );
    record({
      act: "revision.lines-accepted",
      objectId: revisionId,
      detail: {
        lines: chosen.map((line) => ({
          line: line.id,
          version: line.version,
          content: line.contentHash.toString("hex"),
        })),
        ...mixture,
      },
    });
  });
}

/**
 * Declines lines, with the reason. What stays accepted of the same species is examined without them first.
 * @throws MixtureRefused as `acceptLines` does
 */
export async function declineLines(
  acting: Acting,
  revisionId: number,
  seen: readonly SeenLine[],
  reason: string,
  answer: MixtureAnswer | null = null,
): Promise<void> {
  if (seen.length === 0) throw new Invalid("Choose at least one line.");
  if (!reason.trim()) throw new Invalid("Say why the line is declined.", [{ pointer: "/reason", detail: "Say why." }]);
  await act(acting, async ({ trx, record }) => {
    await findInReview(acting, revisionId, trx);
    const chosen = await findSeen(acting, revisionId, seen, trx);
    const mixture = await demandMixture(
      acting,
      {
        revisionId,
        touched: speciesOf(chosen),
        accepts: (line) => line.state === "accepted" && !chosen.some((one) => one.id === line.id),
        deciding: chosen.length === 1 ? "With this line declined" : "With these lines declined",
      },
      answer,
      trx,
    );
    await insertDecisions(
      chosen.map((line) => ({
        versionId: line.versionId,
        decision: "decline" as const,
        reason,
        decidedBy: acting.person.id,
      })),
      trx,
    );
    record({
      act: "revision.line-declined",
      objectId: revisionId,
      detail: { lines: chosen.map((line) => ({ line: line.id, version: line.version })), reason, ...mixture },
    });
  });
}

const speciesOf = (lines: readonly LineRow[]): ReadonlySet<string> =>
  new Set(lines.flatMap((line) => (line.speciesId === null ? [] : [line.speciesId])));

/** Which lines of a revision would be accepted after a decision, and which species it touches. */
interface Deciding {
  revisionId: number;
  touched: ReadonlySet<string>;
  accepts: (line: LineRow) => boolean;
  /** What was asked for, in words that begin a sentence: "With only these lines accepted". */
  deciding: string;
}

/**
 * Examines what would stand after a decision, and demands an answer to what the page of the revision does not say. What
 * blocks and was answered with a reason is set aside here, since no examination of the revision holds it.
 *
 * @returns what the record says of it: nothing where there was nothing to ask
 */
async function demandMixture(
  acting: Acting,
  { revisionId, touched, accepts, deciding }: Deciding,
  answer: MixtureAnswer | null,
  trx: ActScope["trx"],
): Promise<{ mixture?: { reason: string; findings: string[] } }> {
  const accepted = (await findLines(revisionId, trx)).filter(accepts);
  if (!accepted.some((line) => line.speciesId !== null && touched.has(line.speciesId))) return {};
  const waiting = await findWaitingLines({ decidedOnly: false }, trx);
  const others = waiting.filter((line) => line.revisionId !== revisionId);
  const { findings } = await findingsOf(accepted, others, trx);
  const aside = await findSetAside([revisionId], trx);
  const examination = await findNewestExamination(revisionId, trx);
  const told = new Set(
    (examination ? await findFindings(examination.id, trx) : []).map((one) => one.fingerprint.toString("hex")),
  );
  const open = findings
    .map((one) => ({ ...one, print: one.fingerprint.toString("hex") }))
    .filter((one) => one.severity !== "remark" && touched.has(one.speciesId) && !aside.has(one.print));
  // What the page says already blocks until it is set aside there; a look there was looked at before deciding.
  const stops = open.filter((one) => one.severity === "block" && told.has(one.print));
  const [first] = stops;
  if (first) {
    throw new Refused(
      `${deciding}, ${first.species} would not pass: ${first.sentence}${stops.length > 1 ? ` (and ${stops.length - 1} more)` : ""} Decide its lines together, or set the finding aside with a reason.`,
    );
  }
  const untold = open.filter((one) => !told.has(one.print));
  if (untold.length === 0) return {};
  const titles = new Map(checks.map((check) => [check.code, check.title]));
  const question = questionAbout(
    untold.map(({ severity, species, check, sentence, arithmetic, print }) => ({
      severity,
      species,
      title: titles.get(check) ?? check,
      sentence,
      arithmetic,
      fingerprint: print,
    })),
  );
  if (answer?.token !== question.token) throw new MixtureRefused(questionInWords(deciding, question), question);
  const reason = answer.reason.trim();
  if (question.needsReason) {
    if (reason === "") throw new MixtureRefused("Say why what blocks is set aside.", question);
    const own = await findLinesWithHandOf(revisionId, acting.person.id, trx);
    const blocks = untold.filter((one) => one.severity === "block");
    const ofSpecies = new Set(blocks.map((one) => one.speciesId));
    const lines = await findLines(revisionId, trx);
    if (lines.some((line) => line.speciesId !== null && ofSpecies.has(line.speciesId) && own.has(line.id))) {
      throw new Forbidden("You had a hand in the lines of this species, so somebody else sets its findings aside.");
    }
    for (const { fingerprint, sentence } of blocks) {
      await insertSetAside({ revisionId, fingerprint, reason, by: acting.person.id, sentence }, trx);
    }
  }
  return { mixture: { reason, findings: untold.map((one) => `${one.species}: ${one.sentence}`) } };
}

/** Sets a blocking finding aside, with the reason. It stays aside only while it says the same. */
export async function setFindingAside(
  acting: Acting,
  revisionId: number,
  findingId: string,
  reason: string,
): Promise<void> {
  if (!reason.trim())
    throw new Invalid("Say why the finding is set aside.", [{ pointer: "/reason", detail: "Say why." }]);
  await act(acting, async ({ trx, record }) => {
    await findInReview(acting, revisionId, trx);
    const finding = await findFinding(findingId, trx);
    if (!finding || finding.revision_id !== revisionId) throw new NotFound("This revision has no such finding.");
    const lines = (await findLines(revisionId, trx)).filter((line) => line.speciesId === finding.species_id);
    const own = await findLinesWithHandOf(revisionId, acting.person.id, trx);
    if (lines.some((line) => own.has(line.id))) {
      throw new Forbidden("You had a hand in the lines of this species, so somebody else sets its findings aside.");
    }
    await insertSetAside({ revisionId, fingerprint: finding.fingerprint, reason, by: acting.person.id }, trx);
    record({
      act: "revision.finding-set-aside",
      objectId: revisionId,
      detail: { check: finding.check_code, species: finding.species_id, sentence: finding.sentence, reason },
    });
  });
}

/** Returns a revision to its steward with words, and writes to them. */
export async function returnRevision(acting: Acting, id: number, remark: string): Promise<void> {
  if (!remark.trim())
    throw new Invalid("Say what should be mended.", [{ pointer: "/remark", detail: "Say what should be mended." }]);
  await act(acting, async ({ trx, record }) => {
    const revision = await findInReview(acting, id, trx);
    await updateRevisionState(
      { id, from: revision.state, to: "returned", round: revision.round, by: acting.person.id, remark },
      trx,
    );
    await insertComment(
      { revisionId: id, lineId: null, round: revision.round, body: remark, writtenBy: acting.person.id },
      trx,
    );
    const author = await findAccount(revision.madeBy, trx);
    if (author) {
      await enqueueLetter(
        {
          kind: "revision-returned",
          toPerson: author.id,
          toAddress: author.email,
          ...revisionReturnedLetter({ id, title: revision.title, by: acting.person.name, remark }),
        },
        trx,
      );
    }
    record({ act: "revision.returned", objectId: id, detail: { round: revision.round, remark } });
  });
}

/** Closes the review once every line is accepted or declined; the accepted ones go into the next edition. */
export async function closeReview(acting: Acting, id: number): Promise<{ accepted: number; declined: number }> {
  return act(acting, async ({ trx, record }) => {
    const revision = await findInReview(acting, id, trx);
    if (!mayMove(revision.state, "decided")) throw new Refused(`Revision ${id} cannot be closed now.`);
    const lines = await findLines(id, trx);
    const open = lines.filter((line) => line.state === "open").length;
    if (open > 0)
      throw new Refused(
        `${open} ${open === 1 ? "line has" : "lines have"} no decision yet. Accept or decline every line, then close the review.`,
      );
    const own = await findLinesWithHandOf(id, acting.person.id, trx);
    if (own.size > 0) throw new Forbidden("You had a hand in this revision, so somebody else closes its review.");
    await demandGround(id, trx);
    const accepted = lines.filter((line) => line.state === "accepted").length;
    const declined = lines.length - accepted;
    await updateRevisionState(
      { id, from: revision.state, to: "decided", round: revision.round, by: acting.person.id, remark: "" },
      trx,
    );
    const author = await findAccount(revision.madeBy, trx);
    if (author) {
      await enqueueLetter(
        {
          kind: "revision-decided",
          toPerson: author.id,
          toAddress: author.email,
          ...revisionDecidedLetter({ id, title: revision.title, by: acting.person.name, accepted, declined }),
        },
        trx,
      );
    }
    record({ act: "revision.decided", objectId: id, detail: { accepted, declined } });
    return { accepted, declined };
  });
}

/**
 * A decided revision is final, so an accepted value whose species or source was declined could never be published, and
 * would hold up every edition after it.
 */
async function demandGround(id: number, trx: ActScope["trx"]): Promise<void> {
  const groundless = await findGroundless(id, trx);
  const species = groundless.filter((one) => one.lacksSpecies).length;
  const sources = groundless.filter((one) => one.lacksSource).length;
  if (species > 0) {
    throw new Refused(
      `${species === 1 ? "One accepted value belongs" : `${species} accepted values belong`} to a species that is not accepted. Accept the line that names the species, or decline its values.`,
    );
  }
  if (sources > 0) {
    throw new Refused(
      `${sources === 1 ? "One accepted value rests" : `${sources} accepted values rest`} on a source that is not accepted. Accept the line of the source, or decline the values that rest on it.`,
    );
  }
}
