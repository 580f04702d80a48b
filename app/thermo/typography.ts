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
    amp: "&",
    lt: "<",
    gt: ">",
    quot: '"',
    apos: "'",
    middot: "·",
    sdot: "·",
    bull: "·",
    minus: "-",
    ndash: "-",
    mdash: "-",
    shy: "\u00ad",
    nbsp: " ",
    thinsp: " ",
    ensp: " ",
    emsp: " ",
    plusmn: "±",
    times: "×",
    frac12: "½",
    frac14: "¼",
    frac34: "¾",
    sup1: "¹",
    sup2: "²",
    sup3: "³",
    deg: "°",
    dagger: "†",
    hellip: "…",
    infin: "∞",
    alpha: "α",
    beta: "β",
    gamma: "γ",
    delta: "δ",
    epsilon: "ε",
  }),
);

const TEX_SIGNS: ReadonlyMap<string, string> = new Map(
  Object.entries({
    cdot: "·",
    bullet: "·",
    times: "×",
    pm: "±",
    circ: "°",
    degree: "°",
    dagger: "†",
    ddagger: "‡",
    quad: " ",
    alpha: "α",
    beta: "β",
    gamma: "γ",
    delta: "δ",
    epsilon: "ε",
  }),
);

/**
 * Plain text with raised parts marked `^{…}` and lowered parts `_{…}`, whether they came as markup
 * (`<sup>2−</sup>`), as raised characters (`²⁻`) or already so. For readers that must tell `SO₄²⁻` from `SO42-`.
 */
export function markedText(text: string): string {
  return levelled(
    withoutMarkup(text)
      .replace(/<sup>(.*?)<\/sup>/gi, "^{$1}")
      .replace(/<sub>(.*?)<\/sub>/gi, "_{$1}")
      .replace(RAISED_RUN, (run) => `^{${level(run, RAISED)}}`)
      .replace(LOWERED_RUN, (run) => `_{${level(run, LOWERED)}}`),
  );
}

/** Plain text on one line: raised and lowered characters lose their level (`mol⁻¹` becomes `mol-1`). */
export function plainText(text: string): string {
  return levelled(
    withoutMarkup(text)
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
    .replace(/[‐‑‒–—−﹣˗⁃➖]/gu, "-")
    .replace(/⁄/g, "/")
    .replace(/[•∙⋅・･‧●]/g, "·")
    .replace(/[∗⁎＊]/g, "*")
    .replace(/[\u00ad\u200b-\u200f\u202a-\u202e\u2060-\u2064\ufeff]/g, "")
    .replace(/\s/g, " ");
}

/** Named and numbered characters of web pages, marks of emphasis, and the TeX people paste. */
function withoutMarkup(text: string): string {
  return withoutTex(
    text
      .replace(
        /&([a-z]+\d*);/gi,
        (whole, name: string) => NAMED_CHARACTERS.get(name) ?? NAMED_CHARACTERS.get(name.toLowerCase()) ?? whole,
      )
      .replace(/&#(?:x([\da-f]{1,6})|(\d{1,7}));/gi, (whole, hex?: string, decimal?: string) => {
        const code = hex === undefined ? Number(decimal) : Number.parseInt(hex, 16);
        return code > 0x1f && code <= 0x10ffff ? String.fromCodePoint(code) : whole;
      })
      .replace(/<(su[bp])\s[^<>]*>/gi, "<$1>")
      .replace(/<(i|b|em|strong|span|font|small)(?:\s[^<>]*)?>(.*?)<\/\1>/gi, "$2"),
  );
}

/** `$\mathrm{SO_4^{2-}}$` and `\ce{SO4^2-}` say SO_4^{2-} and SO4^2-. */
function withoutTex(text: string): string {
  if (!/[\\$]/.test(text)) return text;
  let plain = (text.match(/\$/g)?.length ?? 0) % 2 === 0 ? text.replaceAll("$", "") : text;
  plain = plain.replace(/\\([A-Za-z]+)\s*/g, (whole, name: string) => TEX_SIGNS.get(name) ?? whole);
  for (let depth = 0; depth < 4; depth += 1) {
    plain = plain.replace(
      /\\(?:ce|text|textrm|textit|mathrm|mathit|mathsf|mathbf|rm|ensuremath)\s*\{((?:[^{}]|\{(?:[^{}]|\{[^{}]*\})*\})*)\}/g,
      "$1",
    );
  }
  return plain
    .replace(/\\textsuperscript\{([^{}]*)\}/g, "^{$1}")
    .replace(/\\textsubscript\{([^{}]*)\}/g, "_{$1}")
    .replace(/\\[()[\]]/g, "")
    .replace(/\\[,;:! ]/g, " ");
}

function level(run: string, from: string): string {
  return Array.from(run, (character) => LEVEL[from.indexOf(character)] ?? character).join("");
}
