import { beforeAll, describe, expect, test } from "vitest";
import { database as appDatabase, useDatabase as connectTo } from "#app/db/database.server.ts";
import { findDetailsAsOf } from "#app/editions/editions.queries.server.ts";
import { Invalid, Refused } from "#app/http/errors.ts";
import { buildRevision } from "#app/intake/buildRevision.server.ts";
import { chooseEncoding } from "#app/intake/chooseEncoding.server.ts";
import { reopenPlan } from "#app/intake/confirmPlan.server.ts";
import { countRows, findRepairs, findRow, findRowsByOutcome, findSheet } from "#app/intake/intake.queries.server.ts";
import { ANSWER } from "#app/intake/meaning.ts";
import { readSheet } from "#app/intake/readSheet.server.ts";
import { receiveSheet } from "#app/intake/receiveSheet.server.ts";
import { leaveRowsOut, repairAlike, repairCell } from "#app/intake/repairCell.server.ts";
import { findSheetPage } from "#app/intake/sheetPage.server.ts";
import type { Acting } from "#app/people/person.ts";
import { findLines, type LineRow } from "#app/review/review.queries.server.ts";
import { useDatabase } from "#tests/support/database.ts";
import { acceptAll, actor, publishWaiting } from "#tests/support/revisions.ts";
import { confirmGuess, fixture, notebook, revisionFromSheet, sheetRead } from "#tests/support/sheets.ts";

/*
 * Sheets of other kinds than the plain one, all the way into a revision: in older encodings, at 1 atm, with a source a
 * row, and with names and numbers for species that the table knows. Figures: common practice, and app/thermo.
 */

const database = useDatabase();
const bytes = (text: string): Uint8Array => new TextEncoder().encode(text);

let steward: Acting;
let reviewer: Acting;

const linesOf = (revision: number): Promise<LineRow[]> => findLines(revision, appDatabase());
const refusedIn = (id: number) => findRowsByOutcome(id, "refused", { after: 0, limit: 100 }, appDatabase());
const sheetOf = async (id: number) => {
  const sheet = await findSheet(id, appDatabase());
  if (!sheet) throw new Error("no such sheet");
  return sheet;
};
const contentsOf = async (revision: number, kind: LineRow["kind"]) =>
  (await linesOf(revision)).filter((line) => line.kind === kind).map((line) => line.content);

beforeAll(async () => {
  connectTo(database.app);
  steward = await actor("S. Steward", "steward");
  reviewer = await actor("R. Reviewer", "reviewer");
  const built = await revisionFromSheet(
    steward,
    {
      name: "first.csv",
      bytes: bytes(
        "formula,phase,form,S (J/mol/K)\nH2O,l,,69.95\nH2O,g,,188.835\nCaO,cr,,38.1\nC,cr,graphite,5.74\nO2,g,,205.152\nH2,g,,130.68\n",
      ),
    },
    { source: { kind: "new", source: { ...notebook, title: "Key values", authors: "Cox, J. D.", year: "1989" } } },
  );
  await acceptAll(steward, reviewer, built.revisionId);
  await publishWaiting(reviewer);
}, 60_000);

describe("the encoding", () => {
  const text = "formula,phase,S (J/mol/K),remark\nNaCl,cr,72.1,±0.2\nKCl,cr,82.6,\n";
  const ansi = Uint8Array.from(Array.from(text, (sign) => sign.charCodeAt(0)));

  test("that the bytes do not prove is noted, and can be chosen otherwise", async () => {
    const id = await receiveSheet(steward, { name: "ansi.csv", bytes: ansi });
    expect((await sheetOf(id)).dialect).toMatchObject({
      encoding: "Windows-1252",
      guessed: { why: "row 2 is not valid UTF-8", signs: [{ sign: "±", row: 2 }] },
    });
    await expect(chooseEncoding(steward, id, "UTF-8")).rejects.toThrow(/Row 2 is not valid UTF-8/);
    await expect(chooseEncoding(steward, id, "EBCDIC")).rejects.toBeInstanceOf(Invalid);
    expect((await sheetOf(id)).dialect?.encoding).toBe("Windows-1252");
  });

  test("is changed after a reading, and the cells are those of the new one", async () => {
    const id = await receiveSheet(steward, { name: "utf8.csv", bytes: bytes(text) });
    await confirmGuess(steward, id);
    await readSheet(id);
    expect((await findRow(id, 2, appDatabase()))?.cells[3]).toBe("±0.2");
    await expect(chooseEncoding(steward, id, "Windows-1252")).rejects.toBeInstanceOf(Refused);
    await reopenPlan(steward, id);
    await chooseEncoding(steward, id, "Windows-1252");
    await confirmGuess(steward, id);
    await readSheet(id);
    expect((await findRow(id, 2, appDatabase()))?.cells[3]).toBe("Â±0.2");
    await reopenPlan(steward, id);
    await chooseEncoding(steward, id, "UTF-8");
    await confirmGuess(steward, id);
    await readSheet(id);
    expect((await findRow(id, 2, appDatabase()))?.cells[3]).toBe("±0.2");
  });
});

