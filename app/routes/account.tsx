import { useForm } from "@conform-to/react";
import { getZodConstraint, parseWithZod } from "@conform-to/zod/v4";
import { Form, Link, redirect } from "react-router";
import type { z } from "zod";
import { readForm } from "#app/http/forms.server.ts";
import { invalidReply, refusedReply } from "#app/http/formReply.server.ts";
import { requestContext } from "#app/http/requestContext.server.ts";
import { forPage } from "#app/http/respond.server.ts";
import { paths } from "#app/paths.ts";
import { changePasswordForm, sessionsForm } from "#app/people/forms.ts";
import { PASSWORD_HINT } from "#app/people/passwordRules.ts";
import { changePassword } from "#app/people/passwords.server.ts";
import { endOwnSessions, findOwnSessions } from "#app/people/sessions.server.ts";
import { requireVisitor } from "#app/people/visitor.server.ts";
import { Button, usePending } from "#app/ui/Button.tsx";
import { Field } from "#app/ui/Field.tsx";
import { FormErrors } from "#app/ui/FormErrors.tsx";
import { Leaf } from "#app/ui/Leaf.tsx";
import { Lede, Section } from "#app/ui/Section.tsx";
import { StatusLine } from "#app/ui/StatusLine.tsx";
import { Table } from "#app/ui/Table.tsx";
import { Time } from "#app/ui/Time.tsx";
import type { Route } from "./+types/account";

export const meta: Route.MetaFunction = () => [{ title: "Account · Tablewright" }];

/** How long to wait after too many tries. */
export const headers: Route.HeadersFunction = ({ actionHeaders }) => actionHeaders;

const NOTICES: Readonly<Record<string, string>> = {
  password: "Your password is changed; your other sessions are ended.",
  sessions: "Ended.",
};
const PASSWORDS = ["current", "password"];

export const loader = forPage(async ({ request }: Route.LoaderArgs) => {
  const { acting, sessionId } = await requireVisitor(request, "account:own");
  const { name, email, roles } = acting.person;
  const sessions = await findOwnSessions(acting);
  return {
    name,
    email,
    roles,
    notice: NOTICES[new URL(request.url).searchParams.get("done") ?? ""] ?? null,
    sessions: sessions.map((session) => ({ ...session, here: session.id === sessionId })),
  };
});

export const action = forPage(async ({ request, context }: Route.ActionArgs) => {
  const { acting, sessionId } = await requireVisitor(request, "account:own");
  const form = await readForm(request);
  if (form.get("intent") === "password") {
    const submission = parseWithZod(form, { schema: changePasswordForm });
    if (submission.status !== "success") return invalidReply(submission, { hide: PASSWORDS });
    try {
      const { address } = context.get(requestContext);
      await changePassword(acting, submission.value, { sessionId, address });
      return redirect(`${paths.account()}?done=password`);
    } catch (error) {
      return refusedReply(submission, error, { hide: PASSWORDS });
    }
  }
  const submission = parseWithZod(form, { schema: sessionsForm });
  if (submission.status !== "success") return invalidReply(submission);
  const { value } = submission;
  await endOwnSessions(acting, value.intent === "end-session" ? { only: value.session } : { but: sessionId });
  return redirect(`${paths.account()}?done=sessions`);
});

export default function AccountPage({ loaderData, actionData }: Route.ComponentProps) {
  const { name, email, roles, notice, sessions } = loaderData;
  const others = sessions.filter(({ here }) => !here).length;
  return (
    <Leaf
      heading={name}
      section="account"
      lede={
        <>
          {email} · {roles.length > 0 ? roles.join(", ") : "no role yet; an administrator gives one"}
        </>
      }
    >
      {notice && <StatusLine>{notice}</StatusLine>}
      <div className="flex flex-wrap items-center gap-5">
        <Form method="post" action={paths.signOut()} reloadDocument>
          <Button>Sign out</Button>
        </Form>
        <Link to={paths.keys()}>API keys</Link>
      </div>
      <Section head="Password">
        <PasswordForm lastResult={actionData} />
      </Section>
      <Section head="Sessions">
        <Lede>
          A session ends by itself twelve hours after its last use and seven days after signing in. End one that is not
          yours, then change your password.
        </Lede>
        <Table caption="Sessions signed in with your account" even className="max-w-4xl">
          <thead>
            <tr>
              <th scope="col">Browser</th>
              <th scope="col">Signed in</th>
              <th scope="col">Last used</th>
              <th scope="col">
                <span className="said">End</span>
              </th>
            </tr>
          </thead>
          <tbody>
            {sessions.map((session) => (
              <tr key={session.id}>
                <th scope="row">{session.here ? <b>This one</b> : session.agent || "not named"}</th>
                <td className="tight">
                  <Time at={session.begunAt} withTime />
                </td>
                <td className="tight">
                  <Time at={session.seenAt} withTime />
                </td>
                <td>
                  {!session.here && (
                    <Form method="post">
                      <input type="hidden" name="session" value={session.id} />
                      <Button
                        kind="text"
                        name="intent"
                        value="end-session"
                        aria-label={`End the session of ${session.agent || "an unnamed browser"}`}
                      >
                        End
                      </Button>
                    </Form>
                  )}
                </td>
              </tr>
            ))}
          </tbody>
        </Table>
        {others > 0 && (
          <Form method="post" className="mt-4">
            <Button name="intent" value="end-others">
              End all other sessions
            </Button>
          </Form>
        )}
      </Section>
    </Leaf>
  );
}

function PasswordForm({ lastResult }: { lastResult: Route.ComponentProps["actionData"] }) {
  const [form, fields] = useForm<z.input<typeof changePasswordForm>>({
    lastResult: lastResult ?? null,
    constraint: getZodConstraint(changePasswordForm),
  });
  const pending = usePending("intent", "password");
  return (
    <>
      <FormErrors
        errors={form.errors}
        fields={[
          [fields.current, "Current password"],
          [fields.password, "New password"],
        ]}
      />
      <Form method="post" id={form.id} onSubmit={form.onSubmit} noValidate={form.noValidate}>
        <Field field={fields.current} label="Current password" type="password" autoComplete="current-password" />
        <Field
          field={fields.password}
          label="New password"
          hint={PASSWORD_HINT}
          type="password"
          autoComplete="new-password"
        />
        <Button name="intent" value="password" pending={pending} pendingLabel="Changing…">
          Change the password
        </Button>
      </Form>
    </>
  );
}
