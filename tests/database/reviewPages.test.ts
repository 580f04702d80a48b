import { beforeAll, describe, expect, test } from "vitest";
import { Forbidden, Invalid, NotFound, Refused } from "#app/http/errors.ts";
import type { Acting } from "#app/people/person.ts";
import { acceptLines, closeReview, declineLines, returnRevision } from "#app/review/decide.server.ts";
import { findPublishPage } from "#app/review/publishPage.server.ts";
import { findLines } from "#app/review/review.queries.server.ts";
import { restateLines, sendToReview, takeLineOut, withdrawRevision } from "#app/review/revise.server.ts";
import type { RevisionPage } from "#app/review/revisionPage.ts";
import { acceptCleanLines, findRevisionPage } from "#app/review/revisionPage.server.ts";
import { takeSuggestionOf, writeValue } from "#app/review/revisionPageWrite.server.ts";
import { findRevisionsPage } from "#app/review/revisionsPage.server.ts";
import { useDatabase } from "#tests/support/database.ts";
import { expanded, standard, type ValueRow } from "#tests/support/editions.ts";
import { acceptAll, actor, propose, publishWaiting, seenLines } from "#tests/support/revisions.ts";

/*
 * What the pages of the review show and do. Values: CODATA Key Values for Thermodynamics (1989), as published; the
 * in-house figures beside them are invented, and −49.54 is −45.94 with two digits exchanged.
 */

const database = useDatabase();
let steward: Acting;
let reviewer: Acting;
let both: Acting;

const CODATA = { id: "src_codatakeyvalues", title: "CODATA Key Values for Thermodynamics" };
const BOMB = { id: "src_bombcalorimeter", title: "Rotating-bomb calorimetry (invented)", kind: "measurement" as const };
const codata = (key: string, property: ValueRow["property"], text: string, uncertainty: string): ValueRow => ({
  key,
  property,
  digits: text,
  uncertainty: expanded(uncertainty),
  sourceId: CODATA.id,
});
const measured = (key: string, property: ValueRow["property"], text: string, uncertainty: string): ValueRow => ({
  key,
  property,
  digits: text,
  uncertainty: standard(uncertainty),
  sourceId: BOMB.id,
});

/** One line blocks, one asks to be looked at, and three are clean: two values of one species and one of another. */
const CAMPAIGN = {
  values: [
    codata("CaO(cr)", "enthalpyOfFormation", "-634.93", "0.90"),
    codata("CaO(cr)", "entropy", "38.11", "0.40"),
    codata("NH3(g)", "enthalpyOfFormation", "-49.54", "0.30"),
    codata("ZnO(cr)", "enthalpyOfFormation", "-350.5", "0.27"),
    codata("O2(g)", "entropy", "205.153", "0.005"),
  ],
};

beforeAll(async () => {
  steward = await actor("Ines Halvard", "steward");
  reviewer = await actor("Ruth Amsel", "reviewer");
  both = await actor("Tom Breckan", "steward", "reviewer");
  const first = await propose(steward, {
    sources: [CODATA],
    species: ["H2(g)", "N2(g)", "O2(g)", "NH3(g)", "Ca(cr)", "CaO(cr)", "Zn(cr)", "ZnO(cr)"].map((key) => ({ key })),
    values: [
      codata("H2(g)", "entropy", "130.680", "0.003"),
      codata("N2(g)", "entropy", "191.609", "0.004"),
      codata("O2(g)", "entropy", "205.152", "0.005"),
      codata("NH3(g)", "enthalpyOfFormation", "-45.94", "0.35"),
      codata("NH3(g)", "entropy", "192.77", "0.05"),
      codata("NH3(g)", "gibbsEnergyOfFormation", "-16.41", "0.35"),
      codata("CaO(cr)", "enthalpyOfFormation", "-634.92", "0.90"),
      codata("CaO(cr)", "entropy", "38.1", "0.4"),
      codata("ZnO(cr)", "enthalpyOfFormation", "-350.46", "0.27"),
    ],
  });
  await acceptAll(steward, reviewer, first);
  await publishWaiting(reviewer);
});

const page = (acting: Acting, id: number) => findRevisionPage(acting, id, { page: 1 });
const linesOf = (shown: RevisionPage) => shown.groups.flatMap((group) => group.lines);
const lineAbout = (shown: RevisionPage, about: string) => {
  const found = linesOf(shown).find((line) => line.about === about);
  if (!found) throw new Error(`no line about ${about}`);
  return found;
};

