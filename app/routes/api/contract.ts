import { z } from "zod";
import { operation } from "#app/http/apiContract.ts";
import { elementOf } from "#app/thermo/elements.ts";
import { PHASES, type Phase } from "#app/thermo/phase.ts";
import { isProperty, PROPERTIES, type Property } from "#app/thermo/property.ts";
import { readCas } from "#app/thermo/cas.ts";
import { splitKeys } from "#app/editions/search.ts";

/*
 * The reading half of the API, version 1, as zod schemas. Requests are read by them, answers are typed by them, and the
 * OpenAPI document is made from them; a test holds every real answer against that document. A field may be added, but
 * none is ever taken away or given another meaning.
 */

export const property = z.enum(PROPERTIES as readonly [Property, ...Property[]]).meta({
  id: "Property",
  description:
    "enthalpyOfFormation, gibbsEnergyOfFormation and enthalpyIncrement are in kJ/mol; entropy and heatCapacity in J/(mol K).",
});
const phase = z.enum(PHASES as readonly [Phase, ...Phase[]]).meta({
  id: "Phase",
  description: "g gas, l liquid, s solid, cr crystal, am amorphous, vit glass, aq dissolved in water.",
});
export const digitsText = z
  .string()
  .regex(/^-?\d+(\.\d+)?$/)
  .meta({ description: "A decimal number with the digits as printed: 205.10 is not 205.1.", example: "-285.830" });
const editionNumber = z.int().positive().meta({ description: "Number of the edition.", example: 3 });
const sha256 = z
  .string()
  .regex(/^[0-9a-f]{64}$/)
  .meta({ description: "SHA-256 in hexadecimal." });
export const time = z.iso.datetime().meta({ description: "RFC 3339, in UTC.", example: "2026-03-12T09:30:00.000Z" });
const key = z.string().meta({ description: "Species key in that edition.", example: "H2O(l)" });
const speciesId = z.string().meta({
  description: "Opaque id of the species. It stays when the species is renamed.",
  example: "sp_0a1b2c3d4e5f60718293a4b5c6d7e8f9",
});

export const uncertaintyShape = z
  .object({
    value: z.number(),
    digits: digitsText,
    kind: z.enum(["exact", "standard", "expanded", "unstated"]).meta({
      description:
        "exact: by convention; standard: k = 1; expanded: with its coverageFactor; unstated: a ± whose kind the source does not say, counted as k = 2.",
    }),
    coverageFactor: z.number().nullable(),
  })
  .meta({ id: "Uncertainty", description: "In the unit of the value, as its source states it." });

export const valueShape = z
  .object({
    id: speciesId,
    species: key,
    property,
    value: z
      .number()
      .meta({ description: "The nearest IEEE double; digits keeps the number itself.", example: -285.83 }),
    digits: digitsText,
    unit: z.enum(["kJ/mol", "J/(mol K)"]),
    given: z
      .object({ text: z.string(), unit: z.string(), note: z.string().nullable() })
      .optional()
      .meta({ description: "What the sheet said, where it differs from value and unit, with the conversion." }),
    uncertainty: uncertaintyShape.nullable().meta({ description: "null where the source states none." }),
    temperature: z.number().meta({ description: "In kelvin.", example: 298.15 }),
    standardPressure: z.number().meta({ description: "In pascal.", example: 100000 }),
    basis: z
      .enum(["molality", "concentration"])
      .optional()
      .meta({ description: "Standard state of a solute as its source states it: 1 mol/kg or 1 mol/L." }),
    method: z.string().optional().meta({ description: "How it was obtained, where the source says so." }),
    remark: z.string().optional().meta({ description: "A remark of the source on this value." }),
    origin: z.enum(["stated", "derived"]),
    source: z.object({ id: z.string(), citation: z.string(), doi: z.string().nullable() }),
    since: editionNumber.meta({ description: "The edition in which this value came in." }),
  })
  .meta({ id: "Value", description: "One property of one species." });

