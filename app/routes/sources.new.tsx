import { data, Form, Link, redirect } from "react-router";
import { readForm } from "#app/http/forms.server.ts";
import { forPage } from "#app/http/respond.server.ts";
import { paths } from "#app/paths.ts";
import { requireActing } from "#app/people/visitor.server.ts";
import { findOpenDrafts, proposeNewSource } from "#app/review/proposeSource.server.ts";
import { plainCitation } from "#app/sources/citation.ts";
import { Button, usePending } from "#app/ui/Button.tsx";
import { DecisionBar } from "#app/ui/DecisionBar.tsx";
import { Check } from "#app/ui/Field.tsx";
import { plainField } from "#app/ui/fieldState.ts";
import { Leaf } from "#app/ui/Leaf.tsx";
import { Note } from "#app/ui/Note.tsx";
import type { Route } from "./+types/sources.new";
import { Answer } from "./source/Answer.tsx";
import { outcomeOf, readSent, refusedForm } from "./source/act.server.ts";
import { SourceDesk } from "./source/Desk.tsx";
import type { SourceOutcome } from "./source/outcome.ts";

export const meta: Route.MetaFunction = () => [{ title: "Add a source · Tablewright" }];

export const loader = forPage(async ({ request }: Route.LoaderArgs) => ({
  drafts: await findOpenDrafts(await requireActing(request, "revision:write")),
}));

export const action = forPage(async ({ request }: Route.ActionArgs) => {
  const acting = await requireActing(request, "revision:write");
  const form = await readForm(request);
  try {
    const { typed, read, frame } = readSent(form);
    if (!read.ok) return data(outcomeOf(typed, { errors: read.errors }), { status: 422 });
    const outcome = await proposeNewSource(acting, read.source, frame, typed["anyway"] === "on");
    if (outcome.kind === "proposed") return redirect(paths.revision(outcome.revisionId), 303);
    const twins = outcome.twins.map(({ source, because }) => ({
      sourceId: source.sourceId,
      reference: plainCitation(source.citation, source.doi) || source.sourceId,
      because,
      proposed: source.revisionId,
      sameDoi: because === "the same DOI",
    }));
    return data(outcomeOf(typed, { twins }), { status: 409 });
  } catch (error) {
    return refusedForm(error, Object.fromEntries([...form].map(([name, value]) => [name, String(value)])));
  }
});

export default function NewSourcePage({ loaderData: { drafts }, actionData }: Route.ComponentProps) {
  const pending = usePending();
  return (
    <Leaf
      heading="Add a source"
      section="sources"
      lede="A source is proposed like a value: it becomes a line of a revision and is in the table once a reviewer accepted it and the next edition is out. Where a sheet brings it, describe it beside the sheet instead."
    >
      <Form method="post" className="max-w-[48rem]">
        <Twins outcome={actionData} />
        <SourceDesk
          drafts={drafts}
          outcome={actionData}
          initial={{ revisionTitle: "A source added by hand" }}
          reasonHint="For the reviewer: what it will be needed for."
          reasonRequired={false}
        />
        <DecisionBar end={<Link to={paths.sources()}>All sources</Link>}>
          <Button kind="main" pending={pending} pendingLabel="Proposing…">
            Propose the source
          </Button>
        </DecisionBar>
      </Form>
    </Leaf>
  );
}

/** Known sources that this one may be: shown before anything is added. */
function Twins({ outcome }: { outcome: SourceOutcome | undefined }) {
  if (!outcome || outcome.twins.length === 0) return null;
  const sameDoi = outcome.twins.some((twin) => twin.sameDoi);
  return (
    <Answer key={JSON.stringify(outcome)} label="Known already?">
      <Note kind={sameDoi ? "block" : "look"} word="known already?">
        <p>
          {sameDoi ? "A source with this DOI is there already:" : "This looks like a source that is there already:"}
        </p>
        <ul className="my-2">
          {outcome.twins.map(({ sourceId, reference, because, proposed }) => (
            <li key={sourceId} className="my-1">
              <Link to={paths.source(sourceId)}>{reference}</Link>: {because}
              {proposed !== null && `; proposed in revision ${proposed}`}
            </li>
          ))}
        </ul>
        {sameDoi ? (
          <p>A DOI names one work. Use that source, or mend the DOI below.</p>
        ) : (
          <Check field={plainField("anyway")} label="It is another work; propose it all the same." />
        )}
      </Note>
    </Answer>
  );
}
