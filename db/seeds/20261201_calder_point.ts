import { readFileSync } from "node:fs";
import type { Kysely } from "kysely";
import { useDatabase } from "#app/db/database.server.ts";
import type { DB } from "#app/db/types.ts";
import { buildRevision } from "#app/intake/buildRevision.server.ts";
import { confirmPlan } from "#app/intake/confirmPlan.server.ts";
import { findSheet } from "#app/intake/intake.queries.server.ts";
import type { SheetSettings } from "#app/intake/plan.ts";
import { readSheet } from "#app/intake/readSheet.server.ts";
import { receiveSheet } from "#app/intake/receiveSheet.server.ts";
import { leaveRowsOut } from "#app/intake/repairCell.server.ts";
import { makeDemoPeople } from "#app/people/demo.server.ts";
import type { Acting, Person } from "#app/people/person.ts";
import { acceptLines, closeReview, declineLines, setFindingAside } from "#app/review/decide.server.ts";
import { findNextEdition, publishEdition } from "#app/review/publish.server.ts";
import { findFindings, findLines, findNewestExamination } from "#app/review/review.queries.server.ts";
import { sendToReview } from "#app/review/revise.server.ts";
import type { NewSource } from "#app/sources/sourceForm.ts";

/*
 * The demo: Calder Point Laboratory, a fictional place. Everything is done by the application's own acts, as its people
 * would do it, so that each number has its sheet, its decision and its entry in the record.
 */

const codata: NewSource = {
  work: "book",
  title: "CODATA Key Values for Thermodynamics",
  authors: "Cox, J. D.\nWagman, D. D.\nMedvedev, V. A.",
  year: "1989",
  container: "",
  publisher: "Hemisphere",
  place: "New York",
  doi: "",
  sourceKind: "evaluation",
  note:
    "As remembered, compared with other tables where noted: 119 of the 151 species agree with other handbooks within 0.25, " +
    "the rest are supported by reaction checks; uncertainties after the first twenty rows are from memory alone.",
};

const nbs: NewSource = {
  work: "article",
  title: "The NBS Tables of Chemical Thermodynamic Properties",
  authors:
    "Wagman, D. D.\nEvans, W. H.\nParker, V. B.\nSchumm, R. H.\nHalow, I.\nBailey, S. M.\nChurney, K. L.\nNuttall, R. L.",
  year: "1982",
  container: "Journal of Physical and Chemical Reference Data",
  volume: "11",
  issue: "Supplement 2",
  publisher: "",
  doi: "",
  sourceKind: "evaluation",
  note: "An excerpt. A work of the US Government. No uncertainties are printed with the values.",
};

const notebook = (title: string): NewSource => ({
  work: "inhouse",
  title,
  authors: "Calder Point Laboratory",
  year: "2026",
  container: "",
  publisher: "Calder Point Laboratory",
  doi: "",
  sourceKind: "measurement",
  note: "Invented numbers of a fictional laboratory, for trying Tablewright out.",
});

const acting = (person: Person): Acting => ({ person, apiKeyId: null, requestId: null });

