import type { DetailContent, LineContent, SourceContent, ValueContent } from "#app/review/content.ts";
import type { NewLine } from "#app/review/review.queries.server.ts";
import { digits, type Digits } from "#app/thermo/digits.ts";
import type { Phase } from "#app/thermo/phase.ts";
import type { Property } from "#app/thermo/property.ts";
import type { Uncertainty } from "#app/thermo/uncertainty.ts";
import type { Additions, Candidate, MatchedReading } from "./match.ts";
import type { SheetSettings } from "./plan.ts";

/** A row whose species is settled, ready to become lines. */
export interface SettledRow {
  readonly number: number;
  readonly reading: MatchedReading;
}

/** What stands in the newest edition, or waits accepted for the next one, in the place of a value. */
export interface ValueBase {
  readonly speciesId: string;
  readonly property: Property;
  readonly digits: Digits;
  readonly uncertainty: Uncertainty | null;
  readonly sourceId: string;
  readonly remark: string | null;
  /** Id of the standing row; null when this is a waiting line. */
  readonly row: string | null;
  /** Id of the waiting version; null when this stands. */
  readonly version: string | null;
}

/** What a species that the rows know is called now, or waits to be called. */
export interface DetailBase {
  readonly speciesId: string;
  readonly content: DetailContent;
  /** Id of the standing row; null when this is a waiting line, or when nobody accepted it yet. */
  readonly row: string | null;
  /** Id of the waiting version; null when this stands. */
  readonly version: string | null;
}

/** A species that the revision brings into the table: its identity and, as a line, what it is called. */
export interface NewSpecies {
  readonly id: string;
  readonly hill: string;
  readonly composition: Readonly<Record<string, number>>;
  readonly charge: number;
  readonly phase: Phase;
}

export interface SheetSource {
  readonly id: string;
  /** The citation when the source is new to the table; null when it stands or is proposed already. */
  readonly isNew: SourceContent | null;
}

export interface BuiltLines {
  readonly lines: NewLine[];
  readonly newSpecies: NewSpecies[];
  /** Values that say what stands already, and so make no line. */
  readonly same: number;
  readonly newValues: number;
  readonly changedValues: number;
  /** Species of the table that get a name, a CAS number or synonyms. */
  readonly renamed: number;
}

/** What `buildLines` is given beside the rows. */
export interface BuildFrame {
  readonly settings: SheetSettings;
  /** The source of the whole sheet, or of its rows without a key; null where every row names its own. */
  readonly source: SheetSource | null;
  /** The sources that rows name by a key. */
  readonly sourcesByKey: ReadonlyMap<string, SheetSource>;
  /** What stands or waits, for the species that the rows know. A waiting value comes before a standing one. */
  readonly bases: readonly ValueBase[];
  /** What the species that rows add a name, a CAS number or synonyms to are called; a waiting one in place of a standing. */
  readonly details: readonly DetailBase[];
  /** Species that another open revision proposes and nobody accepted yet: their names are proposed here again. */
  readonly unnamed: readonly Pick<Candidate, "speciesId" | "key" | "printed" | "label" | "name" | "cas" | "synonyms">[];
  /** Makes the opaque id of a new species from its key; ids are made outside so that this stays pure. */
  readonly speciesId: (key: string) => string;
}

/**
 * Turns settled rows into the lines of a draft revision, against what stands or waits: a source line for each new source
 * that a value leans on, a detail line for each species that is new to the table or gets a name or CAS number it had not, a value line for each value that is new or differs. A sheet that
 * leaves a species out removes nothing.
 */
