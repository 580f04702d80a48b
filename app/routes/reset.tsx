import { redirect } from "react-router";
import { readForm } from "#app/http/forms.server.ts";
import { forPage } from "#app/http/respond.server.ts";
import { paths } from "#app/paths.ts";
import { findUsableLink } from "#app/people/links.server.ts";
import { Leaf } from "#app/ui/Leaf.tsx";
import type { Route } from "./+types/reset";
import { LinkGone, PasswordForm } from "./password/form.tsx";
import { setPassword } from "./password/set.server.ts";

export const meta: Route.MetaFunction = () => [{ title: "New password · Tablewright" }];

export const loader = forPage(async ({ params }: Route.LoaderArgs) => {
  const link = await findUsableLink("password_reset", params.token);
  return { email: link?.email ?? null };
});

export const action = forPage(async ({ request, params }: Route.ActionArgs) => {
  const refusal = await setPassword("password_reset", params.token, await readForm(request), request);
  return refusal ?? redirect(`${paths.signIn()}?notice=password-set`);
});

export default function ResetPage({ loaderData, actionData }: Route.ComponentProps) {
  if (loaderData.email === null) {
    return (
      <Leaf heading="This link has gone">
        <LinkGone kind="reset" />
      </Leaf>
    );
  }
  return (
    <Leaf heading="Choose a new password" lede="Setting it ends every session of your account.">
      <PasswordForm email={loaderData.email} lastResult={actionData} />
    </Leaf>
  );
}
