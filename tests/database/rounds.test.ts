import { beforeAll, describe, expect, test } from "vitest";
import { findEntries } from "#app/audit/audit.queries.server.ts";
import { Forbidden, Invalid, NotFound, Refused } from "#app/http/errors.ts";
import type { Acting } from "#app/people/person.ts";
import { answerComment, commentOn } from "#app/review/comments.server.ts";
import { acceptLines, closeReview, declineLines, returnRevision, type SeenLine } from "#app/review/decide.server.ts";
import { type MixtureQuestion, MixtureRefused } from "#app/review/mixture.ts";
import {
  findComments,
  findDecisions,
  findLines,
  findLinesWithHandOf,
  findRevision,
} from "#app/review/review.queries.server.ts";
import {
  findLinesWithBases,
  restateLines,
  rewriteLine,
  sendToReview,
  takeLineOut,
  withdrawRevision,
} from "#app/review/revise.server.ts";
import { findRevisionPage } from "#app/review/revisionPage.server.ts";
import { takeSuggestionOf } from "#app/review/revisionPageWrite.server.ts";
import { findTakeOverPage, takeOver } from "#app/review/takeOver.server.ts";
import type { Choice } from "#app/review/takeOver.ts";
import { digits } from "#app/thermo/digits.ts";
import type { Property } from "#app/thermo/property.ts";
import { useDatabase } from "#tests/support/database.ts";
import { expanded, type ValueRow } from "#tests/support/editions.ts";
import { acceptAll, actor, propose, publishWaiting, seenLines } from "#tests/support/revisions.ts";

/*
 * A revision in rounds: sets of one species, comments and their answers, lines that were overtaken, drafts made one.
 * Values: CODATA Key Values for Thermodynamics (1989), ΔfG° by trade arithmetic from them; what differs is made up so
 * that the closure says what the test is about: off by 1 kJ/mol asks to be looked at, off by 10 blocks (the limits are
 * the larger of five tolerances and 3 kJ/mol).
 */

const database = useDatabase();
let steward: Acting;
let second: Acting;
let reviewer: Acting;
let other: Acting;

const SOURCE = { id: "src_codatakeyvalues", title: "CODATA Key Values for Thermodynamics" };
const codata = (key: string, property: Property, text: string, uncertainty = "0.35"): ValueRow => ({
  key,
  property,
  digits: text,
  uncertainty: expanded(uncertainty),
  sourceId: SOURCE.id,
});

beforeAll(async () => {
  steward = await actor("Sela Marsh", "steward");
  second = await actor("Tomas Reed", "steward", "reviewer");
  reviewer = await actor("Rosa Field", "reviewer");
  other = await actor("Olin Brook", "reviewer");
  const first = await propose(
    steward,
    {
      sources: [SOURCE],
      species: ["H2(g)", "N2(g)", "O2(g)", "NH3(g)", "H2O(l)", "CaO(cr)"].map((key) => ({ key })),
      values: [
        codata("H2(g)", "entropy", "130.680", "0.003"),
        codata("N2(g)", "entropy", "191.609", "0.004"),
        codata("O2(g)", "entropy", "205.152", "0.005"),
        codata("NH3(g)", "enthalpyOfFormation", "-45.94"),
        codata("NH3(g)", "entropy", "192.77", "0.05"),
        codata("NH3(g)", "gibbsEnergyOfFormation", "-16.41"),
        codata("H2O(l)", "enthalpyOfFormation", "-285.830", "0.040"),
        codata("CaO(cr)", "enthalpyOfFormation", "-634.92", "0.90"),
        codata("CaO(cr)", "entropy", "38.1", "0.4"),
      ],
    },
    "Key values",
  );
  await acceptAll(steward, reviewer, first);
  await publishWaiting(reviewer);
});

async function refusalOf(work: Promise<unknown>): Promise<Error> {
  try {
    await work;
  } catch (error) {
    if (error instanceof Error) return error;
  }
  throw new Error("It was not refused.");
}

