import { data, Link, redirect } from "react-router";
import { BadRequest } from "#app/http/errors.ts";
import { readForm } from "#app/http/forms.server.ts";
import { requestContext } from "#app/http/requestContext.server.ts";
import { numberInPath, pageError } from "#app/http/respond.server.ts";
import { paths } from "#app/paths.ts";
import { asksPassword } from "#app/people/signing.server.ts";
import { requireVisitor } from "#app/people/visitor.server.ts";
import { type RevisionPage as Page, type Show, SHOWS } from "#app/review/revisionPage.ts";
import { findRevisionPage } from "#app/review/revisionPage.server.ts";
import { draftBookmark, editionBookmark, type BookmarkProps } from "#app/ui/Bookmark.tsx";
import { Button, ButtonLink } from "#app/ui/Button.tsx";
import { Caution } from "#app/ui/Caution.tsx";
import { Ribbon } from "#app/ui/EditionLine.tsx";
import { EmptyPage } from "#app/ui/EmptyPage.tsx";
import { Field, TextArea } from "#app/ui/Field.tsx";
import { plainField } from "#app/ui/fieldState.ts";
import { count } from "#app/ui/figure.ts";
import { FormErrors } from "#app/ui/FormErrors.tsx";
import { Leaf } from "#app/ui/Leaf.tsx";
import { Note } from "#app/ui/Note.tsx";
import { Time } from "#app/ui/Time.tsx";
import { useRootData } from "#app/ui/useRootData.ts";
import type { Route } from "./+types/revision";
import { actOnRevision } from "./revision/act.server.ts";
import { Bar } from "./revision/Bar.tsx";
import { ActForm, DeskProvider, linesAddress, OpenLink, useDesk } from "./revision/desk.tsx";
import { History, roundInWords } from "./revision/History.tsx";
import { Lines } from "./revision/Lines.tsx";
import { Changed, RoundsStrip, ShowLines, Unanswered } from "./revision/Rounds.tsx";
import { RevisionThreads } from "./revision/Threads.tsx";

export const meta: Route.MetaFunction = ({ params }) => [{ title: `Revision ${params.revision} · Tablewright` }];

function showIn(request: Request): Show {
  const text = new URL(request.url).searchParams.get("show") ?? "all";
  const show = SHOWS.find((one) => one === text);
  if (!show) throw new BadRequest(`Lines are shown by one of ${SHOWS.join(", ")}.`);
  return show;
}

function pageIn(request: Request): number {
  const text = new URL(request.url).searchParams.get("page") ?? "1";
  if (!/^[1-9]\d{0,5}$/.test(text)) throw new BadRequest("The page of lines in this address is not a number.");
  return Number(text);
}

export async function loader({ request, params }: Route.LoaderArgs) {
  try {
    const { acting, sessionId } = await requireVisitor(request, "revision:read");
    const page = await findRevisionPage(acting, numberInPath(params.revision), {
      page: pageIn(request),
      show: showIn(request),
    });
    return { ...page, asksPassword: page.may.close && (await asksPassword(acting, sessionId)) };
  } catch (error) {
    throw pageError(error);
  }
}

/** Forms sent without scripts; the same acts as the resource beside it. */
export async function action({ request, params, context }: Route.ActionArgs) {
  try {
    const signer = {
      ...(await requireVisitor(request, "revision:read")),
      address: context.get(requestContext).address,
    };
    const id = numberInPath(params.revision);
    const page = pageIn(request);
    const show = showIn(request);
    const form = await readForm(request);
    const outcome = await actOnRevision(signer, id, form);
    if (!outcome.ok) return data(outcome, { status: outcome.status });
    const line = String(form.get("line") ?? form.get("seen") ?? "").split(":", 1)[0] ?? "";
    const anchor = /^\d+$/.test(line) ? `#line-${line}` : "";
    return redirect(`${linesAddress(id, page, show)}${anchor}`, 303);
  } catch (error) {
    throw pageError(error);
  }
}

