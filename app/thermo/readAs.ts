import { readFormula } from "./formula.ts";
import { readNumber, spellNumber } from "./number.ts";
import { readPhase } from "./phase.ts";
import { readQuantity, spellQuantity } from "./quantity.ts";
import { mapReading, type Reading } from "./reading.ts";
import { formatKey, readKey } from "./speciesKey.ts";
import type { Notation } from "./spellings.ts";
import { readUnit } from "./unit.ts";

/** Each reader, with its reading brought to the plain spelling that `spellings.ts` writes. */
export const readAs: Readonly<Record<Notation, (text: string) => Reading<string>>> = {
  number: (text) => mapReading(readNumber(text), spellNumber),
  quantity: (text) => mapReading(readQuantity(text), spellQuantity),
  unit: (text) => mapReading(readUnit(text), (unit) => unit),
  formula: (text) => mapReading(readFormula(text), ({ printed }) => printed),
  phase: (text) =>
    mapReading(readPhase(text), ({ phase, label }) => (label === undefined ? phase : `${phase},${label}`)),
  key: (text) => mapReading(readKey(text), formatKey),
};