export function buildLines(rows: readonly SettledRow[], frame: BuildFrame): BuiltLines {
  const lines: NewLine[] = [];
  const newSpecies = new Map<string, NewSpecies>();
  const bases = new Map<string, ValueBase>();
  for (const base of frame.bases) {
    const place = `${base.speciesId}|${base.property}`;
    if (base.version !== null || !bases.has(place)) bases.set(place, base);
  }
  const unnamed = new Map(frame.unnamed.map((one) => [one.speciesId, one]));
  const rowsOf = new Map<string, SettledRow[]>();
  for (const row of rows) {
    if (row.reading.match.kind !== "new") continue;
    const own = rowsOf.get(row.reading.match.key);
    if (own) own.push(row);
    else rowsOf.set(row.reading.match.key, [row]);
  }
  const counts = { same: 0, newValues: 0, changedValues: 0, renamed: 0 };
  const details = new Map(frame.details.map((one) => [one.speciesId, one]));
  const added = new Map<string, Additions[]>();
  for (const { reading } of rows) {
    if (reading.match.kind !== "known" || !reading.match.adds) continue;
    const own = added.get(reading.match.speciesId);
    if (own) own.push(reading.match.adds);
    else added.set(reading.match.speciesId, [reading.match.adds]);
  }

  const used = new Map<string, SheetSource>();
  for (const row of rows) {
    const { match, species } = row.reading;
    const speciesId = match.kind === "known" ? match.speciesId : frame.speciesId(match.key);
    if (match.kind === "new" && !newSpecies.has(match.key)) {
      newSpecies.set(match.key, {
        id: speciesId,
        hill: species.formula.hill,
        composition: species.formula.composition,
        charge: species.formula.charge,
        phase: species.phase,
      });
      lines.push(
        line("detail", { speciesId }, detailOf(match.key, match.label, rowsOf.get(match.key) ?? []), row.number),
      );
    }
    const proposed = unnamed.get(speciesId);
    if (proposed) {
      unnamed.delete(speciesId);
      const { key, printed, label, name, cas, synonyms } = proposed;
      const content: DetailContent = {
        kind: "detail",
        key,
        printed,
        label,
        name,
        cas,
        inchikey: null,
        synonyms: [...synonyms],
      };
      lines.push(line("detail", { speciesId }, withAdditions(content, added.get(speciesId) ?? []), row.number));
      added.delete(speciesId);
    }
    const base = details.get(speciesId);
    const additions = added.get(speciesId);
    if (base && additions) {
      added.delete(speciesId);
      const content = withAdditions(base.content, additions);
      if (content !== base.content) {
        counts.renamed += 1;
        lines.push({
          ...line("detail", { speciesId }, content, row.number),
          againstRow: base.row,
          againstVersion: base.version,
        });
      }
    }
    for (const value of row.reading.values) {
      const source = sourceOf(row, frame);
      const content = valueOf(row, value, source, frame);
      const base = bases.get(`${speciesId}|${value.property}`);
      if (base && saysTheSame(content, base)) {
        counts.same += 1;
        continue;
      }
      used.set(source.id, source);
      if (base) counts.changedValues += 1;
      else counts.newValues += 1;
      lines.push({
        ...line("value", { speciesId, property: value.property }, content, row.number),
        againstRow: base && base.version === null ? base.row : null,
        againstVersion: base?.version ?? null,
      });
    }
  }
  const sources = [...used.values()].flatMap(({ id, isNew }) =>
    isNew ? [line("source", { sourceId: id }, isNew, null)] : [],
  );
  return { lines: [...sources, ...lines], newSpecies: [...newSpecies.values()], ...counts };
}

function sourceOf({ reading }: SettledRow, frame: BuildFrame): SheetSource {
  const key = reading.sourceKey ?? null;
  const source = key === null ? frame.source : frame.sourcesByKey.get(key);
  if (!source) throw new RangeError("a row was read whose source nobody chose");
  return source;
}

function line(
  kind: NewLine["kind"],
  subject: { speciesId?: string; property?: Property; sourceId?: string },
  content: LineContent,
  rowNumber: number | null,
): NewLine {
  return {
    kind,
    speciesId: subject.speciesId ?? null,
    property: subject.property ?? null,
    sourceId: subject.sourceId ?? null,
    rowNumber,
    content,
    againstRow: null,
    againstVersion: null,
  };
}

/** A detail with what rows add to it; the same object when they add nothing. What stands is never replaced. */
function withAdditions(content: DetailContent, additions: readonly Additions[]): DetailContent {
  const name = content.name || (additions.find((one) => one.name !== null)?.name ?? "");
  const cas = content.cas ?? additions.find((one) => one.cas !== null)?.cas ?? null;
  const known = new Set([name, ...content.synonyms].map((one) => one.toLowerCase()));
  const synonyms = [...content.synonyms];
  for (const one of additions.flatMap((each) => [each.name ?? "", ...each.synonyms])) {
    if (one === "" || known.has(one.toLowerCase())) continue;
    known.add(one.toLowerCase());
    synonyms.push(one);
  }
  const same = name === content.name && cas === content.cas && synonyms.length === content.synonyms.length;
  return same ? content : { ...content, name, cas, synonyms };
}

/** What a new species is called: the first name and CAS number that its rows give. */
function detailOf(key: string, label: string | null, own: readonly SettledRow[]): DetailContent {
  const first = <T>(of: (species: MatchedReading["species"]) => T | null): T | null =>
    own.map((row) => of(row.reading.species)).find((one) => one !== null) ?? null;
  return {
    kind: "detail",
    key,
    printed: first((species) => species.formula.printed) ?? "",
    label,
    name: first((species) => species.name) ?? "",
    cas: first((species) => species.cas),
    inchikey: null,
    synonyms: [...new Set(own.flatMap((row) => row.reading.species.synonyms ?? []))],
  };
}

function valueOf(
  row: SettledRow,
  value: MatchedReading["values"][number],
  source: SheetSource,
  frame: BuildFrame,
): ValueContent {
  const { settings } = frame;
  if (settings.temperature === null || settings.standardPressure === null) {
    throw new RangeError("lines are built from a confirmed plan only");
  }
  return {
    kind: "value",
    digits: value.digits,
    uncertainty: value.uncertainty,
    temperature: digits(settings.temperature),
    // Values at 1 atm were brought to 1 bar when they were read.
    standardPressure: digits("100000"),
    basis: row.reading.species.phase === "aq" ? settings.basis : null,
    origin: "stated",
    method: settings.method,
    given: value.given,
    remark: row.reading.remark,
    sourceId: source.id,
  };
}

/** The same digits, uncertainty and source, with nothing new to remark. */
function saysTheSame(content: ValueContent, base: ValueBase): boolean {
  return (
    content.digits === base.digits &&
    content.sourceId === base.sourceId &&
    content.uncertainty?.digits === base.uncertainty?.digits &&
    content.uncertainty?.kind === base.uncertainty?.kind &&
    content.uncertainty?.coverageFactor === base.uncertainty?.coverageFactor &&
    content.remark === base.remark
  );
}
