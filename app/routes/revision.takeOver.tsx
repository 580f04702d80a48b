import { data, Form, Link, redirect } from "react-router";
import { BadRequest, DomainError, Invalid, NotFound } from "#app/http/errors.ts";
import { readForm } from "#app/http/forms.server.ts";
import { forPage, numberInPath } from "#app/http/respond.server.ts";
import { paths } from "#app/paths.ts";
import { requireActing } from "#app/people/visitor.server.ts";
import { revisionStateWords } from "#app/review/states.ts";
import { findTakeOverPage, takeOver, type TakeOverPage } from "#app/review/takeOver.server.ts";
import type { Choice } from "#app/review/takeOver.ts";
import { draftBookmark } from "#app/ui/Bookmark.tsx";
import { Button, ButtonLink, usePending } from "#app/ui/Button.tsx";
import { EmptyPage } from "#app/ui/EmptyPage.tsx";
import { count } from "#app/ui/figure.ts";
import { FormErrors } from "#app/ui/FormErrors.tsx";
import { Leaf } from "#app/ui/Leaf.tsx";
import { Prose } from "#app/ui/Prose.tsx";
import { Section } from "#app/ui/Section.tsx";
import { Table } from "#app/ui/Table.tsx";
import type { Route } from "./+types/revision.takeOver";

export const meta: Route.MetaFunction = ({ params }) => [
  { title: `Take lines over into revision ${params.revision} · Tablewright` },
];

/** Names of the fields that choose between two lines of one place begin so. */
const KEEP = "keep.";

function fromIn(request: Request): number | null {
  const text = new URL(request.url).searchParams.get("from");
  if (text === null || text === "") return null;
  if (!/^[1-9]\d{0,8}$/.test(text)) throw new BadRequest("The revision to take over in this address is not a number.");
  return Number(text);
}

export const loader = forPage(async ({ request, params }: Route.LoaderArgs) => {
  const acting = await requireActing(request, "revision:write");
  return findTakeOverPage(acting, numberInPath(params.revision), fromIn(request));
});

export const action = forPage(async ({ request, params }: Route.ActionArgs) => {
  const acting = await requireActing(request, "revision:write");
  const into = numberInPath(params.revision);
  const form = await readForm(request);
  const from = Number(form.get("from"));
  const digest = String(form.get("digest") ?? "");
  const choices: Record<string, Choice> = Object.create(null) as Record<string, Choice>;
  for (const [name, value] of form) {
    if (name.startsWith(KEEP) && (value === "here" || value === "there")) choices[name.slice(KEEP.length)] = value;
  }
  try {
    if (!Number.isSafeInteger(from) || from < 1 || from > 999_999_999) {
      throw new Invalid("Choose the revision whose lines are taken over.");
    }
    await takeOver(acting, { into, from, digest, choices });
    return redirect(paths.revision(into), 303);
  } catch (error) {
    if (!(error instanceof DomainError) || error instanceof NotFound) throw error;
    return data({ sentence: error.message, choices: { ...choices } }, { status: error.status });
  }
});

export default function TakeOverRoute({ loaderData: page, actionData: reply }: Route.ComponentProps) {
  const { into, from } = page;
  return (
    <Leaf
      heading="Take lines over from another draft"
      lede={
        <>
          Its lines come into <Link to={paths.revision(into.id)}>revision {into.id}</Link>, {into.title}, with
          everything that was written and said about them; whoever had a hand in a line keeps it. The emptied draft ends
          and says where its lines went.
        </>
      }
      section="revisions"
      bookmark={draftBookmark(page.edition || null)}
    >
      {reply && <FormErrors errors={[reply.sentence]} />}
      {!into.writable ? (
        <EmptyPage start={<ButtonLink to={paths.revision(into.id)}>Back to revision {into.id}</ButtonLink>}>
          Revision {into.id} is {into.stateWords}; lines come in only while it is a draft or was returned.
        </EmptyPage>
      ) : (
        <>
          <Candidates page={page} />
          {from && <Lines page={page} from={from} chosen={reply?.choices ?? {}} />}
        </>
      )}
    </Leaf>
  );
}

