import { type SubmissionResult, useForm } from "@conform-to/react";
import { getZodConstraint } from "@conform-to/zod/v4";
import { Form, Link } from "react-router";
import type { z } from "zod";
import { paths } from "#app/paths.ts";
import { newPasswordForm } from "#app/people/forms.ts";
import { PASSWORD_HINT } from "#app/people/passwordRules.ts";
import { Button, usePending } from "#app/ui/Button.tsx";
import { Field } from "#app/ui/Field.tsx";
import { FormErrors } from "#app/ui/FormErrors.tsx";

interface PasswordFormProps {
  /** The account's address, shown and given to the password manager. */
  email: string;
  lastResult: SubmissionResult | undefined;
}

/** The form under a secret link: one field, for the password. */
export function PasswordForm({ email, lastResult }: PasswordFormProps) {
  const [form, fields] = useForm<z.input<typeof newPasswordForm>>({
    lastResult: lastResult ?? null,
    constraint: getZodConstraint(newPasswordForm),
  });
  const pending = usePending();
  return (
    <>
      <FormErrors errors={form.errors} fields={[[fields.password, "Password"]]} />
      <Form method="post" id={form.id} onSubmit={form.onSubmit} noValidate={form.noValidate}>
        <p className="mb-4">
          Account: <b>{email}</b>
        </p>
        {/* Password managers file what they keep under the account's name. */}
        <input type="hidden" name="username" value={email} autoComplete="username" />
        <Field
          field={fields.password}
          label="Password"
          hint={PASSWORD_HINT}
          type="password"
          autoComplete="new-password"
        />
        <Button kind="main" pending={pending} pendingLabel="Setting…">
          Set the password
        </Button>
      </Form>
    </>
  );
}

/** What stands in the place of the form when the link cannot be used. */
export function LinkGone({ kind }: { kind: "reset" | "invitation" }) {
  return (
    <p className="max-w-[60ch]">
      It was used already, has run out, or was never made.{" "}
      {kind === "reset" ? (
        <>
          Ask for a <Link to={paths.forgotten()}>new letter</Link>.
        </>
      ) : (
        <>
          If you have chosen a password before, <Link to={paths.signIn()}>sign in</Link>; else ask an administrator for
          a new invitation.
        </>
      )}
    </p>
  );
}
