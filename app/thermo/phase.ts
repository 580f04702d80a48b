import { normalizeLabel } from "./label.ts";
import { isTooLong, quote, read, type Reading, refused } from "./reading.ts";
import { markedText } from "./typography.ts";

/** Phases of the table: gas, liquid, solid, crystal, amorphous, glass, solute in water (IUPAC Green Book, 2.11.1). */
export type Phase = "g" | "l" | "s" | "cr" | "am" | "vit" | "aq";

export const PHASES: readonly Phase[] = ["g", "l", "s", "cr", "am", "vit", "aq"];

/** What a phase is called in a sentence. */
export const phaseName: Readonly<Record<Phase, string>> = {
  g: "gas",
  l: "liquid",
  s: "solid",
  cr: "crystal",
  am: "amorphous solid",
  vit: "glass",
  aq: "solute in water",
};

export interface ReadPhase {
  phase: Phase;
  /** The form of a solid, when the text names one; holds no space. */
  label?: string;
  /** The code as the handbook printed it, where it says more than the phase: `ao`, `cr2`, `c2`. */
  handbookCode?: string;
}

const SPELLINGS: ReadonlyMap<string, Phase> = new Map(
  Object.entries({
    g: "g",
    gas: "g",
    gaseous: "g",
    "ideal gas": "g",
    ig: "g",
    vap: "g",
    vapor: "g",
    vapour: "g",
    l: "l",
    lq: "l",
    liq: "l",
    liquid: "l",
    s: "s",
    solid: "s",
    cr: "cr",
    c: "cr",
    crys: "cr",
    cryst: "cr",
    crystal: "cr",
    crystalline: "cr",
    "crystalline solid": "cr",
    am: "am",
    amor: "am",
    amorp: "am",
    amorph: "am",
    amorphous: "am",
    vit: "vit",
    vitreous: "vit",
    glass: "vit",
    gls: "vit",
    aq: "aq",
    ao: "aq",
    aqueous: "aq",
  } satisfies Record<string, Phase>),
);

/** Phases that exist but have no row in a table of standard states, each with what to do instead. */
const NOT_KEPT: ReadonlyMap<string, string> = new Map(
  Object.entries({
    ai: "is a sum of ions, not a species. Its values are those of its ions; give the ions.",
    au: "is a solution of undefined concentration, not a standard state. Leave the row out.",
    sln: "is a solution without a solvent named. Only solutes in water (aq) are kept.",
    soln: "is a solution without a solvent named. Only solutes in water (aq) are kept.",
    sol: "may mean a solid or a solution. Write s or aq.",
    cd: "may be a liquid or a solid. Write l, s or cr.",
    fl: "may be a gas or a liquid. Write g or l.",
    lc: "(liquid crystal) has no place in this table.",
    ads: "(adsorbed) has no place in this table.",
    mon: "(monomer) names a form, not a phase.",
    pol: "(polymer) names a form, not a phase.",
  }),
);

/** What may stand behind aq without naming a concentration: the standard state itself. */
const STANDARD_SOLUTE =
  /^(?:∞|inf(?:inite)?(?:-dilution|-dil)?|std\.?(?:-state)?|standard-state|undissoc(?:iated|\.)?|ao|ion(?:ized|ised)?)$/i;

/**
 * Reads a phase as sheets and handbooks spell it, with or without brackets: `g`, `gas`, `lq`, `c,alpha`, `(cr, graphite)`.
 *
 * `cr2`, `cr3` are further crystal forms that the handbook names in a remark: they come back as a crystal with the
 * label `form-2`, `form-3` and their code, so that they are never taken for the first form. `ao` is one solute as
 * written, a neutral molecule or a single ion. Refused: `ai` (a sum of ions), finite or undefined concentrations
 * (`aq, 100 H2O`, `au`), solutions, adsorbates.
 */
export function readPhase(text: string): Reading<ReadPhase> {
  if (isTooLong(text)) return refused(`${quote(text)} is too long for a phase.`);
  const plain = markedText(text)
    .trim()
    .replace(/^[([]\s*(.*?)\s*[)\]]$/, "$1");
  if (plain === "") return refused("No phase is given. Write g, l, s, cr, am, vit or aq.");
  const whole = SPELLINGS.get(plain.toLowerCase());
  if (whole !== undefined) return read(withCode(plain, { phase: whole }));

  const numbered = /^(?:cr|c)\s*,?\s*([1-9])$/i.exec(plain);
  if (numbered !== null) {
    return read(
      { phase: "cr", label: `form-${numbered[1]}`, handbookCode: plain.replace(/[\s,]/g, "").toLowerCase() },
      [`${quote(text.trim())} is crystal form ${numbered[1]} of its handbook; the remark should name it.`],
    );
  }
  const [, head = "", rest = ""] = /^([A-Za-z]+)\.?(?:[\s,;:]+(.*))?$/s.exec(plain) ?? [];
  const excluded = NOT_KEPT.get(head.toLowerCase());
  if (excluded !== undefined) return refused(`${quote(text.trim())} ${excluded}`);
  const phase = SPELLINGS.get(head.toLowerCase());
  if (phase === undefined) {
    return refused(`${quote(text.trim())} is not a phase this table knows. Write g, l, s, cr, am, vit or aq.`);
  }
  if (rest === "") return read(withCode(head, { phase }));
  if (phase === "s" && /^(?:cr|crystal(?:line)?)$/i.test(rest)) return read({ phase: "cr" });
  if (phase === "aq") return readSolute(head, rest, text.trim());

  const label = normalizeLabel(rest);
  if (label === undefined)
    return refused(`The form named in ${quote(text.trim())} holds characters that a key cannot.`);
  return read({ phase, label });
}

function readSolute(head: string, rest: string, shown: string): Reading<ReadPhase> {
  const condition = rest.trim().replace(/\s+/g, "-");
  if (STANDARD_SOLUTE.test(condition)) {
    return read(withCode(/^(?:ao|undissoc)/i.test(condition) ? "ao" : head, { phase: "aq" }));
  }
  if (/\d|h2o|dil/i.test(condition)) {
    return refused(
      `${quote(shown)} is a solution of finite concentration, not the standard state of a solute. Leave the row out.`,
    );
  }
  const label = normalizeLabel(rest);
  if (label === undefined) return refused(`The form named in ${quote(shown)} holds characters that a key cannot.`);
  return read({ phase: "aq", label });
}

function withCode(code: string, value: ReadPhase): ReadPhase {
  return code.toLowerCase() === "ao" ? { ...value, handbookCode: "ao" } : value;
}
