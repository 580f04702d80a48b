import { Link } from "react-router";
import type { EditionFrame } from "#app/editions/frame.server.ts";
import { paths } from "#app/paths.ts";
import { editionBookmark } from "#app/ui/Bookmark.tsx";
import { EditionLine } from "#app/ui/EditionLine.tsx";
import { count } from "#app/ui/figure.ts";
import { Notice } from "#app/ui/Notice.tsx";
import { useRootData } from "#app/ui/useRootData.ts";

/** The newest edition this tab knows of: the frame's, or one that was published since the page was kept. */
export function useNewest(frame: EditionFrame): number {
  return Math.max(frame.newest, useRootData().currentEdition ?? 0);
}

/**
 * Bookmark and ribbon of a page pinned to an edition, as `Leaf` takes them. `from` is the first edition that holds what the
 * page is about.
 */
export function useEditionFrame(frame: EditionFrame, { counts = false, from = 1 } = {}) {
  const newest = useNewest(frame);
  const editions = frame.editions.includes(newest) ? frame.editions : [newest, ...frame.editions];
  return {
    bookmark: editionBookmark(frame.number, newest),
    ribbon: (
      <EditionLine
        edition={{
          number: frame.number,
          publishedAt: frame.publishedAt,
          withdrawn: frame.withdrawn && `by edition ${frame.withdrawn.edition}`,
        }}
        newest={newest}
        editions={editions}
        from={from}
        end={
          <>
            <Link to={`${paths.edition(frame.number)}#cite`}>cite</Link>
            <a href={paths.tableDownload(frame.number)} download>
              download
            </a>
          </>
        }
      >
        {counts && (
          <span>
            {count(frame.speciesCount)} species · {count(frame.valueCount)} values
          </span>
        )}
        <span>298.15 K · 100 kPa</span>
      </EditionLine>
    ),
  };
}

/** Says at the head of a page that its edition was withdrawn, why, and where to read instead. */
export function WithdrawnNotice({ frame }: { frame: EditionFrame }) {
  if (!frame.withdrawn) return null;
  const { edition, reason } = frame.withdrawn;
  return (
    <Notice word="withdrawn" text={`Edition ${frame.number} was withdrawn by edition ${edition}: ${reason}`}>
      <p>
        Its values stay here as they were published. <Link to={paths.edition(edition)}>Read edition {edition}</Link>
      </p>
    </Notice>
  );
}