async function refusalOf(work: Promise<unknown>): Promise<Error> {
  try {
    await work;
  } catch (error) {
    if (error instanceof Error) return error;
  }
  throw new Error("It was not refused.");
}

describe("the reviewer's page", () => {
  let id = 0;
  beforeAll(async () => {
    id = await propose(steward, CAMPAIGN, "Spring campaign");
    await sendToReview(steward, id, "The oxides first, please.");
  });

  test("shows the block with its arithmetic before the look before the clean lines, each beside what stands", async () => {
    const shown = await page(reviewer, id);
    expect(shown.groups.map((group) => [group.rank, group.speciesKey])).toEqual([
      ["block", "NH3(g)"],
      ["look", "ZnO(cr)"],
      ["clean", "CaO(cr)"],
      ["clean", "O2(g)"],
    ]);
    const ammonia = lineAbout(shown, "NH3(g) ΔfH°");
    expect(ammonia).toMatchObject({
      stood: { digits: "-45.94", uncertainty: { digits: "0.35", kind: "expanded", coverageFactor: 2 } },
      proposed: { digits: "-49.54" },
      difference: "-3.60",
      mark: "block",
      mayAccept: true,
    });
    const closure = ammonia.findings.find((finding) => finding.check === "gibbs-closure");
    expect(closure).toMatchObject({ severity: "block", title: "Gibbs closure", maySetAside: true });
    expect(closure?.arithmetic.length).toBeGreaterThan(0);
    expect(closure?.suggestions[0]).toMatchObject({ becomes: "-45.94", slip: "digits-exchanged", takes: null });
    expect(shown.cleanSet.count).toBe(3);
    expect(shown.sent).toMatchObject({ by: "Ines Halvard", remark: "The oxides first, please." });
  });

  test("accepts the clean lines only as they were seen", async () => {
    const shown = await page(reviewer, id);
    const oxygen = (await seenLines(id)).find((seen) => seen.lineId === lineAbout(shown, "O2(g) S°").id);
    if (!oxygen) throw new Error("a line of oxygen was proposed");
    await acceptLines(reviewer, id, [oxygen]);
    const refused = await refusalOf(acceptCleanLines(reviewer, id, shown.cleanDigest));
    expect(refused).toBeInstanceOf(Refused);
    expect(refused.message).toContain("there are 2 now");
    expect(await acceptCleanLines(reviewer, id, (await page(reviewer, id)).cleanDigest)).toBe(2);
    expect((await page(reviewer, id)).counts).toMatchObject({ open: 2, accepted: 3, blocks: 1 });
    expect(await refusalOf(acceptCleanLines(reviewer, id, shown.cleanDigest))).toBeInstanceOf(Refused);
  });

  test("is no page of a steward's buttons, and a steward's page has none of the reviewer's", async () => {
    const shown = await page(steward, id);
    expect(shown.may).toMatchObject({ decide: false, close: false, comment: true, withdraw: true });
    expect(linesOf(shown).some((line) => line.mayAccept || line.mayDecline || line.mayEdit)).toBe(false);
    expect(await refusalOf(acceptCleanLines(steward, id, shown.cleanDigest))).toBeInstanceOf(Forbidden);
  });

  test("offers no decision on lines in which the reader had a hand, and says how many there are", async () => {
    const own = await propose(both, { values: [codata("N2(g)", "entropy", "191.610", "0.004")] });
    await sendToReview(both, own, "");
    const shown = await page(both, own);
    expect(shown.own).toBe(1);
    expect(shown.may.decide).toBe(true);
    expect(linesOf(shown)[0]).toMatchObject({ own: true, mayAccept: false, mayDecline: false });
    expect(shown.cleanSet.count).toBe(0);
    await withdrawRevision(both, own, "only for the test");
  });

  test("keeps a line out of the clean ones while another for its place waits to be published", async () => {
    const second = await propose(both, { values: [codata("CaO(cr)", "entropy", "38.12", "0.40")] });
    await sendToReview(both, second, "");
    const shown = await page(reviewer, second);
    expect(linesOf(shown)[0]).toMatchObject({ behind: id, overtaken: null, mayAccept: false, mayDecline: true });
    expect(shown.cleanSet.count).toBe(0);
    // The act refuses it too.
    expect(await refusalOf(acceptLines(reviewer, second, await seenLines(second)))).toBeInstanceOf(Refused);
    await withdrawRevision(both, second, "only for the test");
    await withdrawRevision(steward, id, "only for the test");
  });

  test("is not there for a number nobody gave", async () => {
    expect(await refusalOf(page(reviewer, 999_999))).toBeInstanceOf(NotFound);
  });
});

