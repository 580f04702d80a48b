import Papa from "papaparse";
import { describe, expect, test } from "vitest";
import { useDatabase as workOn } from "#app/db/database.server.ts";
import { compareBytes, editionDigest, type EditionParts, rowHash } from "#app/editions/digest.ts";
import { makeKey } from "#app/people/apiKey.server.ts";
import { publishEditionOf, publishThreeEditions } from "#tests/support/editions.ts";
import { makePerson } from "#tests/support/people.ts";
import { useServer } from "#tests/support/server.ts";

/*
 * A program that has only a download can make the digest of its edition again, by the recipe in app/editions/digest.ts,
 * from each of the three forms.
 */

let key = "";

const server = useServer({
  async prepare(database) {
    workOn(database.app);
    await publishThreeEditions(database.app);
    // Edition 4: a species with names in several forms, and one whose every value went out.
    await publishEditionOf(
      {
        species: [
          { key: "H2O(l)", name: 'water, "liquid"', synonyms: ["oxidane; pure", "dihydrogen oxide, 18 g/mol"] },
          { key: "NH3(g)", name: "ammonia" },
        ],
        withdrawals: (["enthalpyOfFormation", "entropy"] as const).map((property) => ({
          key: "NH3(g)",
          property,
          reason: "A test of what stays of a species.",
        })),
      },
      database.app,
    );
    const analyst = await makePerson("A. Analyst", "analyst");
    key = (await makeKey(analyst, { name: "archive", scopes: ["read"], days: 30 })).key;
  },
});

const EDITIONS = [1, 2, 3, 4];

const ask = (path: string): Promise<Response> =>
  server.fetch(`/api/v1${path}`, { headers: { Authorization: `Bearer ${key}` } });
const textOf = async (path: string): Promise<string> => (await ask(path)).text();

interface Value {
  digits: string;
  unit: string;
  uncertainty: { digits: string; kind: string; coverageFactor: number | null } | null;
  temperature: number;
  standardPressure: number;
  digitsOf?: { temperature?: string; standardPressure?: string };
  basis?: string;
  origin: string;
  source: string;
}
interface Species {
  id: string;
  formula: string;
  label: string | null;
  name: string;
  cas: string | null;
  inchikey: string | null;
  synonyms: string[];
}
interface Source {
  csl: Record<string, unknown>;
  doi: string | null;
  kind: string;
  notice: string | null;
}
interface Facts {
  edition: number;
  licence: string;
  digest: string;
  previousDigest: string | null;
}

const valueHash = (species: string, property: string, value: Value): Buffer =>
  rowHash({
    species,
    property,
    digits: value.digits,
    unit: value.unit,
    uncertainty: value.uncertainty && {
      digits: value.uncertainty.digits,
      kind: value.uncertainty.kind,
      coverageFactor: value.uncertainty.coverageFactor === null ? null : String(value.uncertainty.coverageFactor),
    },
    temperature: value.digitsOf?.temperature ?? String(value.temperature),
    standardPressure: value.digitsOf?.standardPressure ?? String(value.standardPressure),
    basis: value.basis ?? null,
    origin: value.origin,
    source: value.source,
  });
const speciesHash = (key: string, { id, formula, label, name, cas, inchikey, synonyms }: Species): Buffer =>
  rowHash({ species: id, key, printed: formula, label, name, cas, inchikey, synonyms });
const sourceHash = (id: string, { csl, doi, kind, notice }: Source): Buffer =>
  rowHash({ source: id, citation: csl, doi, kind, notice });

const digestOf = (facts: Omit<Facts, "digest">, parts: Pick<EditionParts, "values" | "species" | "sources">): string =>
  editionDigest({
    ...parts,
    number: facts.edition,
    licence: facts.licence,
    previousDigest: facts.previousDigest === null ? null : Buffer.from(facts.previousDigest, "hex"),
  }).toString("hex");

async function digestOfJson(n: number): Promise<string> {
  const table = JSON.parse(await textOf(`/editions/${n}/table.json`)) as Facts & {
    sources: Record<string, Source>;
    species: Record<string, Species>;
    values: Record<string, Record<string, Value>>;
  };
  return digestOf(table, {
    values: Object.entries(table.values).flatMap(([key, values]) =>
      Object.entries(values).map(([property, value]) => ({
        key,
        property,
        hash: valueHash(table.species[key]?.id ?? "", property, value),
      })),
    ),
    species: Object.entries(table.species).map(([key, one]) => ({ key, hash: speciesHash(key, one) })),
    sources: Object.entries(table.sources).map(([id, one]) => ({ id, hash: sourceHash(id, one) })),
  });
}

async function digestOfLines(n: number): Promise<string> {
  type Line = { kind: string } & Record<string, unknown>;
  const lines = (await textOf(`/editions/${n}/table.ndjson`))
    .split("\n")
    .filter(Boolean)
    .map((line) => JSON.parse(line) as Line);
  const of = <Shape>(kind: string): Shape[] => lines.filter((line) => line.kind === kind) as Shape[];
  const [facts] = of<Facts>("edition");
  const ids = new Map<string, string>();
  const species = of<Species & { key: string }>("species").map((one) => {
    ids.set(one.key, one.id);
    return { key: one.key, hash: speciesHash(one.key, one) };
  });
  if (!facts) throw new Error("the first line is missing");
  return digestOf(facts, {
    values: of<Value & { species: string; property: string }>("value").map((one) => ({
      key: one.species,
      property: one.property,
      hash: valueHash(ids.get(one.species) ?? "", one.property, one),
    })),
    species,
    sources: of<Source & { id: string; sourceKind: string }>("source").map((one) => ({
      id: one.id,
      hash: sourceHash(one.id, { ...one, kind: one.sourceKind }),
    })),
  });
}

