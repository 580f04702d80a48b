import { sql } from "kysely";
import type { Database } from "#app/db/database.server.ts";
import { rowHash } from "#app/editions/digest.ts";
import { findDetailsAsOf, findNewestEdition, findSourceDetailsAsOf } from "#app/editions/editions.queries.server.ts";
import {
  contentHash,
  type DetailContent,
  type LineContent,
  type SourceContent,
  type ValueContent,
} from "#app/review/content.ts";
import { digits, type Digits } from "#app/thermo/digits.ts";
import { type Property, propertyInfo } from "#app/thermo/property.ts";
import { readKey, type SpeciesIdentity } from "#app/thermo/speciesKey.ts";
import type { Uncertainty } from "#app/thermo/uncertainty.ts";

/*
 * Publishes editions for tests the only legal way: a steward writes lines, a reviewer accepts them, and the edition is
 * opened, filled and sealed as the application's role. Nothing here goes around a trigger.
 */

export interface SourceRow {
  id: string;
  title?: string;
  doi?: string | null;
  kind?: SourceContent["sourceKind"];
  notice?: string | null;
  /** Takes the place of the citation made from the title. */
  citation?: Record<string, unknown>;
}

export interface SpeciesRow {
  key: string;
  /** The key it had before, where it is being renamed. */
  was?: string;
  /** Read from the key when left out. */
  printed?: string;
  name?: string;
  cas?: string | null;
  synonyms?: string[];
}

export interface ValueRow {
  key: string;
  property: Property;
  digits: string;
  uncertainty?: Uncertainty | null;
  sourceId?: string;
  given?: { text: string; unit: string; note: string | null };
  method?: string | null;
  basis?: "molality" | "concentration" | null;
}

export interface EditionRows {
  notes?: string;
  licence?: string;
  withdraws?: { edition: number; reason: string };
  sources?: readonly SourceRow[];
  species?: readonly SpeciesRow[];
  values?: readonly ValueRow[];
  withdrawals?: readonly { key: string; property: Property; reason: string }[];
  /** Brings further rows into the open edition, each carrying the accepted line version it is given. */
  beside?: (number: number, versionId: string, trx: Database) => Promise<void>;
}

export interface PublishedEdition {
  number: number;
  digest: Buffer;
  revisionId: number;
  /** Opaque ids of the species named, by key. */
  speciesIds: ReadonlyMap<string, string>;
  steward: string;
  reviewer: string;
}

/** The source that values get when a test does not care. */
export const ANY_SOURCE = "src_calderpoint1";

/** An expanded uncertainty with k = 2. */
export function expanded(text: string): Uncertainty {
  return { digits: digits(text), kind: "expanded", coverageFactor: 2 };
}

/** A standard uncertainty. */
export function standard(text: string): Uncertainty {
  return { digits: digits(text), kind: "standard", coverageFactor: null };
}

interface Line {
  kind: LineContent["kind"];
  speciesId: string | null;
  property: Property | null;
  sourceId: string | null;
  content: LineContent;
  key: string | null;
}

/** Publishes the next edition with these rows. `db` is the application's own connection. */
export async function publishEditionOf(rows: EditionRows, db: Database): Promise<PublishedEdition> {
  const steward = await somebody("steward@calderpoint.example", "S. Steward", "steward", db);
  const reviewer = await somebody("reviewer@calderpoint.example", "R. Reviewer", "reviewer", db);
  const newest = await findNewestEdition(db);
  const previous = newest?.number ?? 0;

  const sources = [...(rows.sources ?? [])];
  const standingSources = new Set((await findSourceDetailsAsOf(previous, {}, db)).map((source) => source.sourceId));
  if ((rows.values ?? []).some((value) => !value.sourceId) && !standingSources.has(ANY_SOURCE)) {
    sources.push({ id: ANY_SOURCE, title: "Calder Point Laboratory, in-house notes (invented)" });
  }

  // Species: those named, and those that only appear beside a value.
  const standing = new Map((await findDetailsAsOf(previous, {}, db)).map((detail) => [detail.key, detail.speciesId]));
  const species = [...(rows.species ?? [])];
  for (const { key } of rows.values ?? []) {
    if (!standing.has(key) && !species.some((one) => one.key === key)) species.push({ key });
  }
  const ids = new Map(standing);
  for (const one of species) {
    const known = standing.get(one.was ?? one.key);
    ids.set(one.key, known ?? (await insertSpecies(identityOf(one.key), db)));
  }
  const idOf = (key: string): string => {
    const id = ids.get(key);
    if (!id) throw new Error(`publishEditionOf: no species ${key}`);
    return id;
  };

  const lines: Line[] = [];
  for (const source of sources) {
    if (!standingSources.has(source.id)) {
      await db
        .insertInto("source")
        .values({ id: source.id })
        .onConflict((oc) => oc.doNothing())
        .execute();
    }
    lines.push({
      kind: "source",
      speciesId: null,
      property: null,
      sourceId: source.id,
      key: null,
      content: sourceContentOf(source),
    });
  }
  for (const one of species) {
    lines.push({
      kind: "detail",
      speciesId: idOf(one.key),
      property: null,
      sourceId: null,
      key: one.key,
      content: detailContentOf(one),
    });
  }
  for (const value of rows.values ?? []) {
    lines.push({
      kind: "value",
      speciesId: idOf(value.key),
      property: value.property,
      sourceId: null,
      key: value.key,
      content: valueContentOf(value),
    });
  }
  for (const { key, property, reason } of rows.withdrawals ?? []) {
    lines.push({
      kind: "withdrawal",
      speciesId: idOf(key),
      property,
      sourceId: null,
      key,
      content: { kind: "withdrawal", reason },
    });
  }

  const accepted = await acceptedRevision(lines, steward, reviewer, db);
  const sealed = db.isTransaction
    ? await publish(accepted.lines, rows, previous, reviewer, db)
    : await db.transaction().execute((trx) => publish(accepted.lines, rows, previous, reviewer, trx));
  return { ...sealed, revisionId: accepted.revisionId, speciesIds: ids, steward, reviewer };
}

