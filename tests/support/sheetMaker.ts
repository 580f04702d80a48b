import { readFileSync } from "node:fs";
import path from "node:path";
import Papa from "papaparse";
import { add, digits, type Digits } from "#app/thermo/digits.ts";
import { convert } from "#app/thermo/unit.ts";
import type { Random } from "./random.ts";

/*
 * Makes a property sheet as a steward might bring it: species of the standing table with slightly other ΔfH° and S°, in a
 * spelling and with a delimiter drawn from a seed, with one cell that cannot be read and one slip in a value.
 */

export interface MadeSheet {
  name: string;
  bytes: Buffer;
  delimiter: string;
  decimalComma: boolean;
  unit: "kJ/mol" | "kcal/mol";
  /** What was drawn, in one line, for the log. */
  told: string;
  /** The clean rows by canonical key, with the digits the table should hold afterwards, in kJ/mol and J/(mol K). */
  clean: { key: string; enthalpy: Digits; entropy: Digits; givenEnthalpy: string }[];
  /** The row that holds a cell nobody can read: its line in the file, the text, and what it should have been. */
  unreadable: { row: number; key: string; head: string; text: string; meant: string; enthalpy: Digits };
  /** The row with a slip: two neighbouring digits of ΔfH° exchanged. */
  slip: { row: number; key: string; enthalpy: Digits };
}

interface Known {
  formula: string;
  phase: string;
  form: string;
  enthalpy: string;
  entropy: string;
}

/** Compounds of the CODATA file with at least five significant figures in ΔfH°, so that a slip is far from its value. */
function knownSpecies(): Known[] {
  const text = readFileSync(path.resolve(import.meta.dirname, "../../fixtures/codata-key-values.csv"), "utf8");
  const rows = Papa.parse<string[]>(text.trim()).data.slice(1);
  return rows
    .map((cells) => ({
      formula: cells[0] ?? "",
      phase: cells[1] ?? "",
      form: cells[2] ?? "",
      enthalpy: cells[3] ?? "",
      entropy: cells[5] ?? "",
    }))
    .filter((one) => /^-?\d{3,}\.\d{2,}$/.test(one.enthalpy) && /^\d+\.\d+$/.test(one.entropy) && one.form === "");
}

const HEADS = {
  formula: ["formula", "Formula", "species formula"],
  phase: ["phase", "Phase", "state"],
  enthalpy: {
    "kJ/mol": ["ΔfH° / kJ/mol", "dHf (kJ/mol)", "Hf [kJ/mol]"],
    "kcal/mol": ["ΔfH° / kcal/mol", "dHf (kcal/mol)", "Hf [kcal/mol]"],
  },
  entropy: ["S° / J/(mol K)", "S (J/mol/K)", "entropy [J/(mol K)]"],
} as const;

const CHARGE_SPELLINGS = [
  (formula: string) => formula,
  (formula: string) => formula.replace(/([+-])(\d*)$/, "^$2$1").replace(/\^([+-])$/, "^$1"),
  (formula: string) => formula.replace(/([+-])(\d)$/, " $2$1"),
];

function exchangeDigits(text: string): string | null {
  // The two digits before the point, if they differ by enough that the slip cannot hide.
  const match = /^(-?\d*)(\d)(\d)(\.\d+)$/.exec(text);
  if (!match) return null;
  const [, head = "", a = "", b = "", tail = ""] = match;
  return Math.abs(Number(a) - Number(b)) >= 2 ? `${head}${b}${a}${tail}` : null;
}

export function makeSheet(random: Random): MadeSheet {
  const delimiter = random.pick([",", ";", "\t"]);
  const decimalComma = delimiter !== "," && random.next() < 0.5;
  const unit = random.pick(["kJ/mol", "kcal/mol"] as const);
  const spell = random.pick(CHARGE_SPELLINGS);
  const write = (text: string): string => {
    const signed = random.next() < 0.5 ? text.replace("-", "−") : text;
    return decimalComma ? signed.replace(".", ",") : signed;
  };

  const pool = knownSpecies();
  const slipped = random.pick(pool.filter((one) => exchangeDigits(one.enthalpy) !== null));
  const others = random.sample(
    pool.filter((one) => one !== slipped),
    6,
  );
  const inUnit = (kilojoules: Digits): string =>
    unit === "kJ/mol" ? kilojoules : convert(kilojoules, "kJ/mol", "kcal/mol").digits;
  const back = (text: string): Digits =>
    unit === "kJ/mol" ? digits(text) : convert(digits(text), "kcal/mol", "kJ/mol").digits;
  // A few hundredths of a kilojoule away from what stands: within what such a measurement allows, and not equal.
  const nudge = (text: string): Digits => add(digits(text), digits(random.pick(["0.01", "0.02", "-0.01", "-0.02"])));
  const shortened = (text: string): string => (unit === "kJ/mol" ? text : (/^-?\d+\.\d{1,4}/.exec(text)?.[0] ?? text));

  const heads = [
    random.pick(HEADS.formula),
    random.pick(HEADS.phase),
    random.pick(HEADS.enthalpy[unit]),
    random.pick(HEADS.entropy),
  ];
  const lines: string[][] = [heads];
  const clean: MadeSheet["clean"] = [];
  let unreadable: MadeSheet["unreadable"] | undefined;
  let slip: MadeSheet["slip"] | undefined;

  const order = random.sample([...others, slipped], others.length + 1);
  const broken = random.pick(others);
  for (const one of order) {
    const key = `${one.formula}(${one.phase})`;
    const row = lines.length + 1;
    const given = shortened(inUnit(nudge(one.enthalpy)));
    const entropy = one.entropy;
    if (one === slipped) {
      const text = shortened(inUnit(digits(exchangeDigits(one.enthalpy) ?? one.enthalpy)));
      slip = { row, key, enthalpy: back(text) };
      lines.push([spell(one.formula), one.phase, write(text), write(entropy)]);
      continue;
    }
    if (one === broken) {
      const text = random.pick(["see note", "ca. 12 to 14", "n.d.?", "12,3,4.5"]);
      unreadable = { row, key, head: heads[2] ?? "", text, meant: write(given), enthalpy: back(given) };
      lines.push([spell(one.formula), one.phase, text, write(entropy)]);
      continue;
    }
    clean.push({ key, enthalpy: back(given), entropy: digits(entropy), givenEnthalpy: given });
    lines.push([spell(one.formula), one.phase, write(given), write(entropy)]);
  }
  if (!unreadable || !slip) throw new Error("makeSheet: every sheet has one broken cell and one slip");
  const text = Papa.unparse(lines, { delimiter, newline: random.pick(["\n", "\r\n"]) });
  const name = `calorimetry-${random.below(10_000)}.csv`;
  return {
    name,
    bytes: Buffer.from(`${text}\n`, "utf8"),
    delimiter,
    decimalComma,
    unit,
    told: `${name}: ${lines.length - 1} rows, ${delimiter === "\t" ? "tab" : delimiter}${decimalComma ? ", decimal comma" : ""}, ${unit}, heads ${heads.join(" | ")}, slip in ${slip.key}`,
    clean,
    unreadable,
    slip,
  };
}
