import { Link } from "react-router";
import { checks } from "#app/checks/registry.ts";
import type { Check } from "#app/checks/types.ts";
import { paths } from "#app/paths.ts";
import { DataTable, type Column } from "#app/ui/DataTable.tsx";
import { InlineMark } from "#app/ui/MarginMark.tsx";
import { Prose } from "#app/ui/Prose.tsx";
import type { Route } from "./+types/conventions.checks";
import { ConventionsLeaf } from "./conventions/ConventionsLeaf.tsx";

export const meta = () => [{ title: "Checks · Conventions · Tablewright" }];

type CheckEntry = Pick<Check, "code" | "title" | "severities" | "appliesTo">;

const columns: readonly Column<CheckEntry>[] = [
  {
    id: "title",
    head: "Check",
    rowHead: true,
    cell: (check) => <Link to={paths.conventionsCheck(check.code)}>{check.title}</Link>,
  },
  {
    id: "severities",
    head: "A finding",
    cell: (check) =>
      check.severities.map((severity) => (
        <span key={severity} className="mr-3">
          <InlineMark kind={severity} />
        </span>
      )),
  },
  { id: "appliesTo", head: "Asked of", wraps: "wide", cell: (check) => <Prose text={check.appliesTo} /> },
];

/** The entries of the checks; what they run stays on the server. */
export function loader() {
  return {
    checks: checks.map(({ code, title, severities, appliesTo }): CheckEntry => ({
      code,
      title,
      severities,
      appliesTo,
    })),
  };
}

/** Every check, in the order of the examination; each leads to its rule. Readable by everybody. */
export default function ChecksPage({ loaderData }: Route.ComponentProps) {
  return (
    <ConventionsLeaf
      part="checks"
      heading="What is checked"
      lede="Every line of a revision, and every edition before it is published, is asked these questions."
    >
      <p className="mb-5 max-w-[76ch]">
        <InlineMark kind="block" /> stops a line until it is mended or a reviewer sets the finding aside with a reason;{" "}
        <InlineMark kind="look" /> asks a person to look; <InlineMark kind="remark" /> only says something. No check
        changes a number: a repair is a suggestion with its arithmetic, and the steward takes it or leaves it. Each
        check has a page with its formula, where that comes from, and how to read a finding.
      </p>
      <DataTable
        caption="The checks, in the order in which their findings are listed"
        rows={loaderData.checks}
        columns={columns}
        rowKey={(check) => check.code}
        even
      />
    </ConventionsLeaf>
  );
}
