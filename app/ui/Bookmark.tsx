import { Link } from "react-router";
import { paths } from "#app/paths.ts";

export interface BookmarkProps {
  /** `newest` is green, `older` ochre, `draft` hatched; `sheet` green for a sheet's own pages, `plain` slate for the rest. */
  kind: "newest" | "older" | "draft" | "sheet" | "plain";
  /** One or two short words: "Edition", "Draft of", "Sheet". */
  label: string;
  /** What it says: an edition's number, "6·7" for two. */
  mark: string | number;
  /** Where it leads; the list of editions unless said. */
  to?: string | undefined;
}

const meanings: Record<BookmarkProps["kind"], string> = {
  newest: "the newest edition",
  older: "a newer edition stands",
  draft: "not published",
  sheet: "",
  plain: "",
};

/** The bookmark that hangs in the margin of every leaf and says what you read. */
export function Bookmark({ kind, label, mark, to = paths.editions() }: BookmarkProps) {
  return (
    <Link className={`bookmark bookmark-${kind}`} to={to}>
      <small>{label}</small>
      {mark}
      {meanings[kind] && <span className="said">, {meanings[kind]}</span>}
    </Link>
  );
}

/** The bookmark of an edition: green while it is the newest, ochre once another stands. */
export function editionBookmark(number: number, newest: number | null): BookmarkProps {
  return { kind: newest === null || number >= newest ? "newest" : "older", label: "Edition", mark: number };
}

/** The bookmark of what would go into the next edition. */
export function draftBookmark(current: number | null): BookmarkProps {
  return { kind: "draft", label: "Draft of", mark: (current ?? 0) + 1 };
}
