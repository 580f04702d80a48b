import { normalizeLabel } from "#app/thermo/label.ts";
import type { Phase } from "#app/thermo/phase.ts";

/** What a cell of a mixed description column turns out to be. */
export interface Description {
  /** The form of a solid or the kind of isomer, as a key holds it. */
  readonly label: string | null;
  readonly name: string | null;
  readonly remark: string | null;
}

const SOLIDS: ReadonlySet<Phase> = new Set(["s", "cr", "am", "vit"]);

const GREEK_FORM = /^(?:[α-ω]|alpha|beta|gamma|delta|epsilon|zeta|eta|theta|kappa|lambda|omega)(?:[\s-]+\p{L}+)?$/iu;
const NUMBERED_FORM = /^(?:form[\s-]*)?(?:I|II|III|IV|V|VI)$/;
const NAMED_FORM = new RegExp(
  "^(?:diamond|graphite|quartz|corundum|rutile|cinnabar|metacinnabar|halite|gypsum|lime|" +
    "rhombic|orthorhombic|monoclinic|triclinic|tetragonal|hexagonal|cubic|trigonal|rhombohedral|wurtzite|zincblende|" +
    "red|white|black|grey|gray|yellow|green|blue|brown|violet|orange)$",
  "i",
);
/** Minerals end so; so do a few anions, which are no forms. */
const MINERAL = /^\p{L}{3,}ite$/iu;
const ANION = /^(?:hypo|bi|meta|per|thio|di)*(?:nitrite|sulfite|sulphite|phosphite|chlorite|bromite|iodite|arsenite)$/i;
const ISOMER = /^(?:cis|trans|iso|neo|sec|tert|ortho|meta|para|n|o|m|p|D|L|DL|R|S|E|Z)$/;
const REMARK = /constraint|relaxed|\bsee\b|estimated|assumed|measured|calculated|refer|value|\d{4}|;|[.!?]\s/i;

/**
 * Sorts a description into form, name or remark. `diamond`, `hematite`, `α`, `alpha quartz` of a solid are forms,
 * `ammonium nitrate` and `methanol` are names, `G-H-S constraint has been relaxed` is a remark. Where one piece of a list
 * is a form (`insoluble, anhydrite`) that piece is the form and the whole stays as remark.
 */
export function readDescription(text: string, phase: Phase): Description {
  const plain = text.trim();
  const none: Description = { label: null, name: null, remark: null };
  if (plain === "") return none;
  if (REMARK.test(plain) || plain.length > 80) return { ...none, remark: plain };
  if (ISOMER.test(plain)) return { ...none, label: normalizeLabel(plain) ?? null };
  if (SOLIDS.has(phase)) {
    const pieces = plain.split(",").map((piece) => piece.trim());
    const form = pieces.find(isForm);
    if (form !== undefined) {
      return { label: normalizeLabel(form) ?? null, name: null, remark: pieces.length > 1 ? plain : null };
    }
  }
  if (/^[\p{L}][\p{L}\p{N}\s,'()[\]-]*$/u.test(plain)) return { ...none, name: plain };
  return { ...none, remark: plain };
}

function isForm(text: string): boolean {
  return (
    GREEK_FORM.test(text) ||
    NUMBERED_FORM.test(text) ||
    NAMED_FORM.test(text) ||
    (MINERAL.test(text) && !ANION.test(text))
  );
}