describe("the steward's page", () => {
  let id = 0;
  beforeAll(async () => {
    id = await propose(steward, CAMPAIGN);
  });

  test("takes a suggestion in one act: a new version whose note says what was repaired, examined again", async () => {
    const before = await page(steward, id);
    const closure = lineAbout(before, "NH3(g) ΔfH°").findings.find((finding) => finding.check === "gibbs-closure");
    const takes = closure?.suggestions[0]?.takes;
    if (!closure || !takes) throw new Error("the suggestion cannot be taken");
    const [lineId = "", versionId = ""] = takes.seen[0]?.split(":") ?? [];
    const form = { finding: closure.id, index: takes.index, seen: [{ lineId, versionId }] };
    await takeSuggestionOf(steward, id, form);
    const after = lineAbout(await page(steward, id), "NH3(g) ΔfH°");
    expect(after.proposed?.digits).toBe("-45.94");
    expect(after.mark).not.toBe("block");
    expect(after.versions.map((version) => [version.figure?.digits, version.by, version.reason])).toEqual([
      ["-49.54", "Ines Halvard", ""],
      ["-45.94", "Ines Halvard", "Two digits exchanged: −49.54 becomes −45.94."],
    ]);
    // A second press finds another examination and changes nothing.
    expect(await refusalOf(takeSuggestionOf(steward, id, form))).toBeInstanceOf(Refused);
  });

  test("writes a value in kilocalories, and keeps what was typed and the conversion", async () => {
    const line = lineAbout(await page(steward, id), "CaO(cr) ΔfH°");
    const form = {
      line: line.id,
      version: 1,
      value: "−151.75",
      unit: "kcal/mol",
      uncertainty: "",
      kind: "none" as const,
    };
    await writeValue(steward, id, { ...form, reason: "as the notebook has it" });
    const after = lineAbout(await page(steward, id), "CaO(cr) ΔfH°");
    // 151.75 × 4.184 = 634.922; the second decimal comes back to 151.75 kcal/mol.
    expect(after.proposed).toEqual({ digits: "-634.92", uncertainty: null });
    expect(after.given).toEqual({ text: "−151.75", unit: "kcal/mol", note: "× 4.184" });
    const stale = await refusalOf(writeValue(steward, id, { ...form, reason: "again" }));
    expect(stale).toBeInstanceOf(Refused);
    const wrong = await refusalOf(writeValue(steward, id, { ...form, value: "n/a", version: 2, reason: "x" }));
    expect(wrong).toMatchObject({ errors: [{ pointer: "/value" }] });
    expect(wrong).toBeInstanceOf(Invalid);
  });

  test("tells in its history what was taken out, by whom and why", async () => {
    const line = lineAbout(await page(steward, id), "O2(g) S°");
    await takeLineOut(steward, id, line.id, "belongs to another sheet");
    const shown = await page(steward, id);
    expect(shown.counts.lines).toBe(4);
    expect(shown.history.at(-1)?.entries.at(-1)).toMatchObject({
      by: "Ines Halvard",
      did: "took out O2(g) S°",
      words: "belongs to another sheet",
      before: { digits: "205.153" },
    });
  });

  test("shows a decision that an edit made void as void", async () => {
    await sendToReview(steward, id, "");
    const entropy = (await findLines(id, database.app)).find((line) => line.property === "entropy");
    if (!entropy) throw new Error("an entropy was proposed");
    await acceptLines(reviewer, id, [{ lineId: entropy.id, versionId: entropy.versionId }]);
    await returnRevision(reviewer, id, "One decimal, please.");
    await writeValue(steward, id, {
      line: entropy.id,
      version: 1,
      value: "38.1(2)",
      unit: "J/(mol K)",
      uncertainty: "",
      kind: "none",
      reason: "one decimal",
    });
    const line = lineAbout(await page(steward, id), "CaO(cr) S°");
    expect(line).toMatchObject({ state: "open", decision: null });
    expect(line.voided).toMatchObject([{ decision: "accept", by: "Ruth Amsel", version: 1 }]);
    expect(line.proposed?.uncertainty).toEqual({ digits: "0.2", kind: "standard", coverageFactor: null });
    await withdrawRevision(steward, id, "only for the test");
  });

  test("a withdrawn revision stays to be read, with its lines and the reason", async () => {
    const shown = await page(reviewer, id);
    expect(shown.ended).toMatchObject({ to: "withdrawn", remark: "only for the test" });
    expect(shown.counts.lines).toBe(4);
    expect(linesOf(shown).every((line) => line.state === "dropped")).toBe(true);
  });
});

