import { getZodConstraint, parseWithZod } from "@conform-to/zod/v4";
import { useForm } from "@conform-to/react";
import { data, Form, Link, redirect } from "react-router";
import type { z } from "zod";
import { config } from "#app/config.server.ts";
import { readForm } from "#app/http/forms.server.ts";
import { invalidReply, refusedReply } from "#app/http/formReply.server.ts";
import { requestContext } from "#app/http/requestContext.server.ts";
import { forPage } from "#app/http/respond.server.ts";
import { paths } from "#app/paths.ts";
import { DEMO_PASSWORD, demoPeople } from "#app/people/demoPeople.ts";
import { signInForm } from "#app/people/forms.ts";
import { pathOfThisSite } from "#app/people/session.ts";
import { readSessionToken, sessionCookie } from "#app/people/sessionCookie.server.ts";
import { beginSession } from "#app/people/sessions.server.ts";
import { signIn, SignInFailed } from "#app/people/signIn.server.ts";
import { findVisitor } from "#app/people/visitor.server.ts";
import { Button, usePending } from "#app/ui/Button.tsx";
import { Field } from "#app/ui/Field.tsx";
import { FormErrors } from "#app/ui/FormErrors.tsx";
import { Leaf } from "#app/ui/Leaf.tsx";
import { Fine, Section } from "#app/ui/Section.tsx";
import { StatusLine } from "#app/ui/StatusLine.tsx";
import { Table } from "#app/ui/Table.tsx";
import type { Route } from "./+types/sign-in";

export const meta: Route.MetaFunction = () => [{ title: "Sign in · Tablewright" }];

/** How long to wait after too many tries. */
export const headers: Route.HeadersFunction = ({ actionHeaders }) => actionHeaders;

/** What the page says to somebody who was sent here by another one. */
const NOTICES: Readonly<Record<string, string>> = {
  "password-set": "Your password is set. Sign in with it.",
  "signed-out": "You are signed out.",
  "address-set": "Your address is changed. Sign in with the new one.",
};

export const loader = forPage(async ({ request }: Route.LoaderArgs) => {
  const search = new URL(request.url).searchParams;
  const to = pathOfThisSite(search.get("to"));
  if (await findVisitor(request)) throw redirect(to);
  const accounts = Object.values(demoPeople).map(({ email, roles }) => ({ email, role: roles.join(", ") }));
  return {
    to,
    notice: NOTICES[search.get("notice") ?? ""] ?? null,
    demo: config().demo ? { accounts, password: DEMO_PASSWORD } : null,
  };
});

export const action = forPage(async ({ request, context }: Route.ActionArgs) => {
  const submission = parseWithZod(await readForm(request.clone()), { schema: signInForm });
  if (submission.status !== "success") return invalidReply(submission, { hide: ["password"] });
  const { id: requestId, address } = context.get(requestContext);
  try {
    const person = await signIn(request, { address, requestId });
    const token = await beginSession(person, {
      agent: request.headers.get("User-Agent") ?? "",
      formerToken: readSessionToken(request),
      requestId,
    });
    return redirect(pathOfThisSite(submission.value.to), { headers: { "Set-Cookie": sessionCookie(token) } });
  } catch (error) {
    if (error instanceof SignInFailed) {
      return data(submission.reply({ formErrors: [error.message], hideFields: ["password"] }), {
        status: error.status,
      });
    }
    return refusedReply(submission, error, { hide: ["password"] });
  }
});

export default function SignInPage({ loaderData, actionData }: Route.ComponentProps) {
  const { to, notice, demo } = loaderData;
  const [form, fields] = useForm<z.input<typeof signInForm>>({
    lastResult: actionData ?? null,
    constraint: getZodConstraint(signInForm),
    shouldValidate: "onSubmit",
  });
  const pending = usePending();
  return (
    <Leaf heading="Sign in" lede="The table is for people of the laboratory. An administrator makes accounts.">
      {notice && <StatusLine>{notice}</StatusLine>}
      <FormErrors
        errors={form.errors}
        fields={[
          [fields.email, "Address"],
          [fields.password, "Password"],
        ]}
      />
      <Form method="post" id={form.id} onSubmit={form.onSubmit} noValidate={form.noValidate} className="mt-4">
        <input type="hidden" name="to" value={to} />
        <Field field={fields.email} label="E-mail address" type="email" autoComplete="username" autoCapitalize="none" />
        <Field field={fields.password} label="Password" type="password" autoComplete="current-password" />
        <div className="flex flex-wrap items-center gap-5">
          <Button kind="main" pending={pending} pendingLabel="Signing in…">
            Sign in
          </Button>
          <Link to={paths.forgotten()}>Forgotten?</Link>
        </div>
      </Form>
      {demo && (
        <Section head="The demo’s people">
          <Table caption="Accounts of the demo" even className="max-w-2xl">
            <thead>
              <tr>
                <th scope="col">Address</th>
                <th scope="col">Role</th>
              </tr>
            </thead>
            <tbody>
              {demo.accounts.map(({ email, role }) => (
                <tr key={email}>
                  <th scope="row">{email}</th>
                  <td>{role}</td>
                </tr>
              ))}
            </tbody>
          </Table>
          <Fine>
            The password of each is <b className="select-all">{demo.password}</b>. Letters are not sent; read them in
            the <Link to={paths.inbox()}>inbox</Link>.
          </Fine>
        </Section>
      )}
    </Leaf>
  );
}
