import { beforeAll, describe, expect, test } from "vitest";
import { findEntries } from "#app/audit/audit.queries.server.ts";
import { findDetailsAsOf, findNewestEdition, findValuesAsOf } from "#app/editions/editions.queries.server.ts";
import { Forbidden, Invalid, NotFound, Refused } from "#app/http/errors.ts";
import type { Acting } from "#app/people/person.ts";
import type { ProposedLine } from "#app/review/propose.server.ts";
import { proposeLines } from "#app/review/propose.server.ts";
import { proposeMove, proposeNames, proposeSpecies, proposeWithdrawal } from "#app/review/proposeForm.server.ts";
import { findProposePage } from "#app/review/proposePage.server.ts";
import { findLines, findNewestExamination, findWaitingForPlace } from "#app/review/review.queries.server.ts";
import { findLinesWithBases, sendToReview, takeLineOut } from "#app/review/revise.server.ts";
import type { Property } from "#app/thermo/property.ts";
import { useDatabase } from "#tests/support/database.ts";
import { detailContentOf, expanded, type ValueRow, valueContentOf } from "#tests/support/editions.ts";
import { acceptAll, actor, propose, publishWaiting } from "#tests/support/revisions.ts";

/*
 * Lines written by hand: what they are written against, and what is refused before it becomes a line. Values: CODATA Key
 * Values for Thermodynamics (1989).
 */

const database = useDatabase();
let steward: Acting;
let second: Acting;
let reviewer: Acting;

const SOURCE = { id: "src_codatakeyvalues", title: "CODATA Key Values for Thermodynamics" };
const codata = (key: string, property: Property, text: string, uncertainty: string): ValueRow => ({
  key,
  property,
  digits: text,
  uncertainty: expanded(uncertainty),
  sourceId: SOURCE.id,
});

beforeAll(async () => {
  steward = await actor("Ada Steward", "steward");
  second = await actor("Ben Steward", "steward");
  reviewer = await actor("Cy Reviewer", "reviewer");
  const first = await propose(steward, {
    sources: [SOURCE],
    species: ["H2(g)", "O2(g)", "H2O(l)", "H2O(g)"].map((key) => ({ key })),
    values: [
      codata("H2(g)", "entropy", "130.680", "0.003"),
      codata("O2(g)", "entropy", "205.152", "0.005"),
      codata("H2O(l)", "enthalpyOfFormation", "-285.830", "0.040"),
      codata("H2O(l)", "entropy", "69.95", "0.03"),
      codata("H2O(g)", "enthalpyOfFormation", "-241.826", "0.040"),
    ],
  });
  await acceptAll(steward, reviewer, first);
  await publishWaiting(reviewer);
});

async function edition(): Promise<number> {
  return (await findNewestEdition(database.app))?.number ?? 0;
}

async function speciesId(key: string): Promise<string> {
  const [detail] = await findDetailsAsOf(await edition(), { keys: [key] }, database.app);
  if (!detail) throw new Error(`no species ${key}`);
  return detail.speciesId;
}

async function value(key: string, property: Property, text: string): Promise<ProposedLine> {
  return {
    kind: "value",
    speciesId: await speciesId(key),
    property,
    sourceId: null,
    content: valueContentOf(codata(key, property, text, "0.040")),
  };
}

async function withdrawal(key: string, property: Property): Promise<ProposedLine> {
  return {
    kind: "withdrawal",
    speciesId: await speciesId(key),
    property,
    sourceId: null,
    content: { kind: "withdrawal", reason: "Superseded." },
  };
}

const begin = (acting: Acting, lines: readonly ProposedLine[], title = "By hand") =>
  proposeLines(acting, { revisionId: null, title, summary: "", lines });
const addTo = (acting: Acting, revisionId: number, lines: readonly ProposedLine[]) =>
  proposeLines(acting, { revisionId, title: "", summary: "", lines });

