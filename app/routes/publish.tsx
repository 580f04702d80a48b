import { data, Form, Link, redirect } from "react-router";
import { DomainError, Invalid, NotFound } from "#app/http/errors.ts";
import { readForm } from "#app/http/forms.server.ts";
import { requestContext } from "#app/http/requestContext.server.ts";
import { pageError } from "#app/http/respond.server.ts";
import { paths } from "#app/paths.ts";
import { asksPassword, demandFresh } from "#app/people/signing.server.ts";
import { requireVisitor } from "#app/people/visitor.server.ts";
import { publishEdition } from "#app/review/publish.server.ts";
import { findNewestPublication, findPublishPage } from "#app/review/publishPage.server.ts";
import { countsInWords } from "#app/review/publishPage.ts";
import { publishForm, readFields } from "#app/review/revisionPageForms.ts";
import { draftBookmark } from "#app/ui/Bookmark.tsx";
import { Button, ButtonLink, usePending } from "#app/ui/Button.tsx";
import { Caution } from "#app/ui/Caution.tsx";
import { Ribbon } from "#app/ui/EditionLine.tsx";
import { EmptyPage } from "#app/ui/EmptyPage.tsx";
import { Field, Select, TextArea } from "#app/ui/Field.tsx";
import { plainField } from "#app/ui/fieldState.ts";
import { count } from "#app/ui/figure.ts";
import { Finding } from "#app/ui/Finding.tsx";
import { FormErrors } from "#app/ui/FormErrors.tsx";
import { Leaf } from "#app/ui/Leaf.tsx";
import { Note } from "#app/ui/Note.tsx";
import { Section } from "#app/ui/Section.tsx";
import { Time } from "#app/ui/Time.tsx";
import { useRootData } from "#app/ui/useRootData.ts";
import type { Route } from "./+types/publish";
import { NextLines } from "./publish/NextLines.tsx";

export const meta: Route.MetaFunction = () => [{ title: "Next edition · Tablewright" }];

/** What waits is read anew after a refusal too: it is why it was refused. */
export function shouldRevalidate() {
  return true;
}

export async function loader({ request }: Route.LoaderArgs) {
  try {
    const { acting, sessionId } = await requireVisitor(request, "edition:publish");
    return { ...(await findPublishPage(acting)), asksPassword: await asksPassword(acting, sessionId) };
  } catch (error) {
    throw pageError(error);
  }
}

type Page = Route.ComponentProps["loaderData"];

/** What a form of this page came to, when it did not publish. */
interface Answer {
  step: "write" | "confirm";
  sentence: string;
  /** The edition that somebody published first. */
  made: { number: number; publisher: string; publishedAt: Date } | null;
  errors: Readonly<Record<string, readonly string[]>>;
  typed: Readonly<Record<string, string>>;
}

export async function action({ request, context }: Route.ActionArgs) {
  try {
    const { acting, sessionId } = await requireVisitor(request, "edition:publish");
    const form = await readForm(request);
    const typed: Record<string, string> = {};
    for (const [name, value] of form) if (typeof value === "string" && name !== "password") typed[name] = value;
    const answer = (status: number, rest: Partial<Answer>) =>
      data<Answer>({ step: "write", sentence: "", made: null, errors: {}, typed, ...rest }, { status });

    // Going back to the text asks for nothing; what was typed stands in the fields again.
    if (typed["intent"] === "change") return answer(200, {});
    const reading = readFields(form, publishForm);
    if (!reading.ok) {
      const shown = ["notes", "licence", "withdraws", "withdrawalReason"];
      const above = Object.entries(reading.errors).flatMap(([name, texts]) => (shown.includes(name) ? [] : texts));
      return answer(422, { sentence: above[0] ?? "", errors: reading.errors });
    }
    const { intent, notes, licence, withdraws, withdrawalReason, expectedPrevious, listDigest } = reading.value;
    if (intent !== "publish") return answer(200, { step: "confirm" });
    try {
      const { address } = context.get(requestContext);
      await demandFresh(acting, sessionId, reading.value.password, { address, requestId: acting.requestId });
    } catch (error) {
      if (!(error instanceof Invalid)) throw error;
      return answer(error.status, { step: "confirm", errors: { password: [error.message] } });
    }
    try {
      const { number } = await publishEdition(acting, {
        expectedPrevious,
        listDigest,
        notes,
        licence,
        withdraws: withdraws ?? null,
        withdrawalReason: withdraws === undefined ? null : withdrawalReason,
      });
      return redirect(paths.edition(number), 303);
    } catch (error) {
      if (!(error instanceof DomainError)) throw error;
      if (error instanceof NotFound) return answer(404, { errors: { withdraws: [error.message] } });
      if (error instanceof Invalid && error.errors.length > 0) {
        return answer(error.status, {
          errors: Object.fromEntries(error.errors.map(({ pointer, detail }) => [pointer.slice(1), [detail]])),
        });
      }
      const newest = await findNewestPublication();
      const made = newest && newest.number > expectedPrevious ? newest : null;
      return answer(error.status, { sentence: error.message, made });
    }
  } catch (error) {
    throw pageError(error);
  }
}