async function digestOfCsv(n: number): Promise<string> {
  const { data } = Papa.parse<Record<string, string>>(await textOf(`/editions/${n}/table.csv`), {
    header: true,
    skipEmptyLines: true,
  });
  const described = JSON.parse(await textOf(`/editions/${n}/table.csv-metadata.json`)) as {
    "dc:license": string;
    notes: [
      {
        previousDigest: string | null;
        sources: (Omit<Source, "csl"> & { id: string; citation: Record<string, unknown> })[];
        speciesWithoutValues: (Species & { species: string })[];
      },
    ];
  };
  const [notes] = described.notes;
  const orNull = (text: string | undefined): string | null => text || null;
  const species = new Map(notes.speciesWithoutValues.map((one) => [one.species, one]));
  const values = data.map((line) => {
    const key = line["species"] ?? "";
    species.set(key, {
      species: key,
      id: line["id"] ?? "",
      formula: line["formula"] ?? "",
      label: orNull(line["label"]),
      name: line["name"] ?? "",
      cas: orNull(line["cas"]),
      inchikey: orNull(line["inchikey"]),
      synonyms: line["synonyms"] ? (JSON.parse(line["synonyms"]) as string[]) : [],
    });
    const hash = rowHash({
      species: line["id"] ?? "",
      property: line["property"] ?? "",
      digits: line["value"] ?? "",
      unit: line["unit"] ?? "",
      uncertainty: line["uncertainty"]
        ? {
            digits: line["uncertainty"],
            kind: line["uncertaintyKind"] ?? "",
            coverageFactor: orNull(line["coverageFactor"]),
          }
        : null,
      temperature: line["temperature"] ?? "",
      standardPressure: line["standardPressure"] ?? "",
      basis: orNull(line["basis"]),
      origin: line["origin"] ?? "",
      source: line["source"] ?? "",
    });
    expect(hash.toString("hex")).toBe(line["hash"]);
    return { key, property: line["property"] ?? "", hash };
  });
  const licence = /\/licenses\/(.+)\.html$/.exec(described["dc:license"])?.[1] ?? "";
  return digestOf(
    { edition: n, licence, previousDigest: notes.previousDigest },
    {
      values,
      species: [...species].map(([key, one]) => ({ key, hash: speciesHash(key, one) })),
      sources: notes.sources.map(({ id, citation, ...one }) => ({
        id,
        hash: sourceHash(id, { ...one, csl: citation }),
      })),
    },
  );
}

describe.each(EDITIONS)("the digest of edition %d", (n) => {
  test.each([
    ["table.json", digestOfJson],
    ["table.ndjson", digestOfLines],
    ["table.csv with its description", digestOfCsv],
  ])("is made again from %s", async (_form, made) => {
    const { digest } = (await (await ask(`/editions/${n}`)).json()) as { digest: string };
    expect(await made(n)).toBe(digest);
  });
});

describe("a whole edition as JSON", () => {
  interface Table {
    species: Record<string, unknown>;
    values: Record<string, Record<string, { digits: string; source: string }>>;
    sources: Record<string, unknown>;
  }
  const table = async (n: number | string) => JSON.parse(await textOf(`/editions/${n}/table.json`)) as Table;

  test("has its species and values in the order of the bytes of key and property", async () => {
    const { species, values } = await table(4);
    const inOrder = (texts: string[]) => expect(texts).toEqual([...texts].sort(compareBytes));
    inOrder(Object.keys(species));
    expect(Object.keys(values)).toEqual(Object.keys(species));
    for (const one of Object.values(values)) inOrder(Object.keys(one));
  });

  test("keeps a JSON Pointer from edition to edition", async () => {
    for (const n of EDITIONS) {
      const { values, sources } = await table(n);
      const value = values["H2O(l)"]?.["enthalpyOfFormation"];
      // CODATA Key Values (1989): ΔfH°(H2O, l) = −285.830 kJ/mol.
      expect(value?.digits).toBe("-285.830");
      expect(Object.keys(sources)).toContain(value?.source);
    }
  });

  test("names a species whose every value went out", async () => {
    expect((await table(4)).values["NH3(g)"]).toEqual({});
    const lines = (await textOf("/editions/4/table.ndjson")).split("\n");
    expect(lines.filter((line) => line.includes('"NH3(g)"'))).toHaveLength(1);
  });

  test("is the same table in all three forms", async () => {
    const csv = (await textOf("/editions/4/table.csv")).trimEnd().split("\r\n").length - 1;
    const json = Object.values((await table(4)).values).flatMap((one) => Object.keys(one)).length;
    const lines = (await textOf("/editions/4/table.ndjson")).match(/^\{"kind":"value"/gm)?.length;
    expect([json, lines]).toEqual([csv, csv]);
  });

  test.each([
    ["table.json", "application/json", "tablewright-edition-4.json"],
    ["table.ndjson", "application/x-ndjson", "tablewright-edition-4.ndjson"],
  ])("%s is a file of its own type and name", async (form, type, name) => {
    const answer = await ask(`/editions/4/${form}`);
    expect(answer.headers.get("Content-Type")?.split(";")[0]).toBe(type);
    expect(answer.headers.get("Content-Disposition")).toBe(`attachment; filename="${name}"`);
  });
});
