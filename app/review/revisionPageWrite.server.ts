import { database } from "#app/db/database.server.ts";
import { Invalid, NotFound, Refused } from "#app/http/errors.ts";
import { demand } from "#app/people/permissions.ts";
import type { Acting } from "#app/people/person.ts";
import type { Unit } from "#app/thermo/unit.ts";
import { UNITS } from "#app/thermo/unit.ts";
import type { SeenLine } from "./decide.server.ts";
import { findLine, findLines, type LineRow } from "./review.queries.server.ts";
import { rewriteLine, rewriteLines } from "./revise.server.ts";
import { findPageFindings } from "./revisionPage.server.ts";
import { repairsOf } from "./revisionPage.ts";
import { readWritten, takeSuggestion } from "./revisionPageValue.ts";
import type { UncertaintyChoice } from "./writtenValue.ts";

/** A value as the form of a line sends it. */
export interface ValueForm {
  line: string;
  /** The version the steward saw. */
  version: number;
  value: string;
  unit: string;
  uncertainty: string;
  kind: UncertaintyChoice;
  reason: string;
}

const isUnit = (text: string): text is Unit => UNITS.some((unit) => unit === text);

/**
 * Writes a line's value by hand: reads what was typed as a cell of a sheet is read, converts it, and gives the line a new
 * version.
 * @throws Invalid with the field that cannot be read; whatever `rewriteLine` throws
 */
export async function writeValue(acting: Acting, revisionId: number, form: ValueForm): Promise<void> {
  demand(acting, "revision:write");
  const line = await findValueLine(revisionId, form.line);
  if (!isUnit(form.unit)) throw new Invalid("Choose a unit.", [{ pointer: "/unit", detail: "Choose a unit." }]);
  const reading = readWritten({ ...form, unit: form.unit }, line.property, line.content);
  if (reading.outcome === "wrong") {
    const errors = Object.entries(reading.errors).map(([name, detail]) => ({ pointer: `/${name}`, detail }));
    throw new Invalid(errors[0]?.detail ?? "The value cannot be read.", errors);
  }
  await rewriteLine(acting, {
    revisionId,
    lineId: line.id,
    expectedVersion: form.version,
    content: reading.content,
    reason: form.reason,
  });
}

/**
 * Takes one of a finding's suggestions: every line that the slip touched gets a new version whose note says what was
 * repaired.
 * @throws Refused when the finding is no longer that of the newest examination, or a line was edited since
 */
export async function takeSuggestionOf(
  acting: Acting,
  revisionId: number,
  form: { finding: string; index: number; seen: readonly SeenLine[] },
): Promise<void> {
  demand(acting, "revision:write");
  const finding = (await findPageFindings(revisionId)).find((one) => one.id === form.finding);
  if (!finding) {
    throw new Refused("The revision was examined again since you opened this page. Look at what is found now.");
  }
  const suggestion = finding.suggestions[form.index];
  if (!suggestion) throw new NotFound("This finding has no such suggestion.");
  const lines = (await findLines(revisionId, database())).filter((line) => line.speciesId === finding.speciesId);
  const repairs = repairsOf(suggestion, lines);
  if (!repairs)
    throw new Refused("The value to repair is not in this revision. Propose it on the page of its species.");
  const seen = new Map(form.seen.map((one) => [one.lineId, one.versionId]));
  for (const { line } of repairs) {
    if (seen.get(line.id) !== line.versionId) {
      throw new Refused(
        "A line was edited since you opened this page. Look at what it says now, then take the suggestion.",
      );
    }
  }
  const changes = repairs.map(({ line, becomes }) => {
    const taken = line.content.kind === "value" ? takeSuggestion(line.content, becomes, suggestion.slip) : null;
    if (!taken) throw new Refused("This suggestion is not a number that the line could take.");
    return { lineId: line.id, expectedVersion: line.version, content: taken.content, reason: taken.note };
  });
  await rewriteLines(acting, revisionId, changes);
}

async function findValueLine(revisionId: number, id: string) {
  const line = await findLine(id, database());
  if (!line || line.revisionId !== revisionId || line.state === "dropped") {
    throw new NotFound(`Revision ${revisionId} has no such line.`);
  }
  const { content, property } = line satisfies LineRow;
  if (content.kind !== "value" || property === null) {
    throw new Invalid("Only a value is written here. Take the line out and propose it anew.");
  }
  return { ...line, content, property };
}
