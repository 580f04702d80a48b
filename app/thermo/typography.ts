/**
 * Typesetting undone: sheets come out of word processors and web pages with raised digits, typographic minus signs and
 * fixed spaces, all of which mean something plainer. Readers call this first and then look at plain text only.
 */

const RAISED = "⁰¹²³⁴⁵⁶⁷⁸⁹⁺⁻⁼⁽⁾";
const LOWERED = "₀₁₂₃₄₅₆₇₈₉₊₋₌₍₎";
const LEVEL = "0123456789+-=()";
const RAISED_RUN = new RegExp(`[${RAISED}]+`, "g");
const LOWERED_RUN = new RegExp(`[${LOWERED}]+`, "g");

const NAMED_CHARACTERS: ReadonlyMap<string, string> = new Map(
  Object.entries({
    middot: "·",
    sdot: "·",
    bull: "·",
    minus: "-",
    ndash: "-",
    nbsp: " ",
    thinsp: " ",
    plusmn: "±",
    times: "×",
    frac12: "1/2",
    deg: "°",
  }),
);

/**
 * Plain text with raised parts marked `^{…}` and lowered parts `_{…}`, whether they came as markup
 * (`<sup>2−</sup>`), as raised characters (`²⁻`) or already so. For readers that must tell `SO₄²⁻` from `SO42-`.
 */
export function markedText(text: string): string {
  return levelled(
    entities(text)
      .replace(/<sup>(.*?)<\/sup>/gi, "^{$1}")
      .replace(/<sub>(.*?)<\/sub>/gi, "_{$1}")
      .replace(RAISED_RUN, (run) => `^{${level(run, RAISED)}}`)
      .replace(LOWERED_RUN, (run) => `_{${level(run, LOWERED)}}`),
  );
}

/** Plain text on one line: raised and lowered characters lose their level (`mol⁻¹` becomes `mol-1`). */
export function plainText(text: string): string {
  return levelled(
    entities(text)
      .replace(/<\/?su[bp]>/gi, "")
      .replace(RAISED_RUN, (run) => level(run, RAISED))
      .replace(LOWERED_RUN, (run) => level(run, LOWERED)),
  );
}

/** One minus, one space, one middle dot, and no compatibility characters (full-width letters, `½`). */
function levelled(text: string): string {
  return text
    .replace(/(?<=\d)(?=[¼½¾⅐-⅞])/g, " ") // 2½ is not 21/2
    .normalize("NFKC")
    .replace(/[‐‑‒–—−﹣]/g, "-")
    .replace(/⁄/g, "/")
    .replace(/[•∙⋅・･‧]/g, "·")
    .replace(/[\u00ad\u200b-\u200d\u2060\ufeff]/g, "")
    .replace(/\s/g, " ");
}

function entities(text: string): string {
  return text
    .replace(/&([a-z]+\d*);/gi, (whole, name: string) => NAMED_CHARACTERS.get(name.toLowerCase()) ?? whole)
    .replace(/&#(?:x2212|8722);/gi, "-")
    .replace(/&#(?:xb7|183);/gi, "·");
}

function level(run: string, from: string): string {
  return Array.from(run, (character) => LEVEL[from.indexOf(character)] ?? character).join("");
}
