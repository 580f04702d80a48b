import { getZodConstraint, parseWithZod } from "@conform-to/zod/v4";
import { useForm } from "@conform-to/react";
import { Form, Link, redirect } from "react-router";
import type { z } from "zod";
import { Invalid } from "#app/http/errors.ts";
import { readForm } from "#app/http/forms.server.ts";
import { invalidReply, refusedReply } from "#app/http/formReply.server.ts";
import { requestContext } from "#app/http/requestContext.server.ts";
import { forPage } from "#app/http/respond.server.ts";
import { paths } from "#app/paths.ts";
import { readEmail } from "#app/people/email.ts";
import { forgottenForm } from "#app/people/forms.ts";
import { askForReset } from "#app/people/passwords.server.ts";
import { Button, usePending } from "#app/ui/Button.tsx";
import { Field } from "#app/ui/Field.tsx";
import { FormErrors } from "#app/ui/FormErrors.tsx";
import { Leaf } from "#app/ui/Leaf.tsx";
import { useRootData } from "#app/ui/useRootData.ts";
import type { Route } from "./+types/forgotten";

export const meta: Route.MetaFunction = () => [{ title: "Forgotten password · Tablewright" }];

/** How long to wait after too many tries. */
export const headers: Route.HeadersFunction = ({ actionHeaders }) => actionHeaders;

export const loader = forPage(async ({ request }: Route.LoaderArgs) => {
  return { asked: new URL(request.url).searchParams.has("asked") };
});

export const action = forPage(async ({ request, context }: Route.ActionArgs) => {
  const submission = parseWithZod(await readForm(request), { schema: forgottenForm });
  if (submission.status !== "success") return invalidReply(submission);
  const { id: requestId, address } = context.get(requestContext);
  try {
    const email = readEmail(submission.value.email);
    if (!email) throw notAnAddress();
    await askForReset(email, { address, requestId });
    return redirect(`${paths.forgotten()}?asked`);
  } catch (error) {
    return refusedReply(submission, error);
  }
});

function notAnAddress(): Invalid {
  const detail = "This is not an e-mail address of the form name@example.org.";
  return new Invalid(detail, [{ pointer: "/email", detail }]);
}

export default function ForgottenPage({ loaderData, actionData }: Route.ComponentProps) {
  const { demo } = useRootData();
  const [form, fields] = useForm<z.input<typeof forgottenForm>>({
    lastResult: actionData ?? null,
    constraint: getZodConstraint(forgottenForm),
  });
  const pending = usePending();
  if (loaderData.asked) {
    return (
      <Leaf heading="Look into your mail">
        <p className="max-w-[60ch]">
          If there is an account with that address, a letter is on its way to it. Its link can be used once, within an
          hour. {demo && <Link to={paths.inbox()}>The demo’s inbox</Link>}
        </p>
        <p className="mt-4">
          <Link to={paths.signIn()}>Back to signing in</Link>
        </p>
      </Leaf>
    );
  }
  return (
    <Leaf
      heading="Forgotten password"
      lede="A letter with a link comes to your address; there you choose a new password."
    >
      <FormErrors errors={form.errors} fields={[[fields.email, "E-mail address"]]} />
      <Form method="post" id={form.id} onSubmit={form.onSubmit} noValidate={form.noValidate}>
        <Field field={fields.email} label="E-mail address" type="email" autoComplete="username" autoCapitalize="none" />
        <Button kind="main" pending={pending} pendingLabel="Asking…">
          Send the letter
        </Button>
      </Form>
    </Leaf>
  );
}
