import { data, Form, Link, redirect } from "react-router";
import { readForm } from "#app/http/forms.server.ts";
import { forPage, numberInPath } from "#app/http/respond.server.ts";
import { paths } from "#app/paths.ts";
import { requireActing } from "#app/people/visitor.server.ts";
import { editLine, findLineEdit, type LineEditPage } from "#app/review/lineEdit.server.ts";
import { propertyInfo } from "#app/thermo/property.ts";
import { draftBookmark } from "#app/ui/Bookmark.tsx";
import { Button, ButtonLink, usePending } from "#app/ui/Button.tsx";
import { EmptyPage } from "#app/ui/EmptyPage.tsx";
import { Field, Select, TextArea } from "#app/ui/Field.tsx";
import { FormErrors } from "#app/ui/FormErrors.tsx";
import { Leaf } from "#app/ui/Leaf.tsx";
import { Section } from "#app/ui/Section.tsx";
import { SpeciesName } from "#app/ui/SpeciesName.tsx";
import { Symbol } from "#app/ui/Symbol.tsx";
import type { Route } from "./+types/revision.line";
import { held } from "./propose/act.server.ts";
import { ConditionFields, NameFields, Questions, Readings, ValueRow } from "./propose/Fields.tsx";
import { errorList, type FormState, formState } from "./propose/form.ts";
import { describedFields, SourceFields } from "./source/SourceFields.tsx";

export const meta: Route.MetaFunction = ({ params }) => [
  { title: `A line of revision ${params.revision} · Tablewright` },
];

export const loader = forPage(async ({ request, params }: Route.LoaderArgs) => {
  const acting = await requireActing(request, "revision:write");
  return findLineEdit(acting, numberInPath(params.revision), params.line);
});

export const action = forPage(async ({ request, params }: Route.ActionArgs) => {
  const acting = await requireActing(request, "revision:write");
  const revision = numberInPath(params.revision);
  const form = await readForm(request);
  const answer = await held(form, (typed) => editLine(acting, revision, params.line, typed));
  if ("revisionId" in answer) return redirect(`${paths.revision(revision)}#line-${params.line}`, 303);
  return data(answer.reply, { status: answer.status });
});

export default function LinePage({ loaderData: page, actionData: reply }: Route.ComponentProps) {
  const { revision, line } = page;
  const form = formState(reply);
  const pending = usePending();
  return (
    <Leaf
      heading={<Heading page={page} />}
      lede={
        <>
          A line of <Link to={paths.revision(revision.id)}>revision {revision.id}</Link>, {revision.title}. What it said
          before stays on record.
        </>
      }
      section="revisions"
      bookmark={draftBookmark(page.edition || null)}
    >
      {revision.writable ? (
        <Form method="post" className="max-w-[52rem]">
          <FormErrors {...errorList(reply)} />
          <Questions form={form} edition={page.edition} />
          <input type="hidden" name="version" value={line.version} />
          <Section head="What it shall say">
            <LineFields page={page} form={form} />
          </Section>
          <TextArea
            field={form.field("reason")}
            label="Reason"
            hint="The reviewer reads it beside the change."
            rows={2}
          />
          <div className="flex flex-wrap items-baseline gap-4">
            <Button kind="main" type="submit" pending={pending} pendingLabel="Examining…">
              Change the line
            </Button>
            <ButtonLink kind="quiet" to={paths.revision(revision.id)}>
              Never mind
            </ButtonLink>
          </div>
        </Form>
      ) : (
        <EmptyPage start={<ButtonLink to={paths.revision(revision.id)}>Back to revision {revision.id}</ButtonLink>}>
          Lines are written only while their revision is a draft or was returned.
        </EmptyPage>
      )}
    </Leaf>
  );
}

function Heading({ page: { line } }: { page: LineEditPage }) {
  if (line.kind === "source") return <>Change a source</>;
  return (
    <>
      Change{" "}
      {line.property ? (
        <>
          <Symbol of={propertyInfo[line.property].symbol} /> of
        </>
      ) : (
        "what is said of"
      )}{" "}
      {line.key && <SpeciesName speciesKey={line.key} />}
    </>
  );
}

function LineFields({ page, form }: { page: LineEditPage; form: FormState }) {
  const { line, typed } = page;
  switch (line.kind) {
    case "detail":
      return (
        <>
          <NameFields form={form} stands={typed} />
          <div className="grid items-start gap-x-6 sm:grid-cols-2">
            <div>
              <Field field={form.field("formula", typed["formula"])} label="Printed formula" autoComplete="off" />
              <Readings form={form} field="formula" />
            </div>
            <Field field={form.field("label", typed["label"], false)} label="Form or isomer" autoComplete="off" />
          </div>
        </>
      );
    case "source":
      return (
        <SourceFields
          fields={describedFields(
            (name) => form.typed(`source.${name}`) ?? typed[`source.${name}`] ?? "",
            (name) => [...(form.reply?.errors[`source.${name}`] ?? [])],
            "source.",
          )}
        />
      );
    case "withdrawal":
      return <TextArea field={form.field("why", typed["why"])} label="Why the value is taken out" rows={2} />;
    case "value":
      return (
        line.property && (
          <>
            <ValueRow form={form} property={line.property} initial={typed} />
            <ConditionFields form={form} solute={line.phase === "aq"} initial={typed} />
            <Select
              field={form.field("source", typed["source"])}
              label="Source"
              options={page.sources.map(
                ({ id, name, proposed }) =>
                  [id, proposed === null ? name : `${name} (proposed in revision ${proposed})`] as const,
              )}
            />
          </>
        )
      );
  }
}
