import { beforeAll, describe, expect, test } from "vitest";
import { findEditionPage, findEditionsPage } from "#app/editions/editionPage.server.ts";
import { findEdition } from "#app/editions/editions.queries.server.ts";
import { Forbidden } from "#app/http/errors.ts";
import type { Acting } from "#app/people/person.ts";
import { acceptLines, closeReview, setFindingAside } from "#app/review/decide.server.ts";
import { findEditionReview, findNextEditionCount } from "#app/review/editionPage.server.ts";
import { findFindings, findLines, findNewestExamination } from "#app/review/review.queries.server.ts";
import { sendToReview } from "#app/review/revise.server.ts";
import { useDatabase } from "#tests/support/database.ts";
import { expanded, type ValueRow } from "#tests/support/editions.ts";
import { acceptAll, actor, propose, publishWaiting, seenLines } from "#tests/support/revisions.ts";

/*
 * What the pages of the editions tell, of two editions published by the acts: the second brings two revisions, one
 * accepted by two reviewers with a blocking finding set aside, and withdraws the first. Values: CODATA Key Values for
 * Thermodynamics (1989); −49.54 is −45.94 with two digits exchanged.
 */

const database = useDatabase();
let ines: Acting;
let tom: Acting;
let ruth: Acting;
let jonas: Acting;
let analyst: Acting;
let ammonia = 0;
let water = 0;

const SOURCE = { id: "src_codatakeyvalues", title: "CODATA Key Values for Thermodynamics" };
const codata = (key: string, property: ValueRow["property"], text: string, uncertainty: string): ValueRow => ({
  key,
  property,
  digits: text,
  uncertainty: expanded(uncertainty),
  sourceId: SOURCE.id,
});

beforeAll(async () => {
  ines = await actor("Ines Halvard", "steward");
  tom = await actor("Tom Breckan", "steward");
  ruth = await actor("Ruth Amsel", "reviewer");
  jonas = await actor("Jonas Fairley", "reviewer");
  analyst = await actor("Mina Corvin", "analyst");
  const first = await propose(
    ines,
    {
      sources: [SOURCE],
      species: ["H2(g)", "N2(g)", "O2(g)", "NH3(g)", "H2O(g)"].map((key) => ({ key })),
      values: [
        codata("H2(g)", "entropy", "130.680", "0.003"),
        codata("N2(g)", "entropy", "191.609", "0.004"),
        codata("O2(g)", "entropy", "205.152", "0.005"),
        codata("NH3(g)", "enthalpyOfFormation", "-45.94", "0.35"),
        codata("NH3(g)", "entropy", "192.77", "0.05"),
        codata("NH3(g)", "gibbsEnergyOfFormation", "-16.41", "0.35"),
      ],
    },
    "The beginning",
  );
  await acceptAll(ines, ruth, first);
  await publishWaiting(ruth, "The first edition.\nWith a second line.");

  ammonia = await propose(
    ines,
    {
      values: [
        codata("NH3(g)", "enthalpyOfFormation", "-49.54", "0.35"),
        codata("O2(g)", "entropy", "205.153", "0.005"),
      ],
    },
    "Ammonia again",
  );
  await sendToReview(ines, ammonia, "");
  const examination = await findNewestExamination(ammonia, database.app);
  const findings = examination ? await findFindings(examination.id, database.app) : [];
  for (const finding of findings.filter((one) => one.severity === "block")) {
    await setFindingAside(ruth, ammonia, finding.id, "Measured twice.");
  }
  const lines = await findLines(ammonia, database.app);
  const seen = await seenLines(ammonia);
  const [oxygen] = lines.filter((line) => line.property === "entropy");
  await acceptLines(
    jonas,
    ammonia,
    seen.filter((one) => one.lineId === oxygen?.id),
  );
  await acceptLines(
    ruth,
    ammonia,
    seen.filter((one) => one.lineId !== oxygen?.id),
  );
  await closeReview(ruth, ammonia);
  water = await propose(
    tom,
    {
      values: [
        codata("H2O(g)", "enthalpyOfFormation", "-241.826", "0.040"),
        codata("H2O(g)", "entropy", "188.835", "0.010"),
      ],
    },
    "Water vapour",
  );
  await acceptAll(tom, jonas, water);
});

describe("before the second edition", () => {
  test("reviewers are told what waits for it, and nobody else", async () => {
    expect(await findNextEditionCount(ruth)).toMatchObject({
      number: 2,
      revisions: 2,
      counts: { lines: 4, newValues: 2, changedValues: 2 },
    });
    expect(await findNextEditionCount(ines)).toBeNull();
    expect(await findNextEditionCount(analyst)).toBeNull();
  });
});