export const speciesShape = z
  .object({
    id: speciesId,
    key,
    formula: z.string().meta({ description: "In the order its source prints it.", example: "H2O" }),
    hill: z.string().meta({ description: "In Hill order, without the charge.", example: "H2O" }),
    charge: z.int(),
    phase,
    label: z.string().nullable().meta({ description: "Form of a solid or name of an isomer, where one is needed." }),
    composition: z
      .record(z.string(), z.number())
      .meta({ description: "Atoms of each element.", example: { H: 2, O: 1 } }),
    name: z.string(),
    cas: z.string().nullable().meta({ description: "CAS Registry Number.", example: "7732-18-5" }),
    inchikey: z.string().nullable(),
    synonyms: z.array(z.string()),
    since: editionNumber.meta({ description: "The edition in which it got this key and these names." }),
    values: z.array(valueShape).meta({ description: "Ordered by property; at most one for each." }),
  })
  .meta({ id: "Species" });

const links = z.record(z.string(), z.url()).meta({ description: "Addresses of what belongs to it." });

export const editionShape = z
  .object({
    number: editionNumber,
    publishedAt: time,
    publishedBy: z.string().meta({ description: "Name of the reviewer who published it." }),
    notes: z.string(),
    licence: z.string().meta({ description: "SPDX licence identifier.", example: "CC-BY-4.0" }),
    counts: z.object({
      species: z.int(),
      values: z.int(),
      came: z.int().meta({ description: "Values that came in with it." }),
      changed: z.int(),
      went: z.int(),
    }),
    digest: sha256,
    previousDigest: sha256.nullable(),
    withdraws: z
      .object({ edition: editionNumber, reason: z.string() })
      .nullable()
      .meta({ description: "The older edition that this one withdraws." }),
    withdrawnBy: z
      .object({ edition: editionNumber, reason: z.string() })
      .nullable()
      .meta({ description: "The later edition that withdrew this one; its values stay readable." }),
    links,
  })
  .meta({ id: "Edition" });

const editionList = z.object({
  edition: editionNumber.nullable().meta({ description: "Number of the newest edition; null before the first." }),
  editions: z.array(editionShape).meta({ description: "The newest first." }),
});

const oneEdition = z.object({ edition: editionNumber, ...editionShape.shape });

const speciesPage = z.object({
  edition: editionNumber,
  species: z.array(speciesShape),
  next: z.string().nullable().meta({ description: "Cursor of the next page; null on the last." }),
});

const oneSpecies = z.object({ edition: editionNumber, ...speciesShape.shape });

const valueList = z.object({ edition: editionNumber, values: z.array(valueShape) });

export const valueChangeShape = z
  .object({
    what: z.enum(["came", "went", "changed"]),
    id: speciesId,
    species: key,
    property,
    unit: z.enum(["kJ/mol", "J/(mol K)"]),
    before: valueShape.nullable(),
    after: valueShape.nullable(),
    aspects: z
      .array(z.enum(["value", "digits", "uncertainty", "source", "state", "origin"]))
      .meta({ description: "In what the two differ; digits: the same number with more or fewer digits." }),
    digitsOnly: z.boolean(),
    difference: digitsText.nullable().meta({ description: "After less before." }),
    relative: z.number().nullable().meta({ description: "The difference over the size of what stood before." }),
    normalizedError: z
      .number()
      .nullable()
      .meta({ description: "E_n: difference over the joined expanded uncertainties; null where it is not defined." }),
  })
  .meta({ id: "ValueChange" });

const textChange = z.object({ field: z.string(), before: z.string(), after: z.string() });