async function questionOf(work: Promise<unknown>): Promise<MixtureQuestion> {
  const refused = await refusalOf(work);
  if (!(refused instanceof MixtureRefused)) throw refused;
  return refused.question;
}

async function seenOf(id: number, ...properties: Property[]): Promise<SeenLine[]> {
  const lines = await findLines(id, database.app);
  return properties.map((property) => {
    const line = lines.find((one) => one.property === property);
    if (!line) throw new Error(`no line for ${property}`);
    return { lineId: line.id, versionId: line.versionId };
  });
}

const statesOf = async (id: number) =>
  Object.fromEntries((await findLines(id, database.app)).map((line) => [line.property, line.state]));
const actsOf = async (id: number) =>
  (await findEntries(0, 10_000, database.app)).filter((one) => one.object_id === String(id)).map((one) => one.act);
const lettersOf = (kind: string) =>
  database.app.selectFrom("letter").selectAll().where("kind", "=", kind).orderBy("made_at", "desc").execute();

/** Ammonia's ΔfH° and ΔfG°, both moved by this much: together they close, either alone is off by it. */
const moved = (enthalpy: string, gibbs: string) =>
  propose(steward, {
    values: [codata("NH3(g)", "enthalpyOfFormation", enthalpy), codata("NH3(g)", "gibbsEnergyOfFormation", gibbs)],
  });

