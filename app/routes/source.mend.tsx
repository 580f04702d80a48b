import { data, Form, Link, redirect } from "react-router";
import { readForm } from "#app/http/forms.server.ts";
import { forPage } from "#app/http/respond.server.ts";
import { paths } from "#app/paths.ts";
import { requireActing } from "#app/people/visitor.server.ts";
import { changeOf, findMendableSource, findOpenDrafts, proposeMendedSource } from "#app/review/proposeSource.server.ts";
import { citationPieces, shortCitation } from "#app/sources/citation.ts";
import { typedSource } from "#app/sources/sourceForm.ts";
import { Button, usePending } from "#app/ui/Button.tsx";
import { ChangedWords } from "#app/ui/ChangedWords.tsx";
import { DecisionBar } from "#app/ui/DecisionBar.tsx";
import { Leaf } from "#app/ui/Leaf.tsx";
import { Note } from "#app/ui/Note.tsx";
import { Reference } from "#app/ui/Reference.tsx";
import type { Route } from "./+types/source.mend";
import { Answer } from "./source/Answer.tsx";
import { outcomeOf, readSent, refusedForm } from "./source/act.server.ts";
import { SourceDesk } from "./source/Desk.tsx";
import type { SourceOutcome } from "./source/outcome.ts";

export const meta: Route.MetaFunction = () => [{ title: "Mend a citation · Tablewright" }];

export const loader = forPage(async ({ request, params }: Route.LoaderArgs) => {
  const acting = await requireActing(request, "revision:write");
  const source = await findMendableSource(acting, params.source);
  const name = shortCitation(source.before.citation) || source.sourceId;
  return {
    source,
    name,
    initial: { ...typedSource(source.before), revisionTitle: `Citation of ${name}`.slice(0, 200) },
    drafts: await findOpenDrafts(acting),
  };
});

export const action = forPage(async ({ request, params }: Route.ActionArgs) => {
  const acting = await requireActing(request, "revision:write");
  const form = await readForm(request);
  const source = await findMendableSource(acting, params.source);
  try {
    const { typed, read, frame } = readSent(form);
    if (!read.ok) return data(outcomeOf(typed, { errors: read.errors }), { status: 422 });
    if (typed["intent"] === "show") return data(outcomeOf(typed, { change: changeOf(source, read.source) }));
    const { sourceId } = source;
    const revisionId = await proposeMendedSource(
      acting,
      { sourceId, seen: typed["seen"] ?? "", source: read.source },
      frame,
    );
    return redirect(paths.revision(revisionId), 303);
  } catch (error) {
    return refusedForm(error, Object.fromEntries([...form].map(([name, value]) => [name, String(value)])));
  }
});

export default function MendSourcePage({ loaderData, actionData }: Route.ComponentProps) {
  const { source, name, initial, drafts } = loaderData;
  const { before, edition, revisionId } = source;
  const showing = usePending("intent", "show");
  const proposing = usePending("intent", "propose");
  return (
    <Leaf
      heading={`Mend the citation of ${name}`}
      section="sources"
      lede={<Reference pieces={citationPieces(before.citation, before.doi)} />}
    >
      <p className="mb-6 max-w-[68ch]">
        {edition !== null ? (
          <>
            So cites it <Link to={paths.sourceIn(edition, source.sourceId)}>edition {edition}</Link>.
          </>
        ) : (
          revisionId !== null && (
            <>
              So it waits, accepted, in <Link to={paths.revision(revisionId)}>revision {revisionId}</Link>.
            </>
          )
        )}{" "}
        What is mended here stands from the next edition on; the editions that are out keep their citation.
      </p>
      <Form method="post" className="max-w-[48rem]">
        <input type="hidden" name="seen" value={actionData?.typed["seen"] ?? source.seen} readOnly />
        <Change outcome={actionData} />
        <SourceDesk
          drafts={drafts}
          outcome={actionData}
          initial={initial}
          reasonHint="What was wrong, and how you know."
          reasonRequired
        />
        <DecisionBar end={<Link to={paths.source(source.sourceId)}>Leave it as it is</Link>}>
          <Button kind="main" name="intent" value="propose" pending={proposing} pendingLabel="Proposing…">
            Propose the change
          </Button>
          <Button kind="plain" name="intent" value="show" pending={showing} pendingLabel="Comparing…">
            Show the change
          </Button>
        </DecisionBar>
      </Form>
    </Leaf>
  );
}

/** How the record would change, word by word, before anything is proposed. */
function Change({ outcome }: { outcome: SourceOutcome | undefined }) {
  if (!outcome || outcome.change === null) return null;
  return (
    <Answer key={JSON.stringify(outcome)} label="The change">
      <Note kind="remark" word="the change">
        {outcome.change.length > 0 ? (
          <ChangedWords texts={outcome.change} />
        ) : (
          <p>It would be printed as it is printed now.</p>
        )}
      </Note>
    </Answer>
  );
}