test("a sheet at 1 atm says so itself, and is kept at 100 kPa with each step beside its value", async () => {
  const id = await receiveSheet(steward, {
    name: "one-atmosphere.csv",
    bytes: fixture("sheets/one-atmosphere.csv"),
  });
  expect((await sheetOf(id)).settings).toMatchObject({ temperature: "298.15", standardPressure: "101325" });
  await confirmGuess(steward, id, { settings: { standardPressure: "101325" } });
  await readSheet(id);
  const counts = await countRows(id, appDatabase());
  expect(counts).toMatchObject({ read: 9, refused: 0, skipped: 1 });
  const { revisionId } = await buildRevision(steward, id, { title: "At 1 atm", summary: "" });
  const water = (await linesOf(revisionId)).filter((line) => line.rowNumber === 3 && line.kind === "value");
  expect(Object.fromEntries(water.map((line) => [line.property, line.content]))).toMatchObject({
    gibbsEnergyOfFormation: {
      digits: "-237.129",
      standardPressure: "100000",
      given: { text: "-56.687", unit: "kcal/mol", note: "× 4.184; 1 atm to 1 bar: + 0.0489" },
    },
    entropy: { digits: "69.91", standardPressure: "100000" },
  });
}, 60_000);

describe("a source a row", () => {
  const text =
    "formula,phase,S (J/mol/K),ref\nH2O,l,69.96,Cox 1989\nCaO,cr,38.2,book 4\nMgO,cr,26.95,book 4\nBaO,cr,70.4,book 5\nSrO,cr,55.4,\n";

  test("is guessed for keys that a known source fits, and asked for the others", async () => {
    const id = await receiveSheet(steward, { name: "keys.csv", bytes: bytes(text) });
    const page = await findSheetPage(steward, id, 0);
    const known = page.sources.find((one) => one.name === "Cox, 1989");
    expect(page.columns[3]).toMatchObject({
      means: "sourceKey",
      keys: [
        { key: "Cox 1989", guess: known?.id },
        { key: "book 4", guess: null },
        { key: "book 5", guess: null },
      ],
    });
    await expect(confirmGuess(steward, id)).rejects.toThrow(/Say which source each of them stands for/);
    await confirmGuess(steward, id, {
      source: {
        kind: "byKey",
        keys: [
          { key: "Cox 1989", choice: { kind: "known", sourceId: known?.id ?? "" } },
          { key: "book 4", choice: { kind: "new", source: { ...notebook, title: "Notebook 4" } } },
          { key: "book 5", choice: null },
        ],
        otherwise: null,
      },
    });
    await readSheet(id);
    expect((await refusedIn(id)).map((row) => [row.number, row.problems[0]?.column])).toEqual([
      [5, 3],
      [6, 3],
    ]);
    await repairCell(steward, id, { row: 6, column: 3, was: "", becomes: "book 4" });
    await leaveRowsOut(steward, id, [5]);
    const { revisionId } = await buildRevision(steward, id, { title: "Keys", summary: "" });
    const lines = await linesOf(revisionId);
    const sources = lines.filter((line) => line.kind === "source");
    expect(sources.map((line) => line.content)).toMatchObject([{ citation: { title: "Notebook 4" } }]);
    const ofRow = new Map(
      lines.flatMap((line) =>
        line.content.kind === "value" ? [[line.rowNumber, line.content.sourceId] as const] : [],
      ),
    );
    const book = sources[0]?.sourceId;
    expect(Object.fromEntries(ofRow)).toEqual({ 2: known?.id, 3: book, 4: book, 6: book });
  }, 60_000);
});

