import { soleElement } from "#app/thermo/formula.ts";
import { normalizeLabel } from "#app/thermo/label.ts";
import type { Phase } from "#app/thermo/phase.ts";
import { type Property, propertyInfo } from "#app/thermo/property.ts";
import { referenceStateOf } from "#app/thermo/referenceStates.ts";
import { formatKey } from "#app/thermo/speciesKey.ts";
import { ANSWER } from "./meaning.ts";
import { type CellProblem, type Repair, type RowReading, type SheetFrame } from "./readRows.ts";
import { columnsOf } from "./plan.ts";

/** A species a row could be: one that stands in the newest edition or is proposed in an open revision. */
export interface Candidate {
  readonly speciesId: string;
  readonly key: string;
  readonly printed: string;
  readonly hill: string;
  readonly charge: number;
  readonly phase: Phase;
  readonly label: string | null;
  readonly name: string;
  readonly cas: string | null;
  readonly synonyms: readonly string[];
  /** The open revision that proposes it; null when it stands in the edition. */
  readonly revisionId: number | null;
}

/** What a row adds to what the table calls a species it knows. */
export interface Additions {
  /** Null where the table has a name, or the row has none. */
  readonly name: string | null;
  readonly cas: string | null;
  readonly synonyms: readonly string[];
}

/** Which species a row is. */
export type SpeciesMatch =
  | {
      readonly kind: "known";
      readonly speciesId: string;
      readonly key: string;
      readonly note: string | null;
      /** Left out where the row adds nothing. */
      readonly adds?: Additions;
    }
  /** A species new to the table; rows of one sheet with the same key are one species. */
  | { readonly kind: "new"; readonly key: string; readonly label: string | null };

/** A row that was read and knows its species. */
export interface MatchedReading extends RowReading {
  readonly match: SpeciesMatch;
}

export type MatchOutcome =
  | { readonly outcome: "read"; readonly reading: MatchedReading }
  | { readonly outcome: "refused"; readonly problems: readonly CellProblem[] };

/** A row on its way through matching. */
export interface RowToMatch {
  readonly number: number;
  readonly answer: string | null;
  readonly reading: RowReading;
}

/** What two mentions of a substance are compared by. */
interface Mention {
  readonly printed: string;
  readonly label: string | null;
  readonly name: string | null;
  readonly cas: string | null;
  readonly synonyms: readonly string[];
}

const SOLIDS: ReadonlySet<Phase> = new Set(["s", "cr", "am", "vit"]);

/**
 * Finds out which species each row is, among those of the same composition, charge and phase. CAS number, label and name
 * tell isomers and forms apart; where they leave a doubt the steward is asked, never answered for.
 */
export function matchSpecies(
  rows: readonly RowToMatch[],
  candidates: readonly Candidate[],
  frame: SheetFrame,
): MatchOutcome[] {
  const byComposition = new Map<string, Candidate[]>();
  for (const candidate of candidates) {
    const place = `${candidate.hill}|${candidate.charge}|${candidate.phase}`;
    pushTo(byComposition, place, candidate);
  }
  return rows.map((row) => matchRow(row, byComposition.get(placeOf(row.reading)) ?? [], frame));
}

const placeOf = ({ species }: RowReading): string =>
  `${species.formula.hill}|${species.formula.charge}|${species.phase}`;