const comparison = z.object({
  edition: editionNumber.meta({ description: "The second of the two." }),
  from: editionNumber,
  to: editionNumber,
  counts: z.object({ came: z.int(), went: z.int(), changed: z.int(), unchanged: z.int() }),
  changes: z.array(valueChangeShape),
  species: z
    .array(
      z.object({
        what: z.enum(["came", "went", "changed"]),
        id: speciesId,
        before: z.string().nullable().meta({ description: "Key in the first edition." }),
        after: z.string().nullable().meta({ description: "Key in the second edition." }),
        texts: z.array(textChange),
      }),
    )
    .meta({ description: "Species that came, went or are called otherwise; all of them, on the first page only." }),
  sources: z
    .array(z.object({ what: z.enum(["came", "went", "changed"]), id: z.string(), texts: z.array(textChange) }))
    .meta({ description: "Sources that came, went or are cited otherwise; all of them, on the first page only." }),
  next: z.string().nullable(),
});

export type ApiValue = z.output<typeof valueShape>;
export type ApiSpecies = z.output<typeof speciesShape>;
export type ApiEdition = z.output<typeof editionShape>;
export type ApiValueChange = z.output<typeof valueChangeShape>;
export type ApiComparison = z.output<typeof comparison>;
export type ApiSourceFacts = Omit<ApiTableSource, "hash">;
export type ApiLookupEntry = z.output<typeof lookupEntry>;

// --- What a request may say ---------------------------------------------------

/** A list in one parameter, separated by commas. */
function listOf<T>(what: string, read: (item: string) => T | undefined) {
  return z.string().transform((text, context): T[] => {
    const items = text.split(",").map((item) => item.trim());
    return items.flatMap((item) => {
      const value = read(item);
      if (value !== undefined) return [value];
      context.addIssue({ code: "custom", message: `"${item}" is not ${what}.` });
      return [];
    });
  });
}

const propertyList = listOf(`a property; give one of ${PROPERTIES.join(", ")}`, (item) =>
  isProperty(item) ? item : undefined,
);
const phaseList = listOf(`a phase; give one of ${PHASES.join(", ")}`, (item) => PHASES.find((one) => one === item));
const elementList = listOf("the symbol of an element", (item) => elementOf(item)?.symbol);

const casNumber = z.string().transform((text, context): string => {
  const reading = readCas(text);
  if (reading.outcome === "read") return reading.value;
  context.addIssue({ code: "custom", message: reading.sentence });
  return z.NEVER;
});

/** Most entries of one page. */
export const LONGEST_PAGE = 500;
const USUAL_PAGE = 100;

export const limit = z
  .string()
  .optional()
  .transform((text, context): number => {
    if (text === undefined) return USUAL_PAGE;
    const number = /^\d{1,4}$/.test(text) ? Number(text) : 0;
    if (number >= 1 && number <= LONGEST_PAGE) return number;
    context.addIssue({ code: "custom", message: `Give a whole number from 1 to ${LONGEST_PAGE}.` });
    return z.NEVER;
  })
  .meta({
    description: `Most entries of one page, from 1 to ${LONGEST_PAGE} [${USUAL_PAGE}].`,
    param: { example: "100" },
  });

export const cursor = z
  .string()
  .max(1000)
  .optional()
  .meta({ description: "The next of the page before; it holds within one edition." });

const editionParameter = z.object({
  edition: z.string().meta({
    description: "Number of the edition, or current for the newest. Answers under a number never change.",
    example: "1",
  }),
});

const NONE = z.object({});

/** A citation by itself, as the Citation Style Language has it. */
export const CSL_TYPE = "application/vnd.citationstyles.csl+json";

// --- Operations ----------------------------------------------------------------

export const listEditions = operation({
  id: "listEditions",
  group: "Editions",
  method: "get",
  path: "/editions",
  summary: "All editions, the newest first",
  description: "Number, time, notes, counts and digest of each edition. May change: ask again with If-None-Match.",
  parameters: NONE,
  query: NONE,
  answer: { description: "The editions.", mediaType: "application/json", schema: editionList },
  otherStatuses: [304, 400],
  scope: "read",
});

export const readEdition = operation({
  id: "readEdition",
  group: "Editions",
  method: "get",
  path: "/editions/{edition}",
  summary: "One edition",
  description:
    "What an edition is, what it withdraws and whether it was withdrawn. Link headers lead to its neighbours.",
  parameters: editionParameter,
  query: NONE,
  answer: { description: "The edition.", mediaType: "application/json", schema: oneEdition },
  otherStatuses: [304, 400, 404],
  headers: ["Link", "Content-Location"],
  scope: "read",
});

