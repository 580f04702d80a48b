import { beforeAll, describe, expect, test } from "vitest";
import { findEdition } from "#app/editions/editions.queries.server.ts";
import { sourceFilePortions } from "#app/editions/sourceFile.server.ts";
import { readSourceQuery } from "#app/editions/sourceList.ts";
import {
  findSourceIn,
  findSourcePage,
  findSourcesPage,
  findWhereSourceStands,
} from "#app/editions/sourcesPage.server.ts";
import { tableFilePortions } from "#app/editions/tableFile.server.ts";
import { Forbidden, Invalid, NotFound, Refused } from "#app/http/errors.ts";
import type { Acting } from "#app/people/person.ts";
import {
  changeOf,
  findMendableSource,
  findOpenDrafts,
  proposeMendedSource,
  proposeNewSource,
} from "#app/review/proposeSource.server.ts";
import { findLines } from "#app/review/review.queries.server.ts";
import { sendToReview } from "#app/review/revise.server.ts";
import { fullCitation } from "#app/sources/citation.ts";
import { newSource, type NewSource, typedSource } from "#app/sources/sourceForm.ts";
import { useDatabase } from "#tests/support/database.ts";
import { actsOn } from "#tests/support/people.ts";
import { acceptAll, actor, propose, publishWaiting } from "#tests/support/revisions.ts";

/*
 * Sources as people handle them: added and mended by hand, and read as of an edition. Three editions: the first with two
 * sources, the second after a citation was mended and values moved to another source, the third after a source that was
 * described by hand. Numbers are CODATA Key Values (1989) or invented.
 */

const database = useDatabase();
let ines: Acting;
let ruth: Acting;
let mina: Acting;

const CODATA = "src_codatakeyvalues";
const CELL = "src_calderpointcell3";
let added = "";
let addedIn = 0;
let mendedIn = 0;

const described = (changes: Partial<NewSource> = {}): NewSource =>
  newSource.parse({
    work: "article",
    title: "Heats of solution of two salts",
    authors: "Marin, A. B.\nOkafor, C.",
    year: "2019",
    container: "Journal of Bench Calorimetry",
    volume: "12",
    issue: "",
    pages: "101-118",
    publisher: "",
    doi: "10.5555/jbc.2019.101",
    sourceKind: "measurement",
    note: "Invented, for a test.",
    ...changes,
  });

const frame = { revisionId: null, title: "By hand", reason: "Needed for the salts." };

beforeAll(async () => {
  ines = await actor("Ines Halvard", "steward");
  ruth = await actor("Ruth Amsel", "reviewer");
  mina = await actor("Mina Corvin", "analyst");
  const codata = (key: string, property: "entropy" | "enthalpyOfFormation", digits: string) => ({
    key,
    property,
    digits,
    sourceId: CODATA,
  });
  const first = await propose(ines, {
    sources: [
      { id: CODATA, title: "CODATA Key Vlaues for Thermodynamics" },
      { id: CELL, title: "Cell 3, notebook 12 (invented)", kind: "measurement" },
    ],
    species: ["NH3(g)", "H2O(g)"].map((key) => ({ key })),
    values: [
      codata("NH3(g)", "entropy", "192.77"),
      codata("NH3(g)", "enthalpyOfFormation", "-45.94"),
      codata("H2O(g)", "entropy", "188.835"),
      { key: "H2O(g)", property: "enthalpyOfFormation", digits: "-241.8", sourceId: CELL },
    ],
  });
  await acceptAll(ines, ruth, first);
  await publishWaiting(ruth);

  // Edition 2: the typing mistake is mended, the source has a notice, and a value leans on it that leaned on the other.
  const before = await findMendableSource(ines, CODATA);
  const mended = newSource.parse({
    ...typedSource(before.before),
    work: "report",
    title: "CODATA Key Values for Thermodynamics",
    notice: "A correction of table 4 is announced.",
  });
  mendedIn = await proposeMendedSource(
    ines,
    { sourceId: CODATA, seen: before.seen, source: mended },
    { ...frame, title: "A typing mistake", reason: "Two letters were exchanged." },
  );
  await acceptAll(ines, ruth, mendedIn);
  const moved = await propose(ines, { values: [codata("H2O(g)", "enthalpyOfFormation", "-241.826")] });
  await acceptAll(ines, ruth, moved);
  await publishWaiting(ruth);

  // Edition 3: a source described by hand.
  const outcome = await proposeNewSource(ines, described(), frame, false);
  if (outcome.kind !== "proposed") throw new Error("the source was taken for a known one");
  ({ sourceId: added, revisionId: addedIn } = outcome);
});

const edition = async (n: number) => (await findEdition(n, database.app))!;
const page = async (n: number, id: string, query: Partial<Parameters<typeof findSourcePage>[3]> = {}) =>
  findSourcePage(mina, await edition(n), id, { property: null, page: 1, ...query });

