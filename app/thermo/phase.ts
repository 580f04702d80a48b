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
    xtal: "cr",
    crys: "cr",
    crst: "cr",
    cryst: "cr",
    crystal: "cr",
    crystalline: "cr",
    "crystalline solid": "cr",
    polycrystalline: "cr",
    am: "am",
    amorphic: "am",
    "amorphous solid": "am",
    amor: "am",
    amorp: "am",
    amorph: "am",
    amorphous: "am",
    vit: "vit",
    vitreous: "vit",
    vitr: "vit",
    glass: "vit",
    glassy: "vit",
    gl: "vit",
    gls: "vit",
    aq: "aq",
    ao: "aq",
    aqueous: "aq",
    "aqueous solution": "aq",
    "in water": "aq",
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
    solution: "is a solution without a solvent named. Only solutes in water (aq) are kept.",
    a: "may mean amorphous or aqueous. Write am or aq.",
    cond: "may be a liquid or a solid. Write l, s or cr.",
    fluid: "may be a gas or a liquid. Write g or l.",
    cd: "may be a liquid or a solid. Write l, s or cr.",
    fl: "may be a gas or a liquid. Write g or l.",
    lc: "(liquid crystal) has no place in this table.",
    ads: "(adsorbed) has no place in this table.",
    mon: "(monomer) names a form, not a phase.",
    pol: "(polymer) names a form, not a phase.",
  }),
);

/**
 * Forms that only a crystal has and that sheets write where the phase belongs: `C(graphite)`, `S(rhombic)`, `α`.
 * Mineral and crystallographic names; common practice.
 */
const FORMS_OF_CRYSTALS = new Set(
  (
    "graphite diamond rhombic orthorhombic monoclinic triclinic tetragonal hexagonal trigonal rhombohedral cubic bcc fcc hcp " +
    "white red black grey gray yellow alpha beta gamma delta epsilon quartz cristobalite tridymite coesite stishovite rutile " +
    "anatase brookite calcite aragonite vaterite corundum wurtzite sphalerite pyrite marcasite hematite maghemite magnetite"
  ).split(" "),
);

/** Conditions behind a phase that are those of the table anyway. */
const STANDARD_CONDITIONS =
  /^(?:1\s?bar|100\s?kpa|0\.1\s?mpa|298(?:\.15)?\s?k|25\s?°?\s?c|ideal|ideal[\s-]gas|standard(?:[\s-]state)?)$/i;

/** What may stand behind aq without naming a concentration: the standard state itself. */
const STANDARD_SOLUTE =
  /^(?:∞|(?:hyp(?:othetical)?\.?-?)?1-?(?:m|mol\/(?:kg|l|dm3)|molal|molar)|m=1|inf(?:inite)?(?:-dilution|-dil)?|std\.?(?:-state)?|standard-state|undissoc(?:iated|\.)?|ao|ion(?:ized|ised)?)$/i;

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
    .replace(/^[_^]?\{\s*(.*?)\s*\}$/, "$1")
    .replace(/^[([]\s*(.*?)\s*[)\]]$/, "$1")
    .replace(/^(cr|c|s)([α-ω])$/i, "$1,$2");
  if (plain === "") return refused("No phase is given. Write g, l, s, cr, am, vit or aq.");
  const whole = SPELLINGS.get(plain.toLowerCase());
  if (whole !== undefined) return read(withCode(plain, { phase: whole }));

  const form = normalizeLabel(plain);
  if (form?.split("-").every((word) => FORMS_OF_CRYSTALS.has(word))) {
    return read({ phase: "cr", label: form }, [`${quote(text.trim())} names a form of a crystal.`]);
  }
  const roman = /^(cr|c|s)\s*,?\s*(I{1,3}|IV|VI{0,3})$/.exec(plain);
  if (roman !== null) return read({ phase: roman[1] === "s" ? "s" : "cr", label: roman[2] ?? "" });

  const numbered = /^(?:cr|c)\s*,?\s*([1-9])$/i.exec(plain);
  if (numbered !== null) {
    return read(
      { phase: "cr", label: `form-${numbered[1]}`, handbookCode: plain.replace(/[\s,]/g, "").toLowerCase() },
      [`${quote(text.trim())} is crystal form ${numbered[1]} of its handbook; the remark should name it.`],
    );
  }
  const [, head = "", rest = ""] = /^([A-Za-z]+)\.?(?:[\s,;:/(-]+(.*?)\)?)?$/s.exec(plain) ?? [];
  const excluded = NOT_KEPT.get(head.toLowerCase());
  if (excluded !== undefined) return refused(`${quote(text.trim())} ${excluded}`);
  const phase = SPELLINGS.get(head.toLowerCase());
  if (phase === undefined) {
    return refused(`${quote(text.trim())} is not a phase this table knows. Write g, l, s, cr, am, vit or aq.`);
  }
  if (rest === "") return read(withCode(head, { phase }));
  const second = SPELLINGS.get(rest.toLowerCase());
  if (second !== undefined) {
    // "s, cr" and "am, solid" say one thing twice over; "g, l" says two.
    const solids = [phase, second].filter((one) => one !== "s");
    if (phase === second || (solids.length === 1 && ["cr", "am", "vit"].includes(solids[0] ?? ""))) {
      return read(withCode(phase === "aq" ? rest : head, { phase: solids[0] ?? phase }));
    }
    return refused(`${quote(text.trim())} names two phases, ${phaseName[phase]} and ${phaseName[second]}. Give one.`);
  }
  if (phase === "aq") return readSolute(head, rest, text.trim());
  if (STANDARD_CONDITIONS.test(rest)) {
    return read({ phase }, [`“${rest}” behind the phase is the standard state or reference temperature.`]);
  }
  if (/\d\s?(?:atm|bar|k?pa|mpa|torr|mmhg|k|°?\s?c)$/i.test(rest)) {
    return refused(
      `${quote(text.trim())} names a pressure or a temperature. Say it for the sheet, and leave only the phase here.`,
    );
  }

  const label = normalizeLabel(rest);
  if (label === undefined)
    return refused(`The form named in ${quote(text.trim())} holds characters that a key cannot.`);
  return read({ phase, label });
}

function readSolute(head: string, rest: string, shown: string): Reading<ReadPhase> {
  const condition = rest.trim().replace(/\s+/g, "-");
  if (/^(?:ai|au)$/i.test(condition)) return refused(`${quote(shown)} ${NOT_KEPT.get(condition.toLowerCase())}`);
  if (STANDARD_SOLUTE.test(condition)) {
    const notes = /1/.test(condition) ? [`${quote(shown)} is read as the standard state of a solute.`] : [];
    return read(withCode(/^(?:ao|undissoc)/i.test(condition) ? "ao" : head, { phase: "aq" }), notes);
  }
  if (/^(?:[mcnx]-?=-?)?\d[\d.,]*-?(?:h2o|[mn]|mol.*|%.*|wt.*|ppm)?$|h2o|dil|sat/i.test(condition)) {
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