test("an overtaken line says what happened, before and after the other one is published", async () => {
  const one = await propose(steward, { values: [codata("H2(g)", "entropy", "130.681", "0.003")] });
  const two = await propose(both, { values: [codata("H2(g)", "entropy", "130.682", "0.003")] });
  await acceptAll(steward, reviewer, one);
  const waits = lineAbout(await page(both, two), "H2(g) S°");
  expect(waits.overtaken).toBe(
    `Another proposal for this place (130.681 J/(mol K)) was accepted since and waits in revision ${one}.`,
  );
  const { number } = await publishWaiting(reviewer);
  const stands = await page(both, two);
  expect(lineAbout(stands, "H2(g) S°").overtaken).toBe(
    `Edition ${number} changed what stands here (130.681 J/(mol K)) since this line was written.`,
  );
  expect(stands.may.restate).toBe(true);
  await restateLines(both, two);
  const again = lineAbout(await page(both, two), "H2(g) S°");
  expect(again).toMatchObject({ overtaken: null, stood: { digits: "130.681" }, difference: "0.001" });
  await withdrawRevision(both, two, "only for the test");
});

describe("a species and its source that are new", () => {
  const NEW = {
    sources: [BOMB],
    species: [{ key: "CuO(cr)", name: "copper(II) oxide", cas: "1317-38-0" }],
    values: [measured("CuO(cr)", "enthalpyOfFormation", "-157.3", "0.6")],
  };

  test("are shown together: what it is called, then its values; the source with its citation", async () => {
    const id = await propose(steward, NEW);
    const shown = await page(steward, id);
    expect(shown.groups.map((group) => group.lines.map((line) => line.kind))).toEqual([
      ["source"],
      ["detail", "value"],
    ]);
    const oxide = shown.groups[1];
    expect(oxide).toMatchObject({ speciesKey: "CuO(cr)", stands: false });
    expect(oxide?.lines[0]?.changes).toEqual([
      { label: "name", before: null, after: "copper(II) oxide" },
      { label: "CAS", before: null, after: "1317-38-0" },
    ]);
    expect(oxide?.lines[1]).toMatchObject({ stood: null, proposed: { digits: "-157.3" } });
    await withdrawRevision(steward, id, "only for the test");
  });

  test.each([
    ["species", "detail"],
    ["source", "source"],
  ])("a review is not closed while an accepted value lacks its %s: it could never be published", async (what, kind) => {
    const id = await propose(steward, NEW);
    await sendToReview(steward, id, "");
    const lines = await findLines(id, database.app);
    const seen = (wanted: (line: (typeof lines)[number]) => boolean) =>
      lines.filter(wanted).map((line) => ({ lineId: line.id, versionId: line.versionId }));
    await acceptLines(
      reviewer,
      id,
      seen((line) => line.kind !== kind),
    );
    await declineLines(
      reviewer,
      id,
      seen((line) => line.kind === kind),
      "not like this",
    );
    const refused = await refusalOf(closeReview(reviewer, id));
    expect(refused).toBeInstanceOf(Refused);
    expect(refused.message).toContain(`a ${what} that is not accepted`);
    await declineLines(
      reviewer,
      id,
      seen(() => true),
      "only for the test",
    );
    await closeReview(reviewer, id);
  });
});

test("the next edition as it would be: what comes and changes, who reviewed it, and nothing that stops it", async () => {
  const id = await propose(steward, {
    values: [codata("CaO(cr)", "entropy", "38.10", "0.40"), codata("H2(g)", "heatCapacity", "28.836", "0.002")],
  });
  await acceptAll(steward, reviewer, id);
  const shown = await findPublishPage(reviewer);
  expect(shown).toMatchObject({
    number: shown.previous + 1,
    counts: { lines: 2, newValues: 1, changedValues: 1 },
    stops: [],
    allOwn: false,
    licence: "CC-BY-4.0",
  });
  expect(shown.revisions).toMatchObject([{ id, decided: { by: "Ruth Amsel" }, madeByName: "Ines Halvard" }]);
  expect(shown.withdrawable).toContain(1);
  expect(await refusalOf(findPublishPage(steward))).toBeInstanceOf(Forbidden);

  const inReview = await propose(steward, CAMPAIGN);
  await sendToReview(steward, inReview, "");
  const lists = await findRevisionsPage(reviewer);
  expect(lists.lists.find((list) => list.name === "waiting")?.items.map((item) => item.id)).toEqual([id]);
  expect(lists.lists.find((list) => list.name === "inReview")?.items).toMatchObject([
    { lines: 5, blocks: 1, looks: 2 },
  ]);
});
