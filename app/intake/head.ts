import type { Property } from "#app/thermo/property.ts";
import { propertyInfo } from "#app/thermo/property.ts";
import { plainText } from "#app/thermo/typography.ts";
import { readUnit, type Unit } from "#app/thermo/unit.ts";
import type { ColumnMeans } from "./meaning.ts";

/** What the head of a column says by itself, before anybody looks at the cells under it. */
export interface HeadReading {
  /** The meaning the words name; null when they name none. */
  readonly means: ColumnMeans | null;
  /** The quantity of a value, or of an uncertainty that names it. */
  readonly property: Property | null;
  /** The unit in the head; null when it names none. */
  readonly unit: Unit | null;
  /** The head names an energy (kJ) and leaves out per mole (and per kelvin). */
  readonly unitIncomplete: boolean;
  /** A temperature in the head, in kelvin, as plain digits (`298.15`, `0`, `500`); null when it names none. */
  readonly temperature: string | null;
  /** A standard pressure in the head, in pascal; null when it names none. */
  readonly pressure: "100000" | "101325" | null;
  /** The kind that an uncertainty head gives away: `U` is written for expanded, `u` for standard uncertainty. */
  readonly uncertaintyKind: "standard" | "expanded" | null;
}

const NOTHING: HeadReading = {
  means: null,
  property: null,
  unit: null,
  unitIncomplete: false,
  temperature: null,
  pressure: null,
  uncertaintyKind: null,
};

/** A longer text is no head. It is not looked into: the patterns below take time by the square of its length. */
const LONGEST_HEAD = 300;

/**
 * Reads a head in the spellings of sheets: `dHf (kcal)`, `ΔfH° / kJ mol⁻¹`, `enthalpyOfFormation_kJ_mol`, `S298`,
 * `u(ΔfH°)`, `±`, `CAS No.`. It never refuses: what it does not know stays null.
 */
export function readHead(text: string): HeadReading {
  if (text.length > LONGEST_HEAD) return NOTHING;
  const plain = plainText(text.replace(/[º⦵⊖˚]/g, "°").replace(/[∆Δ]/g, "d"))
    .replace(/\s+/g, " ")
    .trim();
  if (plain === "") return NOTHING;

  const increment = readIncrement(plain);
  const { symbol, energy, unit, temperature, pressure } = withoutRemarks(increment ? `H${increment.rest}` : plain);
  const base = { ...NOTHING, temperature: increment ? null : temperature, pressure };
  if (increment) {
    return { ...base, means: "value", property: "enthalpyIncrement", ...unitFor("enthalpyIncrement", unit, energy) };
  }

  const uncertainty = readUncertaintyHead(symbol);
  if (uncertainty) {
    const property = uncertainty.of === "" ? null : propertyOf(uncertainty.of);
    if (uncertainty.of === "" || property) {
      const ofUnit = property ? unitFor(property, unit, energy) : { unit, unitIncomplete: false };
      return { ...base, means: "uncertainty", property, ...ofUnit, uncertaintyKind: uncertainty.kind };
    }
  }

  const property = propertyOf(symbol);
  if (property) return { ...base, means: "value", property, ...unitFor(property, unit, energy) };

  if (TEMPERATURE_HEAD.test(plain)) return { ...NOTHING, means: "temperature" };
  const means = WORDS[letters(symbol)] ?? null;
  return { ...base, means, unit: means === "anyValue" ? unit : null };
}

/** The property that a cell of a long sheet (`ΔfH°`, `S`, `enthalpyOfFormation`) or the symbol of a head names. */
export function propertyOf(text: string): Property | null {
  const plain = plainText(text.replace(/[º⦵⊖˚]/g, "°").replace(/[∆Δ]/g, "d"));
  if (readIncrement(plain)) return "enthalpyIncrement";
  const core = letters(plain.replace(/\(?\b298(?:[.,]15)?\s*K?\b\)?/g, " "))
    .replace(/29815$|298$/, "")
    .replace(/^(?:standard|molar|std)+/, "")
    .replace(/(?<=.)(?:o|0|°|m)$/, "");
  for (const [property, pattern] of PROPERTY_NAMES) {
    if (pattern.test(core)) return property;
  }
  return null;
}