describe("a half-updated row", () => {
  test("a new ΔfH° beside the old ΔfG° that blocks is refused, and accepted once set aside with a reason", async () => {
    const id = await moved("-55.94", "-26.41");
    await sendToReview(steward, id, "");
    // The revision as a whole closes: the mixture alone fails.
    expect((await findRevisionPage(reviewer, id, { page: 1 })).counts.blocks).toBe(0);
    const half = await seenOf(id, "enthalpyOfFormation");
    const question = await questionOf(acceptLines(reviewer, id, half));
    expect(question).toMatchObject({ needsReason: true, findings: [{ severity: "block", species: "NH3(g)" }] });
    expect(question.findings[0]?.title).toBe("Gibbs closure");
    expect(question.findings[0]?.arithmetic.length).toBeGreaterThan(0);
    expect(await statesOf(id)).toEqual({ enthalpyOfFormation: "open", gibbsEnergyOfFormation: "open" });

    const { token } = question;
    // Without a reason, and with the answer to another question, it stays refused.
    expect(await refusalOf(acceptLines(reviewer, id, half, { token, reason: " " }))).toBeInstanceOf(MixtureRefused);
    const elsewhere = { token: "0".repeat(64), reason: "whatever" };
    expect(await refusalOf(acceptLines(reviewer, id, half, elsewhere))).toBeInstanceOf(MixtureRefused);

    await acceptLines(reviewer, id, half, { token, reason: "ΔfG° follows with the next sheet." });
    expect(await statesOf(id)).toEqual({ enthalpyOfFormation: "accepted", gibbsEnergyOfFormation: "open" });
    const { history } = await findRevisionPage(reviewer, id, { page: 1 });
    const told = history.flatMap((round) => round.entries).find((entry) => entry.did.startsWith("set a finding aside"));
    expect(told).toMatchObject({ words: "ΔfG° follows with the next sheet." });
    expect(told?.did).toContain(question.findings[0]?.sentence);

    // Declining the rest leaves the mixture that was answered for, so nothing is asked twice.
    await declineLines(reviewer, id, await seenOf(id, "gibbsEnergyOfFormation"), "It comes with the next sheet.");
    await declineLines(reviewer, id, await seenOf(id, "enthalpyOfFormation"), "Only a trial of the rule.");
    await closeReview(reviewer, id);
  });

  test("one that asks to be looked at is accepted once that is confirmed", async () => {
    const id = await moved("-46.94", "-17.41");
    await sendToReview(steward, id, "");
    const half = await seenOf(id, "gibbsEnergyOfFormation");
    const question = await questionOf(acceptLines(reviewer, id, half));
    expect(question).toMatchObject({ needsReason: false, findings: [{ severity: "look", species: "NH3(g)" }] });
    await acceptLines(reviewer, id, half, { token: question.token, reason: "" });
    expect(await statesOf(id)).toMatchObject({ gibbsEnergyOfFormation: "accepted" });
    // The rest makes the set whole again: nothing to ask.
    await acceptLines(reviewer, id, await seenOf(id, "enthalpyOfFormation"));
    const entries = (await findEntries(0, 10_000, database.app)).filter((one) => one.object_id === String(id));
    expect(entries.find((one) => one.act === "revision.lines-accepted")?.detail).toMatchObject({
      mixture: { findings: [expect.stringContaining("NH3(g)")] },
    });
    await withdrawRevision(steward, id, "only for the test");
  });

  test("declining part of a set that was accepted whole asks in the same way", async () => {
    const id = await moved("-55.94", "-26.41");
    await sendToReview(steward, id, "");
    await acceptLines(reviewer, id, await seenLines(id));
    const half = await seenOf(id, "gibbsEnergyOfFormation");
    const question = await questionOf(declineLines(reviewer, id, half, "not measured"));
    expect(question.needsReason).toBe(true);
    expect(await statesOf(id)).toMatchObject({ gibbsEnergyOfFormation: "accepted" });
    await declineLines(reviewer, id, half, "not measured", { token: question.token, reason: "The new ΔfH° is sure." });
    expect(await statesOf(id)).toEqual({ enthalpyOfFormation: "accepted", gibbsEnergyOfFormation: "declined" });
    await withdrawRevision(steward, id, "only for the test");
  });

  test("declining the whole set asks nothing, and nobody answers for lines of their own hand", async () => {
    const id = await moved("-55.94", "-26.41");
    await sendToReview(steward, id, "");
    await acceptLines(reviewer, id, await seenLines(id));
    await declineLines(reviewer, id, await seenLines(id), "not ours");
    expect(await statesOf(id)).toEqual({ enthalpyOfFormation: "declined", gibbsEnergyOfFormation: "declined" });
    await returnRevision(reviewer, id, "Once more.");
    const [gibbs] = (await findLines(id, database.app)).filter((line) => line.property === "gibbsEnergyOfFormation");
    if (gibbs?.content.kind !== "value") throw new Error("a value was proposed");
    await rewriteLine(second, {
      revisionId: id,
      lineId: gibbs.id,
      expectedVersion: gibbs.version,
      content: { ...gibbs.content, digits: digits("-26.42") },
      reason: "read again",
    });
    await sendToReview(steward, id, "");
    const half = await seenOf(id, "enthalpyOfFormation");
    const { token } = await questionOf(acceptLines(second, id, half));
    expect(await refusalOf(acceptLines(second, id, half, { token, reason: "I know" }))).toBeInstanceOf(Forbidden);
    await withdrawRevision(steward, id, "only for the test");
  });
});

