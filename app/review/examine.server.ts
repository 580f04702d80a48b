import { createHash } from "node:crypto";
import canonicalize from "canonicalize";
import { examine } from "#app/checks/examine.ts";
import { POLICY } from "#app/checks/policy.ts";
import { checks } from "#app/checks/registry.ts";
import type { Finding, TableView } from "#app/checks/types.ts";
import type { Database } from "#app/db/database.server.ts";
import {
  findDetailsAsOf,
  findNewestEdition,
  findSourceDetailsAsOf,
  findValuesAsOf,
} from "#app/editions/editions.queries.server.ts";
import { findSpeciesByIds } from "#app/species/species.queries.server.ts";
import { referenceStateOf } from "#app/thermo/referenceStates.ts";
import type { OverlayLine, OverlaySpecies } from "./overlay.ts";
import { overlayView } from "./overlay.ts";
import {
  findLines,
  findWaitingLines,
  insertExamination,
  type LineRow,
  type StoredFinding,
} from "./review.queries.server.ts";

/** On which occasion an examination is made. */
export type Occasion = "build" | "edit" | "send" | "publish";

export interface Examined {
  examinationId: string;
  findings: readonly StoredFinding[];
}

/** SHA-256 over what a finding says: it stays set aside only while it says the same. */
export function fingerprintOf(finding: Finding): Buffer {
  return createHash("sha256")
    .update(
      canonicalize([
        finding.check,
        finding.severity,
        finding.speciesId,
        finding.property,
        finding.sentence,
        finding.data,
      ]) ?? "",
    )
    .digest();
}

/** The lines of a list that still propose something. */
function proposing(lines: readonly LineRow[]): readonly LineRow[] {
  return lines.filter((line) => line.state === "open" || line.state === "accepted");
}

/**
 * Reads what the checks need for these lines in a fixed number of statements: the species touched, others of the same
 * formula or CAS number, and the reference states of every element in them.
 */
export async function loadView(
  proposed: readonly OverlayLine[],
  waiting: readonly OverlayLine[],
  trx: Database,
): Promise<{ view: TableView; edition: number }> {
  const newest = await findNewestEdition(trx);
  const edition = newest?.number ?? 0;
  const touchedIds = new Set(proposed.map((line) => line.speciesId));
  const proposedIds = unique([...proposed, ...waiting].map((line) => line.speciesId).filter((id) => id !== null));
  const identities = await findSpeciesByIds(proposedIds, trx);
  const touched = identities.filter((one) => touchedIds.has(one.id));
  const elements = unique(touched.flatMap((one) => Object.keys(one.composition)).concat("H"));
  const referenceFormulas = elements
    .map((element) => referenceStateOf(element))
    .filter((state) => state !== undefined)
    .map((state) => (state.atoms === 1 ? state.element : `${state.element}${state.atoms}`));
  // Water too: H3O+(aq) carries its values.
  const hills = unique([...touched.map((one) => one.hill), ...referenceFormulas, "H2O"]);
  const cas = unique(
    proposed.map((line) => (line.content.kind === "detail" ? line.content.cas : null)).filter((one) => one !== null),
  );
  // One after the other: they share the transaction's one connection.
  const byFormula = await findDetailsAsOf(edition, { hill: hills }, trx);
  const byId = await findDetailsAsOf(edition, { speciesIds: proposedIds }, trx);
  const byCas = cas.length > 0 ? await findDetailsAsOf(edition, { cas }, trx) : [];
  const sources = await findSourceDetailsAsOf(edition, {}, trx);
  const species = new Map<string, OverlaySpecies>();
  for (const one of identities) species.set(one.id, { ...one, detail: null });
  for (const detail of [...byFormula, ...byId, ...byCas]) {
    species.set(detail.speciesId, {
      id: detail.speciesId,
      hill: detail.hill,
      charge: detail.charge,
      phase: detail.phase,
      composition: detail.composition,
      detail,
    });
  }
  const values = await findValuesAsOf(edition, { speciesIds: [...species.keys()] }, trx);
  const view = overlayView({
    species: [...species.values()],
    values,
    sourceKinds: new Map(sources.map((source) => [source.sourceId, source.kind])),
    waiting,
    proposed,
  });
  return { view, edition };
}

/** Runs every check over these lines, laid over the newest edition and over what waits. Writes nothing. */
export async function findingsOf(
  proposed: readonly OverlayLine[],
  waiting: readonly OverlayLine[],
  trx: Database,
): Promise<{ findings: StoredFinding[]; edition: number }> {
  const { view, edition } = await loadView(proposed, waiting, trx);
  const findings = examine(view).map((finding) => ({ ...finding, fingerprint: fingerprintOf(finding) }));
  return { findings, edition };
}

/** Examines a revision as it reads now, over the accepted lines of other revisions, and keeps the result. */
export async function examineRevision(revisionId: number, occasion: Occasion, trx: Database): Promise<Examined> {
  const lines = proposing(await findLines(revisionId, trx));
  const waiting = (await findWaitingLines({ decidedOnly: false }, trx)).filter(
    (line) => line.revisionId !== revisionId,
  );
  return keepExamination(revisionId, occasion, lines, waiting, trx);
}

/** Examines lines and keeps the result, with the digest of everything it saw. */
export async function keepExamination(
  revisionId: number | null,
  occasion: Occasion,
  lines: readonly LineRow[],
  waiting: readonly LineRow[],
  trx: Database,
): Promise<Examined> {
  const { findings, edition } = await findingsOf(lines, waiting, trx);
  const inputDigest = createHash("sha256")
    .update(
      canonicalize({
        edition,
        lines: lines.map((line) => line.contentHash.toString("hex")),
        waiting: waiting.map((line) => line.contentHash.toString("hex")),
      }) ?? "",
    )
    .digest();
  const examinationId = await insertExamination(
    {
      revisionId,
      edition: edition || null,
      occasion,
      policy: POLICY.version,
      checks: Object.fromEntries(checks.map((check) => [check.code, check.version])),
      inputDigest,
      lines: lines.length,
      findings,
    },
    trx,
  );
  return { examinationId, findings };
}

function unique<T>(list: readonly T[]): T[] {
  return [...new Set(list)];
}