export default function RevisionPage({ loaderData: page, actionData }: Route.ComponentProps) {
  const { revision } = page;
  const failed = actionData && !actionData.ok ? actionData : undefined;
  return (
    <DeskProvider
      key={revision.id}
      revision={revision.id}
      content={page}
      page={page.pages.page}
      show={page.show}
      answered={actionData}
    >
      <Leaf
        heading={revision.title}
        lede={revision.summary || undefined}
        section="revisions"
        bookmark={bookmarkOf(page)}
        ribbon={<RevisionRibbon page={page} />}
      >
        {failed?.sentence && !failed.asks && <FormErrors errors={[failed.sentence]} />}
        {page.may.write && <Describe page={page} />}
        <div className="mb-4 empty:hidden">
          <Standing page={page} />
        </div>
        <RoundsStrip rounds={page.rounds} />
        <Unanswered page={page} />
        <Changed page={page} />
        {page.counts.lines > 0 && <ShowLines page={page} />}
        {page.groups.length > 0 ? (
          <>
            <Lines page={page} />
            <LinePages page={page} />
          </>
        ) : (
          <NoLines page={page} />
        )}
        <RevisionThreads threads={page.threads} may={page.may.comment} />
        <History rounds={page.history} comments={page.may.comment} />
        <Caution />
        <Bar page={page} digest={page.cleanDigest} asksPassword={page.asksPassword} />
      </Leaf>
    </DeskProvider>
  );
}

function NoLines({ page }: { page: Page }) {
  const { revision, counts, wentInto, show } = page;
  if (counts.lines > 0) {
    return (
      <EmptyPage start={<ButtonLink to={paths.revision(revision.id)}>Show all lines</ButtonLink>}>
        {show === "overtaken" ? "No line is overtaken." : "No line of this kind is left."}
      </EmptyPage>
    );
  }
  const [into] = wentInto;
  if (into !== undefined) {
    return (
      <EmptyPage start={<ButtonLink to={paths.revision(into)}>See them in revision {into}</ButtonLink>}>
        The lines of this revision were taken over into another, with their history.
      </EmptyPage>
    );
  }
  return (
    <EmptyPage start={<ButtonLink to={paths.newSheet()}>Bring a sheet</ButtonLink>}>
      This revision has no lines. They come from a sheet, or are begun on the page of a species.
    </EmptyPage>
  );
}

function bookmarkOf(page: Page): BookmarkProps {
  const [published] = page.publishedIn;
  if (published !== undefined) return editionBookmark(published, page.newest);
  if (page.revision.state === "withdrawn") return { kind: "plain", label: "With-drawn", mark: page.revision.id };
  return draftBookmark(page.newest || null);
}

function RevisionRibbon({ page }: { page: Page }) {
  const { opens } = useRootData();
  const { revision, counts, sent, newest } = page;
  return (
    <Ribbon
      end={
        <>
          <span>
            {counts.lines === 1 ? "1 line" : `${count(counts.lines)} lines`}
            {revision.state === "in_review" && counts.open < counts.lines && `, ${count(counts.open)} open`}
            {revision.sheetId !== null && (
              <>
                {" "}
                · sheet{" "}
                {opens.includes("sheets") ? (
                  <Link to={paths.sheet(revision.sheetId)}>{revision.sheetName}</Link>
                ) : (
                  revision.sheetName
                )}
              </>
            )}
          </span>
        </>
      }
    >
      <span>
        <b>Revision {revision.id}</b>
        {sent ? (
          <>
            , {roundInWords(revision.round).toLowerCase()}, sent <Time at={sent.at} /> by {sent.by}
          </>
        ) : (
          <>
            , a draft begun <Time at={revision.madeAt} /> by {revision.madeByName}
          </>
        )}
      </span>
      <span>{newest === 0 ? "before the first edition" : `against edition ${newest}`}</span>
    </Ribbon>
  );
}

