/** The energies that stand in front of a unit. `Cal` is the calorie or the kilocalorie, nobody can tell which. */
export type UnitEnergy = "J" | "kJ" | "cal" | "kcal" | "cal(IT)" | "kcal(IT)" | "eV" | "meV" | "Cal";

/** A unit taken apart into what it counts, each with its exponent. */
export interface UnitFactors {
  energy: UnitEnergy | undefined;
  moles: number;
  kelvins: number;
  /** Molecules, ions, formula units: what an electronvolt is counted by. */
  particles: number;
  /** What has no place in a unit of this table. */
  rest: string[];
  /** What was taken for granted. */
  notes: string[];
  /** A calorie that is neither the thermochemical one nor the International Table's. */
  otherCalorie: boolean;
}

/**
 * Takes a unit apart into symbols with exponents; a solidus divides by everything up to the next one, as people mean it
 * (`J/mol K`, `J/mol/K`), and a bracket may carry an exponent of its own (`J (mol K)-1`).
 *
 * @param plain text as `plainText` leaves it
 * @returns undefined when the text is no product of powers
 */
export function unitFactors(plain: string): UnitFactors | undefined {
  const factors: UnitFactors = {
    energy: undefined,
    moles: 0,
    kelvins: 0,
    particles: 0,
    rest: [],
    notes: [],
    otherCalorie: false,
  };
  const calorie = whichCalorie(plain);
  const spelled = inWords(calorie.rest, factors.notes);
  const powers = new PowerParser(spelled).parseAll();
  if (powers === undefined) return undefined;
  for (const { symbol, exponent, twice } of powers) {
    if (twice) factors.notes.push(`The exponent of ${symbol} behind the solidus is read as dividing once.`);
    if (!takeFactor(factors, symbol, exponent)) factors.rest.push(symbol);
  }
  if (factors.energy === "cal" || factors.energy === "kcal") {
    factors.otherCalorie = calorie.kind === "other";
    if (calorie.kind === "IT") {
      factors.energy = `${factors.energy}(IT)`;
      factors.notes.push("The calorie of the International Table is 4.1868 J.");
    }
  }
  return factors;
}

