import { beforeAll, describe, expect, test } from "vitest";
import { database as appDatabase, useDatabase as connectTo } from "#app/db/database.server.ts";
import { buildRevision } from "#app/intake/buildRevision.server.ts";
import { confirmPlan, reopenPlan, stopReading } from "#app/intake/confirmPlan.server.ts";
import {
  countRows,
  findRepairs,
  findRow,
  findRowsByOutcome,
  findSheet,
  findSheetBytes,
} from "#app/intake/intake.queries.server.ts";
import { ANSWER } from "#app/intake/meaning.ts";
import { readSheet } from "#app/intake/readSheet.server.ts";
import { receiveSheet } from "#app/intake/receiveSheet.server.ts";
import { leaveRowsOut, repairCell } from "#app/intake/repairCell.server.ts";
import { Forbidden, Invalid, NotFound, Refused } from "#app/http/errors.ts";
import type { Acting } from "#app/people/person.ts";
import { findLines } from "#app/review/review.queries.server.ts";
import { useDatabase } from "#tests/support/database.ts";
import { runJobs } from "#tests/support/jobs.ts";
import { acceptAll, actor, publishWaiting } from "#tests/support/revisions.ts";
import { confirmGuess, fixture, notebook, revisionFromSheet, sheetRead } from "#tests/support/sheets.ts";

const database = useDatabase();
// Lines of the published files.
const WATER_ROW = 67;
const LIME_ROW = 67;
const SODA_ROW = 79;

const bytes = (text: string): Uint8Array => new TextEncoder().encode(text);

let steward: Acting;
let reviewer: Acting;
let analyst: Acting;

beforeAll(async () => {
  connectTo(database.app);
  steward = await actor("S. Steward", "steward");
  reviewer = await actor("R. Reviewer", "reviewer");
  analyst = await actor("A. Analyst", "analyst");
});

const refusedRows = async (id: number) => findRowsByOutcome(id, "refused", { after: 0, limit: 100 }, appDatabase());
const sheetOf = async (id: number) => {
  const sheet = await findSheet(id, appDatabase());
  if (!sheet) throw new Error("no such sheet");
  return sheet;
};

// The order matters: each group builds on the editions that the groups before it published.