describe("comments", () => {
  test("one on a line is told to the author, waits for an answer, and is answered", async () => {
    const id = await propose(steward, { values: [codata("N2(g)", "heatCapacity", "29.124")] }, "Nitrogen");
    await sendToReview(steward, id, "");
    const [line] = await findLines(id, database.app);
    const lineId = line?.id ?? "";
    await commentOn(reviewer, { revisionId: id, lineId, body: "Which calorimeter?" });
    const [letter] = await lettersOf("revision-commented");
    expect(letter).toMatchObject({ to_person: steward.person.id, path: `/revisions/${id}#line-${lineId}` });
    expect(letter?.body).toContain("Which calorimeter?");

    const waiting = await findRevisionPage(steward, id, { page: 1 });
    expect(waiting.unanswered).toEqual([{ lineId, about: "N2(g) Cp°" }]);
    const asked = waiting.groups[0]?.lines[0]?.threads[0];
    expect(asked).toMatchObject({ body: "Which calorimeter?", by: "Rosa Field", waits: true, answers: [] });
    // Sending again with an open question says so to the reviewers.
    await returnRevision(reviewer, id, "See the question.");
    await sendToReview(steward, id, "");
    expect((await lettersOf("revision-sent"))[0]?.body).toContain("One comment has no answer yet.");

    const comment = asked?.id ?? "";
    await answerComment(steward, { revisionId: id, comment, body: "The adiabatic one." });
    expect((await lettersOf("revision-answered")).map((one) => one.to_person)).toEqual([reviewer.person.id]);
    const answered = await findRevisionPage(reviewer, id, { page: 1 });
    expect(answered.unanswered).toEqual([]);
    expect(answered.groups[0]?.lines[0]?.threads[0]).toMatchObject({
      waits: false,
      answers: [{ body: "The adiabatic one.", by: "Sela Marsh" }],
    });
    expect(answered.changed?.answers.map((one) => one.body)).toEqual(["Which calorimeter?"]);
    expect(await actsOf(id)).toContain("revision.answered");
    await withdrawRevision(steward, id, "only for the test");
  });

  test("an answer needs words, a comment of this revision, and is not answered itself", async () => {
    const id = await propose(steward, { values: [codata("N2(g)", "heatCapacity", "29.124")] });
    const elsewhere = await propose(steward, { values: [codata("N2(g)", "heatCapacity", "29.124")] });
    await commentOn(reviewer, { revisionId: id, lineId: null, body: "Is this all?" });
    const [comment] = await findComments(id, database.app);
    const asked = comment?.id ?? "";
    const body = "It is.";
    expect(await refusalOf(answerComment(steward, { revisionId: id, comment: asked, body: " " }))).toBeInstanceOf(
      Invalid,
    );
    expect(await refusalOf(answerComment(steward, { revisionId: elsewhere, comment: asked, body }))).toBeInstanceOf(
      NotFound,
    );
    await answerComment(steward, { revisionId: id, comment: asked, body });
    const answer = (await findComments(id, database.app)).at(-1)?.id ?? "";
    expect(await refusalOf(answerComment(reviewer, { revisionId: id, comment: answer, body }))).toBeInstanceOf(Refused);
    const inSql = await refusalOf(
      database.app
        .insertInto("comment")
        .values({ revision_id: id, round: 0, body, written_by: reviewer.person.id, answers: answer })
        .execute(),
    );
    expect(inSql).toMatchObject({ code: "TW006" });
    await withdrawRevision(steward, id, "only for the test");
    await withdrawRevision(steward, elsewhere, "only for the test");
  });
});

describe("sent again", () => {
  test("the page says what changed since the round before, and what stays decided", async () => {
    const id = await propose(
      steward,
      {
        values: [
          codata("CaO(cr)", "enthalpyOfFormation", "-634.93", "0.90"),
          codata("CaO(cr)", "entropy", "38.11", "0.40"),
          codata("O2(g)", "entropy", "205.153", "0.005"),
          codata("N2(g)", "heatCapacity", "29.124", "0.01"),
        ],
      },
      "Four lines",
    );
    await sendToReview(steward, id, "");
    const about = (page: Awaited<ReturnType<typeof findRevisionPage>>, text: string) => {
      const line = page.groups.flatMap((group) => group.lines).find((one) => one.about === text);
      if (!line) throw new Error(`no line about ${text}`);
      return line;
    };
    const first = await findRevisionPage(reviewer, id, { page: 1 });
    expect(first.changed).toBeNull();
    const seen = (text: string): SeenLine => {
      const line = about(first, text);
      return { lineId: line.id, versionId: line.versionId };
    };
    await acceptLines(reviewer, id, [seen("CaO(cr) ΔfH°"), seen("CaO(cr) S°"), seen("N2(g) Cp°")]);
    await returnRevision(reviewer, id, "One more digit for S° of lime, and leave oxygen.");
    const lime = (await findLines(id, database.app)).find((line) => line.id === about(first, "CaO(cr) S°").id);
    if (lime?.content.kind !== "value") throw new Error("a value was proposed");
    await rewriteLine(steward, {
      revisionId: id,
      lineId: lime.id,
      expectedVersion: 1,
      content: { ...lime.content, digits: digits("38.112") },
      reason: "as printed",
    });
    await takeLineOut(steward, id, about(first, "O2(g) S°").id, "not ours");
    await sendToReview(steward, id, "Mended.");

    const again = await findRevisionPage(reviewer, id, { page: 1 });
    expect(again.changed).toMatchObject({
      since: 1,
      edited: [
        {
          about: "CaO(cr) S°",
          before: { digits: "38.11" },
          after: { digits: "38.112" },
          reason: "as printed",
          by: "Sela Marsh",
          decided: { decision: "accept", round: 1 },
        },
      ],
      takenOut: [{ about: "O2(g) S°", reason: "not ours" }],
      added: [],
      kept: 2,
    });
    expect(about(again, "CaO(cr) ΔfH°").state).toBe("accepted");
    expect(about(again, "CaO(cr) S°")).toMatchObject({ state: "open", voided: [{ decision: "accept", round: 1 }] });
    expect(again.rounds.map((round) => [round.round, round.outcome])).toEqual([
      [1, "returned"],
      [2, null],
    ]);
    await withdrawRevision(steward, id, "only for the test");
  });
});

