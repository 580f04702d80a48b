import { type Formula, readFormula } from "./formula.ts";
import { type Phase, readPhase, type ReadPhase } from "./phase.ts";
import { ambiguous, isTooLong, mapReading, quote, read, type Reading, refused } from "./reading.ts";
import { markedText } from "./typography.ts";

/** What makes a species: formula with charge, phase and, where that leaves more than one substance, a label. */
export interface SpeciesIdentity {
  readonly formula: Formula;
  readonly phase: Phase;
  /** The form of a solid or the name of an isomer, as `normalizeLabel` spells it. */
  readonly label?: string;
}

/** The key as the trade writes it: `H2O(l)`, `C(cr,graphite)`, `Fe+3(aq)`, `C2H6O(g,dimethyl-ether)`. Holds no space. */
export function formatKey(identity: SpeciesIdentity): string {
  const { formula, phase, label } = identity;
  return `${formula.printed}(${label === undefined ? phase : `${phase},${label}`})`;
}

/**
 * Reads a key and its common variants: `H2O(liq)`, `H2O, l`, `SO4 2-(aq)`, `Fe3+ (aq)`, `C(c,graphite)`.
 * Two readings of the formula are two species; the phase does not settle them silently.
 */
export function readKey(text: string): Reading<SpeciesIdentity> {
  if (isTooLong(text)) return refused(`${quote(text)} is too long for a key.`);
  const marked = markedText(text).trim();
  if (marked === "") return refused("No species is given. Write a key such as H2O(l).");
  const parts = splitPhase(withoutFormInFront(marked));
  if (parts === undefined) return refused(`${quote(text.trim())} names no phase. Write it as in H2O(l) or Na+(aq).`);
  const phase = readPhase(parts.phase);
  if (phase.outcome !== "read") return phase.outcome === "refused" ? phase : refused(phase.sentence);
  const formula = readFormula(parts.formula);
  if (formula.outcome === "refused") return formula;
  const identities = mapReading(formula, (value) => identityOf(value, phase.value));
  switch (identities.outcome) {
    case "read":
      return read(identities.value, [...identities.notes, ...phase.notes]);
    case "ambiguous":
      return ambiguous(identities.candidates, identities.sentence);
    case "refused":
      return identities;
  }
}

/** Whether two identities are one species: composition, charge, phase and label agree, however the formula is written. */
export function isSameSpecies(a: SpeciesIdentity, b: SpeciesIdentity): boolean {
  return (
    a.formula.hill === b.formula.hill &&
    a.formula.charge === b.formula.charge &&
    a.phase === b.phase &&
    a.label === b.label
  );
}

/** Whether the species is dissolved in water, so that the conventions of ions in solution hold for it. */
export function isSolute(identity: SpeciesIdentity): boolean {
  return identity.phase === "aq";
}

function identityOf(formula: Formula, phase: ReadPhase): SpeciesIdentity {
  return phase.label === undefined
    ? { formula, phase: phase.phase }
    : { formula, phase: phase.phase, label: phase.label };
}

/** `α-Al2O3(cr)` names its form in front; the key names it behind the phase. */
function withoutFormInFront(marked: string): string {
  const [, form, rest = ""] = /^\(?([α-ω]|alpha|beta|gamma|delta|epsilon)\)?[-\s](?=[A-Z])(.*)$/su.exec(marked) ?? [];
  if (form === undefined) return marked;
  const parts = splitPhase(rest);
  return parts === undefined || /[,;\s]/.test(parts.phase.trim()) ? marked : `${parts.formula}(${parts.phase},${form})`;
}

/** The phase stands in the last bracket, raised, lowered or level, or behind the last comma, space or underscore. */
function splitPhase(given: string): { formula: string; phase: string } | undefined {
  const marked = given
    .replace(/\s*[_^]\{\s*\(([^{}]*)\)\s*\}$/, "($1)")
    .replace(/[_^]\{\(\}([A-Za-z]{1,2})[_^]\{\)\}$/, "($1)");
  const bracketed = /^(.+?)\s*[([]([^()[\]]*(?:\([^()]*\)[^()[\]]*)*)[)\]]$/s.exec(marked);
  if (bracketed !== null && !/^[\d+-]*$/.test(bracketed[2] ?? "")) {
    return { formula: bracketed[1] ?? "", phase: bracketed[2] ?? "" };
  }
  const trailing =
    /^(.+?)(?:[\s,;]+|\s*[_:|]\s*|\s*\{)([A-Za-z]{1,11})\}?$/.exec(marked) ?? /^(.*[+-]\d?)(aq|g)$/.exec(marked);
  return trailing === null ? undefined : { formula: trailing[1] ?? "", phase: trailing[2] ?? "" };
}
