import { database } from "#app/db/database.server.ts";
import {
  countSpeciesAsOf,
  type DetailAsOf,
  findDetailsAsOf,
  findEditions,
  findNamesNear,
  findSourceDetailsAsOf,
  findSpeciesPageAsOf,
} from "#app/editions/editions.queries.server.ts";
import { identityOf } from "#app/editions/identity.ts";
import { EVERY_SPECIES, readSearch, type Search } from "#app/editions/search.ts";
import { BadRequest } from "#app/http/errors.ts";
import { demand, may } from "#app/people/permissions.ts";
import type { Acting } from "#app/people/person.ts";
import { fullCitation, holdsWords } from "#app/sources/citation.ts";
import { readCas } from "#app/thermo/cas.ts";
import { isSameSpecies, readKey } from "#app/thermo/speciesKey.ts";
import { findPeopleLike, findSheetsLike } from "./find.queries.server.ts";
import { readDoi, readNumbers } from "./findPage.ts";
import { findRevisionsLike } from "./review.queries.server.ts";
import type { RevisionState } from "./states.ts";

/** The longest text that can be looked for. */
const LONGEST_FIND = 200;
const LISTED = 25;
const NEAR_LISTED = 8;
/** Of fewer letters than this, every name is nearly alike. */
const SHORTEST_NAME = 4;
/** Species among which the best are chosen before the list is cut. */
const LOOKED_AT = 500;

export interface FoundSpecies {
  key: string;
  name: string;
  cas: string | null;
}

/** The one thing that was named outright. */
export type FoundExactly =
  | { kind: "species"; edition: number; key: string }
  | { kind: "source"; sourceId: string }
  | { kind: "revision"; id: number }
  | { kind: "edition"; number: number }
  | { kind: "sheet"; id: number };

export interface Found {
  /** What was looked for, without spaces at its ends; empty when nothing was. */
  text: string;
  /** The newest edition, in which species and sources were looked for; null before the first. */
  edition: number | null;
  species: readonly FoundSpecies[];
  /** How many species fit, listed or not. */
  speciesCount: number;
  sources: readonly { sourceId: string; citation: string }[];
  revisions: readonly { id: number; title: string; state: RevisionState }[];
  editions: readonly { number: number; publishedAt: Date }[];
  sheets: readonly { id: number; name: string }[];
  /** For an administrator only. */
  people: readonly { id: string; name: string; email: string }[];
  /** Where it leads when it names one thing and nothing else. */
  exactly: FoundExactly | null;
  /** What comes near to what was asked for in vain, and why it does. */
  near: readonly (FoundSpecies & { why: string })[];
  /** Why the text cannot be read as what it looks like, a species key or a CAS number. */
  hint: string | null;
}

/**
 * Looks for a text among the species and sources of the newest edition, the revisions and the editions.
 * @throws Forbidden; BadRequest for a text longer than `LONGEST_FIND`
 */
export async function findEverything(acting: Acting, typed: string): Promise<Found> {
  demand(acting, "table:read");
  const db = database();
  const text = typed.trim();
  if (text.length > LONGEST_FIND) throw new BadRequest(`Look for a text of at most ${LONGEST_FIND} characters.`);
  const editions = await findEditions(db);
  const n = editions[0]?.number ?? 0;
  const numbers = readNumbers(text);
  const search = readSearch(text);
  const nothing = { species: [], count: 0, outright: [] };
  const { roles } = acting.person;
  const isWords = text !== "" && !numbers.named;
  const [species, sources, revisions, sheets, people] = await Promise.all([
    search && !numbers.named ? findSpecies(n, search) : nothing,
    isWords ? findSources(n, text) : { all: [], exact: null },
    text !== "" && may(roles, "revision:read") ? findRevisions(text, numbers) : [],
    text !== "" && may(roles, "sheet:read") ? findSheetsLike(isWords ? text : null, numbers.sheet, LISTED, db) : [],
    isWords && may(roles, "people:manage") ? findPeopleLike(text, LISTED, db) : [],
  ]);
  const editionsFound = editions.filter(
    (one) => one.number === numbers.edition || (isWords && numbers.edition === null && holdsWords(one.notes, text)),
  );
  const exact: FoundExactly[] = [
    ...species.outright.map(({ key }) => ({ kind: "species" as const, edition: n, key })),
    ...(sources.exact === null ? [] : [{ kind: "source" as const, sourceId: sources.exact }]),
    ...editionsFound
      .filter((one) => one.number === numbers.edition)
      .map(({ number }) => ({ kind: "edition" as const, number })),
    ...revisions.filter(({ id }) => id === numbers.revision).map(({ id }) => ({ kind: "revision" as const, id })),
    ...sheets.filter(({ id }) => id === numbers.sheet).map(({ id }) => ({ kind: "sheet" as const, id })),
  ];
  const isInVain = search !== null && species.count === 0 && !numbers.named;
  return {
    text,
    edition: n === 0 ? null : n,
    species: species.species.slice(0, LISTED).map(shown),
    speciesCount: species.count,
    sources: sources.all.slice(0, LISTED),
    revisions,
    editions: editionsFound.slice(0, LISTED).map(({ number, publishedAt }) => ({ number, publishedAt })),
    sheets,
    people,
    exactly: exact.length === 1 ? (exact[0] ?? null) : null,
    near: isInVain ? await findNear(n, search) : [],
    hint: isInVain ? hintFor(text) : null,
  };
}

