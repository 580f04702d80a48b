import { paths } from "#app/paths.ts";
import type { Found, FoundExactly } from "#app/review/findPage.server.ts";

/*
 * What the find box offers while somebody types: a few of each kind, what was named outright first. Pure.
 */

export interface FindSuggestion {
  kind: "species" | "source" | "revision" | "edition" | "sheet" | "person";
  to: string;
  /** A species key for a species, plain text for anything else. */
  text: string;
  /** Name and CAS number of a species; why it comes near; nothing for others. */
  note: string;
}

const SPECIES_OFFERED = 6;
const OTHERS_OFFERED = 3;

/** Where the one thing that was named outright stands. */
export function addressOf(exactly: FoundExactly): string {
  switch (exactly.kind) {
    case "species":
      return paths.species(exactly.edition, exactly.key);
    case "source":
      return paths.source(exactly.sourceId);
    case "revision":
      return paths.revision(exactly.id);
    case "edition":
      return paths.edition(exactly.number);
    case "sheet":
      return paths.sheet(exactly.id);
  }
}

/** The offers for what was found, in the order in which they stand in the list. */
export function suggestionsOf(found: Found): FindSuggestion[] {
  const { edition } = found;
  const species = edition === null ? [] : [...found.species, ...found.near].slice(0, SPECIES_OFFERED);
  const offers: FindSuggestion[] = [
    ...species.map((one) => ({
      kind: "species" as const,
      to: paths.species(edition ?? "current", one.key),
      text: one.key,
      note: [one.name, one.cas, "why" in one ? one.why : null].filter(Boolean).join(" · "),
    })),
    ...found.editions.slice(0, OTHERS_OFFERED).map(({ number }) => ({
      kind: "edition" as const,
      to: paths.edition(number),
      text: `Edition ${number}`,
      note: "",
    })),
    ...found.revisions.slice(0, OTHERS_OFFERED).map(({ id, title }) => ({
      kind: "revision" as const,
      to: paths.revision(id),
      text: `Revision ${id}`,
      note: title,
    })),
    ...found.sources.slice(0, OTHERS_OFFERED).map(({ sourceId, citation }) => ({
      kind: "source" as const,
      to: paths.source(sourceId),
      text: citation,
      note: "",
    })),
    ...found.sheets.slice(0, OTHERS_OFFERED).map(({ id, name }) => ({
      kind: "sheet" as const,
      to: paths.sheet(id),
      text: `Sheet ${id}`,
      note: name,
    })),
    ...found.people.slice(0, OTHERS_OFFERED).map(({ id, name, email }) => ({
      kind: "person" as const,
      to: paths.person(id),
      text: name,
      note: email,
    })),
  ];
  const named = found.exactly && addressOf(found.exactly);
  return offers.sort((a, b) => Number(b.to === named) - Number(a.to === named));
}
