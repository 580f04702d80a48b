import { type SubmissionResult, useForm } from "@conform-to/react";
import { getZodConstraint, parseWithZod } from "@conform-to/zod/v4";
import { data, Form, Link, redirect } from "react-router";
import type { z } from "zod";
import { readForm } from "#app/http/forms.server.ts";
import { type FormReply, invalidReply, refusedReply } from "#app/http/formReply.server.ts";
import { requestContext } from "#app/http/requestContext.server.ts";
import { forPage } from "#app/http/respond.server.ts";
import { paths } from "#app/paths.ts";
import { addressForm, changePasswordForm, renameForm, sessionsForm } from "#app/people/forms.ts";
import { PASSWORD_HINT } from "#app/people/passwordRules.ts";
import { changePassword } from "#app/people/passwords.server.ts";
import { askForAddress, renameOneself } from "#app/people/profile.server.ts";
import { endOwnSessions, findOwnSessions } from "#app/people/sessions.server.ts";
import { requireVisitor } from "#app/people/visitor.server.ts";
import { Button, usePending } from "#app/ui/Button.tsx";
import { Field } from "#app/ui/Field.tsx";
import { FormErrors } from "#app/ui/FormErrors.tsx";
import { Leaf } from "#app/ui/Leaf.tsx";
import { Columns, Lede, Section } from "#app/ui/Section.tsx";
import { StatusLine } from "#app/ui/StatusLine.tsx";
import type { Route } from "./+types/account";
import { SessionsTable } from "./person/SessionsTable.tsx";

export const meta: Route.MetaFunction = () => [{ title: "Account · Tablewright" }];

/** How long to wait after too many tries. */
export const headers: Route.HeadersFunction = ({ actionHeaders }) => actionHeaders;

const NOTICES: Readonly<Record<string, string>> = {
  password: "Your password is changed; your other sessions are ended.",
  sessions: "Ended.",
  name: "Your name is changed.",
  "address-asked":
    "A letter is on its way to the new address; the link in it makes the change. If none comes, another account may have that address: ask an administrator.",
  address: "Your address is changed. Sign in with the new one from now on.",
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
  const { address } = context.get(requestContext);
  const form = await readForm(request);
  const hide = { hide: PASSWORDS };
  switch (form.get("intent")) {
    case "password": {
      const submission = parseWithZod(form, { schema: changePasswordForm });
      if (submission.status !== "success") return answer("password", invalidReply(submission, hide));
      try {
        await changePassword(acting, submission.value, { sessionId, address });
        return redirect(`${paths.account()}?done=password`);
      } catch (error) {
        return answer("password", refusedReply(submission, error, hide));
      }
    }
    case "rename": {
      const submission = parseWithZod(form, { schema: renameForm });
      if (submission.status !== "success") return answer("rename", invalidReply(submission));
      try {
        await renameOneself(acting, submission.value.name);
        return redirect(`${paths.account()}?done=name`);
      } catch (error) {
        return answer("rename", refusedReply(submission, error));
      }
    }
    case "address": {
      const submission = parseWithZod(form, { schema: addressForm });
      if (submission.status !== "success") return answer("address", invalidReply(submission, hide));
      try {
        await askForAddress(acting, submission.value, { address });
        return redirect(`${paths.account()}?done=address-asked`);
      } catch (error) {
        return answer("address", refusedReply(submission, error, hide));
      }
    }
    default: {
      const submission = parseWithZod(form, { schema: sessionsForm });
      if (submission.status !== "success") return answer("sessions", invalidReply(submission));
      const { value } = submission;
      await endOwnSessions(acting, value.intent === "end-session" ? { only: value.session } : { but: sessionId });
      return redirect(`${paths.account()}?done=sessions`);
    }
  }
});

type FormName = "password" | "rename" | "address" | "sessions";

/** The answer of one of the page's forms, so that no other shows it. */
function answer(form: FormName, reply: FormReply) {
  return data({ form, result: reply.data }, reply.init ?? {});
}

export default function AccountPage({ loaderData, actionData }: Route.ComponentProps) {
  const { name, email, roles, notice, sessions } = loaderData;
  const resultOf = (form: FormName) => (actionData?.form === form ? actionData.result : undefined);
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
      {notice && !actionData && <StatusLine>{notice}</StatusLine>}
      <div className="flex flex-wrap items-center gap-5">
        <Form method="post" action={paths.signOut()} reloadDocument>
          <Button>Sign out</Button>
        </Form>
        <Link to={paths.keys()}>API keys</Link>
      </div>
      <Columns>
        <Section head="Name">
          <NameForm key={name} name={name} lastResult={resultOf("rename")} />
        </Section>
        <Section head="Address">
          <AddressForm key={email} email={email} lastResult={resultOf("address")} />
        </Section>
        <Section head="Password">
          <PasswordForm lastResult={resultOf("password")} />
        </Section>
      </Columns>
      <Section head="Sessions">
        <Lede>
          A session ends by itself twelve hours after its last use and seven days after signing in. End one that is not
          yours, then change your password.
        </Lede>
        <SessionsTable caption="Sessions signed in with your account" sessions={sessions} />
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

interface FormProps {
  lastResult: SubmissionResult | undefined;
}

function NameForm({ name, lastResult }: FormProps & { name: string }) {
  const [form, fields] = useForm<z.input<typeof renameForm>>({
    id: "rename",
    lastResult: lastResult ?? null,
    defaultValue: { name },
    constraint: getZodConstraint(renameForm),
  });
  const pending = usePending("intent", "rename");
  return (
    <>
      <FormErrors errors={form.errors} fields={[[fields.name, "Name"]]} />
      <Form method="post" id={form.id} onSubmit={form.onSubmit} noValidate={form.noValidate}>
        <Field field={fields.name} label="Name" hint="As it stands beside what you do." autoComplete="name" />
        <Button name="intent" value="rename" pending={pending} pendingLabel="Changing…">
          Change the name
        </Button>
      </Form>
    </>
  );
}

function AddressForm({ email, lastResult }: FormProps & { email: string }) {
  const [form, fields] = useForm<z.input<typeof addressForm>>({
    id: "address",
    lastResult: lastResult ?? null,
    constraint: getZodConstraint(addressForm),
  });
  const pending = usePending("intent", "address");
  return (
    <>
      <FormErrors
        errors={form.errors}
        fields={[
          [fields.email, "New e-mail address"],
          [fields.current, "Current password"],
        ]}
      />
      <Form method="post" id={form.id} onSubmit={form.onSubmit} noValidate={form.noValidate}>
        <Field
          field={fields.email}
          label="New e-mail address"
          hint={`A letter goes there, whose link makes the change. Until then it is ${email}.`}
          type="email"
          autoComplete="email"
        />
        <Field field={fields.current} label="Current password" type="password" autoComplete="current-password" />
        <Button name="intent" value="address" pending={pending} pendingLabel="Asking…">
          Ask for the letter
        </Button>
      </Form>
    </>
  );
}

function PasswordForm({ lastResult }: FormProps) {
  const [form, fields] = useForm<z.input<typeof changePasswordForm>>({
    id: "password-change",
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
