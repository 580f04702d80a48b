import type { Property } from "#app/thermo/property.ts";

/*
 * Two drafts made one: the lines of a revision are taken over into another. Where both propose something for one place, a
 * person chooses; nothing is left out silently. Pure.
 */

/** What both revisions propose for one place. */
export interface SharedPlace<Line> {
  place: string;
  here: Line;
  there: Line;
}

/** Which line of a shared place stays. */
export type Choice = "here" | "there";

interface PlacedLine {
  speciesId: string | null;
  property: Property | null;
  sourceId: string | null;
}

/** The place of a line: a species and a property, what a species is called, or a source. */
export function placeOf({ speciesId, property, sourceId }: PlacedLine): string {
  return sourceId ?? `${speciesId ?? ""}|${property ?? ""}`;
}

/** The places for which both revisions have a line, in the order of the one that is taken over. */
export function sharedPlaces<Line extends PlacedLine>(
  here: readonly Line[],
  there: readonly Line[],
): SharedPlace<Line>[] {
  const byPlace = new Map(here.map((line) => [placeOf(line), line]));
  return there.flatMap((line) => {
    const place = placeOf(line);
    const other = byPlace.get(place);
    return other ? [{ place, here: other, there: line }] : [];
  });
}