export async function seed(db: Kysely<DB>): Promise<void> {
  useDatabase(db);
  const people = await db.transaction().execute((trx) => makeDemoPeople(trx));
  const steward = acting(people.steward);
  const reviewer = acting(people.reviewer);

  /** Takes a fixture through the intake as the steward would; answers the number of the draft revision. */
  const revisionOf = async (
    file: string,
    source: NewSource | { sourceId: string } | null,
    text: { title: string; summary: string },
    settings: Partial<SheetSettings> = {},
  ): Promise<number> => {
    const bytes = readFileSync(new URL(`../../fixtures/${file}`, import.meta.url));
    const id = await receiveSheet(steward, { name: file, bytes });
    const sheet = await findSheet(id, db);
    if (!sheet?.plan) throw new Error(`The columns of ${file} could not be planned.`);
    await confirmPlan(steward, id, {
      columns: sheet.plan.columns,
      settings: {
        ...sheet.settings,
        temperature: "298.15",
        standardPressure: "100000",
        uncertaintyKind: "expanded",
        ...settings,
      },
      source:
        source === null
          ? null
          : "sourceId" in source
            ? { kind: "known", sourceId: source.sourceId }
            : { kind: "new", source },
    });
    await readSheet(id);
    await leaveRowsOut(steward, id, null).catch(() => 0);
    return (await buildRevision(steward, id, text)).revisionId;
  };

  /** Decides a revision line by line: declines what `declined` names, accepts the rest, sets blocks aside with a reason. */
  const decide = async (id: number, declined: { keys: readonly string[]; reason: string } | null): Promise<void> => {
    await sendToReview(steward, id, "");
    const lines = await findLines(id, db);
    const keys = await keysOf();
    const seen = (list: typeof lines) => list.map((line) => ({ lineId: line.id, versionId: line.versionId }));
    const refused = lines.filter((line) => declined?.keys.includes(keys.get(line.speciesId ?? "") ?? ""));
    if (declined && refused.length > 0) await declineLines(reviewer, id, seen(refused), declined.reason);
    const examination = await findNewestExamination(id, db);
    for (const finding of examination ? await findFindings(examination.id, db) : []) {
      if (finding.severity === "block") await setFindingAside(reviewer, id, finding.id, "As published.");
    }
    await acceptLines(reviewer, id, seen(lines.filter((line) => !refused.includes(line))));
    await closeReview(reviewer, id);
  };

  const keysOf = async (): Promise<Map<string, string>> => {
    const rows = await db
      .selectFrom("species_detail")
      .select(["species_id", "key"])
      .where("until", "is", null)
      .execute();
    return new Map(rows.map((row) => [row.species_id, row.key]));
  };

  const publish = async (notes: string): Promise<void> => {
    const next = await findNextEdition();
    await publishEdition(reviewer, {
      expectedPrevious: next.previous,
      listDigest: next.digest,
      notes,
      licence: "CC-BY-4.0",
      withdraws: null,
      withdrawalReason: null,
    });
  };

  const keyValues = await revisionOf("codata-key-values.csv", codata, {
    title: "CODATA key values",
    summary:
      "The foundation of the table: 151 species with their enthalpies of formation, entropies and uncertainties.",
  });
  await decide(keyValues, null);
  await publish("The foundation of the table: the CODATA key values, 151 species.");

  // Before the excerpt, so that its species are named by the time their values come.
  const names = await revisionOf("calder-point-names.csv", null, {
    title: "Names and CAS numbers",
    summary:
      "What the 151 species of the key values are called, and the 81 whose values come with the NBS excerpt. " +
      "Written from memory; the check digit of every CAS number was tested.",
  });
  await decide(names, null);

  const excerpt = await revisionOf("nbs-1982-excerpt.csv", nbs, {
    title: "NBS tables, an excerpt",
    summary: "Eighty-one further species with all three values as printed, so that each can be closed.",
  });
  await decide(excerpt, {
    keys: ["CaO(cr)", "Br(g)"],
    reason:
      "The CODATA value stands with its uncertainty, and the printed ΔfG° belongs to the other two values of its own table.",
  });
  const [source] = await db
    .selectFrom("revision_line")
    .select("source_id")
    .where("revision_id", "=", excerpt)
    .where("kind", "=", "source")
    .execute();
  const capacities = await revisionOf(
    "nbs-1982-heat-capacities.csv",
    source?.source_id ? { sourceId: source.source_id } : nbs,
    {
      title: "Heat capacities of the key values",
      summary: "Cp° from the NBS tables for species of the CODATA set, which has none.",
    },
  );
  await decide(capacities, null);
  await publish(
    "Adds an excerpt of the NBS tables with stated ΔfG°, heat capacities for the key values, and names and CAS numbers.",
  );

  const spring = await revisionOf("calder-point-spring.csv", notebook("Rotating-bomb calorimeter, spring campaign"), {
    title: "In-house calorimetry, spring campaign",
    summary: "Heats of formation of oxides, two salts and three gases, with entropies from the adiabatic calorimeter.",
  });
  await sendToReview(steward, spring, "Ten species. Please look at methane, which moved more than we expected.");

  await revisionOf("calder-point-long.csv", notebook("Flow calorimeter, bench notes"), {
    title: "Flow calorimeter, bench notes",
    summary: "Still being put in order.",
  });
}