export default function PublishPage({ loaderData: page, actionData }: Route.ComponentProps) {
  const nothing = page.counts.lines === 0;
  const answer = actionData;
  const stopped = page.stops.length > 0 || page.allOwn;
  const confirming = answer?.step === "confirm" && !nothing && !stopped;
  return (
    <Leaf
      heading={confirming ? `Publish edition ${page.number}?` : `Edition ${page.number} as it would be`}
      section="editions"
      bookmark={draftBookmark(page.previous || null)}
      lede={
        nothing || confirming
          ? undefined
          : `${countsInWords(page.counts)}, from ${page.revisions.length === 1 ? "one revision" : `${page.revisions.length} revisions`}.`
      }
      ribbon={
        <Ribbon
          end={
            <span>{page.counts.lines === 1 ? "1 accepted line" : `${count(page.counts.lines)} accepted lines`}</span>
          }
        >
          <span>
            <b>Next edition</b>, not published
          </span>
          <span>{page.previous === 0 ? "the first of this table" : `after edition ${page.previous}`}</span>
        </Ribbon>
      }
    >
      {answer?.made ? (
        <div role="alert" className="mb-5">
          <Note kind="block" word="not published">
            <p>
              <Link to={paths.edition(answer.made.number)}>Edition {answer.made.number}</Link> was published by{" "}
              {answer.made.publisher} on <Time at={answer.made.publishedAt} withTime />, before this came in.{" "}
              {nothing
                ? "Nothing is left to publish. What you wrote stands below."
                : "Look at what is left, and publish again. What you wrote still stands below."}
            </p>
          </Note>
        </div>
      ) : (
        answer?.sentence && <FormErrors errors={[answer.sentence]} />
      )}
      {nothing ? (
        <Nothing page={page} answer={answer} />
      ) : (
        <>
          {confirming ? <Confirm page={page} answer={answer} /> : <Stops page={page} />}
          {page.revisions.map((revision) => (
            <Section
              key={revision.id}
              head={
                <>
                  <Link to={paths.revision(revision.id)}>Revision {revision.id}</Link> · {revision.title}
                </>
              }
            >
              <p className="lede">
                Written by {revision.madeByName}
                {revision.decided && (
                  <>
                    ; reviewed by {revision.decided.by}, <Time at={revision.decided.at} withTime />
                  </>
                )}
                .
              </p>
              <NextLines revision={revision} previous={page.previous} />
            </Section>
          ))}
          {!confirming && <Write page={page} answer={answer} stopped={stopped} />}
          <Caution />
        </>
      )}
    </Leaf>
  );
}

function Nothing({ page, answer }: { page: Page; answer: Answer | undefined }) {
  return (
    <>
      <EmptyPage start={<ButtonLink to={paths.revisions()}>See the revisions</ButtonLink>}>
        Nothing is accepted for edition {page.number} yet. When a reviewer closes the review of a revision, its accepted
        lines stand here.
        {page.inReview.length > 0 &&
          ` ${page.inReview.length === 1 ? "One revision is" : `${page.inReview.length} revisions are`} in review.`}
      </EmptyPage>
      {answer?.typed["notes"] && (
        <Section head="What you had written">
          <p className="max-w-[68ch] whitespace-pre-line">{answer.typed["notes"]}</p>
        </Section>
      )}
    </>
  );
}

/** What stops the edition, and whose hand it needs. */
function Stops({ page }: { page: Page }) {
  return (
    <>
      {page.allOwn && (
        <Note kind="block" word="four eyes">
          <p>You had a hand in every line of this edition, so somebody else publishes it.</p>
        </Note>
      )}
      {page.stops.length > 0 && (
        <Section head={`What stops edition ${page.number}`}>
          <p className="lede">
            Taken together, the accepted lines do not pass the checks. Mend them in a new revision, or set the finding
            aside where its lines are in review.
          </p>
          {page.stops.map((stop) => (
            <Finding
              key={`${stop.check} ${stop.species} ${stop.sentence}`}
              finding={{ ...stop, severity: "block", suggestions: [] }}
              title={stop.title}
            />
          ))}
        </Section>
      )}
    </>
  );
}

function useFields(page: Page, answer: Answer | undefined) {
  const field = (name: string, initial: string, required: boolean) =>
    plainField(name, {
      errors: answer?.errors[name] ? [...answer.errors[name]] : undefined,
      initialValue: answer?.typed[name] ?? initial,
      required,
    });
  return {
    notes: field("notes", "", true),
    licence: field("licence", page.licence, true),
    withdraws: field("withdraws", "", false),
    withdrawalReason: field("withdrawalReason", "", false),
  };
}

