import { readAs } from "#app/thermo/readAs.ts";
import { NOT_READ, type Notation } from "#app/thermo/spellings.ts";

/** Spellings that are not read, with what their reader says of each. */
export interface ToldGroup {
  readonly why: string;
  readonly rows: readonly { readonly text: string; readonly sentence: string; readonly readings: readonly string[] }[];
}

/** What the reader of a notation says of each spelling that it refuses or asks about. */
export function toldBy(notation: Notation): ToldGroup[] {
  return NOT_READ[notation].map(({ why, rows }) => ({
    why,
    rows: rows.map(([text]) => {
      const reading = readAs[notation](text);
      return {
        text,
        sentence: reading.outcome === "read" ? "" : withoutQuotation(reading.sentence),
        readings: reading.outcome === "ambiguous" ? reading.candidates : [],
      };
    }),
  }));
}

/** The sentence as it goes on behind the text it quotes, which stands beside it anyway. */
function withoutQuotation(sentence: string): string {
  return sentence.replace(/^“[^”]*”:? (?!and)/, "");
}