describe("a draft begun by hand", () => {
  test("a line is written against the row that stands, and examined at once", async () => {
    const id = await begin(steward, [await value("H2O(l)", "enthalpyOfFormation", "-285.83")]);
    const [line] = await findLinesWithBases(id);
    const [standing] = await findValuesAsOf(
      await edition(),
      { speciesIds: [await speciesId("H2O(l)")], properties: ["enthalpyOfFormation"] },
      database.app,
    );
    expect(line).toMatchObject({ againstRow: standing?.rowId, againstVersion: null, overtaken: false });
    // One digit fewer than stands: the less-precise check has something to say.
    const examination = await findNewestExamination(id, database.app);
    expect(examination).toMatchObject({ occasion: "build", lines: 1 });
    const entries = await findEntries(0, 10_000, database.app);
    expect(entries.findLast((one) => one.act === "revision.begun")).toMatchObject({ object_id: String(id) });
  });

  test("where nothing stands, a line is written against nothing", async () => {
    const id = await begin(steward, [await value("H2O(g)", "entropy", "188.835")]);
    expect((await findLines(id, database.app))[0]).toMatchObject({ againstRow: null, againstVersion: null });
  });

  test("lines are added to a draft, and their addition is on record", async () => {
    const id = await begin(steward, [await value("H2O(g)", "entropy", "188.835")]);
    expect(await addTo(second, id, [await value("H2O(g)", "heatCapacity", "33.609")])).toBe(id);
    expect((await findLines(id, database.app)).map((line) => [line.property, line.position])).toEqual([
      ["entropy", 1],
      ["heatCapacity", 2],
    ]);
    const entries = await findEntries(0, 10_000, database.app);
    expect(entries.findLast((one) => one.act === "revision.lines-added")).toMatchObject({ object_id: String(id) });
  });

  test("a place already proposed in the revision is refused by name, and nothing is written", async () => {
    const id = await begin(steward, [await value("H2O(g)", "entropy", "188.835")]);
    await expect(addTo(steward, id, [await value("H2O(g)", "entropy", "188.80")])).rejects.toThrow(
      `Revision ${id} already has a line for S° of H2O(g): 188.835 J/(mol K). Change that line, or take it out first.`,
    );
    await expect(addTo(steward, id, [await withdrawal("H2O(g)", "entropy")])).rejects.toThrow(Refused);
    expect(await findLines(id, database.app)).toHaveLength(1);
    const twice = await value("H2O(g)", "heatCapacity", "33.609");
    await expect(addTo(steward, id, [twice, twice])).rejects.toThrow("Two lines are about Cp° of H2O(g).");
  });

  test("a line that was taken out leaves its place free", async () => {
    const id = await begin(steward, [await value("H2O(g)", "entropy", "188.835")]);
    const [line] = await findLines(id, database.app);
    await takeLineOut(steward, id, line?.id ?? "", "typed for another phase");
    await addTo(steward, id, [await value("H2O(g)", "entropy", "188.80")]);
    expect(await findLines(id, database.app)).toHaveLength(1);
  });

  test("what would change nothing is refused", async () => {
    await expect(begin(steward, [await value("H2O(l)", "enthalpyOfFormation", "-285.830")])).rejects.toThrow(
      "Nothing would change: ΔfH° of H2O(l) stands with just this.",
    );
  });

  test("a withdrawal needs something to withdraw", async () => {
    await expect(begin(steward, [await withdrawal("H2O(g)", "heatCapacity")])).rejects.toThrow(
      "There is no Cp° of H2O(g) to withdraw.",
    );
  });

  test("a revision in review takes no further line", async () => {
    const id = await begin(steward, [await value("H2O(g)", "entropy", "188.835")]);
    await sendToReview(steward, id, "");
    await expect(addTo(steward, id, [await value("H2O(g)", "heatCapacity", "33.609")])).rejects.toThrow(
      "its lines are written only while it is a draft or was returned",
    );
  });

  test("refuses an empty proposal, a title that is none, and subjects that do not exist", async () => {
    await expect(begin(steward, [])).rejects.toThrow(Invalid);
    await expect(begin(steward, [await value("H2O(g)", "entropy", "188.835")], "  ")).rejects.toThrow(Invalid);
    await expect(addTo(steward, 999_999, [await value("H2O(g)", "entropy", "188.835")])).rejects.toThrow(NotFound);
    const nowhere = { ...(await value("H2O(g)", "entropy", "188.835")), speciesId: "sp_0123456789" };
    await expect(begin(steward, [nowhere])).rejects.toThrow("There is no such species.");
    const sourceless = await value("H2O(g)", "entropy", "188.835");
    if (sourceless.content.kind !== "value") throw new Error("a value line");
    const content = { ...sourceless.content, sourceId: "src_nowhere00" };
    await expect(begin(steward, [{ ...sourceless, content }])).rejects.toThrow("There is no such source.");
  });

  test("an analyst or a reviewer writes no lines", async () => {
    const analyst = await actor("Dee Analyst", "analyst");
    const line = await value("H2O(g)", "entropy", "188.835");
    await expect(begin(analyst, [line])).rejects.toThrow(Forbidden);
    await expect(begin(reviewer, [line])).rejects.toThrow(Forbidden);
  });
});