async function somebody(email: string, name: string, role: "steward" | "reviewer", db: Database): Promise<string> {
  const found = await db.selectFrom("person").select("id").where("email", "=", email).executeTakeFirst();
  if (found) return found.id;
  const { id } = await db.insertInto("person").values({ email, name }).returning("id").executeTakeFirstOrThrow();
  await db.insertInto("person_role").values({ person_id: id, role }).execute();
  return id;
}

export function identityOf(key: string): SpeciesIdentity {
  const reading = readKey(key);
  if (reading.outcome !== "read") throw new Error(`publishEditionOf: ${key}: ${reading.sentence}`);
  return reading.value;
}

export async function insertSpecies(identity: SpeciesIdentity, db: Database): Promise<string> {
  const { formula, phase } = identity;
  const { id } = await db
    .insertInto("species")
    .values({ hill: formula.hill, composition: JSON.stringify(formula.composition), charge: formula.charge, phase })
    .returning("id")
    .executeTakeFirstOrThrow();
  return id;
}

export function sourceContentOf(source: SourceRow): SourceContent {
  const citation = source.citation ?? {
    type: "report",
    title: source.title ?? source.id,
    publisher: "Calder Point Laboratory",
  };
  return {
    kind: "source",
    citation,
    doi: source.doi ?? null,
    sourceKind: source.kind ?? "evaluation",
    notice: source.notice ?? null,
  };
}

export function detailContentOf(row: SpeciesRow): DetailContent {
  const identity = identityOf(row.key);
  return {
    kind: "detail",
    key: row.key,
    printed: row.printed ?? identity.formula.printed,
    label: identity.label ?? null,
    name: row.name ?? row.key,
    cas: row.cas ?? null,
    inchikey: null,
    synonyms: row.synonyms ?? [],
  };
}

export function valueContentOf(row: ValueRow): ValueContent {
  return {
    kind: "value",
    digits: digits(row.digits),
    uncertainty: row.uncertainty ?? null,
    temperature: digits("298.15"),
    standardPressure: digits("100000"),
    basis: row.basis ?? null,
    origin: "stated",
    method: row.method ?? null,
    given: row.given ?? { text: row.digits, unit: propertyInfo[row.property].unit, note: null },
    remark: null,
    sourceId: row.sourceId ?? ANY_SOURCE,
  };
}

interface AcceptedLine extends Line {
  lineId: string;
  versionId: string;
}

/** Writes the lines as the steward, accepts every one as the reviewer and decides the revision. */
async function acceptedRevision(lines: readonly Line[], steward: string, reviewer: string, db: Database) {
  const { id: revisionId } = await db
    .insertInto("revision")
    .values({ title: "Rows for a test", made_by: steward })
    .returning("id")
    .executeTakeFirstOrThrow();
  const accepted: AcceptedLine[] = [];
  for (const [index, line] of lines.entries()) {
    const { id: lineId } = await db
      .insertInto("revision_line")
      .values({
        revision_id: revisionId,
        position: index + 1,
        kind: line.kind,
        species_id: line.speciesId,
        property: line.property,
        source_id: line.sourceId,
      })
      .returning("id")
      .executeTakeFirstOrThrow();
    const { id: versionId } = await db
      .insertInto("line_version")
      .values({
        line_id: lineId,
        version: 1,
        content: JSON.stringify(line.content),
        content_hash: contentHash(line.content),
        made_by: steward,
      })
      .returning("id")
      .executeTakeFirstOrThrow();
    accepted.push({ ...line, lineId, versionId });
  }
  await db.updateTable("revision").set({ state: "in_review", round: 1 }).where("id", "=", revisionId).execute();
  for (const { versionId } of accepted) {
    await db
      .insertInto("line_decision")
      .values({ line_version_id: versionId, decision: "accept", decided_by: reviewer })
      .execute();
  }
  await db.updateTable("revision").set({ state: "decided" }).where("id", "=", revisionId).execute();
  return { revisionId, lines: accepted };
}