describe("the published tables, as edition 1 and 2", () => {
  test("the CODATA table becomes a revision of one source, 151 species and all their values", async () => {
    const id = await receiveSheet(steward, { name: "codata-key-values.csv", bytes: fixture("codata-key-values.csv") });
    expect(await sheetOf(id)).toMatchObject({ state: "planned", rowsTotal: 151, rowsDone: 0 });
    expect(Buffer.compare(await findSheetBytes(id, appDatabase()), fixture("codata-key-values.csv"))).toBe(0);

    await confirmGuess(steward, id, {
      source: {
        kind: "new",
        source: { ...notebook, title: "CODATA Key Values for Thermodynamics", sourceKind: "evaluation" },
      },
    });
    expect((await sheetOf(id)).state).toBe("reading");
    await runJobs(database);
    expect(await sheetOf(id)).toMatchObject({ state: "read", rowsDone: 151 });
    expect(await countRows(id, appDatabase())).toMatchObject({ read: 151, refused: 0, skipped: 0 });

    const built = await buildRevision(steward, id, { title: "CODATA key values", summary: "" });
    // 151 ΔfH°, 151 S° and 118 increments (the file leaves the increment of the 33 solutes empty).
    const increments = new TextDecoder()
      .decode(fixture("codata-key-values.csv"))
      .split("\n")
      .slice(1)
      .filter((line) => line !== "" && line.split(",")[7] !== "").length;
    expect(built).toMatchObject({ newSpecies: 151, newValues: 302 + increments, changedValues: 0, same: 0 });
    expect(await sheetOf(id)).toMatchObject({ state: "built", revisionId: built.revisionId });
    const lines = await findLines(built.revisionId, appDatabase());
    expect(lines).toHaveLength(1 + 151 + 302 + increments);
    const ofWater = lines.filter((line) => line.rowNumber === WATER_ROW).map((line) => line.content);
    expect(ofWater).toContainEqual(
      expect.objectContaining({
        digits: "-285.830",
        uncertainty: { digits: "0.040", kind: "expanded", coverageFactor: 2 },
        given: { text: "-285.830", unit: "kJ/mol", note: null },
        temperature: "298.15",
        standardPressure: "100000",
      }),
    );
    await acceptAll(steward, reviewer, built.revisionId);
    await publishWaiting(reviewer);
  }, 60_000);

  test("the heat capacities find every species of the CODATA table by formula, phase and form", async () => {
    const built = await revisionFromSheet(steward, {
      name: "nbs-1982-heat-capacities.csv",
      bytes: fixture("nbs-1982-heat-capacities.csv"),
    });
    expect(built).toMatchObject({ newSpecies: 0, newValues: 129, changedValues: 0 });
    await acceptAll(steward, reviewer, built.revisionId);
    await publishWaiting(reviewer);
  }, 60_000);

  test("the NBS excerpt changes the two species it shares and brings the others", async () => {
    const built = await revisionFromSheet(steward, { name: "nbs.csv", bytes: fixture("nbs-1982-excerpt.csv") });
    expect(built.newSpecies).toBe(81);
    const lines = await findLines(built.revisionId, appDatabase());
    const keys = lines.flatMap((line) => (line.content.kind === "detail" ? [line.content.key] : []));
    expect(keys).not.toContain("CaO(cr)");
    expect(keys).not.toContain("Br(g)");
    expect(keys).toEqual(
      expect.arrayContaining([
        "C(cr,diamond)",
        "Mn(cr,alpha)",
        "CaCO3(cr,calcite)",
        "CaCO3(cr,aragonite)",
        "Fe2O3(cr,hematite)",
        "NH4NO3(cr)",
      ]),
    );
    const ofLime = lines.filter((line) => line.rowNumber === LIME_ROW);
    expect(ofLime.map((line) => [line.property, line.againstRow !== null])).toEqual([
      ["enthalpyOfFormation", true],
      ["gibbsEnergyOfFormation", false],
      ["entropy", true],
      ["heatCapacity", true],
    ]);
    const soda = lines.find((line) => line.rowNumber === SODA_ROW && line.content.kind === "value");
    expect(soda?.content).toMatchObject({ remark: "G-H-S constraint has been relaxed; see Introduction" });
    expect(
      lines.find((line) => line.content.kind === "detail" && line.content.key === "NH4NO3(cr)")?.content,
    ).toMatchObject({
      name: "ammonium nitrate",
      label: null,
    });
  }, 60_000);
});

describe("an in-house sheet", () => {
  test("tells its units by the newest edition, and asks about the missing one", async () => {
    const id = await receiveSheet(steward, {
      name: "calder-point-calorimetry.csv",
      bytes: fixture("calder-point-calorimetry.csv"),
    });
    const sheet = await sheetOf(id);
    expect(sheet.dialect).toMatchObject({ delimiter: ";", decimalComma: true });
    expect(sheet.plan?.columns).toMatchObject([
      { means: "formula" },
      { means: "phase" },
      {
        means: "value",
        unit: "kcal/mol",
        because: expect.stringContaining("agrees with edition 2 to 1 % in kcal/mol"),
      },
      { means: "uncertainty", property: "enthalpyOfFormation" },
      { means: "value", unit: "cal/(mol K)", asks: true, because: expect.stringContaining("no unit in the head") },
    ]);
    await confirmGuess(steward, id, { settings: { uncertaintyKind: "standard" } });
    await readSheet(id);
    const built = await buildRevision(steward, id, { title: "Spring calorimetry", summary: "" });
    // KBr is new, NaCl is proposed by the revision above, the other ten species stand in edition 1.
    expect(built).toMatchObject({ newSpecies: 1, newValues: 4, changedValues: 20, same: 0 });
    const lines = await findLines(built.revisionId, appDatabase());
    const ammonia = lines.find((line) => line.rowNumber === 2 && line.property === "enthalpyOfFormation");
    expect(ammonia?.content).toMatchObject({
      digits: "-45.90",
      uncertainty: { digits: "0.17", kind: "standard", coverageFactor: null },
      given: { text: "-10,97", unit: "kcal/mol", note: "× 4.184" },
    });
  }, 60_000);

  test("a plan is remembered for the same heads", async () => {
    const id = await receiveSheet(steward, {
      name: "again.csv",
      bytes: bytes("Substance;State;dHf (kcal);u(dHf);S\nNH3;g;-10,95;0,04;46,09\nZnO;cr;-83,7;0,05;10,4\n"),
    });
    const sheet = await sheetOf(id);
    expect(sheet.settings).toMatchObject({
      temperature: "298.15",
      standardPressure: "100000",
      uncertaintyKind: "standard",
    });
    expect(sheet.plan?.columns[4]).toMatchObject({
      unit: "cal/(mol K)",
      because: expect.stringContaining("as confirmed before"),
    });
    expect(sheet.plan?.notices[0]).toContain("S. Steward confirmed");
  });
});