const PROPERTY_NAMES: readonly (readonly [Property, RegExp])[] = [
  [
    "enthalpyOfFormation",
    /^(?:(?:enthalpy|heat)(?:of)?formation|formationenthalpy|d(?:elta)?(?:fh|hf|h)o?f?|hof|hf|dfh|dhform)$/,
  ],
  [
    "gibbsEnergyOfFormation",
    /^(?:(?:gibbs|free|gibbsfree)(?:energy|function)(?:of)?formation|gibbsformation|d(?:elta)?(?:fg|gf|g)o?f?|gf|dfg)$/,
  ],
  ["entropy", /^(?:(?:absolute|thirdlaw)?(?:molar)?entropy|s)$/],
  ["heatCapacity", /^(?:(?:isobaric|molar)*heatcapacity(?:atconstantpressure|cp)?|cp|cpm)$/],
  ["enthalpyIncrement", /^(?:enthalpyincrement|incrementofenthalpy|hth0|h298h0)$/],
];

/** `T`, `T / K`, `temperature (°C)`; not `Tc`, which is the critical temperature. */
const TEMPERATURE_HEAD = /^(?:T|temp(?:erature)?\.?)(?:\s*(?:[/([_,]|in\b)\s*°?\s*[KC]\s*[)\]]?)?$/i;

/** Words that name the other columns, as letters only. */
const WORDS: Readonly<Record<string, ColumnMeans>> = Object.assign(Object.create(null) as Record<string, ColumnMeans>, {
  formula: "formula",
  chemicalformula: "formula",
  molecularformula: "formula",
  compound: "formula",
  substance: "formula",
  species: "formula",
  specieskey: "key",
  key: "key",
  phase: "phase",
  state: "phase",
  st: "phase",
  stateofaggregation: "phase",
  physicalstate: "phase",
  form: "label",
  label: "label",
  polymorph: "label",
  modification: "label",
  crystalform: "label",
  isomer: "label",
  description: "description",
  name: "name",
  substancename: "name",
  compoundname: "name",
  chemicalname: "name",
  iupacname: "name",
  nameiupac: "name",
  systematicname: "name",
  synonym: "synonyms",
  synonyms: "synonyms",
  othername: "synonyms",
  othernames: "synonyms",
  commonname: "synonyms",
  trivialname: "synonyms",
  cas: "cas",
  casno: "cas",
  casnr: "cas",
  casnumber: "cas",
  casrn: "cas",
  casregistrynumber: "cas",
  m: "molarMass",
  mw: "molarMass",
  molarmass: "molarMass",
  molecularweight: "molarMass",
  formulaweight: "molarMass",
  source: "sourceKey",
  sourcekey: "sourceKey",
  sourceid: "sourceKey",
  ref: "sourceKey",
  refkey: "sourceKey",
  reference: "sourceKey",
  citation: "sourceKey",
  citationkey: "sourceKey",
  remark: "remark",
  remarks: "remark",
  note: "remark",
  notes: "remark",
  comment: "remark",
  comments: "remark",
  property: "propertyName",
  quantity: "propertyName",
  value: "anyValue",
  unit: "unitName",
  units: "unitName",
});

/** H°(298.15 K)−H°(0), H(T)-H(0 K), H298-H0: the increment names two temperatures, so it is looked for first. */
function readIncrement(plain: string): { rest: string } | null {
  const match = /^\[?H°?\s*[_(]?\s*(?:T|298(?:[.,]15)?)\s*(?:K)?\)?\s*-\s*H°?\s*[_(]?\s*0\s*(?:K)?\)?\]?/i.exec(plain);
  return match ? { rest: plain.slice(match[0].length) } : null;
}

/** Takes units, temperatures and pressures off the end of a head, in brackets, after a solidus, underscore or comma. */
function withoutRemarks(plain: string): {
  symbol: string;
  unit: Unit | null;
  energy: string | null;
  temperature: string | null;
  pressure: HeadReading["pressure"];
} {
  const found = {
    unit: null as Unit | null,
    energy: null as string | null,
    temperature: null as string | null,
    pressure: null as HeadReading["pressure"],
  };
  const take = (piece: string): boolean => {
    const trimmed = piece.trim();
    const temperature = readTemperature(trimmed);
    if (temperature !== null) {
      found.temperature ??= temperature;
      return true;
    }
    const pressure = readPressure(trimmed);
    if (pressure !== null) {
      found.pressure ??= pressure;
      return true;
    }
    if (/^g\s*(?:\/\s*mol|mol-1)$/.test(trimmed)) return true;
    if (found.unit !== null || found.energy !== null) return false;
    const bare = bareEnergy(trimmed);
    if (bare !== null) {
      found.energy = bare;
      return true;
    }
    found.unit = unitIn(trimmed);
    return found.unit !== null;
  };

  let rest = plain;
  for (let changed = true; changed;) {
    changed = false;
    // `S (J/(mol K))`: the last bracket group, which may hold one inside itself.
    const group = /[[(]((?:[^()[\]]|\([^()]*\))*)[\])]\s*$/.exec(rest);
    if (group?.[1] !== undefined && group.index > 0 && take(group[1] === "0" ? "0 K" : group[1])) {
      rest = rest.slice(0, group.index).trim();
      changed = true;
      continue;
    }
    for (const sign of ["/", "_", ",", ";", ":", " in ", " at ", " "]) {
      let from = rest.indexOf(sign, 1);
      while (from !== -1) {
        if (take(rest.slice(from + sign.length))) {
          rest = rest.slice(0, from).trim();
          changed = true;
          break;
        }
        from = rest.indexOf(sign, from + 1);
      }
      if (changed) break;
    }
  }
  // Older tables mark the values at absolute zero by a lowered 0 behind the sign of the standard state: ΔHf°0.
  const atZero = /^(.*[a-z].*°)\s*_?\{?0\}?$/i.exec(rest);
  if (atZero?.[1] !== undefined && found.temperature === null) return { symbol: atZero[1], ...found, temperature: "0" };
  return { symbol: rest, ...found };
}