describe("a source described by hand", () => {
  test("is a line of a new draft, with its reason, on record, and is nowhere in an edition yet", async () => {
    const lines = await findLines(addedIn, database.app);
    expect(lines).toMatchObject([
      {
        kind: "source",
        sourceId: added,
        content: { doi: "10.5555/jbc.2019.101", sourceKind: "measurement", notice: null },
      },
    ]);
    expect(await actsOn(String(addedIn))).toContain("revision.begun");
    expect(await findWhereSourceStands(mina, added)).toEqual({ revisionId: addedIn });
    await expect(edition(2).then((n) => findSourceIn(n, added))).rejects.toThrow(`Edition 2 has no source ${added}.`);
  });

  test("is shown as known before it is added a second time: by its DOI, or by title, year and first author", async () => {
    const again = await proposeNewSource(ines, described({ title: "Another title" }), frame, true);
    expect(again).toMatchObject({
      kind: "twins",
      twins: [{ because: "the same DOI", source: { sourceId: added, revisionId: addedIn } }],
    });
    const alike = described({ doi: "", title: "heats of solution, of two SALTS" });
    expect(await proposeNewSource(ines, alike, frame, false)).toMatchObject({
      kind: "twins",
      twins: [{ because: "the same title, year and first author", source: { sourceId: added } }],
    });
  });

  test("goes in all the same when the person says that it is another work", async () => {
    const alike = described({ doi: "", title: "heats of solution, of two SALTS" });
    const drafts = await findOpenDrafts(ines);
    expect(drafts.map((draft) => draft.id)).toContain(addedIn);
    const outcome = await proposeNewSource(ines, alike, { ...frame, revisionId: addedIn, title: "" }, true);
    expect(outcome).toMatchObject({ kind: "proposed", revisionId: addedIn });
    expect(await findLines(addedIn, database.app)).toHaveLength(2);
    expect(await actsOn(String(addedIn))).toContain("revision.lines-added");
  });

  test("needs the steward's role, a title for a new draft, and a draft that is written now", async () => {
    const other = described({ doi: "10.5555/other", title: "Other" });
    await expect(proposeNewSource(mina, other, frame, false)).rejects.toThrow(Forbidden);
    await expect(proposeNewSource(ruth, other, frame, false)).rejects.toThrow(Forbidden);
    await expect(proposeNewSource(ines, other, { ...frame, title: " " }, false)).rejects.toThrow(Invalid);
    await expect(proposeNewSource(ines, other, { ...frame, revisionId: mendedIn }, false)).rejects.toThrow(Refused);
    await expect(proposeNewSource(ines, other, { ...frame, revisionId: 999_999 }, false)).rejects.toThrow(NotFound);
  });

  test("is on its page once it is accepted and published", async () => {
    await acceptAll(ines, ruth, addedIn);
    await publishWaiting(ruth);
    expect(await findWhereSourceStands(mina, added)).toEqual({ edition: 3 });
    const { source, counts, species, history } = await page(3, added);
    expect(fullCitation(source.citation)).toBe(
      "A. B. Marin, C. Okafor, Heats of solution of two salts, Journal of Bench Calorimetry 12, 101–118, 2019",
    );
    expect(source).toMatchObject({ doi: "10.5555/jbc.2019.101", kind: "measurement", since: 3 });
    expect({ counts, species }).toEqual({ counts: [], species: [] });
    expect(history).toMatchObject([
      { edition: 3, came: 0, went: 0, cited: { texts: null, revisionId: addedIn, decider: "Ruth Amsel" } },
    ]);
    await expect(edition(2).then((n) => findSourceIn(n, added))).rejects.toThrow("it came in with edition 3");
  });
});