describe("rows that cannot be read", () => {
  let id: number;
  beforeAll(async () => {
    id = await sheetRead(steward, { name: "calder-point-messy.csv", bytes: fixture("calder-point-messy.csv") });
  }, 60_000);

  test("every row is accounted for, and each refused one says where and why", async () => {
    const sheet = await sheetOf(id);
    const counts = await countRows(id, appDatabase());
    expect(counts.read + counts.refused + counts.skipped).toBe(sheet.rowsTotal);
    expect(sheet.state).toBe("read");
    const rows = await refusedRows(id);
    expect(rows.map((row) => [row.number, row.problems[0]?.column])).toEqual([
      [8, 3],
      [10, 4],
      [14, 6],
      [18, 0],
      [21, 4],
      [22, null],
      [24, 2],
    ]);
  });

  test("no revision is built while they wait", async () => {
    await expect(buildRevision(steward, id, { title: "Too early", summary: "" })).rejects.toThrow(
      /7 refused rows wait/,
    );
  });

  test("a repair keeps the original, is read at once, and a second of the same cell sees the first", async () => {
    await repairCell(steward, id, { row: 18, column: 0, was: "SO42-", becomes: "SO4-2" });
    const row = await findRow(id, 18, appDatabase());
    expect(row).toMatchObject({ outcome: "read", reading: { match: { kind: "known", key: "SO4-2(aq)" } } });
    expect(row?.cells[0]).toBe("SO42-");
    expect(await findRepairs(id, [18], appDatabase())).toMatchObject([
      { was: "SO42-", becomes: "SO4-2", by: "S. Steward" },
    ]);
    // A double click does nothing twice; another text for a cell that changed meanwhile is refused.
    await repairCell(steward, id, { row: 18, column: 0, was: "SO42-", becomes: "SO4-2" });
    expect(await findRepairs(id, [18], appDatabase())).toHaveLength(1);
    await expect(repairCell(steward, id, { row: 18, column: 0, was: "SO42-", becomes: "SO42-1" })).rejects.toThrow(
      /says “SO4-2” now/,
    );
  });

  test("two people at once: one repair stands, the other is refused", async () => {
    const other = await actor("T. Twin", "steward");
    const attempts = await Promise.allSettled([
      repairCell(steward, id, { row: 14, column: 6, was: "-41.46", becomes: "41.46" }),
      repairCell(other, id, { row: 14, column: 6, was: "-41.46", becomes: "41.5" }),
    ]);
    expect(attempts.map((one) => one.status).sort()).toEqual(["fulfilled", "rejected"]);
    const repairs = await findRepairs(id, [14], appDatabase());
    expect(repairs).toHaveLength(1);
  });

  test("a repair that is wrong again leaves the row refused with the new reason", async () => {
    await repairCell(steward, id, { row: 8, column: 3, was: "7647-01-1", becomes: "7647-01-2" });
    const row = await findRow(id, 8, appDatabase());
    expect(row?.outcome).toBe("refused");
    expect(row?.problems).toMatchObject([{ column: 3, sentence: expect.stringContaining("ends in 2") }]);
    await repairCell(steward, id, { row: 8, column: 3, was: "7647-01-2", becomes: "7647-01-0" });
    expect((await findRow(id, 8, appDatabase()))?.outcome).toBe("read");
  });

  test("leaving one of two disputing rows out settles the other", async () => {
    await leaveRowsOut(steward, id, [21]);
    expect((await findRow(id, 10, appDatabase()))?.outcome).toBe("read");
    expect((await findRow(id, 21, appDatabase()))?.leftOutAt).toBeInstanceOf(Date);
    await expect(leaveRowsOut(steward, id, [21])).rejects.toBeInstanceOf(Refused);
  });

  test("mending a row that was left out brings it back in, and the dispute with it", async () => {
    await repairCell(steward, id, { row: 21, column: 4, was: "-634.9", becomes: "-634.8" });
    expect((await findRow(id, 10, appDatabase()))?.outcome).toBe("refused");
    expect((await findRow(id, 21, appDatabase()))?.leftOutAt).toBeNull();
    await leaveRowsOut(steward, id, [21]);
    expect((await findRow(id, 10, appDatabase()))?.outcome).toBe("read");
  });

  test("the rest is left out together, and the revision is built from what was read", async () => {
    expect(await leaveRowsOut(steward, id, null)).toBe(2);
    const built = await buildRevision(steward, id, { title: "Messy", summary: "" });
    const lines = await findLines(built.revisionId, appDatabase());
    expect(new Set(lines.map((line) => line.rowNumber))).not.toContain(22);
    await expect(buildRevision(steward, id, { title: "Messy", summary: "" })).rejects.toBeInstanceOf(Refused);
    await expect(repairCell(steward, id, { row: 8, column: 6, was: "186.90", becomes: "1" })).rejects.toBeInstanceOf(
      Refused,
    );
  }, 60_000);
});

