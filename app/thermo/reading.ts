/**
 * What reading a person's spelling comes to.
 *
 * Readers in this room never throw for what somebody typed and never guess: a text is *read*, has *two readings*
 * (and a person is asked), or is *refused* with a sentence that says what is wrong and what to do about it.
 */
export type Reading<T> =
  | { outcome: "read"; value: T; /** What was taken for granted on the way, for the record. */ notes: string[] }
  | { outcome: "ambiguous"; candidates: T[]; sentence: string }
  | { outcome: "refused"; sentence: string };

/** The text has one reading. */
export function read<T>(value: T, notes: string[] = []): Reading<T> {
  return { outcome: "read", value, notes };
}

/** The text has more than one reading, and nothing in it says which is meant. */
export function ambiguous<T>(candidates: T[], sentence: string): Reading<T> {
  return { outcome: "ambiguous", candidates, sentence };
}

/** The text cannot be read; the sentence tells the person why. */
export function refused(sentence: string): { outcome: "refused"; sentence: string } {
  return { outcome: "refused", sentence };
}

/** Carries a reading of one thing over to a thing built from it. */
export function mapReading<T, U>(reading: Reading<T>, build: (value: T) => U): Reading<U> {
  switch (reading.outcome) {
    case "read":
      return read(build(reading.value), reading.notes);
    case "ambiguous":
      return ambiguous(reading.candidates.map(build), reading.sentence);
    case "refused":
      return reading;
  }
}

/** The text in quotation marks, cut when it is long, so that a sentence stays a sentence. */
export function quote(text: string): string {
  const shown = text.length > 60 ? `${text.slice(0, 57)}…` : text;
  return `“${shown}”`;
}

/** No number, unit, formula or key is longer; readers refuse such a text before they look into it. */
const LONGEST_TEXT = 500;

export function isTooLong(text: string): boolean {
  return text.length > LONGEST_TEXT;
}
