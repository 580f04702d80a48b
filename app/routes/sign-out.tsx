import { Form, redirect } from "react-router";
import { readForm } from "#app/http/forms.server.ts";
import { forPage } from "#app/http/respond.server.ts";
import { paths } from "#app/paths.ts";
import { endedSessionCookie } from "#app/people/sessionCookie.server.ts";
import { signOut } from "#app/people/sessions.server.ts";
import { findVisitor, requestIdOf } from "#app/people/visitor.server.ts";
import { Button } from "#app/ui/Button.tsx";
import { Leaf } from "#app/ui/Leaf.tsx";
import type { Route } from "./+types/sign-out";

export const meta: Route.MetaFunction = () => [{ title: "Sign out · Tablewright" }];

export const loader = forPage(async ({ request }: Route.LoaderArgs) => {
  if (!(await findVisitor(request))) throw redirect(paths.signIn());
  return null;
});

export const action = forPage(async ({ request }: Route.ActionArgs) => {
  await readForm(request);
  const visitor = await findVisitor(request);
  if (visitor) {
    const { sessionId, ...person } = visitor;
    await signOut({ person, apiKeyId: null, requestId: requestIdOf(request) }, sessionId);
  }
  const headers = new Headers();
  headers.append("Set-Cookie", endedSessionCookie());
  // What the browser kept of the pages goes with the session.
  headers.append("Clear-Site-Data", '"cache", "storage"');
  return redirect(`${paths.signIn()}?notice=signed-out`, { headers });
});

export default function SignOutPage() {
  return (
    <Leaf heading="Sign out" lede="Ends this session, on this browser only.">
      <Form method="post" reloadDocument>
        <Button kind="main">Sign out</Button>
      </Form>
    </Leaf>
  );
}
