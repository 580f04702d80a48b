import { useEffect, useRef } from "react";
import { Form, Link, useFetcher } from "react-router";
import type { SheetPage } from "#app/intake/sheetPage.server.ts";
import type { ReadRowLine, RefusedRow } from "#app/intake/sheetPage.ts";
import { ANSWER } from "#app/intake/meaning.ts";
import type { Repair } from "#app/intake/readRows.ts";
import { paths } from "#app/paths.ts";
import { isProperty, propertyInfo } from "#app/thermo/property.ts";
import { Button, usePending } from "#app/ui/Button.tsx";
import { DecisionBar } from "#app/ui/DecisionBar.tsx";
import { Field, InlineField, TextArea } from "#app/ui/Field.tsx";
import { plainField } from "#app/ui/fieldState.ts";
import { count } from "#app/ui/figure.ts";
import { Formula } from "#app/ui/Formula.tsx";
import { FormErrors } from "#app/ui/FormErrors.tsx";
import { MarginHead, MarginMark } from "#app/ui/MarginMark.tsx";
import { Prose } from "#app/ui/Prose.tsx";
import { Fine, Section } from "#app/ui/Section.tsx";
import { SpeciesName } from "#app/ui/SpeciesName.tsx";
import { Symbol } from "#app/ui/Symbol.tsx";
import { RowUnder, Table } from "#app/ui/Table.tsx";
import type { RepairOutcome, SheetOutcome } from "./outcome.ts";
import { SheetText } from "./SheetText.tsx";

type PageRows = NonNullable<SheetPage["rows"]>;

/** What became of the rows: counts, the refused ones with the cell that is wrong, what was read, and the way on. */
export function Rows({ page, rows, failed }: { page: SheetPage; rows: PageRows; failed: SheetOutcome | undefined }) {
  const { counts } = rows;
  useFocusOnNext(counts);
  const open = page.sheet.state === "read" && page.mayWork;
  return (
    <>
      <Section head="Rows" id="rows">
        <p role="status" id="rows-status" tabIndex={-1}>
          {rowsInWords(page.sheet.rowsTotal)} = {count(counts.read)} read + {count(counts.refused + counts.leftOut)}{" "}
          refused + {count(counts.skipped)} skipped
          {counts.leftOut > 0 && ` · ${count(counts.leftOut)} of the refused left out`}
          {" · "}
          {count(counts.values)} {counts.values === 1 ? "value" : "values"} of{" "}
          {count(rows.species.known + rows.species.new)} species, {count(rows.species.new)} of them new
        </p>
        <Asides rows={rows} page={page} />
        {rows.refused.length > 0 && <RefusedTable page={page} rows={rows} open={open} />}
      </Section>
      {rows.read.length > 0 && <ReadTable rows={rows} />}
      {open && <Build page={page} rows={rows} failed={failed} />}
    </>
  );
}

const rowsInWords = (n: number): string => `${count(n)} ${n === 1 ? "row" : "rows"}`;

/** Why rows were skipped and what was taken for granted, for whoever wants to know. */
function Asides({ rows, page }: { rows: PageRows; page: SheetPage }) {
  return (
    <div className="flex flex-wrap gap-x-6 gap-y-1 my-2">
      {rows.skipped.length > 0 && (
        <details className="disclosure">
          <summary>why rows were skipped</summary>
          <ul className="list-disc pl-5 my-2">
            {rows.skipped.map(({ reason, n, first }) => (
              <li key={reason}>
                {reason}: {n === 1 ? `row ${first}` : `${count(n)} rows, the first is row ${first}`}
              </li>
            ))}
          </ul>
        </details>
      )}
      {rows.notes.length > 0 && (
        <details className="disclosure">
          <summary>what was taken for granted</summary>
          <ul className="list-disc pl-5 my-2 max-w-[74ch]">
            {rows.notes.map(({ note, rows: numbers }) => (
              <li key={note}>
                {numbers.length === 1 ? "Row" : "Rows"} {numbers.slice(0, 8).join(", ")}
                {numbers.length > 8 && ` and ${count(numbers.length - 8)} more`}: <Prose text={note} />
              </li>
            ))}
          </ul>
        </details>
      )}
      {rows.refused.length > 0 && (
        <Link to={paths.sheetFindings(page.sheet.id)} reloadDocument download>
          refused rows as a file
        </Link>
      )}
    </div>
  );
}