async function publish(
  lines: readonly AcceptedLine[],
  rows: EditionRows,
  previous: number,
  reviewer: string,
  trx: Database,
): Promise<{ number: number; digest: Buffer }> {
  const opened = await sql<{ n: number }>`
    select open_edition(${previous}, ${reviewer}, ${rows.notes ?? "For a test."}, ${rows.licence ?? "CC-BY-4.0"},
                        ${rows.withdraws?.edition ?? null}, ${rows.withdraws?.reason ?? null}) as n`.execute(trx);
  const number = opened.rows[0]?.n ?? 0;
  for (const line of lines) {
    await trx
      .updateTable("revision_line")
      .set({ state: "published", published_in: number })
      .where("id", "=", line.lineId)
      .execute();
    await replaceRow(line, number, trx);
  }
  if (rows.beside && lines[0]) await rows.beside(number, lines[0].versionId, trx);
  const sealed = await sql<{ digest: Buffer }>`select seal_edition(${number}) as digest`.execute(trx);
  return { number, digest: sealed.rows[0]?.digest ?? Buffer.alloc(0) };
}

/** The row that stood goes out; the row that the line says comes in. */
async function replaceRow(line: AcceptedLine, number: number, trx: Database): Promise<void> {
  const { content, speciesId, property, sourceId, versionId } = line;
  if (content.kind === "source" && sourceId) {
    await trx
      .updateTable("source_detail")
      .set({ until: number })
      .where("source_id", "=", sourceId)
      .where("until", "is", null)
      .execute();
    const { citation, doi, sourceKind: kind, notice } = content;
    await trx
      .insertInto("source_detail")
      .values({
        source_id: sourceId,
        citation: JSON.stringify(citation),
        doi,
        kind,
        notice,
        line_version_id: versionId,
        row_hash: rowHash({ source: sourceId, citation, doi, kind, notice }),
        since: number,
      })
      .execute();
    return;
  }
  if (!speciesId) return;
  if (content.kind === "detail") {
    await trx
      .updateTable("species_detail")
      .set({ until: number })
      .where("species_id", "=", speciesId)
      .where("until", "is", null)
      .execute();
    const { key, printed, label, name, cas, inchikey, synonyms } = content;
    await trx
      .insertInto("species_detail")
      .values({
        species_id: speciesId,
        key,
        printed,
        label,
        name,
        cas,
        inchikey,
        synonyms,
        line_version_id: versionId,
        row_hash: rowHash({ species: speciesId, key, printed, label, name, cas, inchikey, synonyms }),
        since: number,
      })
      .execute();
    return;
  }
  if (!property) return;
  await trx
    .updateTable("table_value")
    .set({ until: number })
    .where("species_id", "=", speciesId)
    .where("property", "=", property)
    .where("until", "is", null)
    .execute();
  if (content.kind !== "value") return;
  await trx
    .insertInto("table_value")
    .values({
      species_id: speciesId,
      property,
      value: content.digits,
      uncertainty: content.uncertainty?.digits ?? null,
      uncertainty_kind: content.uncertainty?.kind ?? null,
      coverage_factor: content.uncertainty?.coverageFactor?.toString() ?? null,
      temperature: content.temperature,
      standard_pressure: content.standardPressure,
      basis: content.basis,
      origin: content.origin,
      method: content.method,
      given_text: content.given.text,
      given_unit: content.given.unit,
      given_note: content.given.note,
      remark: content.remark,
      source_id: content.sourceId,
      line_version_id: versionId,
      row_hash: valueHash(speciesId, property, content),
      since: number,
    })
    .execute();
}

function valueHash(speciesId: string, property: Property, content: ValueContent): Buffer {
  const { uncertainty } = content;
  return rowHash({
    species: speciesId,
    property,
    digits: content.digits satisfies Digits,
    unit: propertyInfo[property].unit,
    uncertainty: uncertainty && {
      digits: uncertainty.digits,
      kind: uncertainty.kind,
      coverageFactor: uncertainty.coverageFactor === null ? null : String(uncertainty.coverageFactor),
    },
    temperature: content.temperature,
    standardPressure: content.standardPressure,
    basis: content.basis,
    origin: content.origin,
    source: content.sourceId,
  });
}

