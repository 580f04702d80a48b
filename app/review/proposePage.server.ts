import { database, type Database } from "#app/db/database.server.ts";
import { findNewestEdition } from "#app/editions/editions.queries.server.ts";
import { identityOf } from "#app/editions/identity.ts";
import { resolveSpecies } from "#app/editions/resolve.server.ts";
import { NotFound } from "#app/http/errors.ts";
import { demand } from "#app/people/permissions.ts";
import type { Acting } from "#app/people/person.ts";
import { shortCitation } from "#app/sources/citation.ts";
import { findChoosableSources } from "#app/sources/sources.queries.server.ts";
import { findSpeciesByIds } from "#app/species/species.queries.server.ts";
import { type Property, PROPERTIES, propertyInfo } from "#app/thermo/property.ts";
import { type SpeciesIdentity } from "#app/thermo/speciesKey.ts";
import type { DetailContent } from "./content.ts";
import { lineSays } from "./lineWords.ts";
import {
  findKeyHolders,
  findOpenLines,
  findPlaces,
  findWritableRevisions,
  type OpenLine,
  type PlaceNow,
} from "./propose.queries.server.ts";
import { figureOf } from "./revisionPage.ts";

/** A species that something can be proposed for: it stands, waits, or is proposed in an open revision. */
export interface ProposableSpecies {
  id: string;
  identity: SpeciesIdentity;
  /** What it is called now: as it waits, else as it stands, else as it is proposed. */
  detail: DetailContent;
  /** What stands or waits in each of its places; what waits takes the place of what stands. */
  places: ReadonlyMap<Property | null, PlaceNow>;
  openLines: readonly OpenLine[];
  /** Whether its name stands or waits accepted, so that a further revision need not bring it again. */
  named: boolean;
}

/**
 * The species that a key names: one of the newest edition, in any usual spelling, or one that an open revision proposes.
 * @throws NotFound
 */
export async function findProposable(key: string, db: Database): Promise<ProposableSpecies> {
  const [holder] = await findKeyHolders([key], db);
  const id = holder?.speciesId ?? (await standingId(key, db));
  const [stored] = await findSpeciesByIds([id], db);
  if (!stored) throw new NotFound(`There is no species ${key}.`);
  const places = new Map((await findPlaces(id, db)).map((place) => [place.property, place]));
  const openLines = await findOpenLines(id, db);
  const called = places.get(null)?.content ?? openLines.findLast((line) => line.content.kind === "detail")?.content;
  if (called?.kind !== "detail") throw new NotFound(`There is no species ${key}.`);
  return {
    id,
    identity: identityOf({ ...stored, printed: called.printed, label: called.label }),
    detail: called,
    places,
    openLines,
    named: places.has(null),
  };
}

async function standingId(key: string, db: Database): Promise<string> {
  const edition = (await findNewestEdition(db))?.number ?? 0;
  return (await resolveSpecies(edition, key)).speciesId;
}

/** What every form that proposes something offers: where its lines go, and which sources there are. */
async function findChoices(acting: Acting, besides: number | null) {
  const db = database();
  const edition = (await findNewestEdition(db))?.number ?? 0;
  const [sources, drafts] = await Promise.all([
    findChoosableSources(edition, db),
    findWritableRevisions(acting.person.id, besides, db),
  ]);
  return {
    edition,
    sources: sources
      .map(({ sourceId, citation, revisionId }) => ({
        id: sourceId,
        name: shortCitation(citation) || sourceId,
        proposed: revisionId,
      }))
      .sort((a, b) => a.name.localeCompare(b.name, "en")),
    drafts,
  };
}

export type ProposeChoices = Awaited<ReturnType<typeof findChoices>>;

/** What the page for bringing in a new species needs. @throws Forbidden */
export async function findNewSpeciesPage(acting: Acting, besides: number | null) {
  demand(acting, "revision:write");
  return findChoices(acting, besides);
}

/** What the page shows on which a change of one species is proposed. @throws NotFound, Forbidden */
export async function findProposePage(acting: Acting, key: string, besides: number | null) {
  demand(acting, "revision:write");
  const species = await findProposable(key, database());
  const choices = await findChoices(acting, besides);
  const shortOf = (id: string): string => choices.sources.find((one) => one.id === id)?.name ?? id;
  return {
    ...choices,
    species: {
      key: species.detail.key,
      phase: species.identity.phase,
      detail: species.detail,
      stands: species.places.get(null)?.revisionId === null,
      /** What the person sees in each place, sent back with the form. */
      seen: seenOf(species),
    },
    places: PROPERTIES.map((property) => {
      const place = species.places.get(property);
      const figure = figureOf(place?.content);
      return {
        property,
        unit: propertyInfo[property].unit,
        figure,
        waitsIn: place?.revisionId ?? null,
        source: place?.content.kind === "value" ? shortOf(place.content.sourceId) : null,
        withdrawn: place?.content.kind === "withdrawal",
      };
    }),
    proposed: species.openLines.map((line) => ({
      revisionId: line.revisionId,
      title: line.title,
      what: line.property === null ? "what it is called" : propertyInfo[line.property].symbol,
      says: lineSays(line.content, line.property),
    })),
  };
}

export type ProposePage = Awaited<ReturnType<typeof findProposePage>>;

/** Which versions stand or wait in the places of a species, as one text for a hidden field. */
export function seenOf(species: Pick<ProposableSpecies, "places">): string {
  return [...species.places].map(([property, { version }]) => `${property ?? "detail"}:${version}`).join(" ");
}
