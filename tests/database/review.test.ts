import { beforeAll, describe, expect, test } from "vitest";
import { sql } from "kysely";
import { findEntries } from "#app/audit/audit.queries.server.ts";
import { CHAIN_START, chainHash } from "#app/audit/chain.ts";
import {
  findDetailsAsOf,
  findEditions,
  findNewestEdition,
  findValuesAsOf,
} from "#app/editions/editions.queries.server.ts";
import { Forbidden, Invalid, Refused } from "#app/http/errors.ts";
import type { Acting } from "#app/people/person.ts";
import { acceptLines, closeReview, declineLines, returnRevision, setFindingAside } from "#app/review/decide.server.ts";
import { findNextEdition, publishEdition } from "#app/review/publish.server.ts";
import {
  findDecisions,
  findFindings,
  findLines,
  findNewestExamination,
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
import { digits } from "#app/thermo/digits.ts";
import { useDatabase } from "#tests/support/database.ts";
import { expanded, type ValueRow } from "#tests/support/editions.ts";
import { acceptAll, actor, propose, publishWaiting, seenLines } from "#tests/support/revisions.ts";

/*
 * A change on its way from a steward's draft to an edition, with everything that may not happen on the way. Values:
 * CODATA Key Values for Thermodynamics (1989); derived ΔfG° by trade arithmetic from them.
 */

const database = useDatabase();
let steward: Acting;
let second: Acting;
let reviewer: Acting;
let other: Acting;

const SOURCE = { id: "src_codatakeyvalues", title: "CODATA Key Values for Thermodynamics" };
const codata = (key: string, property: ValueRow["property"], text: string, uncertainty: string): ValueRow => ({
  key,
  property,
  digits: text,
  uncertainty: expanded(uncertainty),
  sourceId: SOURCE.id,
});

const FIRST = {
  sources: [SOURCE],
  species: ["H2(g)", "N2(g)", "O2(g)", "NH3(g)", "H2O(l)"].map((key) => ({ key })),
  values: [
    codata("H2(g)", "entropy", "130.680", "0.003"),
    codata("N2(g)", "entropy", "191.609", "0.004"),
    codata("O2(g)", "entropy", "205.152", "0.005"),
    codata("NH3(g)", "enthalpyOfFormation", "-45.94", "0.35"),
    codata("NH3(g)", "entropy", "192.77", "0.05"),
    codata("NH3(g)", "gibbsEnergyOfFormation", "-16.41", "0.35"),
    codata("H2O(l)", "enthalpyOfFormation", "-285.830", "0.040"),
    codata("H2O(l)", "entropy", "69.95", "0.03"),
  ],
};

beforeAll(async () => {
  steward = await actor("Sela Marsh", "steward");
  second = await actor("Tomas Reed", "steward", "reviewer");
  reviewer = await actor("Rosa Field", "reviewer");
  other = await actor("Olin Brook", "reviewer");
  const first = await propose(steward, FIRST, "Key values");
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

test("the first edition holds what was accepted, digit for digit", async () => {
  const values = await findValuesAsOf(1, {}, database.app);
  expect(values.map((row) => `${row.key} ${row.property} ${row.digits}`)).toEqual([
    "H2(g) entropy 130.680",
    "H2O(l) enthalpyOfFormation -285.830",
    "H2O(l) entropy 69.95",
    "N2(g) entropy 191.609",
    "NH3(g) enthalpyOfFormation -45.94",
    "NH3(g) entropy 192.77",
    "NH3(g) gibbsEnergyOfFormation -16.41",
    "O2(g) entropy 205.152",
  ]);
});

describe("four eyes", () => {
  test("a steward who is also a reviewer cannot decide a line of their own", async () => {
    const id = await propose(second, { values: [codata("H2O(l)", "entropy", "69.950", "0.030")] });
    await sendToReview(second, id, "");
    expect(await refusalOf(acceptLines(second, id, await seenLines(id)))).toBeInstanceOf(Forbidden);
    const [line] = await seenLines(id);
    const inSql = await refusalOf(
      database.app
        .insertInto("line_decision")
        .values({ line_version_id: line?.versionId ?? "", decision: "accept", decided_by: second.person.id })
        .execute(),
    );
    expect(inSql).toMatchObject({ code: "TW008" });
    await withdrawRevision(second, id, "only for the test");
  });

  test("a steward without the reviewer's role cannot decide, and an analyst cannot propose", async () => {
    const id = await propose(steward, { values: [codata("H2O(l)", "entropy", "69.951", "0.030")] });
    await sendToReview(steward, id, "");
    expect(await refusalOf(acceptLines(steward, id, await seenLines(id)))).toBeInstanceOf(Forbidden);
    expect(await refusalOf(propose(await actor("Ana Lys", "analyst"), {}))).toBeInstanceOf(Forbidden);
    await withdrawRevision(steward, id, "only for the test");
  });

  test("an edition whose every line is the publisher's own is not published", async () => {
    const id = await propose(second, { values: [codata("H2O(l)", "entropy", "69.950", "0.030")] });
    await acceptAll(second, reviewer, id);
    expect(await refusalOf(publishWaiting(second))).toBeInstanceOf(Forbidden);
    expect((await publishWaiting(reviewer)).number).toBe(2);
  });
});

describe("a line that blocks", () => {
  test("cannot be accepted until somebody sets the finding aside with a reason", async () => {
    // Two digits exchanged: −49.54 for −45.94 (trade.md section 6).
    const id = await propose(steward, { values: [codata("NH3(g)", "enthalpyOfFormation", "-49.54", "0.30")] });
    await sendToReview(steward, id, "");
    const refused = await refusalOf(acceptLines(reviewer, id, await seenLines(id)));
    expect(refused).toBeInstanceOf(Refused);
    expect(refused.message).toContain("NH3(g)");

    const examination = await findNewestExamination(id, database.app);
    const block = (await findFindings(examination?.id ?? "", database.app)).find((one) => one.severity === "block");
    expect(block?.check).toBe("gibbs-closure");
    expect(await refusalOf(setFindingAside(reviewer, id, block?.id ?? "", " "))).toBeInstanceOf(Invalid);
    await setFindingAside(
      reviewer,
      id,
      block?.id ?? "",
      "Measured twice; the other two values follow in the next sheet.",
    );
    await acceptLines(reviewer, id, await seenLines(id));
    expect((await findLines(id, database.app)).map((line) => line.state)).toEqual(["accepted"]);

    // What was set aside for the revision holds for the edition it goes into, and the line stays until it is declined.
    await declineLines(reviewer, id, await seenLines(id), "Wait for the entropy.");
    await closeReview(reviewer, id);
    expect((await findNextEdition()).lines).toEqual([]);
  });

  test("half of a species' new set is refused, the whole set is accepted", async () => {
    // ΔfH° and ΔfG° moved together by −1.00 close; either alone is off by 1 kJ/mol, a look; by −10.00 it blocks.
    const id = await propose(steward, {
      values: [
        codata("NH3(g)", "enthalpyOfFormation", "-55.94", "0.35"),
        codata("NH3(g)", "gibbsEnergyOfFormation", "-26.41", "0.35"),
      ],
    });
    await sendToReview(steward, id, "");
    const [half, rest] = await seenLines(id);
    if (!half || !rest) throw new Error("two lines were proposed");
    expect(await refusalOf(acceptLines(reviewer, id, [half]))).toBeInstanceOf(Refused);
    await acceptLines(reviewer, id, [half, rest]);
    await declineLines(reviewer, id, [half, rest], "Only a trial of the rule.");
    await closeReview(reviewer, id);
  });
});

test("an edit after the decision voids it, visibly, and the line must be decided anew", async () => {
  const id = await propose(steward, { values: [codata("NH3(g)", "entropy", "192.78", "0.05")] });
  await sendToReview(steward, id, "");
  await acceptLines(reviewer, id, await seenLines(id));
  await returnRevision(reviewer, id, "Give the second decimal as printed.");
  const [line] = await findLines(id, database.app);
  if (!line || line.content.kind !== "value") throw new Error("a value was proposed");
  await rewriteLine(steward, {
    revisionId: id,
    lineId: line.id,
    expectedVersion: 1,
    content: { ...line.content, digits: digits("192.770") },
    reason: "as printed",
  });
  const after = await findLines(id, database.app);
  expect(after.map((one) => [one.version, one.state])).toEqual([[2, "open"]]);
  expect((await findDecisions(id, database.app)).map((one) => [one.decision, one.version, Boolean(one.void)])).toEqual([
    ["accept", 1, true],
  ]);
  expect(
    await refusalOf(
      rewriteLine(steward, {
        revisionId: id,
        lineId: line.id,
        expectedVersion: 1,
        content: line.content,
        reason: "again",
      }),
    ),
  ).toBeInstanceOf(Refused);
  await sendToReview(steward, id, "mended");
  expect((await findRevision(id, database.app))?.round).toBe(2);
  expect(await refusalOf(acceptLines(reviewer, id, [{ lineId: line.id, versionId: line.versionId }]))).toBeInstanceOf(
    Refused,
  );
  await withdrawRevision(steward, id, "only for the test");
});

test("two revisions accepted for the same value: the second waits, is overtaken, restated and then accepted", async () => {
  const one = await propose(steward, { values: [codata("O2(g)", "entropy", "205.15", "0.02")] });
  const two = await propose(second, { values: [codata("O2(g)", "entropy", "205.16", "0.02")] });
  await sendToReview(steward, one, "");
  await sendToReview(second, two, "");
  await acceptLines(reviewer, one, await seenLines(one));
  const refused = await refusalOf(acceptLines(reviewer, two, await seenLines(two)));
  expect(refused.message).toContain(`revision ${one}`);
  await closeReview(reviewer, one);
  const editionNumber = (await publishWaiting(reviewer)).number;
  expect((await findLinesWithBases(two)).map((line) => line.overtaken)).toEqual([true]);
  expect(await refusalOf(acceptLines(reviewer, two, await seenLines(two)))).toBeInstanceOf(Refused);
  await returnRevision(reviewer, two, "Overtaken by revision 1 of the pair.");
  expect(await restateLines(second, two)).toEqual({ restated: 1, idle: 0 });
  await acceptAll(second, reviewer, two);
  expect((await publishWaiting(reviewer)).number).toBe(editionNumber + 1);
});

test("a line taken out of a draft stays on record and is not published", async () => {
  const id = await propose(steward, {
    values: [codata("H2(g)", "heatCapacity", "28.824", "0.01"), codata("N2(g)", "heatCapacity", "29.125", "0.01")],
  });
  const [first] = await findLines(id, database.app);
  await takeLineOut(steward, id, first?.id ?? "", "not ours");
  await acceptAll(steward, reviewer, id);
  const { number } = await publishWaiting(reviewer);
  const capacities = (await findValuesAsOf(number, { properties: ["heatCapacity"] }, database.app)).map(
    (row) => row.key,
  );
  expect(capacities).toEqual(["N2(g)"]);
});

describe("older editions after later ones", () => {
  const pictures = async () => {
    const editions = await findEditions(database.app);
    const all = [];
    for (const edition of editions) {
      const values = await findValuesAsOf(edition.number, {}, database.app);
      const species = await findDetailsAsOf(edition.number, {}, database.app);
      const again = await sql<{ digest: Buffer }>`select edition_digest(${edition.number}) as digest`.execute(
        database.app,
      );
      all.push({
        number: edition.number,
        stored: edition.digest.toString("hex"),
        again: again.rows[0]?.digest.toString("hex"),
        rows: JSON.stringify([values, species]),
      });
    }
    return new Map(all.map((one) => [one.number, one]));
  };

  test.each<[string, () => Promise<{ number: number }>]>([
    [
      "a species renamed",
      async () => {
        const id = await propose(steward, { species: [{ key: "NH3(g,ammonia)", was: "NH3(g)", name: "ammonia" }] });
        await acceptAll(steward, reviewer, id);
        return publishWaiting(reviewer);
      },
    ],
    [
      "a value withdrawn",
      async () => {
        const id = await propose(steward, {
          withdrawals: [{ key: "N2(g)", property: "heatCapacity", reason: "belongs to another source" }],
        });
        await acceptAll(steward, reviewer, id);
        return publishWaiting(reviewer);
      },
    ],
    [
      "a citation mended",
      async () => {
        const id = await propose(steward, { sources: [{ ...SOURCE, doi: "10.1016/0021-9614(78)90004-8" }] });
        await acceptAll(steward, reviewer, id);
        return publishWaiting(reviewer);
      },
    ],
    [
      "an edition withdrawn",
      async () => {
        const id = await propose(steward, { values: [codata("H2(g)", "heatCapacity", "28.824", "0.01")] });
        await acceptAll(steward, reviewer, id);
        return publishWaiting(reviewer, "Takes edition 2 back.", {
          edition: 2,
          reason: "One entropy was read from the wrong row.",
        });
      },
    ],
  ])("stay as they were after %s", async (_what, publish) => {
    const before = await pictures();
    const { number } = await publish();
    const after = await pictures();
    expect(after.size).toBe(before.size + 1);
    expect(after.has(number)).toBe(true);
    for (const [n, picture] of before) {
      expect(after.get(n)).toEqual(picture);
      expect(picture.again).toBe(picture.stored);
    }
  });

  test("the withdrawn edition is named by the one that withdrew it, and cannot be withdrawn twice", async () => {
    const editions = await findEditions(database.app);
    const withdrawn = editions.find((edition) => edition.number === 2);
    expect(withdrawn?.withdrawnBy).toBe((await findNewestEdition(database.app))?.number);
    const id = await propose(steward, { values: [codata("O2(g)", "heatCapacity", "29.355", "0.01")] });
    await acceptAll(steward, reviewer, id);
    expect(await refusalOf(publishWaiting(reviewer, "again", { edition: 2, reason: "again" }))).toBeInstanceOf(Refused);
    await publishWaiting(reviewer);
  });
});

describe("at the same moment, on connections of their own", () => {
  test("two reviewers accept the same line: one line, accepted once, both see a decision", async () => {
    const id = await propose(steward, { values: [codata("N2(g)", "heatCapacity", "29.125", "0.01")] });
    await sendToReview(steward, id, "");
    const seen = await seenLines(id);
    const outcomes = await Promise.allSettled([acceptLines(reviewer, id, seen), acceptLines(other, id, seen)]);
    expect(outcomes.some((outcome) => outcome.status === "fulfilled")).toBe(true);
    expect((await findLines(id, database.app)).map((line) => line.state)).toEqual(["accepted"]);
    await closeReview(reviewer, id);
  });

  test("twenty publications of one list: one edition, nineteen refusals that name it", async () => {
    const next = await findNextEdition();
    const request = {
      expectedPrevious: next.previous,
      listDigest: next.digest,
      notes: "Pressed often.",
      licence: "CC-BY-4.0",
      withdraws: null,
      withdrawalReason: null,
    };
    const outcomes = await Promise.allSettled(
      Array.from({ length: 20 }, (_, index) => publishEdition(index % 2 === 0 ? reviewer : other, request)),
    );
    const made = outcomes.filter((outcome) => outcome.status === "fulfilled");
    expect(made).toHaveLength(1);
    for (const outcome of outcomes) {
      if (outcome.status === "fulfilled") continue;
      expect(outcome.reason).toBeInstanceOf(Refused);
      expect(String(outcome.reason)).toContain(`Edition ${next.previous + 1}`);
    }
    expect((await findNewestEdition(database.app))?.number).toBe(next.previous + 1);
  });

  test("accepting while the steward withdraws leaves one of the two, never both", async () => {
    const id = await propose(steward, { values: [codata("O2(g)", "heatCapacity", "29.36", "0.01")] });
    await sendToReview(steward, id, "");
    const seen = await seenLines(id);
    await Promise.allSettled([acceptLines(reviewer, id, seen), withdrawRevision(steward, id, "not now")]);
    const revision = await findRevision(id, database.app);
    if (revision?.state === "withdrawn") expect((await findNextEdition()).lines).toEqual([]);
    const waiting = await database.app
      .selectFrom("revision_line")
      .select("id")
      .where("state", "=", "accepted")
      .where("revision_id", "=", id)
      .execute();
    expect(waiting.length > 0 && revision?.state === "withdrawn").toBe(false);
    if (revision?.state === "in_review") await withdrawRevision(steward, id, "only for the test");
  });

  test("a list that moved after it was shown is not published", async () => {
    const one = await propose(steward, { values: [codata("O2(g)", "heatCapacity", "29.37", "0.01")] });
    await acceptAll(steward, reviewer, one);
    const shown = await findNextEdition();
    const two = await propose(steward, { values: [codata("H2O(l)", "heatCapacity", "75.291", "0.08")] });
    await acceptAll(steward, reviewer, two);
    const refused = await refusalOf(
      publishEdition(reviewer, {
        expectedPrevious: shown.previous,
        listDigest: shown.digest,
        notes: "old list",
        licence: "CC-BY-4.0",
        withdraws: null,
        withdrawalReason: null,
      }),
    );
    expect(refused).toBeInstanceOf(Refused);
    expect((await findNewestEdition(database.app))?.number).toBe(shown.previous);
    await publishWaiting(reviewer);
  });
});

test("every act stands in the record, and the record's chain holds", async () => {
  const entries = await findEntries(0, 10_000, database.app);
  const kinds = new Set(entries.map((entry) => entry.act));
  for (const act of [
    "revision.begun",
    "revision.sent",
    "revision.lines-accepted",
    "revision.line-declined",
    "revision.line-written",
    "revision.line-taken-out",
    "revision.returned",
    "revision.decided",
    "revision.withdrawn",
    "revision.finding-set-aside",
    "edition.published",
  ]) {
    expect(kinds).toContain(act);
  }
  let previousHash = CHAIN_START;
  for (const [index, entry] of entries.entries()) {
    expect(Number(entry.number)).toBe(index + 1);
    const hash = chainHash({
      number: Number(entry.number),
      at: entry.at.toISOString(),
      actor: entry.actor,
      apiKeyId: entry.api_key_id,
      act: entry.act,
      objectKind: entry.object_kind,
      objectId: entry.object_id,
      detail: entry.detail,
      requestId: entry.request_id,
      previousHash,
    });
    expect(entry.hash.toString("hex")).toBe(hash);
    previousHash = hash;
  }
});