function RefusedTable({ page, rows, open }: { page: SheetPage; rows: PageRows; open: boolean }) {
  const asked = askedTwice(rows.refused);
  const shown = page.columns.flatMap((column, index) => (column.means === "ignore" ? [] : [{ ...column, index }]));
  return (
    <>
      <Table caption="Refused rows" marked even>
        <thead>
          <tr>
            <MarginHead />
            <th scope="col" className="figure">
              Row
            </th>
            {shown.map((column) => (
              <th key={column.index} scope="col" className={isFigure(column.means) ? "figure" : undefined}>
                <SheetText text={column.name} />
              </th>
            ))}
          </tr>
        </thead>
        <tbody>
          {rows.refused.map((row) => (
            <Refused key={row.number} row={row} shown={shown} page={page} open={open} asked={asked} />
          ))}
        </tbody>
      </Table>
      {(rows.after !== null || rows.next !== null) && (
        <Fine>
          {rows.after !== null && <Link to={`${paths.sheet(page.sheet.id)}#rows`}>from the first refused row</Link>}
          {rows.after !== null && rows.next !== null && " · "}
          {rows.next !== null && (
            <Link to={`${paths.sheet(page.sheet.id)}?after=${rows.next}#rows`}>further refused rows</Link>
          )}
        </Fine>
      )}
    </>
  );
}

const questionOf = (sentence: string, repair: Repair): string => `${repair.column} ${repair.text} ${sentence}`;

/** The questions that more than one of these rows asks, so that one answer can settle them all. */
function askedTwice(rows: readonly RefusedRow[]): ReadonlySet<string> {
  const counts = new Map<string, number>();
  for (const { problems, leftOut } of rows) {
    if (leftOut) continue;
    const own = new Set(
      problems.flatMap(({ sentence, repairs }) => repairs.map((repair) => questionOf(sentence, repair))),
    );
    for (const question of own) counts.set(question, (counts.get(question) ?? 0) + 1);
  }
  return new Set([...counts].filter(([, n]) => n > 1).map(([question]) => question));
}

type ShownColumn = SheetPage["columns"][number] & { index: number };

const isFigure = (means: ShownColumn["means"]): boolean =>
  ["value", "uncertainty", "anyValue", "anyUncertainty", "molarMass"].includes(means);

function Refused({
  row,
  shown,
  page,
  open,
  asked,
}: {
  row: RefusedRow;
  shown: readonly ShownColumn[];
  page: SheetPage;
  open: boolean;
  /** Questions that several rows ask. */
  asked: ReadonlySet<string>;
}) {
  return (
    <>
      <tr id={`row-${row.number}`} className={row.leftOut ? "text-soft" : undefined}>
        <MarginMark kind={row.leftOut ? "remark" : "block"} word={row.leftOut ? "left out" : undefined} />
        <th scope="row" className="figure">
          {row.number}
        </th>
        {shown.map((column) => {
          const cell = row.cells.find((one) => one.column === column.index);
          const text = cell?.text ?? "";
          return (
            <td key={column.index} className={isFigure(column.means) ? "figure" : undefined}>
              {open && cell?.wrong ? (
                <CellForm page={page} row={row.number} column={column} text={text} />
              ) : column.means === "formula" ? (
                <Formula printed={text} />
              ) : (
                <SheetText text={text} />
              )}
              {cell?.original !== null && cell?.original !== undefined && (
                <span className="block fine">
                  was <SheetText text={cell.original === "" ? "empty" : cell.original} />
                </span>
              )}
            </td>
          );
        })}
      </tr>
      <RowUnder columns={shown.length + 2} marked>
        {row.problems.map((problem, index) => (
          <div key={index}>
            <Prose text={problem.sentence} />{" "}
            {open &&
              problem.repairs.map((repair) => (
                <RepairButton
                  key={`${repair.column} ${repair.text}`}
                  page={page}
                  row={row}
                  repair={repair}
                  isFormula={shown.some((one) => one.index === repair.column && one.means === "formula")}
                  alike={asked.has(questionOf(problem.sentence, repair))}
                />
              ))}
          </div>
        ))}
        {open && !row.leftOut && (
          <Form method="post">
            <input type="hidden" name="row" value={row.number} />
            <Button kind="text" name="intent" value="leave-out" aria-label={`Leave row ${row.number} out`}>
              Leave the row out
            </Button>
          </Form>
        )}
      </RowUnder>
    </>
  );
}

/** What a form that mends a cell sends. */
interface Mend {
  sheetId: number;
  row: number;
  column: number;
  was: string;
}

/**
 * A form that mends a cell: in the background where there are scripts, by the page's own action where there are none.
 * `children` is given whether it is on the way.
 */