export const listSpecies = operation({
  id: "listSpecies",
  group: "Species",
  method: "get",
  path: "/editions/{edition}/species",
  summary: "Species of an edition with their values, a page at a time",
  description:
    "Ordered by the UTF-8 bytes of the key. Everything named must hold at once. The Link header rel=next leads to the next page.",
  parameters: editionParameter,
  query: z.object({
    key: z.string().max(300).optional().meta({
      description:
        "One species by its key or a variant of it: for keys with a slash where %2F cannot travel in a path. Unknown is 404.",
    }),
    q: z.string().max(200).optional().meta({ description: "Key, formula in any usual spelling, name or CAS number." }),
    element: elementList.optional().meta({
      description: "Element symbols, separated by commas; all must occur.",
      param: { example: "H" },
    }),
    phase: phaseList.optional().meta({
      description: "Phases, separated by commas; any of them.",
      param: { example: "g" },
    }),
    cas: casNumber.optional().meta({ description: "CAS Registry Number." }),
    property: propertyList.optional().meta({ description: "Properties, separated by commas; all must have a value." }),
    limit,
    cursor,
  }),
  answer: { description: "A page of species.", mediaType: "application/json", schema: speciesPage },
  otherStatuses: [304, 400, 404, 422],
  headers: ["Link", "Content-Location"],
  scope: "read",
});

export const readSpecies = operation({
  id: "readSpecies",
  group: "Species",
  method: "get",
  path: "/editions/{edition}/species/{key}",
  summary: "One species with all its values",
  description:
    "A common variant of a key (H2O(liq), SO4 2-(aq)), and a key the species had in an earlier edition, redirect (308) to the key as of that edition.",
  parameters: editionParameter.extend({
    key: key.meta({ description: "Species key, URL-encoded.", example: "H2O(l)" }),
  }),
  query: NONE,
  answer: { description: "The species.", mediaType: "application/json", schema: oneSpecies },
  otherStatuses: [304, 308, 400, 404],
  headers: ["Content-Location"],
  scope: "read",
});

export const listValues = operation({
  id: "listValues",
  group: "Species",
  method: "get",
  path: "/editions/{edition}/values",
  summary: "A flat list of values",
  description:
    "Values of the species and properties named, ordered by the UTF-8 bytes of key, then property. A species that the edition does not have is 404 and named: never a silent gap.",
  parameters: editionParameter,
  query: z.object({
    species: z
      .string()
      .max(20_000)
      .transform((text): string[] => splitKeys(text))
      .optional()
      .meta({
        description: "Species keys, separated by commas outside brackets; all species when left out.",
        param: { example: "H2O(l),CO2(g)" },
      }),
    property: propertyList.optional().meta({
      description: "Properties, separated by commas; all when left out.",
      param: { example: "enthalpyOfFormation" },
    }),
  }),
  answer: { description: "The values.", mediaType: "application/json", schema: valueList },
  otherStatuses: [304, 400, 404, 422],
  headers: ["Content-Location"],
  scope: "read",
});

/** Most items of one question. */
export const MOST_ASKED = 1000;
const LONGEST_ASKED = 300;

const askedText = z
  .string("Give a text: a key, a name or a CAS number.")
  .max(LONGEST_ASKED, `Give at most ${LONGEST_ASKED} characters.`)
  .refine(
    (text) => !/[\p{Cc}\p{Surrogate}]/u.test(text),
    "The text holds a character that no name or key has, such as a line end or half of a surrogate pair.",
  );

