import { randomUUID } from "node:crypto";
import { act, type ActScope } from "#app/audit/act.server.ts";
import { findDetailsAsOf, findNewestEdition, findValuesAsOf } from "#app/editions/editions.queries.server.ts";
import { Invalid, Refused } from "#app/http/errors.ts";
import { demand } from "#app/people/permissions.ts";
import type { Acting } from "#app/people/person.ts";
import { findWaitingLines } from "#app/review/review.queries.server.ts";
import { insertRevisionWithLines } from "#app/review/revise.server.ts";
import { newSourceId } from "#app/sources/newId.server.ts";
import { describedSource } from "#app/sources/sourceForm.ts";
import { findChoosableSources, insertSource } from "#app/sources/sources.queries.server.ts";
import {
  findCandidates,
  insertSpecies,
  lockNaming,
  type SpeciesCandidate,
} from "#app/species/species.queries.server.ts";
import { buildLines, type DetailBase, type SettledRow, type SheetSource, type ValueBase } from "./buildLines.ts";
import { sheetToMove } from "./confirmPlan.server.ts";
import { countRows, findReadRows, findRepairs, updateSheetBuilt } from "./intake.queries.server.ts";
import { matchSpecies, settleRows } from "./match.ts";
import type { SheetFrame } from "./readRows.ts";
import { frameOf, repairedRow, repairsByRow } from "./rereadRows.server.ts";
import { chosenSources, type SourceChoice } from "./sourceChoice.ts";

/** What came of building: the revision and how its lines came about. */
export interface BuiltRevision {
  revisionId: number;
  lines: number;
  newSpecies: number;
  newValues: number;
  changedValues: number;
  same: number;
  /** Species of the table that get a name, a CAS number or synonyms. */
  renamed: number;
}

/**
 * Builds the draft revision from the rows that were read: new species and a new source get their identity, and every
 * value that is new or differs from what stands or waits becomes a line. The species are matched once more, since the
 * table may have moved since the rows were read.
 * @throws Refused while refused rows wait, when the table moved so that a row has become a question, or when everything
 *   stands already
 */
export async function buildRevision(
  acting: Acting,
  sheetId: number,
  text: { title: string; summary: string },
): Promise<BuiltRevision> {
  demand(acting, "sheet:work");
  const title = text.title.trim();
  if (title === "" || title.length > 200 || /\p{Cc}/u.test(title)) {
    const sentence = "Give the revision a title of one line and at most 200 characters.";
    throw new Invalid(sentence, [{ pointer: "/title", detail: sentence }]);
  }
  return act(acting, async (scope) => {
    const { trx, record } = scope;
    const sheet = await sheetToMove(sheetId, "built", "building a revision from it", trx);
    const counts = await countRows(sheetId, trx);
    if (counts.refused > 0) {
      throw new Refused(
        `${counts.refused} refused ${counts.refused === 1 ? "row waits" : "rows wait"}. Mend or leave out each of them, then build the revision.`,
      );
    }
    const frame = frameOf(sheet);
    await lockNaming(trx);
    const edition = (await findNewestEdition(trx))?.number ?? 0;
    const stored = await findReadRows(sheetId, trx);
    const { rows, candidates } = await matchAgain(sheetId, stored, frame, edition, trx);
    const sources = await sourcesOf(sheet.sourceChoice, edition, trx);
    if (counts.values > 0 && sources.length === 0) {
      throw new Refused("No source was chosen for this sheet. Go back to the columns and choose it.");
    }

    const ids = new Map<string, string>();
    const built = buildLines(rows, {
      settings: sheet.settings,
      source: sources.find((one) => one.key === null) ?? null,
      sourcesByKey: new Map(sources.flatMap((one) => (one.key === null ? [] : [[one.key, one] as const]))),
      bases: await basesOf(rows, edition, trx),
      details: await detailsOf(rows, edition, trx),
      unnamed: candidates.filter((one) => !one.named),
      speciesId: (key) => {
        const id = ids.get(key) ?? `sp_${randomUUID().replaceAll("-", "")}`;
        ids.set(key, id);
        return id;
      },
    });
    if (!built.lines.some((line) => line.kind !== "source")) {
      throw new Refused(
        counts.values === 0
          ? "No row was read to a value, a name or a number that the table lacks, so there is nothing to propose."
          : `All ${built.same} values of this sheet stand already with the same digits and source, so there is nothing to propose.`,
      );
    }
    const proposed = new Set(built.lines.flatMap((line) => line.sourceId ?? []));
    const made = new Set(sources.flatMap((one) => (!one.exists && proposed.has(one.id) ? [one.id] : [])));
    for (const id of made) await insertSource(id, trx);
    await insertSpecies(built.newSpecies, trx);
    const revisionId = await insertRevisionWithLines(
      acting,
      { title, summary: text.summary.trim(), sheetId, lines: built.lines },
      scope,
    );
    await updateSheetBuilt(sheetId, revisionId, trx);
    const result: BuiltRevision = {
      revisionId,
      lines: built.lines.length,
      newSpecies: built.newSpecies.length,
      newValues: built.newValues,
      changedValues: built.changedValues,
      same: built.same,
      renamed: built.renamed,
    };
    record({
      act: "sheet.built",
      objectId: sheetId,
      detail: { ...result, rows: counts.read, leftOut: counts.leftOut },
    });
    return result;
  });
}