describe("after it", () => {
  beforeAll(async () => {
    await publishWaiting(jonas, "Ammonia again.", { edition: 1, reason: "Two digits were exchanged." });
  });

  const pageOf = async (n: number) => {
    const edition = await findEdition(n, database.app);
    if (!edition) throw new Error(`no edition ${n}`);
    return findEditionPage(analyst, edition);
  };

  test("the list has the newest first, with counts, the first line of the notes and the withdrawal on both sides", async () => {
    expect(await findEditionsPage(analyst)).toMatchObject([
      {
        number: 2,
        publisher: "Jonas Fairley",
        note: "Ammonia again.",
        speciesCount: 5,
        valueCount: 8,
        came: 2,
        changed: 2,
        went: 0,
        withdraws: { edition: 1, reason: "Two digits were exchanged." },
        withdrawn: null,
      },
      {
        number: 1,
        publisher: "Ruth Amsel",
        note: "The first edition.",
        valueCount: 6,
        came: 6,
        withdraws: null,
        withdrawn: { edition: 2, reason: "Two digits were exchanged." },
      },
    ]);
    expect(await findNextEditionCount(ruth)).toMatchObject({ number: 3, revisions: 0, counts: { lines: 0 } });
  });

  test("an edition tells what it changed, the furthest beyond its uncertainty first, and is bound to the one before", async () => {
    const [first, second] = [await pageOf(1), await pageOf(2)];
    expect(first).toMatchObject({ previous: null, previousDigest: null, changes: null });
    expect(first.frame.withdrawn).toEqual({ edition: 2, reason: "Two digits were exchanged." });
    expect(second.previousDigest).toBe(first.digest);
    expect(second.withdraws).toEqual({ edition: 1, reason: "Two digits were exchanged." });
    const listed = second.changes?.listed.map(({ what, key, property, difference }) => [
      what,
      key,
      property,
      difference,
    ]);
    expect(listed).toEqual([
      ["changed", "NH3(g)", "enthalpyOfFormation", "-3.60"],
      ["changed", "O2(g)", "entropy", "0.001"],
      ["came", "H2O(g)", "enthalpyOfFormation", null],
      ["came", "H2O(g)", "entropy", null],
    ]);
    expect(second.file?.sha256).toMatch(/^[0-9a-f]{64}$/);
  });

  test("the people behind it: who wrote, who accepted how many lines", async () => {
    const { revisions } = await findEditionReview(analyst, 2);
    expect(revisions).toMatchObject([
      {
        id: ammonia,
        title: "Ammonia again",
        lines: 2,
        writtenBy: ["Ines Halvard"],
        reviewedBy: [
          { name: "Jonas Fairley", lines: 1 },
          { name: "Ruth Amsel", lines: 1 },
        ],
      },
      { id: water, lines: 2, writtenBy: ["Tom Breckan"], reviewedBy: [{ name: "Jonas Fairley", lines: 2 }] },
    ]);
    expect(revisions[0]?.reviewedBy[0]?.at).toBeInstanceOf(Date);
  });

  test("the examination it passed, and the finding that was set aside with its reason", async () => {
    const [first, second] = [await findEditionReview(analyst, 1), await findEditionReview(analyst, 2)];
    expect(first.examination).toMatchObject({ lines: 12, asideCount: 0, aside: [] });
    const { examination } = second;
    expect(examination).toMatchObject({ lines: 4, asideCount: 1 });
    expect(examination?.aside).toMatchObject([
      {
        species: "NH3(g)",
        check: "gibbs-closure",
        title: "Gibbs closure",
        severity: "block",
        revisionId: ammonia,
        by: "Ruth Amsel",
        reason: "Measured twice.",
      },
    ]);
    expect(examination?.aside[0]?.arithmetic.length).toBeGreaterThan(0);
    const found = examination?.checks.reduce((sum, { found: f }) => sum + f.block + f.look + f.remark, 0);
    expect(found).toBe((examination?.blocks ?? 0) + (examination?.looks ?? 0) + (examination?.remarks ?? 0));
    expect(examination?.checks.find((check) => check.code === "gibbs-closure")).toMatchObject({ found: { block: 1 } });
  });

  test("nothing of it is open to an account without a role", async () => {
    const guest = await actor("Anna Guest");
    const edition = await findEdition(1, database.app);
    if (!edition) throw new Error("no edition 1");
    await expect(findEditionsPage(guest)).rejects.toThrow(Forbidden);
    await expect(findEditionPage(guest, edition)).rejects.toThrow(Forbidden);
    await expect(findEditionReview(guest, 1)).rejects.toThrow(Forbidden);
    await expect(findNextEditionCount(guest)).rejects.toThrow(Forbidden);
  });
});