/** What the revision waits for, or how it ended. */
function Standing({ page }: { page: Page }) {
  const { revision, ended, may, own, counts, publishedIn, newest } = page;
  if (revision.state === "returned" && ended) {
    return (
      <Note kind="look" word="returned">
        <p>
          By {ended.by}, <Time at={ended.at} withTime />:
        </p>
        <p className="whitespace-pre-line">{ended.remark}</p>
      </Note>
    );
  }
  if (revision.state === "withdrawn" && ended) {
    return (
      <Note kind="remark" word="withdrawn">
        <p>
          By {ended.by}, <Time at={ended.at} withTime />: {ended.remark}
        </p>
      </Note>
    );
  }
  if (revision.state === "decided" && ended) {
    return (
      <Note kind="clean" word="decided">
        <p>
          {ended.by} reviewed it and closed the review on <Time at={ended.at} withTime />: {count(counts.accepted)}{" "}
          accepted, {count(counts.declined)} declined.{" "}
          {publishedIn.length > 0 ? (
            <>
              What was accepted came in with{" "}
              {publishedIn.map((edition) => (
                <Link key={edition} to={paths.edition(edition)}>
                  edition {edition}
                </Link>
              ))}
              .
            </>
          ) : counts.accepted > 0 ? (
            `What was accepted waits for edition ${newest + 1}.`
          ) : (
            "Nothing of it goes into an edition."
          )}
        </p>
      </Note>
    );
  }
  if (revision.state !== "in_review") return null;
  if (!may.decide) return <p className="max-w-[68ch]">It is with the reviewers: they decide each line.</p>;
  if (own === 0) return null;
  return (
    <p className="max-w-[68ch]">
      {own === counts.lines
        ? "You had a hand in every line of this revision, so somebody else decides it and closes its review."
        : `You had a hand in ${own === 1 ? "one line" : `${count(own)} lines`} of this revision: somebody else decides ${own === 1 ? "it" : "them"} and closes the review.`}
    </p>
  );
}

/** Title and summary, to be changed while the revision can be written in. */
function Describe({ page: { revision } }: { page: Page }) {
  const { open } = useDesk();
  if (open !== "describe") {
    return (
      <p className={`mb-4 text-fine ${revision.summary ? "-mt-4" : ""}`}>
        <OpenLink form="describe" anchor="text">
          Change title and summary
        </OpenLink>{" "}
        · <Link to={paths.propose({ revision: revision.id })}>Propose a new species in it</Link>
      </p>
    );
  }
  return (
    <ActForm intent="describe" className="mb-6">
      {({ pending, errors, typed }) => {
        const field = (name: "title" | "summary") =>
          plainField(name, {
            id: `describe-${name}`,
            errors: errors[name] ? [...errors[name]] : undefined,
            initialValue: typed[name] ?? revision[name],
            required: name === "title",
          });
        return (
          <>
            <FormErrors
              fields={[
                [field("title"), "Title"],
                [field("summary"), "Summary"],
              ]}
            />
            <Field field={field("title")} label="Title" autoComplete="off" autoFocus />
            <TextArea field={field("summary")} label="Summary" hint="What was measured or corrected, and why." />
            <div className="-mt-2 flex items-baseline gap-4">
              <Button type="submit" pending={pending} pendingLabel="Saving…">
                Save title and summary
              </Button>
              <OpenLink form="describe" anchor="text">
                Never mind
              </OpenLink>
            </div>
          </>
        );
      }}
    </ActForm>
  );
}

function LinePages({ page: { pages, shows, show, revision } }: { page: Page }) {
  if (pages.pages === 1) return null;
  const to = (number: number): string => linesAddress(revision.id, number, show);
  return (
    <nav aria-label="Pages of lines" className="mt-3 flex flex-wrap gap-x-4 text-fine">
      <span className="text-soft">
        Lines {count(pages.from)} to {count(pages.to)} of {count(Math.max(shows[show], pages.to))}
      </span>
      {pages.page > 1 && (
        <Link to={to(pages.page - 1)} rel="prev">
          lines before
        </Link>
      )}
      {pages.page < pages.pages && (
        <Link to={to(pages.page + 1)} rel="next">
          lines after
        </Link>
      )}
    </nav>
  );
}
