import { createHash } from "node:crypto";
import { sql } from "kysely";
import { type Digits, digits } from "#app/thermo/digits.ts";
import type { Phase } from "#app/thermo/phase.ts";
import { PROPERTIES, type Property } from "#app/thermo/property.ts";
import { formatKey, readKey } from "#app/thermo/speciesKey.ts";
import type { TestDatabase } from "./database.ts";
import { publishEditionOf } from "./editions.ts";
import { randomFrom } from "./random.ts";

/*
 * An edition of many thousand species to work against. Every number in it is made up; keys, formulas and check digits are
 * well formed. It is published the legal way, by the application's role between open_edition and seal_edition, except that
 * all its rows carry one accepted line and hashes of no content, and that the owner of the database first sets aside the
 * constraints against overlapping rows: fast, and good for reading, not for `verify`.
 */

export interface BigSpecies {
  id: string;
  key: string;
  hill: string;
  composition: Readonly<Record<string, number>>;
  charge: number;
  phase: Phase;
  printed: string;
  label: string | null;
  name: string;
  cas: string | null;
  synonyms: string[];
  values: Partial<Record<Property, BigValue>>;
}

export interface BigValue {
  digits: Digits;
  uncertainty: Digits | null;
  origin: "stated" | "derived";
  sourceId: string;
}

export interface BigSource {
  id: string;
  author: string;
  title: string;
  year: number;
}

export interface BigTable {
  /** The number of its edition. */
  edition: number;
  species: readonly BigSpecies[];
  sources: readonly BigSource[];
}

// Elements by the charge they usually carry; made-up salts of them have formulas that look like those of a handbook.
const METALS: readonly (readonly [string, number])[] = [
  ...["Li", "Na", "K", "Rb", "Cs", "Ag"].map((one) => [one, 1] as const),
  ...["Be", "Mg", "Ca", "Sr", "Ba", "Zn", "Cd", "Mn", "Fe", "Co", "Ni", "Cu", "Pb"].map((one) => [one, 2] as const),
  ...["Al", "Ga", "In", "Sc", "Y", "La", "Cr", "Bi", "Ce"].map((one) => [one, 3] as const),
  ...["Ti", "Zr", "Hf", "Th", "U", "Sn"].map((one) => [one, 4] as const),
];
const ANIONS: readonly (readonly [string, number, string])[] = [
  ["F", 1, "fluoride"],
  ["Cl", 1, "chloride"],
  ["Br", 1, "bromide"],
  ["I", 1, "iodide"],
  ["OH", 1, "hydroxide"],
  ["NO3", 1, "nitrate"],
  ["O", 2, "oxide"],
  ["S", 2, "sulfide"],
  ["SO4", 2, "sulfate"],
  ["CO3", 2, "carbonate"],
  ["SeO4", 2, "selenate"],
  ["PO4", 3, "phosphate"],
  ["AsO4", 3, "arsenate"],
];
const FORMS = ["alpha", "beta", "gamma"] as const;
const AUTHORS = ["Ashworth", "Brenner", "Castellan", "Duarte", "Eriksen", "Fonseca", "Grünewald", "Hoshino"] as const;
const SUBJECTS = ["halides", "oxides", "sulfates", "organic vapours", "solutes", "hydrates"] as const;

/** The check digit of a CAS Registry Number (CAS, Check Digit Verification). */
function withCheckDigit(body: number): string {
  const text = String(body);
  const sum = [...text].reverse().reduce((total, digit, index) => total + Number(digit) * (index + 1), 0);
  return `${text.slice(0, -2)}-${text.slice(-2)}-${sum % 10}`;
}

/** Keys of made-up species with a name each; each key once. */
function* madeUpKeys(): Generator<{ key: string; name: string }> {
  const group = (symbol: string, n: number): string =>
    n === 1 ? symbol : /^[A-Z][a-z]?$/.test(symbol) ? `${symbol}${n}` : `(${symbol})${n}`;
  for (const [metal, charge] of METALS) {
    yield { key: `${metal}${charge === 1 ? "+" : `+${charge}`}(aq)`, name: `${metal} ion` };
    yield { key: `${metal}(g)`, name: `${metal} atom` };
    yield { key: `${metal}(cr)`, name: metal };
  }
  for (const [metal, plus] of METALS) {
    for (const [anion, minus, word] of ANIONS) {
      const [m, a] = [group(metal, minus), group(anion, plus)];
      const name = `${metal} ${word}`;
      for (const form of FORMS) yield { key: `${m}${a}(cr,${form})`, name: `${name}, ${form} form` };
      for (const phase of ["am", "vit", "l", "g"]) yield { key: `${m}${a}(${phase})`, name };
      for (const water of [1, 2, 5, 7]) {
        yield { key: `${m}${a}·${water === 1 ? "" : water}H2O(cr)`, name: `${name} hydrate` };
      }
    }
  }
  // Hydrocarbons and their oxygen and nitrogen compounds, with isomers told apart by a label.
  for (let carbon = 1; carbon <= 40; carbon += 1) {
    for (let hydrogen = 2; hydrogen <= 2 * carbon + 2; hydrogen += 2) {
      for (const rest of ["", "O", "O2", "N2", "N2O"]) {
        const formula = `${carbon === 1 ? "C" : `C${carbon}`}H${hydrogen}${rest}`;
        for (const isomer of ["form-a", "form-b"]) {
          for (const phase of ["g", "l"]) {
            yield { key: `${formula}(${phase},${isomer})`, name: `compound ${carbon}-${hydrogen}${rest} ${isomer}` };
          }
        }
      }
    }
  }
}