function MendForm({
  mend,
  className,
  children,
}: {
  mend: Mend;
  className: string;
  children: (pending: boolean) => React.ReactNode;
}) {
  const fetcher = useFetcher<RepairOutcome>();
  const problem = fetcher.data && !fetcher.data.ok ? fetcher.data.sentence : null;
  return (
    <Form
      method="post"
      className={className}
      onSubmit={(event) => {
        event.preventDefault();
        void fetcher.submit(event.currentTarget, {
          method: "post",
          action: paths.resource(`sheets/${mend.sheetId}/repair`),
        });
      }}
    >
      <input type="hidden" name="intent" value="repair" />
      <input type="hidden" name="row" value={mend.row} />
      <input type="hidden" name="column" value={mend.column} />
      <input type="hidden" name="was" value={mend.was} />
      {children(fetcher.state !== "idle")}
      {problem && (
        <span className="block whitespace-normal is-block" role="alert">
          {problem}
        </span>
      )}
    </Form>
  );
}

/** The wrong cell itself, to be written over: Enter mends it. */
function CellForm({ page, row, column, text }: { page: SheetPage; row: number; column: ShownColumn; text: string }) {
  return (
    <MendForm mend={{ sheetId: page.sheet.id, row, column: column.index, was: text }} className="whitespace-nowrap">
      {(pending) => (
        <>
          <InlineField
            key={text}
            name="becomes"
            label={`Row ${row}, ${column.name}`}
            defaultValue={text}
            figure={isFigure(column.means)}
            size={Math.min(Math.max(text.length + 2, 8), 32)}
            autoComplete="off"
            data-wrong-cell
            wrong
          />
          <span className="ml-1.5" />
          <Button kind="text" pending={pending} aria-label={`Mend row ${row}, ${column.name}`}>
            mend
          </Button>
        </>
      )}
    </MendForm>
  );
}

/** A repair that is one press away; where other rows ask the same, one press more mends them all. */
function RepairButton({
  page,
  row,
  repair,
  isFormula,
  alike,
}: {
  page: SheetPage;
  row: RefusedRow;
  repair: Repair;
  isFormula: boolean;
  alike: boolean;
}) {
  const was = repair.column === ANSWER ? (row.answer ?? "") : (row.cells[repair.column]?.text ?? "");
  const mend = { sheetId: page.sheet.id, row: row.number, column: repair.column, was };
  return (
    <>
      <MendForm mend={mend} className="mr-3 inline-block">
        {(pending) => (
          <>
            <input type="hidden" name="becomes" value={repair.text} />
            <Button kind="text" pending={pending}>
              {isFormula ? (
                <>
                  Take <Formula printed={repair.text} />
                </>
              ) : (
                <Prose text={repair.label} />
              )}
            </Button>
          </>
        )}
      </MendForm>
      {alike && (
        <MendForm mend={mend} className="mr-3 inline-block">
          {(pending) => (
            <>
              <input type="hidden" name="becomes" value={repair.text} />
              <input type="hidden" name="alike" value="yes" />
              <Button kind="text" pending={pending} aria-label={`${repair.label}, in every row that asks this`}>
                in every such row
              </Button>
            </>
          )}
        </MendForm>
      )}
    </>
  );
}

/** A row that was settled leaves the page and takes the focus with it: it goes on to the next wrong cell. */
function useFocusOnNext(counts: PageRows["counts"]): void {
  const before = useRef(counts);
  useEffect(() => {
    if (before.current.refused === counts.refused && before.current.leftOut === counts.leftOut) return;
    before.current = counts;
    if (document.activeElement !== null && document.activeElement !== document.body) return;
    const next = document.querySelector<HTMLElement>("[data-wrong-cell]") ?? document.getElementById("rows-status");
    next?.focus();
  }, [counts]);
}