/** Which calorie a text names, and the text without that name. */
function whichCalorie(plain: string): { kind: "th" | "IT" | "other" | null; rest: string } {
  const end = String.raw`[\s)}\]]*(?=$|[\s/·*.×(-])`;
  const names: readonly (readonly ["th" | "IT" | "other", RegExp])[] = [
    ["IT", /[([{]?\s*(?:1\s*)?(?:k?cal\s*=\s*)?4\.1868\s*k?J\s*[)\]}]?/i],
    ["th", /[([{]?\s*(?:1\s*)?(?:k?cal\s*=\s*)?4\.184\d{0,1}\s*k?J\s*[)\]}]?/i],
    ["IT", /[([{]?\s*(?:international(?:\s+steam)?(?:[\s-]+tables?)?|int(?:'?l)?\.?[\s-]*tables?)\s*[)\]}]?/i],
    ["IT", new RegExp(String.raw`(?<=cal(?:s|ories?)?)[\s_({[,]*I\.?\s?T\.?${end}`, "i")],
    ["IT", /^\s*I\.?\s?T\.?[\s-]*(?=k?cal|kilocal)/i],
    [
      "th",
      new RegExp(
        String.raw`(?<=cal(?:s|ories?)?)[\s_({[,]*(?:th|thm|thermo|thermochem(?:ical)?|tc|defined)\.?${end}`,
        "i",
      ),
    ],
    ["th", /^\s*(?:th|thermochem(?:ical)?|defined)\.?[\s-]*(?=k?cal|kilocal)/i],
    ["other", new RegExp(String.raw`(?<=cal)[\s_({[,]*(?:15|20|4|mean)\s*(?:°|deg\.?)?\s*C?${end}`, "i")],
    ["other", /^\s*(?:mean|(?:15|20)\s*(?:°|deg\.?)?\s*C?)[\s-]*(?=k?cal|kilocal)/i],
  ];
  for (const [kind, pattern] of names) {
    if (pattern.test(plain)) return { kind, rest: plain.replace(pattern, " ") };
  }
  return { kind: null, rest: plain };
}

/** Brings words and old names of the mole and the kelvin to the symbols. */
function inWords(plain: string, notes: string[]): string {
  return plain
    .replace(/^\s*(?:in\b|\/)\s*/i, "")
    .replace(/^(k?J|k?cal)(?=mol|K(?![a-z]))/, "$1 ")
    .replace(/\bper\b/gi, "/")
    .replace(/\belectron[\s-]*volts?\b/gi, "eV")
    .replace(/\bf\.\s?u\.?(?![A-Za-z])|\bfu\b|\bformula[\s-]+units?\b/gi, "formulaUnit")
    .replace(
      /\b(?:gm?|gram)[\s.-]?mol(?:es?)?(?![A-Za-z])|\bgram[\s-]+formula[\s-]+weight\b|\bg\.?f\.?w\.?(?![A-Za-z])/gi,
      (name) => {
        notes.push(`“${name}” is an older name of the mole.`);
        return "mol";
      },
    )
    .replace(/(?:°|\bdeg(?:rees?)?\.?)\s*C(?:elsius|entigrade)?(?![A-Za-z])/gi, () => {
      notes.push("A difference of 1 °C is one of 1 K.");
      return "K";
    })
    .replace(/(?:°|\bdeg(?:rees?)?\.?)\s*(?:K(?:elvins?)?|abs\.?)(?![A-Za-z])/gi, "K")
    .replace(/\bdeg(?:rees?)?\.?(?![A-Za-z])|°/gi, "K")
    .replace(/\bmol(e?)[Kk](?![A-Za-z])/g, "mol K")
    .replace(/\bKmol(e?)(?![A-Za-z])/g, (name) => {
      notes.push(`“${name}” is read as K mol, not as kmol.`);
      return "K mol";
    });
}

interface Power {
  symbol: string;
  exponent: number;
  /** Set when a negative exponent stood behind a solidus, which would divide twice. */
  twice: boolean;
}

/** Reads products, quotients and bracketed groups of powers. */
class PowerParser {
  private position = 0;

  constructor(private readonly text: string) {}

  /** @returns undefined when something is left over or stands where it cannot */
  parseAll(): Power[] | undefined {
    const powers = this.parseProduct(0);
    return powers === undefined || this.position < this.text.length || powers.length === 0 ? undefined : powers;
  }

  private parseProduct(depth: number): Power[] | undefined {
    const powers: Power[] = [];
    let divides = false;
    while (this.position < this.text.length) {
      if (this.take(/[\s·.*×,]+|-(?=\s*[A-Za-z([])/y) !== undefined) continue;
      if (this.take(/\//y) !== undefined) {
        if (/^\s*(?:\/|$|[)\]}])/.test(this.text.slice(this.position))) return undefined;
        divides = true;
        continue;
      }
      const inner = this.parseFactor(depth);
      if (inner === undefined) {
        if (/^[)\]}]/.test(this.text.slice(this.position)) && depth > 0) return powers;
        return undefined;
      }
      powers.push(...inner.map((power) => (divides ? below(power) : power)));
    }
    return powers;
  }

  private parseFactor(depth: number): Power[] | undefined {
    const open = this.take(/[([{]/y);
    if (open !== undefined) {
      if (depth > 4) return undefined;
      const inner = this.parseProduct(depth + 1);
      if (inner === undefined || this.take(/[)\]}]/y) === undefined) return undefined;
      const exponent = this.parseExponent();
      return inner.map((power) => ({ ...power, exponent: power.exponent * exponent }));
    }
    const symbol = this.take(/[A-Za-z]+/y);
    return symbol === undefined ? undefined : [{ symbol, exponent: this.parseExponent(), twice: false }];
  }

  private parseExponent(): number {
    const marked = this.take(
      /\s*(?:\^|\*\*)?\s*[({]\s*[+-]?\s*\d\s*[)}]|\s*(?:\^|\*\*)\s*[+-]?\s*\d|\s*-\s*\d(?!\d)|\d(?!\d)/y,
    );
    return marked === undefined ? 1 : Number(marked.replace(/[^\d-]/g, ""));
  }

  private take(pattern: RegExp): string | undefined {
    pattern.lastIndex = this.position;
    const match = pattern.exec(this.text)?.[0];
    if (match === undefined || match === "") return undefined;
    this.position += match.length;
    return match;
  }
}

function below(power: Power): Power {
  return { ...power, exponent: -Math.abs(power.exponent), twice: power.twice || power.exponent < 0 };
}

function takeFactor(factors: UnitFactors, symbol: string, exponent: number): boolean {
  if (/^mol(?:es?|s)?$/i.test(symbol)) {
    factors.moles += exponent;
    return true;
  }
  if (/^(?:k|kelvins?)$/i.test(symbol)) {
    factors.kelvins += exponent;
    return true;
  }
  if (/^(?:molecules?|particles?|ions?|formulaUnit)$/i.test(symbol)) {
    factors.particles += exponent;
    return true;
  }
  if (exponent !== 1 || factors.energy !== undefined) return false;
  if (/^(?:gibbs|gbs?|clausius)$/i.test(symbol)) {
    factors.energy = "cal";
    factors.kelvins -= 1;
    factors.notes.push(`“${symbol}” is 1 cal/K with 1 cal = 4.184 J.`);
    return true;
  }
  const energy = energySymbol(symbol);
  if (energy === undefined) return false;
  factors.energy = energy;
  if (energy !== "Cal" && energy !== symbol) factors.notes.push(`${symbol} is read as ${energy}.`);
  return true;
}

/** Symbols are case-sensitive, but heads in capitals are common; `MJ`, `mJ` and `MeV` are never taken for anything else. */
function energySymbol(symbol: string): UnitEnergy | undefined {
  if (symbol === "Cal") return "Cal";
  if (/^(?:eV|ev|EV)$/.test(symbol)) return "eV";
  if (/^me[Vv]$/.test(symbol)) return "meV";
  const lower = symbol.toLowerCase();
  if (/^(?:kj|kjoules?|kilojoules?)$/.test(lower)) return "kJ";
  if (/^(?:j|joules?)$/.test(lower)) return "J";
  if (/^(?:kcals?|kcalories?|kilocals?|kilocalories?|kilogram-?calories?)$/.test(lower)) return "kcal";
  if (/^(?:cals?|calories?)$/.test(lower)) return "cal";
  return undefined;
}