describe("a species that could be two", () => {
  test("is asked about, and the answer is kept as a repair", async () => {
    const id = await sheetRead(steward, {
      name: "names.csv",
      bytes: bytes(
        "formula,phase,form,S (J/mol/K),remark\nSiO2,cr,,41.5,\nSiO2,cr,cristobalite,43.4,\nUO3,cr,alpha,99.4,\nCaO,cr,lime,38.3,\n",
      ),
    });
    expect((await refusedRows(id)).map((row) => [row.number, row.problems[0]?.repairs.map((one) => one.text)])).toEqual(
      [[5, ["CaO(cr)", "new"]]],
    );
    expect((await findRow(id, 2, appDatabase()))?.reading?.match).toMatchObject({ key: "SiO2(cr,alpha-quartz)" });
    expect((await findRow(id, 3, appDatabase()))?.reading?.match).toEqual({
      kind: "new",
      key: "SiO2(cr,cristobalite)",
      label: "cristobalite",
    });
    await repairCell(steward, id, { row: 5, column: ANSWER, was: "", becomes: "CaO(cr)" });
    expect((await findRow(id, 5, appDatabase()))?.reading?.match).toMatchObject({ kind: "known", key: "CaO(cr)" });
  });

  test("proposed in another open revision is the same species, with one id", async () => {
    const sheet = (digits: string) => bytes(`formula,phase,dHf (kJ/mol)\nLiF,cr,${digits}\n`);
    const first = await revisionFromSheet(steward, { name: "a.csv", bytes: sheet("-616.0") });
    const second = await revisionFromSheet(steward, { name: "b.csv", bytes: sheet("-616.9") });
    const idsOf = async (revision: number) =>
      new Set((await findLines(revision, appDatabase())).flatMap((line) => line.speciesId ?? []));
    expect(await idsOf(first.revisionId)).toEqual(await idsOf(second.revisionId));
    expect(second).toMatchObject({ newSpecies: 0, newValues: 1 });
  });
});