function matchRow(row: RowToMatch, candidates: readonly Candidate[], frame: SheetFrame): MatchOutcome {
  const { reading } = row;
  const key = formatKey({
    formula: reading.species.formula,
    phase: reading.species.phase,
    ...(reading.species.label === null ? {} : { label: reading.species.label }),
  });
  const known = (candidate: Candidate, note: string | null): MatchOutcome => {
    const adds = additionsTo(candidate, reading);
    const notes = [note, ...notesOn(candidate, reading, adds)].filter((one) => one !== null).join(" ") || null;
    const { speciesId, key: itsKey } = candidate;
    return {
      outcome: "read",
      reading: { ...reading, match: { kind: "known", speciesId, key: itsKey, note: notes, ...(adds ? { adds } : {}) } },
    };
  };
  const ask = (
    sentence: string,
    choices: readonly Candidate[],
    another: boolean,
    byName: ReadonlySet<Candidate> = new Set(),
  ): MatchOutcome => ({
    outcome: "refused",
    problems: [
      {
        column: speciesColumn(frame),
        sentence,
        repairs: [
          ...choices.map((one): Repair => ({
            label: byName.has(one) ? `It is another name of ${one.key}` : `It is ${one.key}`,
            column: ANSWER,
            text: one.key,
          })),
          ...(another ? [{ label: "It is another substance", column: ANSWER, text: "new" }] : []),
        ],
      },
    ],
  });

  if (row.answer !== null && row.answer !== "new") {
    const chosen = candidates.find((one) => one.key === row.answer);
    return chosen
      ? known(chosen, `Said to be ${chosen.key}.`)
      : ask(
          `The table holds no ${row.answer} of this composition and phase. Which species is the row?`,
          candidates,
          true,
        );
  }
  const unnamedForm = missingForm(reading);
  if (unnamedForm !== null && row.answer === null) {
    return { outcome: "refused", problems: [formQuestion(unnamedForm, reading, candidates, frame)] };
  }
  const mention = mentionOf(reading);
  const verdicts =
    row.answer === "new"
      ? []
      : candidates.map((one) => ({ one, verdict: compareMentions(mention, one, reading.species.phase) }));
  const same = verdicts.filter(({ verdict }) => verdict.is === "same");
  const [only] = same;
  if (only && same.length === 1) return known(only.one, only.verdict.why);
  const doubtful = verdicts.filter(({ verdict }) => verdict.is !== "other");
  if (doubtful.length > 0) {
    const keys = doubtful.map(({ one }) => one.key);
    return ask(
      `The table holds ${listed(keys)} of the same composition and phase. ${doubtful[0]?.verdict.why ?? "Nothing says which it is."} Is ${key} ${keys.length === 1 ? "the same substance" : "one of them"}?`,
      doubtful.map(({ one }) => one),
      true,
      new Set(doubtful.filter(({ verdict: { why } }) => why?.startsWith("The names differ")).map(({ one }) => one)),
    );
  }

  const label = reading.species.label ?? (candidates.length > 0 ? labelFromName(reading.species.name) : null);
  const newKey = withLabel(reading, label);
  if (candidates.some((one) => one.key === newKey)) {
    return ask(
      `Another species with the key ${newKey} is in the table. Name the form or isomer of this one, so that their keys differ.`,
      candidates,
      false,
    );
  }
  return { outcome: "read", reading: { ...reading, match: { kind: "new", key: newKey, label } } };
}

/** A row with its match and number, for the comparison of rows with each other. */
export interface RowToSettle {
  readonly number: number;
  readonly reading: MatchedReading;
}

/**
 * Compares the rows of a sheet with each other: rows of one new species are brought to one key, isomers get the label
 * their names give, and two rows that would set one value of one species are both handed back.
 *
 * @returns the rows as they stand now, in the order given
 */
export function settleRows(rows: readonly RowToSettle[], frame: SheetFrame): MatchOutcome[] {
  const outcomes = new Map<number, MatchOutcome>();
  const byPlace = new Map<string, RowToSettle[]>();
  for (const row of rows) {
    outcomes.set(row.number, { outcome: "read", reading: row.reading });
    if (row.reading.match.kind === "new") {
      const place = placeOf(row.reading);
      pushTo(byPlace, place, row);
    }
  }
  for (const group of byPlace.values()) settleNewSpecies(group, outcomes, frame);
  settleAdditions(rows, outcomes, frame);
  refuseDuplicates(rows, outcomes);
  return rows.map((row) => outcomes.get(row.number) ?? { outcome: "read", reading: row.reading });
}

interface Cluster {
  mention: Mention;
  rows: RowToSettle[];
}

