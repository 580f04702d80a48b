import { plainText } from "#app/thermo/typography.ts";
import { quote } from "#app/thermo/reading.ts";

/** Whether a temperature is that of the table, and what to say if it is not. */
export type TemperatureReading =
  | { readonly is: "reference"; readonly note: string | null }
  | { readonly is: "other"; readonly sentence: string; readonly becomes: string | null };

/**
 * Reads a cell of a temperature column. 298.15 K, 298 K and 25 °C are one temperature; at any other no value is taken in,
 * since nothing is carried from one temperature to another in silence.
 *
 * @param head of the column, which may name the unit
 */
export function readTemperature(text: string, head: string): TemperatureReading {
  const plain = plainText(text).replace(/[º˚]/g, "°").trim();
  const match = /^(\d+(?:[.,]\d+)?)\s*(K|°\s*C|C)?$/i.exec(plain);
  if (!match?.[1]) {
    return {
      is: "other",
      sentence: `${quote(text.trim())} is no temperature. Write 298.15 K or 25 °C.`,
      becomes: null,
    };
  }
  const value = Number(match[1].replace(",", "."));
  const unit = match[2] ? unitOf(match[2]) : unitInHead(head);
  if (unit !== "°C" && (value === 298.15 || value === 298)) {
    return { is: "reference", note: value === 298 ? "298 K is taken as 298.15 K." : null };
  }
  if (unit === "°C" && value === 25) return { is: "reference", note: "25 °C is 298.15 K." };
  if (unit === null && value === 25) {
    return { is: "other", sentence: `${quote(text.trim())} names no unit. Is it 25 °C?`, becomes: "25 °C" };
  }
  return {
    is: "other",
    sentence: `The value is at ${match[1]} ${unit ?? "K"}, and the table is kept at 298.15 K: nothing is carried over from another temperature. Leave the row out, or send the value at 298.15 K.`,
    becomes: null,
  };
}

const unitOf = (text: string): "K" | "°C" => (/C$/i.test(text) ? "°C" : "K");

function unitInHead(head: string): "K" | "°C" | null {
  const plain = plainText(head).replace(/[º˚]/g, "°").trim();
  if (/[\s/([_,°]C\s*[)\]]?$/.test(plain)) return "°C";
  return /[\s/([_,]K\s*[)\]]?$/.test(plain) ? "K" : null;
}
