import type { Severity } from "#app/checks/types.ts";

/*
 * Who and what stands behind an edition, put together for its page. Pure.
 */

/** A revision that an edition holds, with the people who stand behind it. */
export interface RevisionBehind {
  id: number;
  title: string;
  /** Lines of it that the edition brought. */
  lines: number;
  /** Everybody who wrote one of them or mended the cells that one was read from. */
  writtenBy: readonly string[];
  /** Whoever accepted lines, those with the most first. */
  reviewedBy: readonly { name: string; lines: number; at: Date }[];
}

/** Sorts hands and acceptances under their revisions. */
export function revisionsBehind(
  revisions: readonly { id: number; title: string; lines: number }[],
  hands: readonly { revisionId: number; name: string }[],
  acceptances: readonly { revisionId: number; name: string; lines: number; at: Date }[],
): RevisionBehind[] {
  return revisions.map(({ id, title, lines }) => ({
    id,
    title,
    lines,
    writtenBy: hands.filter((hand) => hand.revisionId === id).map((hand) => hand.name),
    reviewedBy: acceptances
      .filter((one) => one.revisionId === id)
      .map((one) => ({ name: one.name, lines: one.lines, at: one.at })),
  }));
}

/** One check as it ran over an edition. */
export interface CheckRun {
  code: string;
  title: string;
  version: number;
  /** Whether the check is one of today's, with a page that explains it. */
  known: boolean;
  found: Readonly<Record<Severity, number>>;
}

/**
 * The checks of an examination with what each of them found: today's in their own order, then those that are no longer
 * among them.
 * @param versions version by code, as the examination recorded them
 * @param titles titles of today's checks by code, in their order
 */
export function checksRun(
  versions: Readonly<Record<string, number>>,
  counts: readonly { check: string; severity: Severity; n: number }[],
  titles: ReadonlyMap<string, string>,
): CheckRun[] {
  const order = [...titles.keys()];
  const place = (code: string): number => (titles.has(code) ? order.indexOf(code) : order.length);
  const found = (code: string, severity: Severity): number =>
    counts.find((one) => one.check === code && one.severity === severity)?.n ?? 0;
  return Object.entries(versions)
    .sort(([a], [b]) => place(a) - place(b) || (a < b ? -1 : 1))
    .map(([code, version]) => ({
      code,
      title: titles.get(code) ?? code,
      version,
      known: titles.has(code),
      found: { block: found(code, "block"), look: found(code, "look"), remark: found(code, "remark") },
    }));
}