describe("names and CAS numbers", () => {
  test("of species in the table become lines of what they are called, against what stands", async () => {
    const built = await revisionFromSheet(
      steward,
      {
        name: "names.csv",
        bytes: bytes(
          'formula,phase,name,CAS,synonyms\nH2O,l,"Water, liquid",7732-18-5,\nCaO,cr,calcium oxide,,lime; burnt lime\n',
        ),
      },
      { source: null },
    );
    expect(built).toMatchObject({ newSpecies: 0, newValues: 0, renamed: 2, lines: 2 });
    const lines = await linesOf(built.revisionId);
    expect(lines.map((line) => [line.kind, line.againstRow !== null])).toEqual([
      ["detail", true],
      ["detail", true],
    ]);
    expect(lines.map((line) => line.content)).toMatchObject([
      { key: "H2O(l)", name: "Water", cas: "7732-18-5", synonyms: [] },
      { key: "CaO(cr)", name: "calcium oxide", cas: null, synonyms: ["lime", "burnt lime"] },
    ]);
    await acceptAll(steward, reviewer, built.revisionId);
    const { number } = await publishWaiting(reviewer);
    const [water] = await findDetailsAsOf(number, { keys: ["H2O(l)"] }, appDatabase());
    expect(water).toMatchObject({ name: "Water", cas: "7732-18-5" });
  }, 60_000);

  test("agree in any letters, with words of the phase and by a synonym, and then add nothing", async () => {
    const id = await sheetRead(steward, {
      name: "agree.csv",
      bytes: bytes("formula,phase,name,S (J/mol/K)\nH2O,l,WATER (liquid),69.97\nCaO,cr,Burnt-lime,38.3\n"),
    });
    expect(await refusedIn(id)).toEqual([]);
    const { revisionId, renamed } = await buildRevision(steward, id, { title: "Agree", summary: "" });
    expect(renamed).toBe(0);
    expect(await contentsOf(revisionId, "detail")).toEqual([]);
  });

  test("that differ are asked about once; the answer keeps the other name as a synonym", async () => {
    const id = await sheetRead(steward, {
      name: "differ.csv",
      bytes: bytes(
        "formula,phase,name,CAS,S (J/mol/K)\nCaO,cr,quicklime,1305-78-8,38.4\nH2O,l,oxidane,,69.98\nH2O,l,water,7732-19-6,69.98\n",
      ),
    });
    const rows = await refusedIn(id);
    expect(rows.map((row) => [row.number, row.problems[0]?.repairs.map((repair) => repair.label)])).toEqual([
      [2, ["It is another name of CaO(cr)", "It is another substance"]],
      [3, ["It is another name of H2O(l)", "It is another substance"]],
      // The number is of no substance of that name: a question too, never a silent match.
      [4, ["It is H2O(l)", "It is another substance"]],
    ]);
    await repairCell(steward, id, { row: 2, column: ANSWER, was: "", becomes: "CaO(cr)" });
    await repairCell(steward, id, { row: 3, column: ANSWER, was: "", becomes: "H2O(l)" });
    await leaveRowsOut(steward, id, [4]);
    expect((await findRow(id, 2, appDatabase()))?.reading?.match).toMatchObject({
      kind: "known",
      key: "CaO(cr)",
      adds: { name: null, cas: "1305-78-8", synonyms: ["quicklime"] },
      note: "Said to be CaO(cr). quicklime is kept as a synonym of CaO(cr).",
    });
    const { revisionId } = await buildRevision(steward, id, { title: "Differ", summary: "" });
    expect(await contentsOf(revisionId, "detail")).toMatchObject([
      { key: "CaO(cr)", name: "calcium oxide", cas: "1305-78-8", synonyms: ["lime", "burnt lime", "quicklime"] },
      { key: "H2O(l)", name: "Water", cas: "7732-18-5", synonyms: ["oxidane"] },
    ]);
  }, 60_000);

  test("two rows that name one species differently are a question between them", async () => {
    const id = await sheetRead(
      steward,
      {
        name: "two.csv",
        bytes: bytes("formula,phase,name,CAS\nH2O,g,steam,\nH2O,g,water vapour,7732-18-5\n"),
      },
      { source: null },
    );
    expect((await refusedIn(id)).map((row) => [row.number, row.problems[0]?.sentence])).toEqual([
      [3, expect.stringContaining("Row 2 calls H2O(g) steam, this one water")],
    ]);
  });
});

describe("a question that several rows ask", () => {
  test("is answered once for all of them, and only for them", async () => {
    const id = await sheetRead(steward, {
      name: "again.csv",
      bytes: bytes(
        "formula,phase,property,value,unit\nHg2+,aq,S,-36.2,J/(mol K)\nHg2+,aq,dHf,170.2,kJ/mol\nSO42-,aq,S,18.5,J/(mol K)\n",
      ),
    });
    expect(await repairAlike(steward, id, { row: 2, column: 0, becomes: "Hg+2" })).toBe(2);
    expect((await refusedIn(id)).map((row) => row.number)).toEqual([4]);
    expect(await findRepairs(id, null, appDatabase())).toMatchObject([
      { row: 2, was: "Hg2+", becomes: "Hg+2", by: "S. Steward" },
      { row: 3, was: "Hg2+", becomes: "Hg+2" },
    ]);
    await expect(repairAlike(steward, id, { row: 2, column: 0, becomes: "Hg+2" })).rejects.toBeInstanceOf(Refused);
    await expect(repairAlike(steward, id, { row: 4, column: 0, becomes: "Hg+2" })).rejects.toBeInstanceOf(Refused);
  });
});
