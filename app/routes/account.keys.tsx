import { type SubmissionResult, useForm } from "@conform-to/react";
import { getZodConstraint, parseWithZod } from "@conform-to/zod/v4";
import { Form, Link, redirect } from "react-router";
import type { z } from "zod";
import { readForm } from "#app/http/forms.server.ts";
import { type FormReply, invalidReply, refusedReply } from "#app/http/formReply.server.ts";
import { forPage } from "#app/http/respond.server.ts";
import { paths } from "#app/paths.ts";
import { findOwnKeys, makeKey, withdrawKey } from "#app/people/apiKey.server.ts";
import { newKeyForm, withdrawKeyForm } from "#app/people/forms.ts";
import { type Scope, scopeInfo, SCOPES, USUAL_KEY_DAYS } from "#app/people/key.ts";
import { may } from "#app/people/permissions.ts";
import { requireActing } from "#app/people/visitor.server.ts";
import { Button, usePending } from "#app/ui/Button.tsx";
import { EmptyPage } from "#app/ui/EmptyPage.tsx";
import { Field, FieldError, Select } from "#app/ui/Field.tsx";
import { FormErrors } from "#app/ui/FormErrors.tsx";
import { Leaf } from "#app/ui/Leaf.tsx";
import { Note } from "#app/ui/Note.tsx";
import { Section } from "#app/ui/Section.tsx";
import { StatusLine } from "#app/ui/StatusLine.tsx";
import { Table } from "#app/ui/Table.tsx";
import { dateInWords, Time } from "#app/ui/Time.tsx";
import type { Route } from "./+types/account.keys";

export const meta: Route.MetaFunction = () => [{ title: "API keys · Tablewright" }];

export const loader = forPage(async ({ request }: Route.LoaderArgs) => {
  const acting = await requireActing(request, "key:own");
  const now = new Date();
  const keys = (await findOwnKeys(acting)).map((key) => ({
    ...key,
    state: key.withdrawnAt
      ? ("withdrawn" as const)
      : key.endsAt <= now
        ? ("past its time" as const)
        : ("in use" as const),
  }));
  return {
    keys,
    scopes: SCOPES.filter((scope) => may(acting.person.roles, scopeInfo[scope].permission)),
    withdrawn: new URL(request.url).searchParams.has("withdrawn"),
  };
});

/** What the page gets: the form's answer, or the key itself, this once. */
type Answer = FormReply | { made: { name: string; key: string; endsAt: Date } };

export const action = forPage(async ({ request }: Route.ActionArgs): Promise<Answer | Response> => {
  const acting = await requireActing(request, "key:own");
  const form = await readForm(request);
  if (form.get("intent") === "withdraw") {
    const submission = parseWithZod(form, { schema: withdrawKeyForm });
    if (submission.status !== "success") return invalidReply(submission);
    await withdrawKey(acting, submission.value.key);
    return redirect(`${paths.keys()}?withdrawn`);
  }
  const submission = parseWithZod(form, { schema: newKeyForm });
  if (submission.status !== "success") return invalidReply(submission);
  try {
    const { key, endsAt } = await makeKey(acting, submission.value);
    return { made: { name: submission.value.name, key, endsAt } };
  } catch (error) {
    return refusedReply(submission, error);
  }
});

const LIVES: readonly (readonly [string, string])[] = [
  ["30", "30 days"],
  ["90", "90 days"],
  ["365", "one year"],
  ["730", "two years"],
];