describe("against what waits", () => {
  test("a second proposal is written against the accepted line, and a second withdrawal is refused", async () => {
    const waiting = await begin(steward, [await withdrawal("H2O(l)", "entropy")], "Withdraw it");
    await acceptAll(steward, reviewer, waiting);
    const place = { speciesId: await speciesId("H2O(l)"), property: "entropy" as const, sourceId: null };
    const accepted = await findWaitingForPlace(place, database.app);
    await expect(begin(second, [await withdrawal("H2O(l)", "entropy")])).rejects.toThrow(
      `S° of H2O(l) is already withdrawn in revision ${waiting}.`,
    );
    const id = await begin(second, [await value("H2O(l)", "entropy", "69.95")]);
    expect((await findLines(id, database.app))[0]).toMatchObject({
      againstRow: null,
      againstVersion: accepted?.versionId,
    });
  });
});

describe("identity", () => {
  test("a key that another species holds is refused", async () => {
    const content = { ...detailContentOf({ key: "H2O(g)" }), name: "steam" };
    await expect(
      begin(steward, [
        { kind: "detail", speciesId: await speciesId("H2O(l)"), property: null, sourceId: null, content },
      ]),
    ).rejects.toThrow("H2O(g) is another species already. Name the form or isomer, so that the keys differ.");
  });
});

describe("two people at once", () => {
  test("one of two lines for one place of one draft is written, the other is told why not", async () => {
    const id = await begin(steward, [await value("H2O(g)", "heatCapacity", "33.609")]);
    const outcomes = await Promise.allSettled([
      addTo(steward, id, [await value("H2O(g)", "entropy", "188.835")]),
      addTo(second, id, [await value("H2O(g)", "entropy", "188.80")]),
    ]);
    expect(outcomes.map((one) => one.status).sort()).toEqual(["fulfilled", "rejected"]);
    const refused = outcomes.find((one) => one.status === "rejected");
    expect(refused?.reason).toBeInstanceOf(Refused);
    expect(String(refused?.reason)).toContain("already has a line for S° of H2O(g)");
    expect(await findLines(id, database.app)).toHaveLength(2);
  });

  test("two drafts may propose for one place; both stand against the same row", async () => {
    const [one, other] = await Promise.all([
      begin(steward, [await value("O2(g)", "entropy", "205.15")]),
      begin(second, [await value("O2(g)", "entropy", "205.16")]),
    ]);
    const [first] = await findLines(one, database.app);
    const [later] = await findLines(other, database.app);
    expect(first?.againstRow).not.toBeNull();
    expect(later?.againstRow).toBe(first?.againstRow);
  });
});