function ReadTable({ rows }: { rows: PageRows }) {
  const more = rows.counts.read - rows.read.length;
  const keyed = rows.read.some((row) => row.sourceKey !== null);
  const valued = rows.counts.values > 0;
  const converted = rows.read.some((row) => row.values.some((value) => value.note !== null));
  return (
    <Section head="What was read">
      <Table caption="The first rows that were read" className="max-w-[72rem]">
        <thead>
          <tr>
            <th scope="col" className="figure">
              Row
            </th>
            <th scope="col">Species</th>
            <th scope="col">In the table</th>
            {valued && <th scope="col">Values, in the table’s units</th>}
            {converted && <th scope="col">Converted</th>}
            {keyed && <th scope="col">Source</th>}
          </tr>
        </thead>
        <tbody>
          {rows.read.map((row) => (
            <tr key={row.number}>
              <td className="figure">{row.number}</td>
              <th scope="row">
                <SpeciesName speciesKey={row.key} />
              </th>
              <td className="text-soft">
                {row.isNew ? "new" : "known"}
                {row.adds && <> · gets {additionInWords(row.adds)}</>}
              </td>
              {valued && (
                <td>
                  {row.values.map((value, index) => (
                    <ShownValue key={value.property} value={value} first={index === 0} />
                  ))}
                </td>
              )}
              {converted && (
                <td className="text-soft">
                  <Conversions values={row.values} />
                </td>
              )}
              {keyed && <td>{row.sourceKey && <SheetText text={row.sourceKey} />}</td>}
            </tr>
          ))}
        </tbody>
      </Table>
      {more > 0 && <Fine>and {count(more)} more rows.</Fine>}
    </Section>
  );
}

/** "the name water, CAS 7732-18-5, the synonym steam" */
function additionInWords({ name, cas, synonyms }: NonNullable<ReadRowLine["adds"]>): string {
  const parts = [name === null ? "" : `the name ${name}`, cas === null ? "" : `CAS ${cas}`];
  if (synonyms.length > 0)
    parts.push(`${synonyms.length === 1 ? "the synonym" : "the synonyms"} ${synonyms.join(", ")}`);
  return parts.filter(Boolean).join(", ");
}

/** What was done to the figures of the sheet, each conversion once with the quantities it was done to. */
function Conversions({ values }: { values: ReadRowLine["values"] }) {
  const byNote = new Map<string, string[]>();
  for (const { property, note } of values) {
    // A step of nothing is kept on the line, and says nothing here.
    const shown = (note ?? "").replace(/(?:; )?1 atm to 1 bar: no change$/, "");
    if (shown === "" || !isProperty(property)) continue;
    byNote.set(shown, [...(byNote.get(shown) ?? []), propertyInfo[property].symbol]);
  }
  return [...byNote].map(([note, symbols], index) => (
    <span key={note} className="mr-2">
      {index > 0 && "· "}
      <Prose text={`${symbols.join(", ")} ${note}`} />
    </span>
  ));
}

function ShownValue({ value, first }: { value: ReadRowLine["values"][number]; first: boolean }) {
  if (!isProperty(value.property)) return null;
  return (
    <span className="whitespace-nowrap">
      {!first && <span className="mr-2">,</span>}
      <Symbol of={propertyInfo[value.property].symbol} /> {value.digits.replace("-", "−")}
    </span>
  );
}

/** The revision that comes of it: a title, and the act at the foot of the window. */
function Build({ page, rows, failed }: { page: SheetPage; rows: PageRows; failed: SheetOutcome | undefined }) {
  const { counts } = rows;
  const building = usePending("intent", "build");
  const leaving = usePending("intent", "leave-all-out");
  const title = plainField("title", {
    initialValue: failed?.typed["title"] ?? page.sheet.name.replace(/\.\w{1,4}$/, ""),
    errors: (failed?.errors ?? []).map((error) => error.detail),
    maxLength: 200,
  });
  const summary = plainField("summary", { initialValue: failed?.typed["summary"] ?? "", maxLength: 5000 });
  const settled = counts.refused === 0;
  return (
    <>
      <Section head="The revision">
        {failed && (
          <FormErrors errors={failed.errors.length > 0 ? [] : [failed.sentence]} fields={[[title, "Title"]]} />
        )}
        <Form method="post" id="build" className="max-w-[40rem]">
          <Field field={title} label="Title" />
          <TextArea field={summary} label="What it is about (may stay empty)" rows={2} />
        </Form>
      </Section>
      <DecisionBar label="Build" end="repairs are kept beside the original, with your name">
        {settled && counts.read > 0 && (
          <Button kind="main" form="build" name="intent" value="build" pending={building} pendingLabel="Building…">
            Build the revision from {count(counts.read)} {counts.read === 1 ? "row" : "rows"}
          </Button>
        )}
        {!settled && (
          <Form method="post">
            <Button name="intent" value="leave-all-out" pending={leaving}>
              Leave the {count(counts.refused)} refused {counts.refused === 1 ? "row" : "rows"} out
            </Button>
          </Form>
        )}
        {!settled && <span>then the revision is built from {count(counts.read)} rows</span>}
        {settled && counts.read === 0 && <span>No row was read, so there is nothing to build.</span>}
      </DecisionBar>
    </>
  );
}
