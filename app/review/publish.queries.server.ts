import { sql } from "kysely";
import { batches } from "#app/db/batches.ts";
import type { Database } from "#app/db/database.server.ts";
import { rowHash } from "#app/editions/digest.ts";
import type { Property } from "#app/thermo/property.ts";
import type { DetailContent, SourceContent, ValueContent } from "./content.ts";
import { hashedSourceDetail, hashedSpeciesDetail, hashedValue } from "./nextEdition.ts";

/*
 * The rows of the open edition. Every statement works on a batch: what goes out is marked first, then what comes in is
 * inserted, so that the exclusion constraints never see two rows for one place.
 */

export interface ValueComing {
  speciesId: string;
  property: Property;
  content: ValueContent;
  lineVersionId: string;
}

export interface DetailComing {
  speciesId: string;
  content: DetailContent;
  lineVersionId: string;
}

export interface SourceComing {
  sourceId: string;
  content: SourceContent;
  lineVersionId: string;
}

/** Marks the standing values of these places as going out with the open edition. */
export async function updateValuesOut(
  places: readonly { speciesId: string; property: Property }[],
  edition: number,
  trx: Database,
): Promise<void> {
  if (places.length === 0) return;
  await sql`
    update table_value v set until = ${edition}
      from unnest(${places.map((one) => one.speciesId)}::text[], ${places.map((one) => one.property)}::text[]) as p (species_id, property)
     where v.species_id = p.species_id and v.property = p.property and v.until is null
  `.execute(trx);
}

/** Marks the standing details of these species as going out with the open edition. */
export async function updateDetailsOut(speciesIds: readonly string[], edition: number, trx: Database): Promise<void> {
  if (speciesIds.length === 0) return;
  await sql`update species_detail set until = ${edition} where species_id = any(${[...speciesIds]}::text[]) and until is null`.execute(
    trx,
  );
}

/** Marks the standing details of these sources as going out with the open edition. */
export async function updateSourcesOut(sourceIds: readonly string[], edition: number, trx: Database): Promise<void> {
  if (sourceIds.length === 0) return;
  await sql`update source_detail set until = ${edition} where source_id = any(${[...sourceIds]}::text[]) and until is null`.execute(
    trx,
  );
}

/** Brings values into the open edition. */
export async function insertValues(rows: readonly ValueComing[], edition: number, trx: Database): Promise<void> {
  for (const batch of batches(rows)) {
    await trx
      .insertInto("table_value")
      .values(
        batch.map(({ speciesId, property, content, lineVersionId }) => ({
          species_id: speciesId,
          property,
          value: content.digits,
          uncertainty: content.uncertainty?.digits ?? null,
          uncertainty_kind: content.uncertainty?.kind ?? null,
          coverage_factor:
            content.uncertainty?.kind === "expanded" ? String(content.uncertainty.coverageFactor ?? 2) : null,
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
          line_version_id: lineVersionId,
          row_hash: rowHash(hashedValue(speciesId, property, content)),
          since: edition,
        })),
      )
      .execute();
  }
}

/** Brings names of species into the open edition. */
export async function insertDetails(rows: readonly DetailComing[], edition: number, trx: Database): Promise<void> {
  for (const batch of batches(rows)) {
    await trx
      .insertInto("species_detail")
      .values(
        batch.map(({ speciesId, content, lineVersionId }) => ({
          species_id: speciesId,
          key: content.key,
          printed: content.printed,
          label: content.label,
          name: content.name,
          cas: content.cas,
          inchikey: content.inchikey,
          synonyms: content.synonyms,
          line_version_id: lineVersionId,
          row_hash: rowHash(hashedSpeciesDetail(speciesId, content)),
          since: edition,
        })),
      )
      .execute();
  }
}

/** Brings citations into the open edition. */
export async function insertSources(rows: readonly SourceComing[], edition: number, trx: Database): Promise<void> {
  for (const batch of batches(rows)) {
    await trx
      .insertInto("source_detail")
      .values(
        batch.map(({ sourceId, content, lineVersionId }) => ({
          source_id: sourceId,
          citation: JSON.stringify(content.citation),
          doi: content.doi,
          kind: content.sourceKind,
          notice: content.notice,
          line_version_id: lineVersionId,
          row_hash: rowHash(hashedSourceDetail(sourceId, content)),
          since: edition,
        })),
      )
      .execute();
  }
}
