import { Link, useLocation } from "react-router";
import { inEdition, paths } from "#app/paths.ts";
import { Time } from "./Time.tsx";

/** The line under the head of every leaf: what is read, at the left; what can be done with it, at the right. */
export function Ribbon({ children, end }: { children: React.ReactNode; end?: React.ReactNode }) {
  return (
    <div className="ribbon">
      {children}
      {end && <div className="ribbon-end flex flex-wrap gap-x-3">{end}</div>}
    </div>
  );
}

interface EditionLineProps {
  edition: { number: number; publishedAt: Date | string; withdrawn?: string | null | undefined };
  /** Number of the newest edition. */
  newest: number;
  /** All editions, newest first, to change over to; the page stays at the same species or filter. */
  editions?: readonly number[] | undefined;
  /** The first edition that holds what the page is about; earlier ones are named and lead nowhere. */
  from?: number | undefined;
  /** More at the left: counts, conditions. */
  children?: React.ReactNode;
  /** More at the right: cite, download. */
  end?: React.ReactNode;
}

/** Which edition you read, when it was published, whether a newer one stands, and the way to another. */
export function EditionLine({ edition, newest, editions, from = 1, children, end }: EditionLineProps) {
  const { pathname, search } = useLocation();
  const here = pathname + search;
  return (
    <Ribbon
      end={
        <>
          {edition.number === newest ? (
            <span>the newest edition</span>
          ) : (
            <span className="is-look">
              edition {newest} stands: <Link to={inEdition(here, newest) ?? paths.edition(newest)}>read it there</Link>
            </span>
          )}
          {editions && editions.length > 1 && (
            <EditionChooser here={here} number={edition.number} editions={editions} from={from} />
          )}
          {end}
        </>
      }
    >
      <span>
        <b>Edition {edition.number}</b>, published <Time at={edition.publishedAt} />
        {edition.withdrawn && <span className="is-block"> · withdrawn: {edition.withdrawn}</span>}
      </span>
      {children}
    </Ribbon>
  );
}

function EditionChooser({
  here,
  number,
  editions,
  from,
}: {
  here: string;
  number: number;
  editions: readonly number[];
  from: number;
}) {
  return (
    <details className="disclosure relative" id="other-editions">
      <summary>other editions</summary>
      <ul className="menu right-0">
        {editions.map((other) => (
          <li key={other}>
            {other < from ? (
              <span className="text-soft">
                <span>Edition {other}</span> <span>not in it yet</span>
              </span>
            ) : (
              <Link
                to={inEdition(here, other) ?? paths.edition(other)}
                aria-current={other === number ? "page" : undefined}
              >
                <span>Edition {other}</span>
                {other === number && <span className="text-soft">this one</span>}
              </Link>
            )}
          </li>
        ))}
      </ul>
    </details>
  );
}
