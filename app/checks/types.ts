import type { Digits } from "#app/thermo/digits.ts";
import type { Property } from "#app/thermo/property.ts";
import type { SpeciesIdentity } from "#app/thermo/speciesKey.ts";
import type { Uncertainty } from "#app/thermo/uncertainty.ts";
import type { Unit } from "#app/thermo/unit.ts";
import type { Policy } from "./policy.ts";

/**
 * The words of the examination room.
 *
 * A check is pure: it is given a species and a `TableView` and returns findings. It never reads the database and never
 * throws for bad data. Sentences are plain text with plain symbols (`ΔfH°`, `SO4-2(aq)`, a true minus sign); pages
 * typeset them.
 */

/** `block` stops a revision, `look` asks a person to look, `remark` only says something. */
export type Severity = "block" | "look" | "remark";

/** Most serious first. */
export const SEVERITIES: readonly Severity[] = ["block", "look", "remark"];

/** How it comes that a source gives a value. */
export type SourceKind = "measurement" | "evaluation" | "calculation" | "estimate";

/** A value as the examination sees it. */
export interface ViewedValue {
  readonly property: Property;
  /** In the table's unit for the property. */
  readonly digits: Digits;
  readonly uncertainty: Uncertainty | null;
  /** Text and unit as the source gave them; null when the table's own unit was used. */
  readonly given: { readonly text: string; readonly unit: Unit } | null;
  readonly sourceId: string;
  readonly sourceKind: SourceKind;
  /** Exact by convention: a reference element's ΔfH°, H+(aq). */
  readonly conventional: boolean;
  /** Reference of the proposed line; null for a value that stands in the edition. */
  readonly lineRef: string | null;
  /** A remark of the source that the checks heed: "G-H-S constraint has been relaxed". */
  readonly notice?: string;
}

export interface ViewedSpecies {
  readonly id: string;
  /** `SO4-2(aq)`, `C(cr,graphite)`. */
  readonly key: string;
  readonly identity: SpeciesIdentity;
  readonly name: string;
  readonly cas: string | null;
  /** As the table would be with the proposal laid over it. */
  readonly values: Partial<Readonly<Record<Property, ViewedValue>>>;
  /** As the table is before the proposal. */
  readonly standing: Partial<Readonly<Record<Property, ViewedValue>>>;
  /** Proposed values beyond the one in `values`, where a proposal names a property of this species more than once. */
  readonly rivals?: readonly ViewedValue[];
  /** A remark of the source about the species as a whole. */
  readonly notice: string | null;
  /** Reference of the proposed line that brings or renames the species; null when none does. */
  readonly lineRef?: string | null;
}

/** S° of an element's reference state, as printed for the species named by `key` (per mole of H2, of P, …). */
export interface ViewedElementEntropy {
  readonly digits: Digits;
  readonly uncertainty: Uncertainty | null;
  readonly key: string;
  /** Taken from the sheet under examination itself. */
  readonly fromSheet: boolean;
}

/** What a check may see: the species touched, their other phases, the elements, and H2O(l). */
export interface TableView {
  species(id: string): ViewedSpecies | undefined;
  /** By key, where the view holds it: it always holds H2O(l) and the reference states if the table or proposal does. */
  withKey(key: string): ViewedSpecies | undefined;
  /** The sheet's own element row first, else what stands; undefined when neither has it. */
  elementEntropy(element: string): ViewedElementEntropy | undefined;
  /** The same substance in other phases or forms. */
  otherPhases(id: string): readonly ViewedSpecies[];
  /** Other species of the table or the proposal that carry this CAS Registry Number. */
  withCas(cas: string): readonly ViewedSpecies[];
  /** Other species of the same Hill formula, charge and phase: isomers, forms, or the same one under a second key. */
  withSameFormula(id: string): readonly ViewedSpecies[];
  /** The species that the proposal touches, in the proposal's order. */
  touched(): readonly ViewedSpecies[];
}

/** One of the values that a suggested repair would change. */
export interface Repair {
  readonly property: Property;
  /** Digits in the table's unit. */
  readonly becomes: Digits;
}

/** A single slip that would explain a finding. Nothing changes unless the steward takes it. */
export interface Suggestion {
  /** The property to change; null when the slip is not in a value (a charge, an atom count). */
  readonly property: Property | null;
  /** Digits in the table's unit; the mended formula where `property` is null. */
  readonly becomes: string;
  /** Which slip, as a code: `digits-exchanged`, `sign-lost`, … (`slips.ts`). */
  readonly slip: string;
  /** "Two digits exchanged would explain it: −45.94 leaves 0.00." */
  readonly sentence: string;
  /** Further values the same slip changes, where it touches two at once (ΔfH° and ΔfG° exchanged). */
  readonly also: readonly Repair[];
  /** 1 for the likeliest; suggestions that explain it equally well share a rank. */
  readonly rank: number;
  /** The residual before and after, in kJ/mol; null where the finding is not about a residual. */
  readonly before: string | null;
  readonly after: string | null;
}

/** What a check found. */
export interface Finding {
  /** Code of the check, which is its file name: `gibbs-closure`. */
  readonly check: string;
  readonly severity: Severity;
  /** Key of the species. */
  readonly species: string;
  readonly speciesId: string;
  /** The property it is about; null when it is about the species. */
  readonly property: Property | null;
  /** Reference of the proposed value it belongs to; null when it belongs to the species or to what stands. */
  readonly lineRef: string | null;
  /** What is wrong and what to do, in one or two sentences. */
  readonly sentence: string;
  /** The arithmetic, line by line. */
  readonly arithmetic: readonly string[];
  /** The same numbers for programs. Part of the finding's fingerprint, so no identifiers that change by the day. */
  readonly data: Readonly<Record<string, string | number | null>>;
  readonly suggestions: readonly Suggestion[];
}

/** What a check hands back; the examination adds the species and the code. */
export interface FindingDraft {
  readonly severity: Severity;
  readonly property: Property | null;
  /** Left out: the line of the property's value, or of the species where `property` is null. */
  readonly lineRef?: string | null;
  readonly sentence: string;
  readonly arithmetic?: readonly string[];
  readonly data?: Readonly<Record<string, string | number | null>>;
  readonly suggestions?: readonly Suggestion[];
}

/** One check: what it is for people, and how it is made. Every check is one file named by its code. */
export interface Check {
  readonly code: string;
  /** Raised whenever the check may answer differently for the same view. */
  readonly version: number;
  readonly title: string;
  /** The severities its findings can have. */
  readonly severities: readonly Severity[];
  /** To what it applies, in words. */
  readonly appliesTo: string;
  /** The rule as plain text with symbols, one line each. */
  readonly formula: readonly string[];
  /** Where the rule comes from. */
  readonly source: string;
  /** Why the check exists and how to read its findings; one paragraph each. */
  readonly explanation: readonly string[];
  /** A finding as it would read, with the case it comes from. */
  readonly example: { readonly given: string; readonly sentence: string };
  /** Pure. Returns nothing when it does not apply. */
  readonly run: (species: ViewedSpecies, view: TableView, policy: Policy) => readonly FindingDraft[];
}