/** What comes near: the same atoms in another state or charge, then names that are written nearly alike. */
async function findNear(n: number, search: Search): Promise<Found["near"]> {
  const db = database();
  const ofComposition = await findOfComposition(n, search);
  const alike = ofComposition.map((one) => ({ ...shown(one), why: "the same atoms" }));
  if (alike.length > 0 || search.text.length < SHORTEST_NAME) return alike.slice(0, NEAR_LISTED);
  const names = await findNamesNear(n, search.text, NEAR_LISTED, db);
  const details = await findDetailsAsOf(n, { speciesIds: names.map((one) => one.speciesId) }, db);
  return names.flatMap(({ speciesId }) => {
    const detail = details.find((one) => one.speciesId === speciesId);
    return detail ? [{ ...shown(detail), why: "a name written nearly so" }] : [];
  });
}

/** Why the text is no CAS number or species key, when it looks like one. */
function hintFor(text: string): string | null {
  const reading = /^\d+-\d+-\d+$/.test(text) ? readCas(text) : /[()]|[A-Z].*\d/.test(text) ? readKey(text) : null;
  return reading?.outcome === "refused" ? reading.sentence : null;
}

const shown = ({ key, name, cas }: DetailAsOf): FoundSpecies => ({ key, name, cas });

/** The species of the composition that was typed, whatever their state and charge. */
function findOfComposition(n: number, search: Search): Promise<DetailAsOf[]> {
  const hill = [...search.identities.map((one) => one.formula.hill), ...search.formulas.map((one) => one.hill)];
  return findDetailsAsOf(n, { hill: [...new Set(hill)] }, database());
}

/** Species that fit, those named outright first. A name names one outright only when nothing else fits. */
async function findSpecies(n: number, search: Search) {
  const db = database();
  const filter = { ...EVERY_SPECIES, search };
  const order = { by: "key", direction: "ascending" } as const;
  const [ofComposition, fitting, count] = await Promise.all([
    findOfComposition(n, search),
    findSpeciesPageAsOf(n, filter, { order, limit: LOOKED_AT }, db),
    countSpeciesAsOf(n, filter, db),
  ]);
  const named = new Map(
    [...ofComposition.filter((one) => isNamed(one, search)), ...fitting].map((one) => [one.key, one]),
  );
  const rank = (one: DetailAsOf): number => (isNamed(one, search) ? 0 : isCalled(one, search.text) ? 1 : 2);
  const species = [...named.values()].sort((a, b) => rank(a) - rank(b));
  const outright = species.filter((one) => isNamed(one, search));
  const called = species.filter((one) => isCalled(one, search.text));
  return {
    species,
    count,
    outright: outright.length > 0 ? outright : count === 1 && called.length === 1 ? called : [],
  };
}

/** Whether the text is this species' key, formula or CAS number in some spelling. */
function isNamed(detail: DetailAsOf, { identities, formulas, cas }: Search): boolean {
  const identity = identityOf(detail);
  return (
    (cas !== null && detail.cas === cas) ||
    identities.some((one) => isSameSpecies(one.label === undefined ? withoutLabel(identity) : identity, one)) ||
    formulas.some(({ hill, charge }) => detail.hill === hill && (charge === null || detail.charge === charge))
  );
}

function withoutLabel({ formula, phase }: ReturnType<typeof identityOf>): ReturnType<typeof identityOf> {
  return { formula, phase };
}

/** Whether the text is this species' name, in any case. */
function isCalled({ name, synonyms }: DetailAsOf, text: string): boolean {
  return [name, ...synonyms].some((one) => one.toLowerCase() === text.toLowerCase());
}

async function findSources(n: number, text: string) {
  const doi = readDoi(text);
  const found = (await findSourceDetailsAsOf(n, {}, database())).map((source) => ({
    ...source,
    line: fullCitation(source.citation) || source.sourceId,
  }));
  const exact = found.filter(
    (source) => source.sourceId === text || (doi !== null && source.doi?.toLowerCase() === doi),
  );
  const all = found.filter(
    (source) => exact.includes(source) || holdsWords(`${source.line} ${source.doi ?? ""}`, text),
  );
  return {
    all: all.map(({ sourceId, line }) => ({ sourceId, citation: line })),
    exact: exact.length === 1 && exact[0] ? exact[0].sourceId : null,
  };
}

async function findRevisions(text: string, { revision, named }: ReturnType<typeof readNumbers>) {
  const found = await findRevisionsLike(text, revision, LISTED, database());
  return found
    .filter((row) => row.id === revision || (!named && holdsWords(row.title, text)))
    .map(({ id, title, state }) => ({ id, title, state }));
}
