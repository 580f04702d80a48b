import { type Formula, readFormula, soleElement } from "#app/thermo/formula.ts";
import { normalizeLabel } from "#app/thermo/label.ts";
import { readPhase } from "#app/thermo/phase.ts";
import { referenceStateOf } from "#app/thermo/referenceStates.ts";
import { quote } from "#app/thermo/reading.ts";
import { formatKey, readKey, type SpeciesIdentity } from "#app/thermo/speciesKey.ts";

/** What a person types to say which species is meant. A whole key may stand in the place of the formula. */
export interface WrittenIdentity {
  formula: string;
  phase: string;
  /** Form of a solid or name of an isomer; may stay empty. */
  label: string;
  /** Which reading of an ambiguous formula is meant, as it would be printed; what fits none of them is not heeded. */
  formulaIs?: string;
}

export type IdentityField = keyof Omit<WrittenIdentity, "formulaIs">;

/** What the typing came to, or what is wrong with which field and, where a formula has two readings, which they are. */
export type ReadIdentity =
  | { outcome: "read"; identity: SpeciesIdentity; key: string; notes: readonly string[] }
  | { outcome: "wrong"; errors: Partial<Record<IdentityField, string>>; readings: readonly string[] };

/** Reads formula, phase and label by the readers that read a sheet's cells. */
export function readIdentity(written: WrittenIdentity): ReadIdentity {
  const errors: Partial<Record<IdentityField, string>> = {};
  const wrong = (readings: readonly string[] = []): ReadIdentity => ({ outcome: "wrong", errors, readings });
  const notes: string[] = [];

  const whole = written.phase.trim() === "" ? readKey(written.formula) : null;
  const isKey = whole !== null && whole.outcome !== "refused";
  const formulaReading = isKey ? whole : readFormula(written.formula);
  let formula: Formula | null = null;
  let readings: readonly string[] = [];
  switch (formulaReading.outcome) {
    case "read":
      formula = formulaOf(formulaReading.value);
      notes.push(...formulaReading.notes);
      break;
    case "ambiguous": {
      const candidates = formulaReading.candidates.map(formulaOf);
      formula = candidates.find((one) => one.printed === written.formulaIs) ?? null;
      if (!formula) {
        errors.formula = `${formulaReading.sentence} Say which it is.`;
        readings = candidates.map((one) => one.printed);
      }
      break;
    }
    case "refused":
      errors.formula =
        written.formula.trim() === "" ? "Write the formula, as in C2H6O or SO4-2." : formulaReading.sentence;
  }

  const keyed = isKey ? (whole.outcome === "read" ? whole.value : whole.candidates[0]) : undefined;
  let phase = keyed?.phase ?? null;
  let label = keyed?.label ?? null;
  if (!keyed) {
    const phaseReading = readPhase(written.phase);
    if (phaseReading.outcome === "read") {
      phase = phaseReading.value.phase;
      label = phaseReading.value.label ?? null;
      notes.push(...phaseReading.notes);
    } else {
      errors.phase = written.phase.trim() === "" ? "Write the phase: g, l, cr, am, vit or aq." : phaseReading.sentence;
    }
  }
  if (written.label.trim() !== "") {
    const named = normalizeLabel(written.label);
    if (named === undefined) {
      errors.label = `The form ${quote(written.label.trim())} holds characters that a species key cannot. Use letters, digits and hyphens.`;
    } else if (label !== null && label !== named && !/^form-\d$/.test(label)) {
      errors.label = `The phase names the form ${label}, but this field says ${named}. Which is it?`;
    } else label = named;
  }
  if (!errors.label && /^form-\d$/.test(label ?? "")) {
    errors.label = `${quote(written.phase.trim())} is a further crystal form, and nothing says which. Name the form.`;
  }
  if (Object.keys(errors).length > 0 || !formula || !phase) return wrong(readings);
  if (formula.charge !== 0 && phase !== "aq" && phase !== "g") {
    errors[keyed ? "formula" : "phase"] =
      `${formula.printed} carries a charge, and ions are kept in water (aq) or in the gas (g) only. Is the phase or the charge wrong?`;
    return wrong();
  }
  const element = phase === "cr" && label === null && formula.charge === 0 ? soleElement(formula) : undefined;
  const reference = element === undefined ? undefined : referenceStateOf(element)?.label;
  if (reference !== undefined) {
    errors.label = `${formula.printed}(cr) has several forms, and only ${reference} is the one from which formation is counted. Name the form.`;
    return wrong();
  }
  const identity: SpeciesIdentity = label === null ? { formula, phase } : { formula, phase, label };
  return { outcome: "read", identity, key: formatKey(identity), notes };
}

function formulaOf(read: Formula | SpeciesIdentity): Formula {
  return "formula" in read ? read.formula : read;
}