export const lookupQuestion = z
  .strictObject({
    species: z
      .array(askedText, "Give a list of texts.")
      .min(1, "Ask for at least one species.")
      .max(MOST_ASKED, `Ask for at most ${MOST_ASKED} species at a time.`)
      .meta({
        description: "Keys in any usual spelling, names or CAS numbers, each by itself.",
        example: ["H2O(l)", "SO4 2-(aq)", "7732-18-5"],
      }),
    phase: phase.optional().meta({ description: "Only species in this phase, where a name or number has several." }),
    properties: z
      .array(property)
      .min(1, "Name at least one property, or leave the list out.")
      .max(20)
      .optional()
      .meta({ description: "Values wanted; all when left out." }),
  })
  .meta({ id: "LookupQuestion" });

const candidate = z.object({ id: speciesId, key, name: z.string(), cas: z.string().nullable() });
const sentence = z.string().meta({ description: "What is the matter, and what to do." });
const askedBack = z.string().meta({ description: "The item as it was sent." });

const lookupEntry = z
  .discriminatedUnion("outcome", [
    z.object({
      asked: askedBack,
      outcome: z.literal("found"),
      species: speciesShape,
      missing: z.array(property).meta({ description: "Properties asked for that have no value in this edition." }),
    }),
    z.object({ asked: askedBack, outcome: z.literal("ambiguous"), sentence, candidates: z.array(candidate).min(1) }),
    z.object({ asked: askedBack, outcome: z.literal("unknown"), sentence }),
  ])
  .meta({
    id: "LookupEntry",
    description:
      "found with the species and its values; ambiguous with all that it may be; or unknown. One for each item, in the order asked.",
  });

export const lookUpSpecies = operation({
  id: "lookUpSpecies",
  group: "Species",
  method: "post",
  path: "/editions/{edition}/lookup",
  summary: "Many species by name, key or CAS number at once",
  description: `Up to ${MOST_ASKED} items, by what they are called in that edition, whatever the case of a name. The answer has one entry for each, in order; nothing is left out and nothing guessed: what may be two species is ambiguous. Under a number the same question has the same answer, byte for byte, for ever.`,
  parameters: editionParameter,
  query: NONE,
  body: {
    description: "What is asked.",
    content: {
      "application/json": {
        schema: lookupQuestion,
        example: { species: ["H2O(l)", "SO4 2-(aq)", "7732-18-5"], properties: ["enthalpyOfFormation"] },
      },
    },
  },
  answer: {
    description: "One entry for each item asked.",
    mediaType: "application/json",
    schema: z.object({ edition: editionNumber, entries: z.array(lookupEntry) }),
  },
  otherStatuses: [400, 404, 413, 415, 422],
  headers: ["Content-Location"],
  scope: "read",
});

export const downloadTable = operation({
  id: "downloadTable",
  group: "Tables",
  method: "get",
  path: "/editions/{edition}/table.csv",
  summary: "The whole edition as CSV",
  description:
    "RFC 4180: one header line, CRLF, comma, UTF-8, decimal point; one line a value, ordered by the UTF-8 bytes of key, then property. The bytes never change. table.csv-metadata.json describes the columns.",
  parameters: editionParameter,
  query: NONE,
  answer: { description: "The table.", mediaType: "text/csv", schema: z.string() },
  otherStatuses: [304, 400, 404],
  headers: ["Link", "Content-Disposition", "Content-Location"],
  scope: "read",
});

const hash = sha256.meta({ description: "SHA-256 that the digest of the edition is made from." });

const editionFacts = {
  edition: editionNumber,
  publishedAt: time,
  notes: z.string(),
  licence: z.string().meta({ description: "SPDX licence identifier." }),
  digest: sha256,
  previousDigest: sha256.nullable(),
  withdraws: z.object({ edition: editionNumber, reason: z.string() }).nullable(),
};

const sourceFacts = {
  citation: z.string(),
  csl: z.record(z.string(), z.unknown()).meta({ description: "The citation as CSL-JSON." }),
  doi: z.string().nullable(),
  kind: z.enum(["measurement", "evaluation", "calculation", "estimate"]).meta({
    description: "How the values of the source came about.",
  }),
  notice: z.string().nullable().meta({ description: "A retraction, a correction or another warning." }),
  since: editionNumber.meta({ description: "The edition in which it was first cited so." }),
};

