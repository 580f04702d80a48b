import { data, Form, Link, redirect } from "react-router";
import { Refused } from "#app/http/errors.ts";
import { readForm } from "#app/http/forms.server.ts";
import { forPage } from "#app/http/respond.server.ts";
import { paths } from "#app/paths.ts";
import { findUsableAddressChange } from "#app/people/links.server.ts";
import { takeAddress } from "#app/people/profile.server.ts";
import { findVisitor, requestIdOf } from "#app/people/visitor.server.ts";
import { Button, usePending } from "#app/ui/Button.tsx";
import { FormErrors } from "#app/ui/FormErrors.tsx";
import { Leaf } from "#app/ui/Leaf.tsx";
import { Lede } from "#app/ui/Section.tsx";
import type { Route } from "./+types/address";

export const meta: Route.MetaFunction = () => [{ title: "New address · Tablewright" }];

export const loader = forPage(async ({ params }: Route.LoaderArgs) => {
  const link = await findUsableAddressChange(params.token);
  return { change: link ? { from: link.email, to: link.newEmail } : null };
});

/** Opening the link changes nothing: programs that look through mail open every link. The button does. */
export const action = forPage(async ({ request, params }: Route.ActionArgs) => {
  await readForm(request);
  try {
    await takeAddress(params.token, { requestId: requestIdOf(request) });
  } catch (error) {
    if (!(error instanceof Refused)) throw error;
    return data({ sentence: error.message }, { status: error.status });
  }
  const signedIn = await findVisitor(request);
  return redirect(signedIn ? `${paths.account()}?done=address` : `${paths.signIn()}?notice=address-set`);
});

export default function NewAddressPage({ loaderData: { change }, actionData }: Route.ComponentProps) {
  const pending = usePending();
  if (!change) {
    return (
      <Leaf heading="This link has gone">
        {actionData && <FormErrors errors={[actionData.sentence]} />}
        <Lede>
          It was used already, has run out, or was never made. Ask for a new one on the page of{" "}
          <Link to={paths.account()}>your account</Link>.
        </Lede>
      </Leaf>
    );
  }
  return (
    <Leaf heading="Confirm your new address" lede="From then on you sign in with it, and letters go there.">
      {actionData && <FormErrors errors={[actionData.sentence]} />}
      <p className="mb-4 break-words">
        <b>{change.to}</b> in the place of {change.from}
      </p>
      <Form method="post">
        <Button kind="main" pending={pending} pendingLabel="Changing…">
          Use this address
        </Button>
      </Form>
    </Leaf>
  );
}
