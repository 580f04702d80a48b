import { Form, Link, useSearchParams } from "react-router";
import { acts } from "#app/audit/acts.ts";
import { actInWords, OBJECT_KINDS, readRecordFilter, RECORD_FIELDS } from "#app/audit/recordPage.ts";
import { findRecordPage } from "#app/audit/recordPage.server.ts";
import { pageError, readQuery } from "#app/http/respond.server.ts";
import { paths } from "#app/paths.ts";
import { requireActing } from "#app/people/visitor.server.ts";
import { Button, usePending } from "#app/ui/Button.tsx";
import { EmptyPage } from "#app/ui/EmptyPage.tsx";
import { InlineField, InlineSelect, Sentence } from "#app/ui/Field.tsx";
import { Leaf } from "#app/ui/Leaf.tsx";
import { Table } from "#app/ui/Table.tsx";
import { Time } from "#app/ui/Time.tsx";
import type { Route } from "./+types/record";

export const meta: Route.MetaFunction = () => [{ title: "Record · Tablewright" }];

export async function loader({ request }: Route.LoaderArgs) {
  try {
    const acting = await requireActing(request, "record:read");
    const { filter, wrong } = readRecordFilter(readQuery(request, RECORD_FIELDS));
    return { ...(await findRecordPage(acting, filter)), wrong };
  } catch (error) {
    throw pageError(error);
  }
}

type Entry = Route.ComponentProps["loaderData"]["entries"][number];

export default function RecordPage({ loaderData: { entries, next, wrong } }: Route.ComponentProps) {
  const [search] = useSearchParams();
  const given = (name: string): string => search.get(name) ?? "";
  const pending = usePending();
  const sentences = Object.values(wrong);
  return (
    <Leaf
      heading="Record"
      section="record"
      lede="Who did what, when, to what and why. Entries are only ever added, and each is chained to the one before; nobody can change them, administrators included."
    >
      <Form method="get" action={paths.record()}>
        <Sentence>
          <span>Showing</span>
          <InlineSelect
            label="Act"
            name="act"
            defaultValue={given("act")}
            wrong={wrong.act !== undefined}
            options={[["", "every act"], ...Object.keys(acts).map((act) => [act, nameOf(act)] as const)]}
          />
          <span>on</span>
          <InlineSelect
            label="Kind of thing"
            name="object"
            defaultValue={given("object")}
            wrong={wrong.object !== undefined}
            options={[["", "anything"], ...OBJECT_KINDS.map((kind) => [kind, kind] as const)]}
          />
          <InlineField
            label="Its number"
            name="id"
            defaultValue={given("id")}
            placeholder="any number"
            size={10}
            wrong={wrong.id !== undefined}
          />
          <span>by</span>
          <InlineField
            label="Person"
            name="person"
            defaultValue={given("person")}
            placeholder="anybody"
            size={14}
            wrong={wrong.person !== undefined}
          />
          <span>from</span>
          <InlineField
            label="From day"
            name="from"
            defaultValue={given("from")}
            placeholder="2026-03-12"
            size={10}
            wrong={wrong.from !== undefined}
          />
          <span>to</span>
          <InlineField
            label="To day"
            name="to"
            defaultValue={given("to")}
            placeholder="today"
            size={10}
            wrong={wrong.to !== undefined}
          />
          <Button kind="text" type="submit" pending={pending}>
            show
          </Button>
        </Sentence>
      </Form>
      {sentences.length > 0 && (
        <p role="alert" className="field-error mb-4">
          {sentences.join(" ")}
        </p>
      )}
      {entries.length === 0 ? (
        <EmptyPage>No entry of the record fits.</EmptyPage>
      ) : (
        <Table caption="Entries of the record, newest first" even>
          <thead>
            <tr>
              <th scope="col" className="figure">
                No.
              </th>
              <th scope="col">When</th>
              <th scope="col">Who</th>
              <th scope="col">Did</th>
              <th scope="col">To</th>
              <th scope="col">Detail</th>
            </tr>
          </thead>
          <tbody>
            {entries.map((entry) => (
              <Row key={entry.number} entry={entry} />
            ))}
          </tbody>
        </Table>
      )}
      {next && (
        <p className="mt-4">
          <Link to={paths.record({ ...Object.fromEntries(search), before: next })} rel="next">
            earlier entries
          </Link>
        </p>
      )}
    </Leaf>
  );
}

function nameOf(act: string): string {
  return `${act.split(".", 1)[0] ?? ""}: ${actInWords(act)}`;
}

function Row({ entry }: { entry: Entry }) {
  const to = objectPath(entry.objectKind, entry.objectId);
  return (
    <tr>
      <th scope="row" className="figure">
        {entry.number}
      </th>
      <td className="tight">
        <Time at={entry.at} withTime />
      </td>
      <td>
        {entry.person ?? "the system"}
        {entry.keyName && <span className="text-soft"> with the key “{entry.keyName}”</span>}
      </td>
      <td>{actInWords(entry.act)}</td>
      <td>
        {to ? (
          <Link to={to}>
            {entry.objectKind} {entry.objectId}
          </Link>
        ) : (
          <>
            {entry.objectKind} <span className="text-fine break-all text-soft">{entry.objectId}</span>
          </>
        )}
      </td>
      <td>
        <Detail entry={entry} />
      </td>
    </tr>
  );
}

/** Long details open on a press; short ones stand in the row. */
function Detail({ entry }: { entry: Entry }) {
  const text = JSON.stringify(entry.detail, null, 1);
  if (text === "{}") return null;
  return (
    <details className="disclosure">
      <summary>show</summary>
      <pre className="max-h-80 max-w-[32rem] overflow-auto font-sans text-fine whitespace-pre-wrap" tabIndex={0}>
        {text}
        {"\n"}hash {entry.hash}
        {entry.requestId && `\nrequest ${entry.requestId}`}
      </pre>
    </details>
  );
}

function objectPath(kind: string, id: string): string | null {
  if (kind === "revision") return paths.revision(id);
  if (kind === "sheet") return paths.sheet(id);
  if (kind === "edition" && /^\d+$/.test(id)) return paths.edition(Number(id));
  return null;
}