/**
 * Three small editions that hold one of everything a reader can meet. Numbers of edition 1 are CODATA Key Values (1989)
 * except ammonia's ΔfH° and the heat capacity, which are those of the NBS tables (1982).
 *
 * 2: changes ammonia's ΔfH°, brings silver chloride, renames calcium carbonate. 3: withdraws silver chloride's S°, mends a
 * citation, prints hydrogen's S° with a digit less, and withdraws edition 2.
 */
export async function publishThreeEditions(db: Database): Promise<readonly PublishedEdition[]> {
  const water = { name: "water", cas: "7732-18-5" };
  const first = await publishEditionOf(
    {
      notes: "The first edition.",
      sources: [
        {
          id: "src_codata1989",
          citation: {
            type: "book",
            title: "CODATA Key Values for Thermodynamics",
            author: [
              { family: "Cox", given: "J. D." },
              { family: "Wagman", given: "D. D." },
              { family: "Medvedev", given: "V. A." },
            ],
            publisher: "Hemisphere",
            issued: { "date-parts": [[1989]] },
          },
        },
        {
          id: "src_nbstables1982",
          title: "The NBS Tables of Chemical Thermodynamic Properties",
          doi: "10.1063/1.555845",
        },
      ],
      species: [
        { key: "H2O(l)", ...water },
        { key: "H2O(g)", ...water },
        { key: "H2(g)", name: "hydrogen", cas: "1333-74-0" },
        { key: "C(cr,graphite)", name: "carbon" },
        { key: "Na+(aq)", name: "sodium ion" },
        { key: "NH3(g)", name: "ammonia", cas: "7664-41-7", synonyms: ["spirits of hartshorn"] },
        { key: "CaCO3(cr)", name: "calcium carbonate" },
      ],
      values: [
        codata("H2O(l)", "enthalpyOfFormation", "-285.830", "0.040"),
        codata("H2O(l)", "entropy", "69.95", "0.03"),
        codata("H2O(g)", "enthalpyOfFormation", "-241.826", "0.040"),
        codata("H2O(g)", "entropy", "188.835", "0.010"),
        codata("H2(g)", "enthalpyOfFormation", "0", null),
        codata("H2(g)", "entropy", "130.680", "0.003"),
        codata("C(cr,graphite)", "entropy", "5.74", "0.10"),
        codata("Na+(aq)", "enthalpyOfFormation", "-240.34", "0.06"),
        codata("Na+(aq)", "entropy", "58.45", "0.15"),
        codata("NH3(g)", "entropy", "192.77", "0.05"),
        { key: "NH3(g)", property: "enthalpyOfFormation", digits: "-46.11", sourceId: "src_nbstables1982" },
        {
          key: "H2O(l)",
          property: "heatCapacity",
          digits: "75.291",
          sourceId: "src_nbstables1982",
          given: { text: "17.995", unit: "cal/(mol K)", note: "× 4.184" },
        },
        { key: "CaCO3(cr)", property: "entropy", digits: "92.9", sourceId: "src_nbstables1982" },
      ],
    },
    db,
  );
  const second = await publishEditionOf(
    {
      notes: "Ammonia anew; silver chloride.",
      sources: [{ id: "src_calderpoint9", title: "Calder Point Laboratory, cell 3 (invented)", kind: "measurement" }],
      species: [
        { key: "CaCO3(cr,calcite)", was: "CaCO3(cr)", name: "calcium carbonate, calcite" },
        { key: "AgCl(cr)", name: "silver chloride" },
      ],
      values: [
        {
          key: "NH3(g)",
          property: "enthalpyOfFormation",
          digits: "-45.94",
          uncertainty: expanded("0.35"),
          sourceId: "src_calderpoint9",
        },
        codata("AgCl(cr)", "enthalpyOfFormation", "-127.01", "0.05"),
        codata("AgCl(cr)", "entropy", "96.25", "0.20"),
      ],
    },
    db,
  );
  const third = await publishEditionOf(
    {
      notes: "Withdraws edition 2.",
      withdraws: { edition: 2, reason: "The ammonia value was read from the wrong column." },
      sources: [
        {
          id: "src_nbstables1982",
          title: "The NBS tables of chemical thermodynamic properties",
          doi: "10.1063/1.555845",
        },
      ],
      values: [codata("H2(g)", "entropy", "130.68", "0.003")],
      withdrawals: [{ key: "AgCl(cr)", property: "entropy", reason: "Not ours to print." }],
    },
    db,
  );
  return [first, second, third];
}

function codata(key: string, property: Property, printed: string, uncertainty: string | null): ValueRow {
  return {
    key,
    property,
    digits: printed,
    uncertainty: uncertainty ? expanded(uncertainty) : null,
    sourceId: "src_codata1989",
  };
}