function Candidates({ page: { candidates, into, from } }: { page: TakeOverPage }) {
  if (candidates.length === 0) {
    return (
      <EmptyPage start={<ButtonLink to={paths.revision(into.id)}>Back to revision {into.id}</ButtonLink>}>
        No other draft or returned revision has lines to take over.
      </EmptyPage>
    );
  }
  return (
    <Section head="Which draft">
      <Table caption="Drafts and returned revisions" even className="max-w-[52rem]">
        <thead>
          <tr>
            <th scope="col">Revision</th>
            <th scope="col">From</th>
            <th scope="col">State</th>
            <th scope="col" className="figure">
              Lines
            </th>
          </tr>
        </thead>
        <tbody>
          {candidates.map((one) => (
            <tr key={one.id}>
              <th scope="row">
                <Link
                  to={`${paths.takeOver(into.id, one.id)}#lines`}
                  aria-current={one.id === from?.id ? "true" : undefined}
                  className={one.id === from?.id ? "font-medium" : undefined}
                >
                  {one.id} · {one.title}
                </Link>
              </th>
              <td>{one.by}</td>
              <td>{revisionStateWords[one.state]}</td>
              <td className="figure">{count(one.lines)}</td>
            </tr>
          ))}
        </tbody>
      </Table>
    </Section>
  );
}

interface LinesProps {
  page: TakeOverPage;
  from: NonNullable<TakeOverPage["from"]>;
  chosen: Readonly<Record<string, Choice>>;
}

function Lines({ page: { into }, from, chosen }: LinesProps) {
  const pending = usePending();
  const coming = from.lines.length;
  return (
    <Section head={`Revision ${from.id}: ${from.title}`} id="lines">
      <Form method="post">
        <input type="hidden" name="from" value={from.id} />
        <input type="hidden" name="digest" value={from.digest} />
        {from.shared.length > 0 && (
          <>
            <p className="mb-2 max-w-[68ch]">
              {from.shared.length === 1
                ? "Both revisions propose something for one place. Choose which line stays; the other is taken out and stays on record."
                : `Both revisions propose something for ${count(from.shared.length)} places. Choose which line stays for each; the other is taken out and stays on record.`}
            </p>
            {from.shared.map((one) => (
              <fieldset key={one.place} className="mb-3 border-t border-rule pt-2">
                <legend className="float-left mb-1 w-full font-medium">
                  <Prose text={one.about} />
                </legend>
                <div className="clear-both grid max-w-[52rem] gap-x-6 gap-y-1 sm:grid-cols-2">
                  {(["here", "there"] as const).map((choice) => (
                    <label key={choice} className="flex items-baseline gap-2">
                      <input
                        type="radio"
                        name={`${KEEP}${one.place}`}
                        value={choice}
                        required
                        defaultChecked={chosen[one.place] === choice}
                      />
                      <span>
                        <Prose text={one[choice].says} />
                        <span className="block text-fine text-soft">
                          revision {choice === "here" ? into.id : from.id}, by {one[choice].by}
                        </span>
                      </span>
                    </label>
                  ))}
                </div>
              </fieldset>
            ))}
          </>
        )}
        {coming > 0 && (
          <Table caption={`Lines that come over from revision ${from.id}`} even className="max-w-[52rem]">
            <thead>
              <tr>
                <th scope="col">Comes over</th>
                <th scope="col">Proposed</th>
                <th scope="col">By</th>
              </tr>
            </thead>
            <tbody>
              {from.lines.map((line) => (
                <tr key={line.id}>
                  <th scope="row">
                    <Prose text={line.about} />
                  </th>
                  <td>
                    <Prose text={line.says} />
                  </td>
                  <td>{line.by}</td>
                </tr>
              ))}
            </tbody>
          </Table>
        )}
        {from.declined > 0 && (
          <p className="fine mt-3">
            {from.declined === 1 ? "One declined line stays" : `${count(from.declined)} declined lines stay`} with
            revision {from.id} and {from.declined === 1 ? "ends" : "end"} with it.
          </p>
        )}
        <div className="mt-4 flex flex-wrap items-baseline gap-4">
          <Button kind="main" type="submit" pending={pending} pendingLabel="Taking over…">
            Take over into revision {into.id}
          </Button>
          <ButtonLink kind="quiet" to={paths.revision(into.id)}>
            Never mind
          </ButtonLink>
        </div>
      </Form>
    </Section>
  );
}