describe("an overtaken line", () => {
  test("says what it was written against and what stands now, and is restated alone or with all others", async () => {
    const late = await propose(second, {
      values: [
        codata("H2O(l)", "enthalpyOfFormation", "-285.84", "0.04"),
        codata("H2O(l)", "entropy", "69.96", "0.03"),
      ],
      withdrawals: [{ key: "CaO(cr)", property: "entropy", reason: "misread" }],
    });
    const early = await propose(steward, {
      values: [
        codata("H2O(l)", "enthalpyOfFormation", "-285.85", "0.04"),
        codata("H2O(l)", "entropy", "69.96", "0.03"),
      ],
      withdrawals: [{ key: "CaO(cr)", property: "entropy", reason: "misread" }],
    });
    await acceptAll(steward, reviewer, early);
    await publishWaiting(reviewer);
    const shown = await findRevisionPage(second, late, { page: 1 });
    expect(shown.counts.overtaken).toBe(3);
    const water = shown.groups.flatMap((group) => group.lines).find((line) => line.about === "H2O(l) ΔfH°");
    expect(water).toMatchObject({ stood: { digits: "-285.830" }, now: { figure: { digits: "-285.85" }, since: 2 } });

    // One line alone.
    expect(await restateLines(second, late, water?.id ?? "")).toEqual({ restated: 1, idle: 0 });
    const mended = (await findRevisionPage(second, late, { page: 1 })).groups
      .flatMap((group) => group.lines)
      .find((line) => line.about === "H2O(l) ΔfH°");
    expect(mended).toMatchObject({ stood: { digits: "-285.85" }, difference: "0.01", overtaken: null, version: 2 });
    expect(await refusalOf(restateLines(second, late, water?.id ?? ""))).toBeInstanceOf(Refused);
    // The entropy says what stands now, and there is nothing left to withdraw: neither would change anything.
    const refused = await refusalOf(restateLines(second, late));
    expect(refused.message).toContain("Take them out.");
    expect((await findLinesWithBases(late)).filter((line) => line.overtaken)).toHaveLength(2);
    await withdrawRevision(second, late, "only for the test");
  });

  test.each([
    [
      "what a species is called",
      { species: [{ key: "H2(g)", was: "H2(g)", name: "hydrogen" }] },
      { species: [{ key: "H2(g)", was: "H2(g)", name: "dihydrogen" }] },
    ],
    [
      "a source",
      { sources: [{ ...SOURCE, doi: "10.1016/0021-9614(78)90004-8" }] },
      { sources: [{ ...SOURCE, title: "Key values" }] },
    ],
    [
      "a withdrawal of a value that changed",
      { values: [codata("O2(g)", "entropy", "205.16", "0.01")] },
      { withdrawals: [{ key: "O2(g)", property: "entropy" as const, reason: "misread" }] },
    ],
  ])("%s is restated", async (_what, early, late) => {
    const id = await propose(second, late);
    await acceptAll(steward, reviewer, await propose(steward, early));
    await publishWaiting(reviewer);
    expect((await findLinesWithBases(id)).map((line) => line.overtaken)).toEqual([true]);
    await sendToReview(second, id, "");
    expect(await refusalOf(acceptLines(reviewer, id, await seenLines(id)))).toBeInstanceOf(Refused);
    await returnRevision(reviewer, id, "Overtaken.");
    expect(await restateLines(second, id)).toEqual({ restated: 1, idle: 0 });
    expect((await findLinesWithBases(id)).map((line) => line.overtaken)).toEqual([false]);
    await acceptAll(second, reviewer, id);
    await publishWaiting(reviewer);
  });

  test("restating while a reviewer accepts: one of the two, and the line is never accepted against what is gone", async () => {
    const id = await propose(second, { values: [codata("N2(g)", "entropy", "191.61", "0.004")] });
    await acceptAll(
      steward,
      reviewer,
      await propose(steward, { values: [codata("N2(g)", "entropy", "191.62", "0.004")] }),
    );
    await publishWaiting(reviewer);
    await sendToReview(second, id, "");
    const seen = await seenLines(id);
    await Promise.allSettled([
      acceptLines(reviewer, id, seen),
      returnRevision(other, id, "Overtaken.").then(() => restateLines(second, id)),
      acceptLines(other, id, seen),
    ]);
    expect((await findLines(id, database.app)).map((line) => [line.state, line.version])).toEqual([["open", 2]]);
    await withdrawRevision(second, id, "only for the test");
  });
});