/** A form as a browser sends it. */
const sent =
  (fields: Record<string, string>) =>
  (name: string): string =>
    fields[name] ?? "";

async function seen(key: string): Promise<string> {
  return (await findProposePage(steward, key, null)).species.seen;
}

describe("forms of two people at once", () => {
  test("one new species is brought once", async () => {
    const form = sent({ formula: "H2O2", phase: "l", name: "hydrogen peroxide", reason: "Wanted.", title: "Peroxide" });
    const outcomes = await Promise.all([proposeSpecies(steward, form), proposeSpecies(second, form)]);
    const made = outcomes.flatMap((one) => (one.ok ? [one.revisionId] : []));
    expect(made).toHaveLength(1);
    expect(outcomes.find((one) => !one.ok)).toMatchObject({
      errors: [expect.objectContaining({ detail: expect.stringContaining(`proposed in revision ${made[0]} already`) })],
    });
  });

  test("a name is not written over one that was accepted after its form was opened", async () => {
    const opened = await seen("O2(g)");
    const names = (name: string, title: string) =>
      sent({ formula: "O2", label: "", name, reason: "No name yet.", title, seen: opened });
    const first = await proposeNames(steward, "O2(g)", names("dioxygen", "One name"));
    await acceptAll(steward, reviewer, first.ok ? first.revisionId : 0);
    await expect(proposeNames(second, "O2(g)", names("oxygen", "Another name"))).rejects.toThrow(
      "What O2(g) is called was changed in the table since you opened the page.",
    );
    // The page now shows what waits, and a proposal is written against that.
    const page = await findProposePage(second, "O2(g)", null);
    expect(page.species.detail.name).toBe("dioxygen");
  });
});

describe("to the next edition", () => {
  test("a whole species loses its values and keeps its name; the edition before keeps both", async () => {
    const before = await edition();
    const outcome = await proposeWithdrawal(
      steward,
      "H2O(g)",
      sent({ "takes.all": "on", reason: "Measured on wet gas.", title: "Vapour goes out", seen: await seen("H2O(g)") }),
    );
    await acceptAll(steward, reviewer, outcome.ok ? outcome.revisionId : 0);
    await publishWaiting(reviewer);
    const now = await edition();
    expect(now).toBe(before + 1);
    const id = await speciesId("H2O(g)");
    expect(await findValuesAsOf(now, { speciesIds: [id] }, database.app)).toEqual([]);
    expect(await findValuesAsOf(before, { speciesIds: [id] }, database.app)).toHaveLength(1);
    expect(await findDetailsAsOf(now, { speciesIds: [id] }, database.app)).toHaveLength(1);
  });

  test("values of the wrong species stand with the right one, digit by digit, with their source", async () => {
    const id = await speciesId("H2O(l)");
    const [stood] = await findValuesAsOf(
      await edition(),
      { speciesIds: [id], properties: ["enthalpyOfFormation"] },
      database.app,
    );
    const outcome = await proposeMove(
      steward,
      "H2O(l)",
      sent({
        "takes.enthalpyOfFormation": "on",
        formula: "D2O",
        phase: "l",
        name: "heavy water",
        reason: "The sample was heavy water.",
        title: "Heavy water",
        seen: await seen("H2O(l)"),
      }),
    );
    await acceptAll(steward, reviewer, outcome.ok ? outcome.revisionId : 0);
    await publishWaiting(reviewer);
    const now = await edition();
    const moved = await findValuesAsOf(now, { speciesIds: [await speciesId("D2O(l)")] }, database.app);
    expect(moved).toMatchObject([
      {
        property: "enthalpyOfFormation",
        digits: stood?.digits,
        sourceId: stood?.sourceId,
        uncertainty: stood?.uncertainty,
      },
    ]);
    expect(await findValuesAsOf(now, { speciesIds: [id], properties: ["enthalpyOfFormation"] }, database.app)).toEqual(
      [],
    );
  });
});