/** The new species of one composition and phase: each row joins a substance or begins another. */
function settleNewSpecies(rows: readonly RowToSettle[], outcomes: Map<number, MatchOutcome>, frame: SheetFrame): void {
  const clusters: Cluster[] = [];
  for (const row of rows) {
    const mention = {
      ...mentionOf(row.reading),
      label: row.reading.match.kind === "new" ? row.reading.match.label : null,
    };
    const verdicts = clusters.map((cluster) => ({
      cluster,
      verdict: compareMentions(mention, cluster.mention, row.reading.species.phase),
    }));
    const same = verdicts.filter(({ verdict }) => verdict.is === "same");
    const joined = same[0]?.cluster;
    if (joined && same.length === 1) {
      joined.rows.push(row);
      joined.mention = {
        ...joined.mention,
        label: joined.mention.label ?? mention.label,
        name: joined.mention.name ?? mention.name,
        cas: joined.mention.cas ?? mention.cas,
        synonyms: [...joined.mention.synonyms, ...mention.synonyms],
      };
      continue;
    }
    const doubt = verdicts.find(({ verdict }) => verdict.is !== "other");
    if (doubt) {
      const other = doubt.cluster.rows[0]?.number ?? 0;
      outcomes.set(row.number, {
        outcome: "refused",
        problems: [
          {
            column: speciesColumn(frame),
            sentence:
              `Row ${other} has the same composition and phase. ${doubt.verdict.why ?? ""} Name the form or isomer of both rows, or give both the same name or CAS number.`.replace(
                / {2}/g,
                " ",
              ),
            repairs: [],
            amongRows: [other],
          },
        ],
      });
      continue;
    }
    clusters.push({ mention, rows: [row] });
  }
  for (const cluster of clusters) {
    const label = cluster.mention.label ?? (clusters.length > 1 ? labelFromName(cluster.mention.name) : null);
    const first = cluster.rows[0];
    if (!first) continue;
    const key = withLabel(first.reading, label);
    for (const row of cluster.rows) {
      outcomes.set(row.number, { outcome: "read", reading: { ...row.reading, match: { kind: "new", key, label } } });
    }
  }
}

/** Two rows that would give one species of the table different names or CAS numbers are a question. */
function settleAdditions(rows: readonly RowToSettle[], outcomes: Map<number, MatchOutcome>, frame: SheetFrame): void {
  const first = new Map<string, { row: number; adds: Additions }>();
  for (const { number, reading } of rows) {
    const { match } = reading;
    if (match.kind !== "known" || !match.adds) continue;
    const { adds } = match;
    const before = first.get(match.speciesId);
    if (!before) {
      first.set(match.speciesId, { row: number, adds });
      continue;
    }
    const names =
      before.adds.name !== null && adds.name !== null && plainName(before.adds.name) !== plainName(adds.name);
    const numbers = before.adds.cas !== null && adds.cas !== null && before.adds.cas !== adds.cas;
    if (names || numbers) {
      const what = names
        ? `calls ${match.key} ${before.adds.name ?? ""}, this one ${adds.name ?? ""}. Write one of them here, or the second among the synonyms.`
        : `gives ${match.key} the CAS number ${before.adds.cas ?? ""}, this one ${adds.cas ?? ""}. One of them is wrong, or the rows are two substances.`;
      const column = columnsOf(frame.plan, names ? "name" : "cas")[0] ?? speciesColumn(frame);
      const problem: CellProblem = {
        column,
        sentence: `Row ${before.row} ${what}`,
        repairs: [],
        amongRows: [before.row],
      };
      outcomes.set(number, { outcome: "refused", problems: [problem] });
      continue;
    }
    first.set(match.speciesId, {
      row: before.row,
      adds: { ...before.adds, name: before.adds.name ?? adds.name, cas: before.adds.cas ?? adds.cas },
    });
  }
}

function refuseDuplicates(rows: readonly RowToSettle[], outcomes: Map<number, MatchOutcome>): void {
  const places = new Map<string, { number: number; property: Property; key: string; column: number }[]>();
  for (const row of rows) {
    const outcome = outcomes.get(row.number);
    if (outcome?.outcome !== "read") continue;
    const { match, values } = outcome.reading;
    for (const value of values) {
      const place = `${match.kind === "known" ? match.speciesId : match.key}|${value.property}`;
      const entry = { number: row.number, property: value.property, key: match.key, column: value.column };
      pushTo(places, place, entry);
    }
  }
  for (const entries of places.values()) {
    if (entries.length < 2) continue;
    for (const entry of entries) {
      const others = entries.filter((other) => other.number !== entry.number).map((other) => other.number);
      const before = outcomes.get(entry.number);
      const sentence = `${others.length === 1 ? "Row" : "Rows"} ${listed(others.map(String))} also ${others.length === 1 ? "gives" : "give"} ${propertyInfo[entry.property].symbol} of ${entry.key}. Leave one of them, or say that they are different species.`;
      const problem: CellProblem = { column: entry.column, sentence, repairs: [], amongRows: others };
      outcomes.set(entry.number, {
        outcome: "refused",
        problems: [...(before?.outcome === "refused" ? before.problems : []), problem],
      });
    }
  }
}

