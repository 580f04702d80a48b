import { data, Form, Link, redirect } from "react-router";
import { BadRequest } from "#app/http/errors.ts";
import { readForm } from "#app/http/forms.server.ts";
import { forPage, numberInPath } from "#app/http/respond.server.ts";
import { findSheetPage } from "#app/intake/sheetPage.server.ts";
import { delimiterWords, sizeInWords } from "#app/intake/sheetPage.ts";
import type { SheetPage } from "#app/intake/sheetPage.server.ts";
import { paths } from "#app/paths.ts";
import { requireActing } from "#app/people/visitor.server.ts";
import { Button, ButtonLink, usePending } from "#app/ui/Button.tsx";
import { Ribbon } from "#app/ui/EditionLine.tsx";
import { FormErrors } from "#app/ui/FormErrors.tsx";
import { Leaf } from "#app/ui/Leaf.tsx";
import { Note } from "#app/ui/Note.tsx";
import { Prose } from "#app/ui/Prose.tsx";
import { Section } from "#app/ui/Section.tsx";
import { Time } from "#app/ui/Time.tsx";
import type { Route } from "./+types/sheet";
import { actOnSheet } from "./sheet/act.server.ts";
import { EncodingChoice } from "./sheet/EncodingChoice.tsx";
import { PlanForm, PlanShown } from "./sheet/Plan.tsx";
import { Reading } from "./sheet/Reading.tsx";
import { Rows } from "./sheet/Rows.tsx";

export const meta: Route.MetaFunction = ({ params }) => [{ title: `Sheet ${params.sheet} · Tablewright` }];

function afterIn(request: Request): number {
  const text = new URL(request.url).searchParams.get("after") ?? "0";
  if (!/^\d{1,9}$/.test(text)) throw new BadRequest("The row in this address is not a number.");
  return Number(text);
}

export const loader = forPage(async ({ request, params }: Route.LoaderArgs) => {
  const acting = await requireActing(request, "sheet:read");
  return findSheetPage(acting, numberInPath(params.sheet), afterIn(request));
});

export const action = forPage(async ({ request, params }: Route.ActionArgs) => {
  const acting = await requireActing(request, "sheet:work");
  const answer = await actOnSheet(acting, numberInPath(params.sheet), await readForm(request));
  return "goTo" in answer ? redirect(answer.goTo, 303) : data(answer.outcome, { status: answer.status });
});

const HEADINGS: Record<SheetPage["sheet"]["state"], string> = {
  received: "The sheet was received",
  planned: "Read the columns, then the rows",
  reading: "The rows are being read",
  read: "Mend what is wrong, then build the revision",
  built: "The revision is built",
  failed: "The reading stopped",
};

const LEDES: Partial<Record<SheetPage["sheet"]["state"], string>> = {
  planned:
    "This is what each column seems to hold, and why. Change what is wrong; the plan is remembered for sheets with the same heads.",
  read: "Every row is accounted for. A refused row shows the cell and the reason; mend it here or leave the row out.",
};

export default function SheetPageView({ loaderData: page, actionData: failed }: Route.ComponentProps) {
  const { sheet, rows } = page;
  const clean = sheet.state === "read" && rows?.counts.refused === 0;
  return (
    <Leaf
      heading={clean ? "Every row is settled" : HEADINGS[sheet.state]}
      lede={clean ? "What was read below becomes a draft revision against the newest edition." : LEDES[sheet.state]}
      section="sheets"
      bookmark={{ kind: "sheet", label: "Sheet", mark: sheet.id, to: paths.sheets() }}
      ribbon={<SheetRibbon page={page} />}
    >
      {failed && failed.intent !== "confirm" && failed.intent !== "build" && <FormErrors errors={[failed.sentence]} />}
      {sheet.state === "failed" && <Stopped page={page} />}
      {sheet.state === "built" && sheet.revisionId !== null && (
        <p className="mb-6">
          {page.may.revision ? (
            <ButtonLink kind="main" to={paths.revision(sheet.revisionId)}>
              Open revision {sheet.revisionId}
            </ButtonLink>
          ) : (
            `It is revision ${sheet.revisionId}.`
          )}
        </p>
      )}
      {sheet.state === "planned" && page.mayWork ? (
        <>
          <EncodingChoice page={page} />
          <PlanForm page={page} failed={failed?.intent === "confirm" ? failed : undefined} />
        </>
      ) : (
        <Section head="Columns">
          <PlanShown page={page} />
          {sheet.state === "read" && page.mayWork && <Reopen />}
        </Section>
      )}
      {sheet.state === "reading" && <Reading page={page} />}
      {rows && sheet.state !== "reading" && sheet.state !== "failed" && (
        <Rows page={page} rows={rows} failed={failed?.intent === "build" ? failed : undefined} />
      )}
    </Leaf>
  );
}

function SheetRibbon({ page: { sheet } }: { page: SheetPage }) {
  const { dialect } = sheet;
  return (
    <Ribbon
      end={
        <span>
          original{" "}
          <Link to={paths.sheetOriginal(sheet.id)} reloadDocument download>
            as received
          </Link>{" "}
          · SHA-256 <span title={sheet.sha256}>{`${sheet.sha256.slice(0, 4)}…${sheet.sha256.slice(-2)}`}</span>
        </span>
      }
    >
      <span>
        <b>{sheet.name}</b>, {sizeInWords(sheet.bytes)}
        {dialect && `, ${dialect.encoding}, ${delimiterWords[dialect.delimiter]}`}
        {dialect?.decimalComma && ", decimal comma"}
      </span>
      <span>
        received <Time at={sheet.receivedAt} withTime /> from {sheet.by}
      </span>
    </Ribbon>
  );
}

function Stopped({ page: { sheet, mayWork } }: { page: SheetPage }) {
  return (
    <Note kind="look" word="stopped">
      <p>
        <Prose text={sheet.failure ?? ""} />
      </p>
      {mayWork && <Reopen />}
    </Note>
  );
}

function Reopen() {
  const pending = usePending("intent", "reopen");
  return (
    <Form method="post" className="mt-3">
      <Button kind="text" name="intent" value="reopen" pending={pending}>
        Change the columns and read again
      </Button>
    </Form>
  );
}