export default function KeysPage({ loaderData, actionData }: Route.ComponentProps) {
  const { keys, scopes, withdrawn } = loaderData;
  const made = actionData && "made" in actionData ? actionData.made : null;
  return (
    <Leaf
      heading="API keys"
      section="account"
      lede="With a key, a program of the laboratory reads the table as you: for each bench its own, so that one can be withdrawn without the others."
    >
      {withdrawn && !made && <StatusLine>The key is withdrawn; its next request is refused.</StatusLine>}
      {made && (
        <div role="status">
          <Note kind="clean" word="Made">
            <p>
              This is the key for {made.name}, good until {dateInWords(made.endsAt)}. It is shown this once; keep it
              where the program finds it.
            </p>
            <p className="my-2 break-all">
              <b className="select-all">{made.key}</b>
            </p>
          </Note>
        </div>
      )}
      <Section head="Make a key">
        <KeyForm
          scopes={scopes}
          lastResult={actionData && !("made" in actionData) ? actionData : undefined}
          key={made?.key}
        />
      </Section>
      <Section head="Your keys">
        {keys.length === 0 ? (
          <EmptyPage>You have no keys yet. Each key you make stands here with when it was last used.</EmptyPage>
        ) : (
          <Table caption="Your API keys" even className="max-w-5xl">
            <thead>
              <tr>
                <th scope="col">Program</th>
                <th scope="col">Key</th>
                <th scope="col">May</th>
                <th scope="col">Last used</th>
                <th scope="col">Good until</th>
                <th scope="col">
                  <span className="said">Withdraw</span>
                </th>
              </tr>
            </thead>
            <tbody>
              {keys.map((key) => (
                <tr key={key.id}>
                  <th scope="row">{key.name}</th>
                  <td className="tight">twk_{key.id}_…</td>
                  <td>{key.scopes.join(", ")}</td>
                  <td className="tight">{key.lastUsedAt ? <Time at={key.lastUsedAt} withTime /> : "never"}</td>
                  <td className="tight">
                    {key.state === "withdrawn" ? "withdrawn" : <Time at={key.endsAt} />}
                    {key.state === "past its time" && " (past)"}
                  </td>
                  <td>
                    {key.state !== "withdrawn" && (
                      <Form method="post">
                        <input type="hidden" name="key" value={key.id} />
                        <Button kind="text" name="intent" value="withdraw" aria-label={`Withdraw the key ${key.name}`}>
                          Withdraw
                        </Button>
                      </Form>
                    )}
                  </td>
                </tr>
              ))}
            </tbody>
          </Table>
        )}
        <p className="mt-4">
          How programs use a key: <Link to={paths.apiGuide()}>for programs</Link>.
        </p>
      </Section>
    </Leaf>
  );
}

function KeyForm({ scopes, lastResult }: { scopes: readonly Scope[]; lastResult: SubmissionResult | undefined }) {
  const [form, fields] = useForm<z.input<typeof newKeyForm>>({
    lastResult: lastResult ?? null,
    constraint: getZodConstraint(newKeyForm),
    defaultValue: { name: "", scopes: ["read"], days: USUAL_KEY_DAYS },
  });
  const pending = usePending("intent", "make");
  const chosen = [fields.scopes.initialValue ?? []].flat();
  return (
    <>
      <FormErrors
        errors={form.errors}
        fields={[
          [fields.name, "Program"],
          [fields.scopes, "What it may do"],
          [fields.days, "Good for"],
        ]}
      />
      <Form method="post" id={form.id} onSubmit={form.onSubmit} noValidate={form.noValidate}>
        <Field
          field={fields.name}
          label="Program"
          hint="Which program or instrument uses it: “titration-2”."
          autoComplete="off"
        />
        <fieldset className="field" id={fields.scopes.id} tabIndex={-1}>
          <legend className="field-label">What it may do</legend>
          {scopes.map((scope) => (
            <label key={scope} className="flex items-start gap-2.5">
              <input
                className="check"
                type="checkbox"
                name="scopes"
                value={scope}
                defaultChecked={chosen.includes(scope)}
              />
              <span>
                {scopeInfo[scope].sentence} <span className="text-soft">({scope})</span>
              </span>
            </label>
          ))}
          <FieldError field={fields.scopes} />
        </fieldset>
        <Select field={fields.days} label="Good for" options={LIVES} />
        <Button kind="main" name="intent" value="make" pending={pending} pendingLabel="Making…">
          Make the key
        </Button>
      </Form>
    </>
  );
}
