import { read, type Reading } from "./reading.ts";

/** Phases of the table: gas, liquid, solid, crystal, amorphous, glass, solute in water (IUPAC Green Book, 2.11). */
export type Phase = "g" | "l" | "s" | "cr" | "am" | "vit" | "aq";

export interface ReadPhase {
  phase: Phase;
  /** The form of a solid, when the text names one; holds no space. */
  label?: string;
  /** The code as the handbook printed it, when it says more than the phase (`ao`, `cr2`). */
  handbookCode?: string;
}

/** Reads a phase as sheets and handbooks spell it. */
export function readPhase(text: string): Reading<ReadPhase> {
  return read({ phase: text as Phase });
}
