import { Link } from "react-router";
import { paths } from "#app/paths.ts";
import type { CheckRun } from "#app/review/editionPage.ts";
import type { EditionExamination, FindingAside } from "#app/review/editionPage.server.ts";
import { type Column, DataTable } from "#app/ui/DataTable.tsx";
import { dateInWords, Time } from "#app/ui/Time.tsx";
import { count } from "#app/ui/figure.ts";
import { Finding } from "#app/ui/Finding.tsx";
import { Prose } from "#app/ui/Prose.tsx";
import { Fine, Lede, Section } from "#app/ui/Section.tsx";

/** What the checks said of an edition as a whole, and which findings a reviewer set aside. */
export function Examined({ examination, number }: { examination: EditionExamination | null; number: number }) {
  if (!examination) {
    return (
      <Section head="The checks">
        <Lede>No examination is on record for edition {number}.</Lede>
      </Section>
    );
  }
  const { lines, at, blocks, looks, remarks, checks, aside, asideCount, policy, inputDigest } = examination;
  const found = [
    [blocks, "blocked", "blocked"],
    [looks, "asked to be looked at", "asked to be looked at"],
    [remarks, "was a remark", "were remarks"],
  ] as const;
  const words = found.filter(([n]) => n > 0).map(([n, one, many]) => `${count(n)} ${n === 1 ? one : many}`);
  return (
    <>
      <Section head="The checks">
        <Lede>
          {lines === 1 ? "Its one line was" : `Its ${count(lines)} lines were`} examined together when it was published,{" "}
          <Time at={at} withTime />
          {words.length > 0 ? `. Of the findings ${words.join(", ")}` : "; nothing was found"}
          {asideCount > 0 && `; ${asideCount === 1 ? "one was" : `${count(asideCount)} were`} set aside with a reason`}.
        </Lede>
        <DataTable
          caption={`The checks that ran over edition ${number}`}
          rows={checks}
          columns={columns}
          rowKey={({ code }) => code}
          className="max-w-[46rem]"
        />
        <Fine>
          Tolerances of policy {policy}. SHA-256 of what the checks saw: <Hash text={inputDigest} />
        </Fine>
      </Section>
      {aside.length > 0 && (
        <Section head="Set aside">
          <Lede>
            Findings that would have stopped the edition, and why a reviewer let the value stand all the same.
          </Lede>
          {aside.map((finding) => (
            <Aside key={finding.id} finding={finding} />
          ))}
          {asideCount > aside.length && (
            <Fine>
              The first {count(aside.length)} of {count(asideCount)}; the pages of the revisions have them all.
            </Fine>
          )}
        </Section>
      )}
    </>
  );
}

const columns: readonly Column<CheckRun>[] = [
  {
    id: "check",
    head: "Check",
    rowHead: true,
    wraps: true,
    cell: ({ code, title, known }) =>
      known ? (
        <Link to={paths.conventionsCheck(code)}>
          <Prose text={title} />
        </Link>
      ) : (
        code
      ),
  },
  { id: "version", head: "Version", figure: true, cell: ({ version }) => version },
  { id: "block", head: "Blocked", figure: true, cell: ({ found }) => count(found.block) },
  { id: "look", head: "To look at", figure: true, cell: ({ found }) => count(found.look) },
  { id: "remark", head: "Remarks", figure: true, cell: ({ found }) => count(found.remark) },
];

function Aside({ finding }: { finding: FindingAside }) {
  const { by, at, reason, species } = finding;
  return (
    <div className="mb-3">
      {species && (
        <p className="font-medium">
          <Prose text={species} />
        </p>
      )}
      <Finding
        finding={{ ...finding, suggestions: [] }}
        title={finding.title}
        setAside={`Set aside by ${by}, ${dateInWords(at, true)}: ${reason}`}
      >
        <Link to={paths.revision(finding.revisionId)}>Revision {finding.revisionId}</Link>
      </Finding>
    </div>
  );
}

/** A digest in hexadecimal, which may break anywhere. */
export function Hash({ text }: { text: string }) {
  return <code className="break-all font-sans">{text}</code>;
}