/** What the publisher writes. Sending it changes nothing yet: a page with what will change comes first. */
function Write({ page, answer, stopped }: { page: Page; answer: Answer | undefined; stopped: boolean }) {
  const fields = useFields(page, answer);
  const pending = usePending("intent", "look");
  if (stopped) return null;
  return (
    <Section head={`What edition ${page.number} says of itself`}>
      <Form method="post" noValidate>
        <FormErrors
          fields={[
            [fields.notes, "Notes"],
            [fields.licence, "Licence"],
            [fields.withdraws, "Withdraws"],
            [fields.withdrawalReason, "Why"],
          ]}
        />
        <Seen page={page} />
        <TextArea
          field={fields.notes}
          label="Notes"
          hint="What this edition brings, for those who read it: what was measured, corrected or taken out."
        />
        <Field
          field={fields.licence}
          label="Licence"
          hint="The SPDX identifier under which the table may be used."
          autoComplete="off"
        />
        {page.withdrawable.length > 0 && (
          <details
            className="mb-4"
            open={Boolean(fields.withdraws.initialValue) || Boolean(fields.withdrawalReason.errors)}
          >
            <summary className="mb-2 text-verdigris underline underline-offset-3">Withdraw an older edition</summary>
            <p className="lede">
              A withdrawn edition keeps its bytes and its address; its pages and answers say that it was withdrawn and
              why.
            </p>
            <Select
              field={fields.withdraws}
              label="Withdraws"
              options={[
                ["", "no edition"],
                ...page.withdrawable.map((number) => [String(number), `edition ${number}`] as const),
              ]}
            />
            <TextArea field={fields.withdrawalReason} label="Why it is withdrawn" />
          </details>
        )}
        <Button kind="main" type="submit" name="intent" value="look" pending={pending} pendingLabel="One moment…">
          Publish edition {page.number}…
        </Button>
        <p className="fine mt-2">You see once more what will change before anything is published.</p>
      </Form>
    </Section>
  );
}

/** What will change, in one view, and the button that does it. */
function Confirm({ page, answer }: { page: Page; answer: Answer }) {
  const { visitor } = useRootData();
  const publishing = usePending("intent", "publish");
  const changing = usePending("intent", "change");
  const { typed } = answer;
  const moved = typed["listDigest"] !== page.digest;
  const password = plainField("password", {
    errors: answer.errors["password"] ? [...answer.errors["password"]] : undefined,
    required: true,
  });
  return (
    <Form method="post" noValidate>
      <Seen page={page} />
      {moved && (
        <Note kind="look" word="changed meanwhile">
          <p>The list of accepted lines has changed while you wrote. What stands below is what would be published.</p>
        </Note>
      )}
      {["notes", "licence", "withdraws", "withdrawalReason"].map((name) => (
        <input key={name} type="hidden" name={name} value={typed[name] ?? ""} />
      ))}
      <dl className="mt-3 mb-5 grid max-w-[46rem] grid-cols-[max-content_minmax(0,1fr)] gap-x-6 gap-y-1.5">
        <dt className="text-soft">Brings</dt>
        <dd>{countsInWords(page.counts)}</dd>
        <dt className="text-soft">Notes</dt>
        <dd className="whitespace-pre-line">{typed["notes"]}</dd>
        <dt className="text-soft">Licence</dt>
        <dd>{typed["licence"]}</dd>
        {typed["withdraws"] && (
          <>
            <dt className="text-soft">Withdraws</dt>
            <dd>
              <span className="is-block">edition {typed["withdraws"]}</span>: {typed["withdrawalReason"]}
            </dd>
          </>
        )}
        <dt className="text-soft">Published by</dt>
        <dd>{visitor?.name}, who signs with it that these lines were reviewed and may be used</dd>
      </dl>
      <p className="mb-3 max-w-[60ch]">
        From then on edition {page.number} never changes. What turns out wrong is put right in the next one.
      </p>
      {page.asksPassword && (
        <>
          <FormErrors fields={[[password, "Your password"]]} />
          <Field
            field={password}
            label="Your password"
            hint="You signed in a while ago, so it is asked for once more."
            type="password"
            autoComplete="current-password"
          />
        </>
      )}
      <div className="flex flex-wrap items-center gap-3.5">
        <Button kind="main" type="submit" name="intent" value="publish" pending={publishing} pendingLabel="Publishing…">
          Publish edition {page.number}
        </Button>
        <Button kind="quiet" type="submit" name="intent" value="change" pending={changing} formNoValidate>
          Change what I wrote
        </Button>
      </div>
    </Form>
  );
}

/** What the publisher was shown when they wrote: published is that, or nothing. */
function Seen({ page }: { page: Page }) {
  return (
    <>
      <input type="hidden" name="expectedPrevious" value={page.previous} />
      <input type="hidden" name="listDigest" value={page.digest} />
    </>
  );
}