function unitIn(piece: string): Unit | null {
  if (piece === "" || !/(?:J|cal|joules?|calories?|eV|electron|e\.?\s?u\.?|gibbs|gbs)/i.test(piece)) return null;
  const spelled = piece.includes("/") ? piece.replaceAll("_", " ") : piece.replace("_", "/").replaceAll("_", " ");
  const reading = readUnit(spelled);
  return reading.outcome === "read" ? reading.value : null;
}

/** An energy with nothing behind it, or per kelvin only: `kcal`, `kJ`, `cal/K`. */
function bareEnergy(piece: string): string | null {
  const match = /^(k?J|k?cal)(?:\s*(?:\/\s*K|K-1))?$/i.exec(piece);
  return match?.[1] ? match[1].toLowerCase().replace("j", "J") : null;
}

function unitFor(
  property: Property,
  unit: Unit | null,
  energy: string | null,
): { unit: Unit | null; unitIncomplete: boolean } {
  if (energy === null) return { unit, unitIncomplete: false };
  const perKelvin = propertyInfo[property].unit === "J/(mol K)";
  return { unit: (perKelvin ? `${energy}/(mol K)` : `${energy}/mol`) as Unit, unitIncomplete: true };
}

function readTemperature(piece: string): string | null {
  const match = /^(?:T\s*=\s*|at\s+)?(\d+(?:[.,]\d+)?)\s*(K|°\s*C|C)$/.exec(piece);
  if (!match?.[1] || !match[2]) return null;
  const number = match[1].replace(",", ".");
  if (match[2] === "K") return number === "298" ? "298.15" : number;
  return number === "25" ? "298.15" : `${number} °C`;
}

function readPressure(piece: string): HeadReading["pressure"] {
  const compact = piece.replace(/\s/g, "").replace(/^p°?=/, "").toLowerCase();
  if (/^(?:1atm|101[.,]?325k?pa|760(?:torr|mmhg))$/.test(compact)) return "101325";
  if (/^(?:1bar|100kpa|100000pa|0[.,]1mpa)$/.test(compact)) return "100000";
  return null;
}

const UNCERTAINTY_WORD =
  "(?:±|\\+/-|unc(?:ertainty|ert)?\\.?|err(?:or)?\\.?|s\\.?d\\.?|sigma|stdev|standard uncertainty|expanded uncertainty)";

function readUncertaintyHead(symbol: string): { of: string; kind: HeadReading["uncertaintyKind"] } | null {
  const kindOf = (sign: string): HeadReading["uncertaintyKind"] => {
    if (sign === "U" || /^expanded/i.test(sign)) return "expanded";
    if (sign === "u" || /^(?:s\.?d|sigma|stdev|standard)/i.test(sign)) return "standard";
    return null;
  };
  const alone = new RegExp(`^(${UNCERTAINTY_WORD}|[uU])$`, "i").exec(symbol);
  if (alone?.[1]) return { of: "", kind: kindOf(alone[1]) };
  const before = new RegExp(`^(${UNCERTAINTY_WORD}|[uU])\\s*(?:of\\b|[(\\[_ ])\\s*(.+?)[)\\]]?$`, "i").exec(symbol);
  if (before?.[1] && before[2]) return { of: before[2], kind: kindOf(before[1]) };
  const behind = new RegExp(`^(.+?)[\\s_,(]+(${UNCERTAINTY_WORD}|[uU])\\)?$`, "i").exec(symbol);
  if (behind?.[1] && behind[2]) return { of: behind[1], kind: kindOf(behind[2]) };
  return null;
}

const letters = (text: string): string =>
  text
    .toLowerCase()
    .replace(/[^a-z0-9°]/g, "")
    .replace(/°/g, "");