/** Makes up `count` species. The same seed gives the same table. */
export function makeUpSpecies(count: number, seed = 1): { species: BigSpecies[]; sources: BigSource[] } {
  const random = randomFrom(seed);
  const sources = AUTHORS.flatMap((author, index) =>
    SUBJECTS.map((subject, at): BigSource => {
      const number = index * SUBJECTS.length + at;
      return {
        id: `src_madeup${String(number).padStart(4, "0")}`,
        author,
        title: `Invented values of ${subject}`,
        year: 1950 + number,
      };
    }),
  );
  const species: BigSpecies[] = [];
  for (const { key, name } of madeUpKeys()) {
    if (species.length === count) break;
    const reading = readKey(key);
    if (reading.outcome !== "read" || formatKey(reading.value) !== key) continue;
    const { formula, phase, label } = reading.value;
    const number = species.length;
    const values: BigSpecies["values"] = {};
    for (const property of PROPERTIES) {
      if (random.next() > (property === "enthalpyIncrement" ? 0.2 : 0.7)) continue;
      const places = random.below(4);
      const size =
        property === "entropy" || property === "heatCapacity" ? 20 + random.next() * 400 : -random.next() * 1500;
      values[property] = {
        digits: digits(size.toFixed(places)),
        uncertainty: random.next() < 0.6 ? digits((random.next() + 0.1).toFixed(2)) : null,
        origin: property === "gibbsEnergyOfFormation" && random.next() < 0.5 ? "derived" : "stated",
        sourceId: random.pick(sources).id,
      };
    }
    species.push({
      // Like the ids that the database gives, without a common beginning: the index that keeps rows apart lives on it.
      id: `sp_${createHash("md5").update(`${seed} ${number}`).digest("hex")}`,
      key,
      hill: formula.hill,
      composition: formula.composition,
      charge: formula.charge,
      phase,
      printed: formula.printed,
      label: label ?? null,
      name: random.next() < 0.8 ? name : "",
      cas: random.next() < 0.6 ? withCheckDigit(1_000_000 + number) : null,
      synonyms: random.next() < 0.1 ? [`Calder ${number}`] : [],
      values,
    });
  }
  return { species, sources };
}

/** Publishes a made-up edition as the application's own role; 20 000 species and 60 000 values unless told otherwise. */
export async function publishBigTable({ app, owner }: TestDatabase, count = 20_000): Promise<BigTable> {
  const { species, sources } = makeUpSpecies(count);
  // Rows that cannot overlap need not be held against each other; these constraints cost a minute at this size. What reads
  // the table must not lean on their indexes, so they stay away.
  await sql`alter table table_value drop constraint table_value_one_at_a_time`.execute(owner);
  await sql`alter table species_detail drop constraint species_detail_one_at_a_time,
                                       drop constraint species_detail_key_once_an_edition`.execute(owner);
  const published = await publishEditionOf(
    {
      notes: "Made up, to work against.",
      sources: sources.map(({ id, author, title, year }) => ({
        id,
        citation: { type: "report", title, author: [{ family: author }], issued: { "date-parts": [[year]] } },
      })),
      async beside(number, versionId, trx) {
        const hash = sql`sha256('')`;
        await sql`set local statement_timeout = 0`.execute(trx);
        await sql`
          insert into species (id, hill, composition, charge, phase)
          select id, hill, composition, charge, phase
            from jsonb_to_recordset(${JSON.stringify(species)}::jsonb)
              as r(id text, hill text, composition jsonb, charge integer, phase text)`.execute(trx);
        await sql`
          insert into species_detail (species_id, key, printed, label, name, cas, synonyms, line_version_id, row_hash, since)
          select id, key, printed, label, name, cas, array(select jsonb_array_elements_text(synonyms)), ${versionId}, ${hash}, ${number}
            from jsonb_to_recordset(${JSON.stringify(species)}::jsonb)
              as r(id text, key text, printed text, label text, name text, cas text, synonyms jsonb)`.execute(trx);
        const values = species.flatMap((one) =>
          Object.entries(one.values).map(([property, value]) => ({ id: one.id, property, ...value })),
        );
        await sql`
          insert into table_value (species_id, property, value, uncertainty, uncertainty_kind, temperature, standard_pressure,
                                   origin, given_text, given_unit, source_id, line_version_id, row_hash, since)
          select id, property, digits::numeric, uncertainty::numeric, case when uncertainty is not null then 'standard' end,
                 298.15, 100000, origin, digits,
                 case when property in ('entropy', 'heatCapacity') then 'J/(mol K)' else 'kJ/mol' end,
                 "sourceId", ${versionId}, ${hash}, ${number}
            from jsonb_to_recordset(${JSON.stringify(values)}::jsonb)
              as r(id text, property text, digits text, uncertainty text, origin text, "sourceId" text)`.execute(trx);
      },
    },
    app,
  );
  await sql`analyze`.execute(owner);
  return { edition: published.number, species, sources };
}