interface Verdict {
  is: "same" | "other" | "unsure";
  why: string | null;
}

const verdict = (is: Verdict["is"], why: string | null = null): Verdict => ({ is, why });

/** Whether a mention in the sheet is a substance already met, both of one composition, charge and phase. */
function compareMentions(row: Mention, other: Mention, phase: Phase): Verdict {
  const names = compareNames(row, other);
  const samePrint = row.printed === other.printed;
  const sameLabel = row.label === other.label;
  if (row.cas !== null && other.cas !== null) {
    if (row.cas === other.cas)
      return row.label !== null && other.label !== null && !sameLabel ? verdict("other") : verdict("same");
    // Another number and another name leave no doubt; one of them alone may be a slip.
    if (samePrint && sameLabel && names !== "differ") {
      return verdict(
        "unsure",
        `The CAS numbers differ (${row.cas} here, ${other.cas} there): another substance, or a wrong number.`,
      );
    }
    return verdict("other");
  }
  if (row.label !== null && other.label !== null) {
    if (!sameLabel) return verdict("other");
    return names === "differ" ? verdict("unsure", differentNames(row, other)) : verdict("same");
  }
  if (sameLabel) {
    if (names === "agree") return verdict("same");
    if (samePrint) return names === "differ" ? verdict("unsure", differentNames(row, other)) : verdict("same");
    return names === "differ" ? verdict("other") : verdict("unsure", "The formulas are written differently.");
  }
  if (row.label === null) {
    if (labelFromName(row.name) === other.label) return verdict("same");
    if (names === "differ") return verdict("unsure", differentNames(row, other));
    // One form of this solid is known and the sheet names none: that is the one, and the record says so.
    if (SOLIDS.has(phase) && samePrint)
      return verdict("same", `The form is not named; ${other.label ?? ""} is the one known.`);
    return verdict("unsure", `The row names no isomer, the other is ${other.label ?? ""}.`);
  }
  if (labelFromName(other.name) === row.label) return verdict("same");
  return verdict("unsure", `The row names ${row.label}, the other names no form.`);
}

function compareNames(row: Mention, other: Mention): "agree" | "differ" | "unknown" {
  const own = namesOf(row);
  const known = new Set(namesOf(other).map(plainName));
  if (own.length === 0 || known.size === 0) return "unknown";
  return own.some((name) => known.has(plainName(name))) ? "agree" : "differ";
}

const namesOf = (mention: Pick<Mention, "name" | "synonyms">): string[] =>
  [mention.name ?? "", ...mention.synonyms].filter((name) => name !== "");

/** Words of the phase behind a name: "water, liquid", "iodine (g)". The key says the phase. */
const PHASE_WORDS =
  /(?:,\s*|\s*\(\s*|\s+)(?:liquid|gas(?:eous)?|vapou?r|solid|crystal(?:line)?|aqueous|in water|\(?(?:g|l|s|cr|c|aq|liq)\)?)\s*\)?$/i;

/** A name without the phase behind it. */
function withoutPhase(name: string): string {
  const bare = name.trim().replace(PHASE_WORDS, "");
  return /\p{L}{2}/u.test(bare) ? bare : name.trim();
}

/** What two spellings of one name have in common: letters and digits, in small letters, without the phase. */
const plainName = (name: string): string => {
  const letters = withoutPhase(name)
    .toLowerCase()
    .replace(/[^\p{L}\p{N}]/gu, "");
  return letters === "" ? name : letters;
};

