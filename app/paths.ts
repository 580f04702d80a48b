/**
 * Every address of Tablewright as a function, so that no link is ever written by hand. The patterns they follow stand in
 * `app/routes.ts`; a test compares the two.
 */

/** An edition in an address: its number, or the word that stands for the newest one. */
export type EditionInPath = number | "current";

/** What a filtered table carries in its address. Empty entries are left out. */
export type Query = Readonly<Record<string, string | number | readonly string[] | null | undefined>>;

/** Writes a query string (with its question mark) or nothing at all. Entries keep their order. */
export function queryString(query: Query | undefined): string {
  const search = new URLSearchParams();
  for (const [name, value] of Object.entries(query ?? {})) {
    for (const one of Array.isArray(value) ? value : [value]) {
      if (one !== null && one !== undefined && one !== "") search.append(name, String(one));
    }
  }
  const text = search.toString();
  return text === "" ? "" : `?${text}`;
}

// A species key may hold a slash ("CdSO4·8/3H2O(cr)"), which must not end the segment.
const segment = (value: string | number): string => encodeURIComponent(String(value));

export const paths = {
  home: () => "/",

  // The table, as of an edition
  table: (edition: EditionInPath = "current", query?: Query) => `/editions/${edition}/table${queryString(query)}`,
  tableDownload: (edition: EditionInPath) => `/editions/${edition}/table.csv`,
  /** What a filtered table shows, as a file: `shown.csv`, `shown.json` or the description of the CSV. */
  tableShown: (edition: EditionInPath, file: string, query?: Query) =>
    `/editions/${edition}/table/${segment(file)}${queryString(query)}`,
  tableDescription: (edition: EditionInPath) => `/editions/${edition}/table.csv-metadata.json`,
  species: (edition: EditionInPath, key: string) => `/editions/${edition}/species/${segment(key)}`,
  editions: () => "/editions",
  edition: (edition: EditionInPath) => `/editions/${edition}`,
  compare: (edition: EditionInPath, other: EditionInPath) => `/editions/${edition}/compare/${other}`,
  find: (q?: string) => `/find${queryString({ q })}`,

  // Sheets
  sheets: () => "/sheets",
  newSheet: () => "/sheets/new",
  sheet: (sheet: string | number) => `/sheets/${segment(sheet)}`,
  sheetOriginal: (sheet: string | number) => `/sheets/${segment(sheet)}/original`,
  sheetFindings: (sheet: string | number) => `/sheets/${segment(sheet)}/refused.csv`,

  // Review
  revisions: () => "/revisions",
  revision: (revision: string | number) => `/revisions/${segment(revision)}`,
  revisionLine: (revision: string | number, line: string) => `/revisions/${segment(revision)}/lines/${segment(line)}`,
  takeOver: (revision: string | number, from?: number) =>
    `/revisions/${segment(revision)}/take-over${from === undefined ? "" : `?from=${from}`}`,
  propose: (query?: { species?: string; what?: string; property?: string; revision?: number | null }) =>
    `/propose${queryString(query)}`,
  publish: () => "/publish",

  // Where the numbers come from, and what they mean
  sources: () => "/sources",
  newSource: () => "/sources/new",
  /** A source as the newest edition cites it; or, while none does, where it is proposed. */
  source: (source: string) => `/sources/${segment(source)}`,
  mendSource: (source: string) => `/sources/${segment(source)}/mend`,
  sourcesIn: (edition: EditionInPath, query?: Query) => `/editions/${edition}/sources${queryString(query)}`,
  sourceIn: (edition: EditionInPath, source: string, query?: Query) =>
    `/editions/${edition}/sources/${segment(source)}${queryString(query)}`,
  sourceValues: (edition: EditionInPath, source: string) =>
    `/editions/${edition}/sources/${segment(source)}/values.csv`,
  conventions: () => "/conventions",
  conventionsSymbols: () => "/conventions/symbols",
  conventionsStates: () => "/conventions/states",
  conventionsUnits: () => "/conventions/units",
  conventionsUncertainty: () => "/conventions/uncertainty",
  conventionsSpellings: () => "/conventions/spellings",
  conventionsChecks: () => "/conventions/checks",
  conventionsCheck: (check: string) => `/conventions/checks/${segment(check)}`,

  // People
  signIn: (to?: string) => `/sign-in${queryString({ to })}`,
  signOut: () => "/sign-out",
  forgotten: () => "/forgotten",
  reset: (token: string) => `/reset/${segment(token)}`,
  invitation: (token: string) => `/invitation/${segment(token)}`,
  newAddress: (token: string) => `/address/${segment(token)}`,
  account: () => "/account",
  keys: () => "/account/keys",
  people: (query?: Query) => `/people${queryString(query)}`,
  person: (person: string) => `/people/${segment(person)}`,
  record: (query?: Query) => `/record${queryString(query)}`,
  inbox: () => "/inbox",

  // For programs
  apiGuide: () => "/api",
  api: (rest: string) => `/api/v1/${rest}`,
  problem: (slug: string) => `/problems/${segment(slug)}`,
  resource: (rest: string) => `/resources/${rest}`,

  // Development and tests only
  specimens: () => "/ui",
} as const;

/**
 * The same page as of another edition: the address with its edition replaced, filters and all. `null` for an address that
 * is not pinned to an edition.
 */
export function inEdition(pathAndQuery: string, edition: EditionInPath): string | null {
  const pinned = /^\/editions\/(?:\d+|current)(?=\/|\?|$)(?!\/compare)/;
  return pinned.test(pathAndQuery) ? pathAndQuery.replace(pinned, `/editions/${edition}`) : null;
}