describe("a mended citation", () => {
  test("stands from the next edition on; the older edition keeps its own", async () => {
    const [old, now] = [await page(1, CODATA), await page(2, CODATA)];
    expect(old.source).toMatchObject({ citation: { title: "CODATA Key Vlaues for Thermodynamics" }, notice: null });
    expect(now.source).toMatchObject({
      citation: { title: "CODATA Key Values for Thermodynamics" },
      notice: "A correction of table 4 is announced.",
      since: 1,
    });
    // Nothing later than an edition is seen from it.
    expect(old.history.map((row) => row.edition)).toEqual([1]);
  });

  test("is told word by word in its history, with the people behind it", async () => {
    const { history } = await page(2, CODATA);
    expect(history).toMatchObject([
      { edition: 1, came: 3, went: 0, cited: { texts: null } },
      {
        edition: 2,
        came: 1,
        went: 0,
        cited: {
          revisionId: mendedIn,
          writer: "Ines Halvard",
          decider: "Ruth Amsel",
          texts: [
            { field: "citation" },
            { field: "notice", runs: [{ kind: "came", text: "A correction of table 4 is announced." }] },
          ],
        },
      },
    ]);
    const runs = history[1]?.cited?.texts?.[0]?.runs ?? [];
    expect(runs.filter((run) => run.kind !== "same").map((run) => [run.kind, run.text])).toEqual([
      ["went", "Vlaues"],
      ["came", "Values"],
    ]);
  });

  test("is shown before it is proposed, and refused while nothing would change", async () => {
    const standing = await findMendableSource(ines, CODATA);
    expect(standing).toMatchObject({ edition: 3, revisionId: null });
    const same = newSource.parse({ ...typedSource(standing.before) });
    expect(changeOf(standing, same)).toEqual([]);
    await expect(
      proposeMendedSource(ines, { sourceId: CODATA, seen: standing.seen, source: same }, frame),
    ).rejects.toThrow(/Nothing would change/);
  });

  test("needs a reason, the steward's role, a source that is there, and a DOI of its own", async () => {
    const { before, seen } = await findMendableSource(ines, CODATA);
    const mend = (changes: Partial<NewSource>, id = CODATA) => ({
      sourceId: id,
      seen,
      source: newSource.parse({ ...typedSource(before), ...changes }),
    });
    await expect(proposeMendedSource(ines, mend({ year: "1989" }), { ...frame, reason: " " })).rejects.toThrow(
      "Say why the citation is mended.",
    );
    await expect(proposeMendedSource(ruth, mend({ year: "1989" }), frame)).rejects.toThrow(Forbidden);
    await expect(proposeMendedSource(ines, mend({ year: "1989" }, "src_nothing00"), frame)).rejects.toThrow(NotFound);
    await expect(proposeMendedSource(ines, mend({ doi: "10.5555/JBC.2019.101" }), frame)).rejects.toThrow(
      `Another source has this DOI already (${added}).`,
    );
  });

  test("is written against what waits, and refused to who saw something older", async () => {
    const standing = await findMendableSource(ines, CELL);
    const retracted = (notice: string) => newSource.parse({ ...typedSource(standing.before), notice });
    const first = await proposeMendedSource(
      ines,
      { sourceId: CELL, seen: standing.seen, source: retracted("Retracted: the cell leaked.") },
      frame,
    );
    await acceptAll(ines, ruth, first);
    expect(await findMendableSource(ines, CELL)).toMatchObject({
      edition: null,
      revisionId: first,
      before: { notice: "Retracted: the cell leaked." },
    });
    await expect(
      proposeMendedSource(ines, { sourceId: CELL, seen: standing.seen, source: retracted("Corrected.") }, frame),
    ).rejects.toThrow(Refused);
  });
});

describe("the page of a source", () => {
  test("has the values that lean on it in that edition, one row a species, counted by property", async () => {
    const first = await page(1, CODATA);
    expect(first.counts).toEqual([
      { property: "enthalpyOfFormation", values: 1 },
      { property: "entropy", values: 2 },
    ]);
    expect(first.species.map((row) => [row.key, Object.keys(row.values).sort()])).toEqual([
      ["H2O(g)", ["entropy"]],
      ["NH3(g)", ["enthalpyOfFormation", "entropy"]],
    ]);
    const second = await page(2, CODATA);
    expect(second.species[0]?.values.enthalpyOfFormation?.digits).toBe("-241.826");
    expect((await page(2, CELL)).species).toEqual([]);
    expect((await page(2, CELL)).history).toMatchObject([
      { edition: 1, came: 1, went: 0 },
      { edition: 2, came: 0, went: 1, cited: null },
    ]);
  });

  test("shows one property alone, and the last page for one beyond it", async () => {
    const { species, count, page: shown, pages } = await page(1, CODATA, { property: "enthalpyOfFormation", page: 7 });
    expect({ keys: species.map((row) => row.key), count, shown, pages }).toEqual({
      keys: ["NH3(g)"],
      count: 1,
      shown: 1,
      pages: 1,
    });
  });

  test("downloads its lines of the edition's own file, in their order, portion by portion", async () => {
    const textOf = async (portions: AsyncGenerator<Buffer>): Promise<string[]> => {
      const parts: Buffer[] = [];
      for await (const portion of portions) parts.push(portion);
      return Buffer.concat(parts).toString("utf8").split("\r\n").filter(Boolean);
    };
    const whole = await textOf(tableFilePortions(await edition(2)));
    const source = await findSourceIn(await edition(2), CODATA);
    const own = await textOf(sourceFilePortions(2, source, 1));
    expect(own).toEqual(whole.filter((line, index) => index === 0 || line.includes(CODATA)));
    expect(own).toHaveLength(5);
  });
});

test("the list counts the values of each source in that edition", async () => {
  const list = await findSourcesPage(mina, await edition(2), readSourceQuery(new URLSearchParams("sort=-values")));
  expect(list.rows.map(({ sourceId, values }) => [sourceId, values])).toEqual([
    [CODATA, 4],
    [CELL, 0],
  ]);
  expect(list).toMatchObject({ all: 2, count: 2, frame: { number: 2, newest: 3 } });
});

test("what is only sent to review is mended in its revision, not from here", async () => {
  const outcome = await proposeNewSource(ines, described({ doi: "10.5555/third", title: "Third" }), frame, false);
  if (outcome.kind !== "proposed") throw new Error("taken for a known one");
  await sendToReview(ines, outcome.revisionId, "");
  await expect(findMendableSource(ines, outcome.sourceId)).rejects.toThrow(/mended in its revision/);
  expect((await findOpenDrafts(ines)).map((draft) => draft.id)).not.toContain(outcome.revisionId);
});