describe("what is refused", () => {
  test("bytes that are no sheet, and nothing is kept of them", async () => {
    const before = (await database.app.selectFrom("sheet").select("id").execute()).length;
    await expect(
      receiveSheet(steward, { name: "book.csv", bytes: Uint8Array.from([0x50, 0x4b, 3, 4]) }),
    ).rejects.toBeInstanceOf(Invalid);
    expect(await database.app.selectFrom("sheet").select("id").execute()).toHaveLength(before);
  });

  test("the same bytes twice while the first are being worked on, also at the same moment", async () => {
    const upload = { name: "twice.csv", bytes: bytes("formula,phase,S (J/mol/K)\nH2O,l,70.1\n") };
    const attempts = await Promise.allSettled([receiveSheet(steward, upload), receiveSheet(steward, upload)]);
    expect(attempts.map((one) => one.status).sort()).toEqual(["fulfilled", "rejected"]);
    await expect(receiveSheet(steward, upload)).rejects.toThrow(/already here as sheet \d+/);
  });

  test("a plan that leaves something open, with a pointer to each", async () => {
    const id = await receiveSheet(steward, {
      name: "open.csv",
      bytes: bytes("formula,phase,Hf,u\nXeF2,cr,-163,1\nXeF4,cr,-260,2\n"),
    });
    const sheet = await sheetOf(id);
    const attempt = confirmPlan(steward, id, {
      columns: sheet.plan?.columns ?? [],
      settings: sheet.settings,
      source: { kind: "new", source: notebook },
    });
    await expect(attempt).rejects.toMatchObject({
      errors: expect.arrayContaining([
        expect.objectContaining({ pointer: "/columns/2" }),
        expect.objectContaining({ pointer: "/settings/temperature" }),
        expect.objectContaining({ pointer: "/settings/standardPressure" }),
        expect.objectContaining({ pointer: "/settings/uncertaintyKind" }),
      ]),
    });
    await expect(
      confirmGuess(steward, id, { source: { kind: "known", sourceId: "src_nothing" } }),
    ).rejects.toBeInstanceOf(Invalid);
    expect((await sheetOf(id)).state).toBe("planned");
  });

  test("a double click on confirm, and moves from the wrong state", async () => {
    const id = await receiveSheet(steward, { name: "c.csv", bytes: bytes("formula,phase,S (J/mol/K)\nH2O,l,70.2\n") });
    await expect(buildRevision(steward, id, { title: "x", summary: "" })).rejects.toBeInstanceOf(Refused);
    await expect(repairCell(steward, id, { row: 2, column: 0, was: "H2O", becomes: "D2O" })).rejects.toBeInstanceOf(
      Refused,
    );
    const attempts = await Promise.allSettled([confirmGuess(steward, id), confirmGuess(steward, id)]);
    expect(attempts.map((one) => one.status).sort()).toEqual(["fulfilled", "rejected"]);
    await readSheet(id);
    await readSheet(id);
    expect((await sheetOf(id)).state).toBe("read");
    await expect(repairCell(steward, id, { row: 99, column: 0, was: "", becomes: "x" })).rejects.toBeInstanceOf(
      NotFound,
    );
    await reopenPlan(steward, id);
    expect((await sheetOf(id)).state).toBe("planned");
  });

  test("everybody without the role", async () => {
    const upload = { name: "d.csv", bytes: bytes("formula,phase,S (J/mol/K)\nH2O,l,70.3\n") };
    for (const somebody of [analyst, reviewer]) {
      await expect(receiveSheet(somebody, upload)).rejects.toBeInstanceOf(Forbidden);
    }
    const id = await receiveSheet(steward, upload);
    await expect(confirmGuess(reviewer, id)).rejects.toBeInstanceOf(Forbidden);
    await expect(repairCell(reviewer, id, { row: 2, column: 0, was: "H2O", becomes: "x" })).rejects.toBeInstanceOf(
      Forbidden,
    );
    await expect(leaveRowsOut(analyst, id, null)).rejects.toBeInstanceOf(Forbidden);
    await expect(buildRevision(reviewer, id, { title: "x", summary: "" })).rejects.toBeInstanceOf(Forbidden);
  });
});

describe("a long reading", () => {
  const rows = Array.from({ length: 1200 }, (_, index) => `Na${index + 1}Cl${index + 2},cr,${50 + index}.5`);
  const text = `formula,phase,S (J/mol/K)\n${rows.join("\n")}\n`;

  test("can be stopped, and goes on from the columns", async () => {
    const id = await receiveSheet(steward, { name: "long.csv", bytes: bytes(text) });
    await confirmGuess(steward, id);
    await stopReading(steward, id);
    expect(await sheetOf(id)).toMatchObject({
      state: "failed",
      failure: "Stopped by S. Steward after 0 of 1200 rows.",
    });
    await readSheet(id);
    expect((await sheetOf(id)).rowsDone).toBe(0);
    await reopenPlan(steward, id);
    await confirmGuess(steward, id);
    await readSheet(id);
    expect(await sheetOf(id)).toMatchObject({ state: "read", rowsDone: 1200 });
  });

  test("taken up by another worker goes on after the rows that were done", async () => {
    const id = await receiveSheet(steward, { name: "longer.csv", bytes: bytes(`${text}NaF,cr,51.1\n`) });
    await confirmGuess(steward, id);
    await Promise.all([readSheet(id), readSheet(id)]);
    const counts = await countRows(id, appDatabase());
    expect(counts.read).toBe(1201);
    expect((await sheetOf(id)).state).toBe("read");
  });
});