const { key: _key, values: _values, ...speciesFacts } = speciesShape.shape;
const { id: _id, species: _species, property: _property, source: _source, ...valueFacts } = valueShape.shape;

const fileSource = z.object({ ...sourceFacts, hash }).meta({ id: "TableSource" });
const fileSpecies = z.object({ ...speciesFacts, hash }).meta({ id: "TableSpecies" });
const fileValue = z
  .object({
    ...valueFacts,
    source: z.string().meta({ description: "Id of the source." }),
    digitsOf: z
      .object({ temperature: digitsText.optional(), standardPressure: digitsText.optional() })
      .optional()
      .meta({ description: "The digits of those that a number does not keep, such as 298.150." }),
    hash,
  })
  .meta({ id: "TableValue", description: "A value in the file of a whole edition, under its species and property." });

const tableJson = z
  .object({
    ...editionFacts,
    sources: z.record(z.string(), fileSource).meta({ description: "By id." }),
    species: z.record(z.string(), fileSpecies).meta({ description: "By key, in the order of its UTF-8 bytes." }),
    values: z.record(z.string(), z.partialRecord(property, fileValue)).meta({
      description:
        "By key, then property: the JSON Pointer /values/H2O(l)/entropy stays. A species without values has none.",
    }),
  })
  .meta({ id: "Table" });

const tableLine = z
  .discriminatedUnion("kind", [
    z.object({ kind: z.literal("edition"), ...editionFacts }),
    z.object({
      kind: z.literal("source"),
      id: z.string(),
      sourceKind: sourceFacts.kind,
      ...omitKind(fileSource.shape),
    }),
    z.object({ kind: z.literal("species"), key, ...fileSpecies.shape }),
    z.object({ kind: z.literal("value"), species: key, property, ...fileValue.shape }),
  ])
  .meta({
    id: "TableLine",
    description:
      "One line of table.ndjson: the edition first, then its sources, then each species followed by its values.",
  });

function omitKind({ kind: _kind, ...rest }: typeof fileSource.shape) {
  return rest;
}

export type ApiTableSource = z.output<typeof fileSource>;
export type ApiTableSpecies = z.output<typeof fileSpecies>;
export type ApiTableValue = z.output<typeof fileValue>;
export type ApiTableLine = z.output<typeof tableLine>;
export type ApiEditionFacts = Pick<z.output<typeof tableJson>, keyof typeof editionFacts>;

export const downloadTableJson = operation({
  id: "downloadTableJson",
  group: "Tables",
  method: "get",
  path: "/editions/{edition}/table.json",
  summary: "The whole edition as one JSON document",
  description:
    "Sources by id, species by key, values by species key and property, each in the order of the UTF-8 bytes. Holds every field that the digest is made from. The bytes never change.",
  parameters: editionParameter,
  query: NONE,
  answer: { description: "The table.", mediaType: "application/json", schema: tableJson },
  otherStatuses: [304, 400, 404],
  headers: ["Content-Disposition", "Content-Location"],
  scope: "read",
});

export const downloadTableLines = operation({
  id: "downloadTableLines",
  group: "Tables",
  method: "get",
  path: "/editions/{edition}/table.ndjson",
  summary: "The whole edition as lines of JSON",
  description:
    "One JSON document a line (TableLine), for reading as it arrives: the edition, its sources, then each species with its values behind it. Holds every field that the digest is made from. The bytes never change.",
  parameters: editionParameter,
  query: NONE,
  answer: {
    description: "The table. The shape is that of one line.",
    mediaType: "application/x-ndjson",
    schema: tableLine,
  },
  otherStatuses: [304, 400, 404],
  headers: ["Content-Disposition", "Content-Location"],
  scope: "read",
});

