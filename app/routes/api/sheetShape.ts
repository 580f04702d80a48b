import type { followFindings, followRows, followSheet } from "#app/intake/programSheet.server.ts";
import { paths } from "#app/paths.ts";
import { toNumber } from "#app/thermo/digits.ts";
import type { ApiSheet, ApiSheetFinding, ApiSheetRow } from "./sheetContract.ts";
import { apiPaths } from "./shape.ts";

type Followed = Awaited<ReturnType<typeof followSheet>>;
type FollowedRows = Awaited<ReturnType<typeof followRows>>;
type FollowedFindings = Awaited<ReturnType<typeof followFindings>>;

/** A sheet as the API answers it; `publicUrl` is the service's origin. */
export function apiSheet({ sheet, counts, findings, plan, revision }: Followed, publicUrl: string): ApiSheet {
  const { id } = sheet;
  const at = (path: string): string => `${publicUrl}${path}`;
  return {
    id,
    name: sheet.name,
    state: sheet.state,
    failure: sheet.failure,
    receivedAt: sheet.receivedAt.toISOString(),
    bytes: Number(sheet.byteLength),
    sha256: sheet.sha256.toString("hex"),
    columns: (sheet.plan?.columns ?? []).map(({ head, means, property, unit, asks }) => ({
      ...{ head, means, property, unit, asks },
    })),
    plan: plan && { id: plan.id, savedBy: plan.savedBy, savedAt: plan.savedAt.toISOString() },
    rows: {
      total: sheet.rowsTotal ?? 0,
      done: sheet.rowsDone,
      read: counts.read,
      refused: counts.refused,
      leftOut: counts.leftOut,
      skipped: counts.skipped,
    },
    values: counts.values,
    findings,
    revision: revision && { number: revision.number, state: revision.state ?? "", lines: revision.lines ?? 0 },
    links: {
      self: at(apiPaths.sheet(id)),
      rows: at(apiPaths.sheetRows(id)),
      findings: at(apiPaths.sheetFindings(id)),
      page: at(paths.sheet(id)),
      ...(revision ? { revision: at(paths.revision(revision.number)) } : {}),
    },
  };
}

/** A row of a sheet as the API answers it. */
export function apiSheetRow(row: FollowedRows["rows"][number], nameOf: FollowedRows["nameOf"]): ApiSheetRow {
  const { number, outcome, leftOutAt, cells, problems, reading } = row;
  const match = reading?.match;
  const note = match && "note" in match ? match.note : null;
  return {
    row: number,
    outcome,
    leftOut: leftOutAt !== null,
    cells: [...cells],
    species: match?.key ?? null,
    isNew: match?.kind === "new",
    values: (reading?.values ?? []).map(({ property, digits, uncertainty, given, column }) => ({
      property,
      digits,
      uncertainty: uncertainty && { value: toNumber(uncertainty.digits), ...uncertainty },
      given: { text: given.text, unit: given.unit, note: given.note },
      column: nameOf(column),
    })),
    why:
      outcome === "read"
        ? [...(reading?.notes ?? []), ...(note ? [note] : [])]
        : problems.map((problem) => problem.sentence),
  };
}

/** A finding of a sheet as the API answers it. */
export function apiSheetFinding(
  finding: FollowedFindings["findings"][number],
  nameOf: FollowedFindings["nameOf"],
): ApiSheetFinding {
  if (finding.kind === "problem") {
    const { column, sentence, repairs } = finding.problem;
    return {
      row: finding.row,
      column: nameOf(column),
      species: null,
      property: null,
      check: "reading",
      severity: "block",
      sentence,
      arithmetic: [],
      numbers: {},
      suggestions: repairs.map(({ label, column: cell, text }) => ({
        ...{ property: null, column: nameOf(cell), becomes: text, sentence: label },
      })),
    };
  }
  const { row, column, species, property, check, severity, sentence, arithmetic, data, suggestions } = finding;
  return {
    ...{ row, column: nameOf(column), species, property, check, severity, sentence },
    arithmetic: [...arithmetic],
    numbers: data,
    suggestions: suggestions.map((one) => ({
      ...{ property: one.property, column: null, becomes: one.becomes, sentence: one.sentence },
    })),
  };
}
