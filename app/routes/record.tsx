import { Form, Link, useSearchParams } from "react-router";
import { acts } from "#app/audit/acts.ts";
import { OBJECT_KINDS, readRecordFilter, RECORD_FIELDS, SYSTEM } from "#app/audit/recordPage.ts";
import { findRecordActors, findRecordPage } from "#app/audit/recordPage.server.ts";
import { actInWords, detailInWords } from "#app/audit/words.ts";
import { forPage, readQuery } from "#app/http/respond.server.ts";
import { paths } from "#app/paths.ts";
import { requireActing } from "#app/people/visitor.server.ts";
import { Button, usePending } from "#app/ui/Button.tsx";
import { EmptyPage } from "#app/ui/EmptyPage.tsx";
import { InlineField, InlineSelect, Sentence } from "#app/ui/Field.tsx";
import { Leaf } from "#app/ui/Leaf.tsx";
import { Lede, Section } from "#app/ui/Section.tsx";
import { Table } from "#app/ui/Table.tsx";
import { Time } from "#app/ui/Time.tsx";
import type { Route } from "./+types/record";

export const meta: Route.MetaFunction = () => [{ title: "Record · Tablewright" }];

/** Lines of an entry's detail that stand open in its row: the short ones. */
const WORDS_SHOWN = 3;
const SHORT = 140;

export const loader = forPage(async ({ request }: Route.LoaderArgs) => {
  const acting = await requireActing(request, "record:read");
  const { filter, wrong } = readRecordFilter(readQuery(request, RECORD_FIELDS));
  const [page, actors] = await Promise.all([findRecordPage(acting, filter), findRecordActors(acting)]);
  return {
    next: page.next,
    entries: page.entries.map((entry) => ({ ...entry, words: detailInWords(entry.detail) })),
    actors,
    wrong,
  };
});

type Entry = Route.ComponentProps["loaderData"]["entries"][number];

export default function RecordPage({ loaderData: { entries, next, actors, wrong } }: Route.ComponentProps) {
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
      <Form method="get" action={paths.record()} key={search.toString()}>
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
          <InlineSelect
            label="Person"
            name="person"
            defaultValue={given("person")}
            wrong={wrong.person !== undefined}
            options={[
              ["", "anybody"],
              ...actors.map(({ id, name }) => [id, name] as const),
              [SYSTEM, "the service itself"],
            ]}
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
        <EmptyPage start={<Link to={paths.record()}>Show every entry</Link>}>No entry of the record fits.</EmptyPage>
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
      <p className="mt-4 flex flex-wrap gap-x-6">
        {next && (
          <Link to={paths.record({ ...Object.fromEntries(search), before: next })} rel="next">
            earlier entries
          </Link>
        )}
        {given("before") !== "" && (
          <Link to={paths.record({ ...Object.fromEntries(search), before: null })}>back to the newest</Link>
        )}
      </p>
      <Take wrong={wrong} />
    </Leaf>
  );
}

/** The filtered record as a file, and how the chain is verified from it. */
function Take({ wrong }: { wrong: Route.ComponentProps["loaderData"]["wrong"] }) {
  const [search] = useSearchParams();
  return (
    <Section head="Take it with you">
      <Lede>
        Every entry that fits the sentence above, oldest first, with the hashes of the chain. Taking it is put on record
        too.
      </Lede>
      <Form method="post" action={paths.resource("record/export")} reloadDocument className="flex flex-wrap gap-3">
        {[...search]
          .filter(([name]) => name !== "before" && !Object.hasOwn(wrong, name))
          .map(([name, value]) => (
            <input key={name} type="hidden" name={name} value={value} />
          ))}
        <Button name="format" value="jsonl">
          Download as JSON Lines
        </Button>
        <Button name="format" value="csv">
          Download as CSV
        </Button>
      </Form>
      <details className="disclosure mt-4">
        <summary>How to verify the chain outside</summary>
        <div className="max-w-[64ch]">
          <p className="mt-2">
            Take the whole record as JSON Lines: one entry a line. Of each entry leave out <b>hash</b> and <b>person</b>
            , write the rest as canonical JSON (RFC 8785) and compute its SHA-256 in hexadecimal: it is the entry’s{" "}
            <b>hash</b>. Its <b>previousHash</b> is the hash of the entry numbered one less; the first carries 64 zeros.
            A changed, missing or exchanged entry breaks the chain from there on.
          </p>
          <p className="mt-2">
            A filtered file holds each entry’s own hash, but not always the entry before. In CSV a text that begins like
            a formula has an apostrophe before it, so hashes are computed from JSON Lines. On the machine of the service{" "}
            <b>npm run verify</b> walks the whole chain.
          </p>
        </div>
      </details>
    </Section>
  );
}

function nameOf(act: string): string {
  return `${act.split(".", 1)[0] ?? ""}: ${actInWords(act)}`;
}

function Row({ entry }: { entry: Entry }) {
  const open = entry.words
    .filter(({ body }) => body.length <= SHORT && !/^[0-9a-f]{64}$/.test(body))
    .slice(0, WORDS_SHOWN);
  const folded = entry.words.filter((line) => !open.includes(line));
  const to = objectPath(entry.objectKind, entry.objectId);
  const own = entry.objectKind === "person" && entry.objectId === entry.actor;
  const name = own ? "own account" : (entry.objectName ?? entry.objectId);
  return (
    <tr>
      <th scope="row" className="figure">
        {entry.number}
      </th>
      <td className="tight">
        <Time at={entry.at} withTime />
      </td>
      <td className="tight">
        {entry.person && entry.actor ? (
          <Link to={paths.person(entry.actor)}>{entry.person}</Link>
        ) : (
          "the service itself"
        )}
        {entry.keyName && <span className="block text-soft">with the key “{entry.keyName}”</span>}
      </td>
      <td className="tight">{actInWords(entry.act)}</td>
      <td className={to ? "tight" : undefined}>
        {!own && <>{entry.objectKind} </>}
        {to ? <Link to={to}>{name}</Link> : <span className="break-all text-soft">{name}</span>}
      </td>
      <td className="wide">
        {open.length > 0 && (
          <p className="break-words">
            {open.map(({ label, body }, index) => (
              <span key={label}>
                {index > 0 && " · "}
                <span className="text-soft">{label}</span> {body}
              </span>
            ))}
          </p>
        )}
        <details className="disclosure">
          <summary>{folded.length > 0 ? "more, and its place in the chain" : "its place in the chain"}</summary>
          <dl className="max-w-[36rem] text-fine">
            {folded.map(({ label, body }) => (
              <Fact key={label} label={label} body={body} />
            ))}
            <Fact label="hash" body={entry.hash} />
            <Fact
              label={entry.number === "1" ? "before it" : `hash of ${Number(entry.number) - 1}`}
              body={entry.previousHash}
            />
            {entry.requestId && <Fact label="request" body={entry.requestId} />}
            {entry.objectName && <Fact label={entry.objectKind} body={entry.objectId} />}
          </dl>
        </details>
      </td>
    </tr>
  );
}

function Fact({ label, body }: { label: string; body: string }) {
  return (
    <div className="py-0.5">
      <dt className="inline text-soft">{label}</dt> <dd className="inline break-all">{body}</dd>
    </div>
  );
}

function objectPath(kind: string, id: string): string | null {
  if (kind === "revision") return paths.revision(id);
  if (kind === "sheet") return paths.sheet(id);
  if (kind === "person" && id !== "unknown") return paths.person(id);
  if (kind === "edition" && /^\d+$/.test(id)) return paths.edition(Number(id));
  return null;
}