describe("drafts made one", () => {
  const choose = async (into: number, from: number, choice: Choice = "here") => {
    const { from: shown } = await findTakeOverPage(steward, into, from);
    if (!shown) throw new Error("nothing to take over");
    const choices = Object.fromEntries(shown.shared.map((one) => [one.place, choice] as const));
    return { into, from, digest: shown.digest, choices };
  };

  test("lines come over with their versions, makers and comments; the emptied draft says where they went", async () => {
    const into = await propose(steward, { values: [codata("H2(g)", "heatCapacity", "28.836", "0.002")] }, "Hydrogen");
    const from = await propose(second, { values: [codata("N2(g)", "heatCapacity", "29.124", "0.001")] }, "Nitrogen");
    const [line] = await findLines(from, database.app);
    const lineId = line?.id ?? "";
    if (line?.content.kind !== "value") throw new Error("a value was proposed");
    await rewriteLine(second, {
      revisionId: from,
      lineId,
      expectedVersion: 1,
      content: { ...line.content, digits: digits("29.125") },
      reason: "as printed",
    });
    await commentOn(reviewer, { revisionId: from, lineId, body: "Which edition of the book?" });
    expect(await takeOver(steward, await choose(into, from))).toBe(1);

    const lines = await findLines(into, database.app);
    expect(lines.map((one) => [one.id === lineId, one.cameFrom, one.version])).toEqual([
      [false, null, 1],
      [true, from, 2],
    ]);
    const page = await findRevisionPage(reviewer, into, { page: 1 });
    const came = page.groups.flatMap((group) => group.lines).find((one) => one.id === lineId);
    expect(came).toMatchObject({ cameFrom: from, threads: [{ body: "Which edition of the book?", waits: true }] });
    expect(came?.versions.map((one) => one.by)).toEqual(["Tomas Reed", "Tomas Reed"]);
    expect(await findRevision(from, database.app)).toMatchObject({ state: "withdrawn" });
    const emptied = await findRevisionPage(reviewer, from, { page: 1 });
    expect(emptied.ended?.remark).toBe(`Its line went into revision ${into}.`);
    expect(emptied.wentInto).toEqual([into]);
    expect((await lettersOf("revision-taken-over"))[0]).toMatchObject({ to_person: second.person.id });
    expect(await actsOf(into)).toContain("revision.lines-taken-over");
    expect(await actsOf(from)).toContain("revision.withdrawn");

    // Four eyes: whoever wrote a line elsewhere cannot decide it here.
    await sendToReview(steward, into, "");
    expect([...(await findLinesWithHandOf(into, second.person.id, database.app))]).toEqual([lineId]);
    expect(await refusalOf(acceptLines(second, into, await seenLines(into)))).toBeInstanceOf(Forbidden);
    await acceptLines(reviewer, into, await seenLines(into));
    await closeReview(reviewer, into);
    await publishWaiting(reviewer);
  });

  test("places that both propose are chosen one by one; the other line is taken out, on record", async () => {
    const into = await propose(steward, {
      values: [codata("H2O(l)", "heatCapacity", "75.29"), codata("O2(g)", "heatCapacity", "29.36")],
    });
    const from = await propose(second, {
      values: [codata("H2O(l)", "heatCapacity", "75.35"), codata("O2(g)", "heatCapacity", "29.38")],
    });
    const asked = await choose(into, from);
    const shown = (await findTakeOverPage(steward, into, from)).from;
    expect(shown?.shared.map((one) => [one.about, one.here.says, one.there.says])).toEqual([
      ["H2O(l) Cp°", "75.29 J/(mol K)", "75.35 J/(mol K)"],
      ["O2(g) Cp°", "29.36 J/(mol K)", "29.38 J/(mol K)"],
    ]);
    const [water = "", oxygen = ""] = Object.keys(asked.choices);
    expect(await refusalOf(takeOver(steward, { ...asked, choices: { [water]: "there" } }))).toBeInstanceOf(Invalid);
    expect(await takeOver(steward, { ...asked, choices: { [water]: "there", [oxygen]: "here" } })).toBe(1);
    const said = (await findLines(into, database.app)).map((line) =>
      line.content.kind === "value" ? line.content.digits : "",
    );
    expect(said).toEqual(["29.36", "75.35"]);
    const takenOut = (await findEntries(0, 10_000, database.app)).filter(
      (one) => one.act === "revision.line-taken-out" && [String(into), String(from)].includes(one.object_id ?? ""),
    );
    expect(takenOut.map((one) => one.object_id)).toEqual([String(from), String(into)]);
    await withdrawRevision(steward, into, "only for the test");
  });

  test("a line accepted in a returned revision is decided anew, visibly", async () => {
    const into = await propose(steward, { values: [codata("H2(g)", "enthalpyIncrement", "8.468", "0.001")] });
    const from = await propose(second, { values: [codata("N2(g)", "enthalpyIncrement", "8.670", "0.001")] });
    await sendToReview(second, from, "");
    await acceptLines(reviewer, from, await seenLines(from));
    await returnRevision(reviewer, from, "Put it with the other gases.");
    await takeOver(steward, await choose(into, from));
    const lines = await findLines(into, database.app);
    expect(lines.map((line) => [line.version, line.state])).toEqual([
      [1, "open"],
      [2, "open"],
    ]);
    expect((await findDecisions(into, database.app)).map((one) => Boolean(one.void))).toEqual([true]);
    await withdrawRevision(steward, into, "only for the test");
  });

  test("is refused for a revision in review, for one whose lines moved, and for itself", async () => {
    const into = await propose(steward, { values: [codata("H2(g)", "enthalpyIncrement", "8.468", "0.001")] });
    const from = await propose(steward, { values: [codata("N2(g)", "enthalpyIncrement", "8.670", "0.001")] });
    const asked = await choose(into, from);
    expect(await refusalOf(takeOver(reviewer, asked))).toBeInstanceOf(Forbidden);
    expect(await refusalOf(takeOver(steward, { ...asked, from: into }))).toBeInstanceOf(Invalid);
    expect(await refusalOf(takeOver(steward, { ...asked, from: 999_999 }))).toBeInstanceOf(NotFound);
    const [line] = await findLines(from, database.app);
    await takeLineOut(steward, from, line?.id ?? "", "not ours");
    expect((await refusalOf(takeOver(steward, asked))).message).toContain("no line to take over");
    await sendToReview(steward, into, "");
    expect(await refusalOf(takeOver(steward, asked))).toBeInstanceOf(Refused);
    // In plain SQL as the application: neither out of review nor without saying where it came from.
    const [held] = await findLines(into, database.app);
    const move = (to: number) =>
      database.app
        .updateTable("revision_line")
        .set({ revision_id: to })
        .where("id", "=", held?.id ?? "")
        .execute();
    expect(await refusalOf(move(from))).toMatchObject({ code: "TW006" });
    await returnRevision(reviewer, into, "Once more.");
    expect(await refusalOf(move(from))).toMatchObject({ code: "TW001" });
    await withdrawRevision(steward, into, "only for the test");
    await withdrawRevision(steward, from, "only for the test");
  });

  test("taking over while the other is sent, and each other's lines at once: every line in one place", async () => {
    for (let round = 0; round < 4; round += 1) {
      const into = await propose(steward, { values: [codata("H2(g)", "enthalpyIncrement", "8.468", "0.001")] });
      const from = await propose(second, { values: [codata("N2(g)", "enthalpyIncrement", "8.670", "0.001")] });
      const [over, sent] = await Promise.allSettled([
        takeOver(steward, await choose(into, from)),
        sendToReview(second, from, ""),
      ]);
      expect([over, sent].filter((one) => one.status === "fulfilled")).toHaveLength(1);
      const state = (await findRevision(from, database.app))?.state;
      expect([
        (await findLines(into, database.app)).length,
        (await findLines(from, database.app)).length,
        state,
      ]).toEqual(over.status === "fulfilled" ? [2, 0, "withdrawn"] : [1, 1, "in_review"]);
      await withdrawRevision(steward, into, "only for the test");
      if (state === "in_review") await withdrawRevision(second, from, "only for the test");
    }
    const one = await propose(steward, { values: [codata("H2(g)", "enthalpyIncrement", "8.468", "0.001")] });
    const two = await propose(second, { values: [codata("N2(g)", "enthalpyIncrement", "8.670", "0.001")] });
    const [there, back] = await Promise.all([choose(one, two), choose(two, one)]);
    const outcomes = await Promise.allSettled([takeOver(steward, there), takeOver(second, back)]);
    expect(outcomes.filter((outcome) => outcome.status === "fulfilled")).toHaveLength(1);
    const left = [...(await findLines(one, database.app)), ...(await findLines(two, database.app))];
    expect(left).toHaveLength(2);
    await withdrawRevision(steward, left[0]?.revisionId ?? 0, "only for the test");
  });
});

