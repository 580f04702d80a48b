import { Link, useSearchParams } from "react-router";
import { count } from "./figure.ts";

interface PageTurnerProps {
  /** What is turned, for those who hear it: "Pages of the sources". */
  label: string;
  page: number;
  pages: number;
  pageSize: number;
  /** How many rows there are on all pages. */
  rows: number;
}

/** Which part of a long list is shown, and the way to the other parts. The rest of the address stays as it is. */
export function PageTurner({ label, page: asked, pages, pageSize, rows }: PageTurnerProps) {
  const [search] = useSearchParams();
  if (pages === 1) return null;
  // An address may ask for a page beyond the last.
  const page = Math.min(asked, pages);
  const to = (number: number): string => {
    const query = new URLSearchParams(search);
    query.set("page", String(number));
    return `?${query.toString()}`;
  };
  return (
    <nav className="mt-3 flex flex-wrap gap-4" aria-label={label}>
      <span className="text-soft">
        {count((page - 1) * pageSize + 1)} to {count(Math.min(page * pageSize, rows))} of {count(rows)}
      </span>
      {page > 1 && <Link to={to(page - 1)}>the page before</Link>}
      {page < pages && <Link to={to(page + 1)}>the next page</Link>}
    </nav>
  );
}