/** Matches every row against the table as it is now. */
async function matchAgain(
  sheetId: number,
  stored: Awaited<ReturnType<typeof findReadRows>>,
  frame: SheetFrame,
  edition: number,
  trx: ActScope["trx"],
): Promise<{ rows: SettledRow[]; candidates: SpeciesCandidate[] }> {
  const repairs = repairsByRow(await findRepairs(sheetId, null, trx));
  const toMatch = stored.flatMap((row) =>
    row.reading ? [{ number: row.number, answer: repairedRow(row, repairs).answer, reading: row.reading }] : [],
  );
  const hills = [...new Set(toMatch.map((row) => row.reading.species.formula.hill))];
  const candidates = await findCandidates(edition, hills, trx);
  const matched = matchSpecies(toMatch, candidates, frame);
  const questionAt = (outcomes: readonly { outcome: string }[]): number =>
    outcomes.findIndex((one) => one.outcome === "refused");
  const moved = (number: number | undefined): never => {
    throw new Refused(
      `The table has moved since the rows were read, and row ${number ?? "?"} is a question now. Go back to the columns and have the sheet read again.`,
    );
  };
  const asked = questionAt(matched);
  if (asked !== -1) moved(toMatch[asked]?.number);
  const readings = matched.flatMap((one, index) =>
    one.outcome === "read" ? [{ number: toMatch[index]?.number ?? 0, reading: one.reading }] : [],
  );
  const settled = settleRows(readings, frame);
  const disputed = questionAt(settled);
  if (disputed !== -1) moved(readings[disputed]?.number);
  const rows = settled.flatMap((one, index): SettledRow[] =>
    one.outcome === "read" ? [{ number: readings[index]?.number ?? 0, reading: one.reading }] : [],
  );
  return { rows, candidates };
}

interface ChosenSource extends SheetSource {
  /** The key it was chosen for; null is the sheet as a whole or its rows without a key. */
  key: string | null;
  /** Whether its identity is there already. */
  exists: boolean;
}

/**
 * The sources of the sheet's values. One that another open revision proposes is proposed here again, word for word; two
 * keys that were answered with one new source share it.
 */
async function sourcesOf(choice: SourceChoice | null, edition: number, trx: ActScope["trx"]): Promise<ChosenSource[]> {
  const chosen = chosenSources(choice);
  if (chosen.length === 0) return [];
  const choosable = await findChoosableSources(edition, trx);
  const described = new Map<string, ChosenSource>();
  return chosen.map(({ key, choice: one }): ChosenSource => {
    if (one.kind === "known") {
      const known = choosable.find((each) => each.sourceId === one.sourceId);
      if (!known) {
        throw new Refused(
          "The source chosen for this sheet is not proposed any more. Go back to the columns and choose another.",
        );
      }
      const { citation, doi, kind, notice } = known;
      return {
        key,
        id: known.sourceId,
        exists: true,
        isNew: known.named ? null : { kind: "source", citation, doi, sourceKind: kind, notice },
      };
    }
    const content = { kind: "source" as const, ...describedSource(one.source) };
    const same = content.doi?.toLowerCase() ?? JSON.stringify(content);
    const source = described.get(same) ?? {
      key,
      id: newSourceId(),
      exists: false,
      isNew: content,
    };
    described.set(same, source);
    return { ...source, key };
  });
}

/** What the species that rows add names or numbers to are called, or wait to be called. */
async function detailsOf(rows: readonly SettledRow[], edition: number, trx: ActScope["trx"]): Promise<DetailBase[]> {
  const wanted = new Set(
    rows.flatMap(({ reading }) =>
      reading.match.kind === "known" && reading.match.adds ? [reading.match.speciesId] : [],
    ),
  );
  if (wanted.size === 0) return [];
  const waiting = (await findWaitingLines({ decidedOnly: false }, trx)).flatMap((line): DetailBase[] =>
    line.content.kind === "detail" && line.speciesId && wanted.has(line.speciesId)
      ? [{ speciesId: line.speciesId, content: line.content, row: null, version: line.versionId }]
      : [],
  );
  const waits = new Set(waiting.map((one) => one.speciesId));
  const standing = await findDetailsAsOf(edition, { speciesIds: [...wanted] }, trx);
  return [
    ...waiting,
    ...standing
      .filter((one) => !waits.has(one.speciesId))
      .map(({ speciesId, key, printed, label, name, cas, inchikey, synonyms, rowId }): DetailBase => ({
        speciesId,
        content: { kind: "detail", key, printed, label, name, cas, inchikey, synonyms: [...synonyms] },
        row: rowId,
        version: null,
      })),
  ];
}

/** What stands or waits for the species that the rows know. */
async function basesOf(rows: readonly SettledRow[], edition: number, trx: ActScope["trx"]): Promise<ValueBase[]> {
  const known = new Set(
    rows.flatMap(({ reading }) => (reading.match.kind === "known" ? [reading.match.speciesId] : [])),
  );
  const standing = await findValuesAsOf(edition, { speciesIds: [...known] }, trx);
  const waiting = (await findWaitingLines({ decidedOnly: false }, trx)).flatMap((line): ValueBase[] =>
    line.content.kind === "value" && line.speciesId && line.property && known.has(line.speciesId)
      ? [
          {
            speciesId: line.speciesId,
            property: line.property,
            digits: line.content.digits,
            uncertainty: line.content.uncertainty,
            sourceId: line.content.sourceId,
            remark: line.content.remark,
            row: null,
            version: line.versionId,
          },
        ]
      : [],
  );
  return [
    ...waiting,
    ...standing.map((value): ValueBase => ({
      speciesId: value.speciesId,
      property: value.property,
      digits: value.digits,
      uncertainty: value.uncertainty,
      sourceId: value.sourceId,
      remark: value.remark,
      row: value.rowId,
      version: null,
    })),
  ];
}