test("a suggestion that changes two values is one act: two line versions, one entry of the record", async () => {
  // ΔfH° and ΔfG° exchanged (trade.md section 6).
  const id = await propose(steward, {
    values: [codata("NH3(g)", "enthalpyOfFormation", "-16.41"), codata("NH3(g)", "gibbsEnergyOfFormation", "-45.94")],
  });
  const page = await findRevisionPage(steward, id, { page: 1 });
  const findings = page.groups.flatMap((group) => group.lines).flatMap((line) => line.findings);
  const taking = findings.flatMap((finding) =>
    finding.suggestions.flatMap((suggestion) =>
      suggestion.takes?.seen.length === 2 ? [{ finding: finding.id, takes: suggestion.takes }] : [],
    ),
  )[0];
  if (!taking) throw new Error("no suggestion changes two values");
  const before = await actsOf(id);
  await takeSuggestionOf(steward, id, {
    finding: taking.finding,
    index: taking.takes.index,
    seen: await seenLines(id),
  });
  expect((await actsOf(id)).slice(before.length)).toEqual(["revision.line-written"]);
  const lines = await findLines(id, database.app);
  expect(lines.map((line) => [line.version, line.content.kind === "value" && line.content.digits])).toEqual([
    [2, "-45.94"],
    [2, "-16.41"],
  ]);
  await withdrawRevision(steward, id, "only for the test");
});
