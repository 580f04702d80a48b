import { authorsOf, type Citation, text, yearOf } from "./citation.ts";
import { comparableDoi } from "./doi.ts";

/** A source that is known already. */
export interface KnownSource {
  sourceId: string;
  citation: Citation;
  doi: string | null;
}

/** A known source that looks like the one described, and why. */
export interface Twin<Source extends KnownSource> {
  source: Source;
  because: "the same DOI" | "the same title, year and first author";
}

/** The known source that has this DOI; a DOI names one work, so no two sources share one. */
export function holderOfDoi<Source extends Pick<KnownSource, "doi">>(
  doi: string | null,
  known: readonly Source[],
): Source | undefined {
  if (doi === null || doi === "") return undefined;
  const asked = comparableDoi(doi);
  return known.find((source) => source.doi !== null && comparableDoi(source.doi) === asked);
}

/** What is said where a source with a known DOI is described and the known one could be chosen from a list. */
export const DOI_IS_KNOWN = "A source with this DOI is there already. Choose it from the list instead.";

/** The known sources that the described one may be: a DOI names one work, and so nearly always does a signed title. */
export function twinsOf<Source extends KnownSource>(
  described: { citation: Citation; doi: string | null },
  known: readonly Source[],
): Twin<Source>[] {
  const name = nameOf(described.citation);
  return known.flatMap((source): Twin<Source>[] => {
    if (holderOfDoi(described.doi, [source])) return [{ source, because: "the same DOI" }];
    return nameOf(source.citation) === name ? [{ source, because: "the same title, year and first author" }] : [];
  });
}

/** What a work is known by, however its title is punctuated and whatever its case. */
function nameOf(citation: Citation): string {
  return [text(citation["title"]), yearOf(citation), authorsOf(citation)[0]?.family ?? ""]
    .map((part) =>
      part
        .normalize("NFKD")
        .toLowerCase()
        .replace(/[^\p{L}\p{N}]+/gu, " ")
        .trim(),
    )
    .join("|");
}