/** What the row says of the substance that the table does not have yet. A name or number that stands is never replaced. */
function additionsTo(candidate: Candidate, { species }: RowReading): Additions | null {
  const named = species.name === null ? null : withoutPhase(species.name);
  const name = candidate.name === "" && named !== null ? named : null;
  const known = new Set(namesOf(candidate).map(plainName));
  if (name !== null) known.add(plainName(name));
  const synonyms: string[] = [];
  for (const one of [named ?? "", ...(species.synonyms ?? [])]) {
    if (one === "" || known.has(plainName(one))) continue;
    known.add(plainName(one));
    synonyms.push(one);
  }
  const cas = candidate.cas === null ? species.cas : null;
  return name === null && cas === null && synonyms.length === 0 ? null : { name, cas, synonyms };
}

/** What the record should say of a row whose name or number is not the table's. */
function notesOn(candidate: Candidate, { species }: RowReading, adds: Additions | null): string[] {
  const notes: string[] = [];
  const named = species.name === null ? null : withoutPhase(species.name);
  if (named !== null && adds?.synonyms.includes(named))
    notes.push(`${named} is kept as a synonym of ${candidate.key}.`);
  if (species.cas !== null && candidate.cas !== null && species.cas !== candidate.cas) {
    notes.push(`The CAS number ${candidate.cas} of ${candidate.key} stays; ${species.cas} is not taken over.`);
  }
  return notes;
}

const differentNames = (row: Mention, other: Mention): string =>
  `The names differ (${row.name ?? ""} here, ${other.name ?? ""} there).`;

function mentionOf({ species }: RowReading): Mention {
  const { formula, label, name, cas, synonyms = [] } = species;
  return { printed: formula.printed, label, name, cas, synonyms };
}

function labelFromName(name: string | null): string | null {
  return name ? (normalizeLabel(name) ?? null) : null;
}

function withLabel({ species }: RowReading, label: string | null): string {
  return formatKey({ formula: species.formula, phase: species.phase, ...(label === null ? {} : { label }) });
}

/** The element of a crystal that has several named forms, when the row names none of them. */
function missingForm({ species }: RowReading): string | null {
  if (species.phase !== "cr" || species.label !== null || species.formula.charge !== 0) return null;
  const element = soleElement(species.formula);
  const reference = element === undefined ? undefined : referenceStateOf(element);
  return reference?.label !== undefined && element !== undefined && labelFromName(species.name) !== reference.label
    ? element
    : null;
}

function formQuestion(
  element: string,
  reading: RowReading,
  candidates: readonly Candidate[],
  frame: SheetFrame,
): CellProblem {
  const reference = referenceStateOf(element)?.label ?? "";
  const [labelColumn] = columnsOf(frame.plan, "label");
  const [phaseColumn] = columnsOf(frame.plan, "phase");
  const [keyColumn] = columnsOf(frame.plan, "key");
  const { printed } = reading.species.formula;
  const forms = new Set([...candidates.flatMap((one) => (one.label === null ? [] : [one.label])), reference]);
  const repairs = [...forms].map((form): Repair => {
    const label = `Take ${printed}(cr,${form})`;
    if (labelColumn !== undefined) return { label, column: labelColumn, text: form };
    if (phaseColumn !== undefined) return { label, column: phaseColumn, text: `cr,${form}` };
    return { label, column: keyColumn ?? 0, text: `${printed}(cr,${form})` };
  });
  return {
    column: labelColumn ?? phaseColumn ?? speciesColumn(frame),
    sentence: `${printed}(cr) has several forms, and only ${reference} is the one from which formation is counted. Name the form.`,
    repairs,
  };
}

function speciesColumn(frame: SheetFrame): number {
  return columnsOf(frame.plan, "key")[0] ?? columnsOf(frame.plan, "formula")[0] ?? 0;
}

function listed(items: readonly string[]): string {
  return items.length < 2 ? items.join("") : `${items.slice(0, -1).join(", ")} and ${items.at(-1) ?? ""}`;
}

function pushTo<T>(lists: Map<string, T[]>, place: string, item: T): void {
  const list = lists.get(place);
  if (list) list.push(item);
  else lists.set(place, [item]);
}
