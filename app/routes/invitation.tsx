import { redirect } from "react-router";
import { readForm } from "#app/http/forms.server.ts";
import { forPage } from "#app/http/respond.server.ts";
import { paths } from "#app/paths.ts";
import { findUsableLink } from "#app/people/links.server.ts";
import { Leaf } from "#app/ui/Leaf.tsx";
import type { Route } from "./+types/invitation";
import { LinkGone, PasswordForm } from "./password/form.tsx";
import { setPassword } from "./password/set.server.ts";

export const meta: Route.MetaFunction = () => [{ title: "Invitation · Tablewright" }];

export const loader = forPage(async ({ params }: Route.LoaderArgs) => {
  const link = await findUsableLink("invitation", params.token);
  return { invited: link ? { email: link.email, name: link.name } : null };
});

export const action = forPage(async ({ request, params }: Route.ActionArgs) => {
  const refusal = await setPassword("invitation", params.token, await readForm(request), request);
  return refusal ?? redirect(`${paths.signIn()}?notice=password-set`);
});

export default function InvitationPage({ loaderData, actionData }: Route.ComponentProps) {
  const { invited } = loaderData;
  if (!invited) {
    return (
      <Leaf heading="This invitation has gone">
        <LinkGone kind="invitation" />
      </Leaf>
    );
  }
  return (
    <Leaf heading={`Welcome, ${invited.name}`} lede="Choose the password with which you will sign in.">
      <PasswordForm email={invited.email} lastResult={actionData} />
    </Leaf>
  );
}