export const describeTable = operation({
  id: "describeTable",
  group: "Tables",
  method: "get",
  path: "/editions/{edition}/table.csv-metadata.json",
  summary: "What the columns of table.csv mean",
  description: "A table description as W3C CSVW (Metadata Vocabulary for Tabular Data) has it.",
  parameters: editionParameter,
  query: NONE,
  answer: {
    description: "The description.",
    mediaType: "application/csvm+json",
    schema: z.record(z.string(), z.unknown()),
  },
  otherStatuses: [304, 400, 404],
  headers: ["Content-Location"],
  scope: "read",
});

export const compareEditions = operation({
  id: "compareEditions",
  group: "Editions",
  method: "get",
  path: "/editions/{a}/compare/{b}",
  summary: "What came, went and changed from one edition to another",
  description:
    "Net: a value that was changed and set back is unchanged. b may be the older one; then everything is turned round.",
  parameters: z.object({
    a: z.string().meta({ description: "Number of the first edition, or current.", example: "1" }),
    b: z.string().meta({ description: "Number of the second edition, or current.", example: "current" }),
  }),
  query: z.object({ limit, cursor }),
  answer: { description: "The comparison.", mediaType: "application/json", schema: comparison },
  otherStatuses: [304, 400, 404, 422],
  headers: ["Link", "Content-Location"],
  scope: "read",
});

export const readSource = operation({
  id: "readSource",
  group: "Sources",
  method: "get",
  path: "/sources/{source}",
  summary: "A source",
  description:
    "As the newest edition cites it: its citation in one line and as CSL-JSON, its DOI, and a notice such as a retraction. With Accept: application/vnd.citationstyles.csl+json the answer is the CSL item itself, which names the edition in its member custom. May change: ask again with If-None-Match.",
  parameters: z.object({
    source: z.string().meta({
      description: "Id of the source, as values name it.",
      example: "src_3f1c0a9be2d84c55a7d1f0e6b9c84d21",
    }),
  }),
  query: NONE,
  answer: {
    description: "The source.",
    mediaType: "application/json",
    schema: z.object({ edition: editionNumber, id: z.string(), ...sourceFacts }).meta({ id: "Source" }),
    others: { [CSL_TYPE]: z.looseObject({ id: z.string(), custom: z.object({ edition: editionNumber }) }) },
  },
  otherStatuses: [304, 400, 404],
  headers: ["Vary"],
  scope: "read",
});

export const listChanges = operation({
  id: "listChanges",
  group: "Editions",
  method: "get",
  path: "/changes",
  summary: "Editions since one that is known",
  description:
    "The cheap way to ask for news: the editions after since, the newest first, each with its change counts; an empty list when there are none. Send the ETag back in If-None-Match and nothing new answers 304.",
  parameters: NONE,
  query: z.object({
    since: z
      .string()
      .regex(/^(?:0|[1-9]\d{0,8})$/, "Give the number of an edition, or 0 for all.")
      .optional()
      .transform((text) => Number(text ?? 0))
      .meta({
        description: "Number of the edition that is known; all editions when left out.",
        param: { example: "1" },
      }),
  }),
  answer: {
    description: "The editions.",
    mediaType: "application/json",
    schema: z.object({
      edition: editionNumber.nullable().meta({ description: "Number of the newest edition; null before the first." }),
      since: z.int(),
      editions: z.array(editionShape).meta({ description: "The newest first." }),
    }),
  },
  otherStatuses: [304, 400, 422],
  scope: "read",
});

export const readContract = operation({
  id: "readContract",
  group: "Contract",
  method: "get",
  path: "/openapi.json",
  summary: "This contract",
  description: "OpenAPI 3.1. Needs no key.",
  parameters: NONE,
  query: NONE,
  answer: { description: "The contract.", mediaType: "application/json", schema: z.record(z.string(), z.unknown()) },
  otherStatuses: [304, 400],
  scope: null,
});

/** Every operation by which editions are read. */
export const readingOperations = [
  listEditions,
  readEdition,
  listSpecies,
  readSpecies,
  listValues,
  lookUpSpecies,
  downloadTable,
  describeTable,
  downloadTableJson,
  downloadTableLines,
  compareEditions,
  listChanges,
  readSource,
  readContract,
] as const;
