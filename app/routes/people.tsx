import { useForm } from "@conform-to/react";
import { getZodConstraint, parseWithZod } from "@conform-to/zod/v4";
import { Form, Link, redirect, useSearchParams } from "react-router";
import type { z } from "zod";
import { readForm } from "#app/http/forms.server.ts";
import { invalidReply, refusedReply } from "#app/http/formReply.server.ts";
import { requestContext } from "#app/http/requestContext.server.ts";
import { forPage, readQuery } from "#app/http/respond.server.ts";
import { paths } from "#app/paths.ts";
import { inviteForm } from "#app/people/forms.ts";
import { invitePerson } from "#app/people/invitations.server.ts";
import { findPeople } from "#app/people/people.server.ts";
import { ACCOUNT_STATES, ROLES } from "#app/people/person.ts";
import { asksPassword, demandFresh } from "#app/people/signing.server.ts";
import { requireVisitor } from "#app/people/visitor.server.ts";
import { Button, usePending } from "#app/ui/Button.tsx";
import { EmptyPage } from "#app/ui/EmptyPage.tsx";
import { Field, InlineField, InlineSelect, Sentence } from "#app/ui/Field.tsx";
import { FormErrors } from "#app/ui/FormErrors.tsx";
import { Leaf } from "#app/ui/Leaf.tsx";
import { Section } from "#app/ui/Section.tsx";
import { Table } from "#app/ui/Table.tsx";
import { Time } from "#app/ui/Time.tsx";
import type { Route } from "./+types/people";
import { RoleBoxes } from "./person/RoleBoxes.tsx";

export const meta: Route.MetaFunction = () => [{ title: "People · Tablewright" }];

/** How long to wait after too many wrong passwords. */
export const headers: Route.HeadersFunction = ({ actionHeaders }) => actionHeaders;

const FILTER_FIELDS = ["q", "role", "account"] as const;
const LONGEST_SEARCH = 200;

export const loader = forPage(async ({ request }: Route.LoaderArgs) => {
  const { acting, sessionId } = await requireVisitor(request, "people:manage");
  const { q, role, account } = readQuery(request, FILTER_FIELDS);
  const people = await findPeople(acting, {
    text: q?.trim().slice(0, LONGEST_SEARCH) || undefined,
    role: ROLES.find((one) => one === role),
    state: ACCOUNT_STATES.find((one) => one === account),
  });
  return { people, asksPassword: await asksPassword(acting, sessionId) };
});

export const action = forPage(async ({ request, context }: Route.ActionArgs) => {
  const { acting, sessionId } = await requireVisitor(request, "people:manage");
  const submission = parseWithZod(await readForm(request), { schema: inviteForm });
  if (submission.status !== "success") return invalidReply(submission, { hide: ["password"] });
  const { value } = submission;
  try {
    const from = { address: context.get(requestContext).address, requestId: acting.requestId };
    await demandFresh(acting, sessionId, value.password ?? "", from, new Date(), "change accounts");
    const { id } = await invitePerson(acting, value);
    return redirect(`${paths.person(id)}?done=invite`);
  } catch (error) {
    return refusedReply(submission, error, { hide: ["password"] });
  }
});

export default function PeoplePage({ loaderData, actionData }: Route.ComponentProps) {
  const { people } = loaderData;
  const [search] = useSearchParams();
  const given = (name: string): string => search.get(name) ?? "";
  const filtered = FILTER_FIELDS.some((name) => given(name) !== "");
  return (
    <Leaf
      heading="People"
      section="people"
      lede="Who has an account, and what each may do. An account is never deleted, only switched off: its name stays beside what the person did."
    >
      <Form method="get" action={paths.people()}>
        <Sentence>
          <span>Showing</span>
          <InlineSelect
            label="Account"
            name="account"
            defaultValue={given("account")}
            options={[["", "every account"], ...ACCOUNT_STATES.map((state) => [state, state] as const)]}
          />
          <span>with</span>
          <InlineSelect
            label="Role"
            name="role"
            defaultValue={given("role")}
            options={[["", "any role"], ...ROLES.map((role) => [role, `the role ${role}`] as const)]}
          />
          <span>named</span>
          <InlineField
            label="Name or address"
            name="q"
            defaultValue={given("q")}
            placeholder="anything"
            maxLength={LONGEST_SEARCH}
            size={14}
          />
          <Button kind="text" type="submit">
            show
          </Button>
        </Sentence>
      </Form>
      {people.length === 0 ? (
        <EmptyPage start={<Link to={paths.people()}>Show every account</Link>}>No account fits.</EmptyPage>
      ) : (
        <Table caption={filtered ? "Accounts that fit" : "Accounts"} even className="max-w-6xl">
          <thead>
            <tr>
              <th scope="col">Name</th>
              <th scope="col">Address</th>
              <th scope="col">Roles</th>
              <th scope="col">Account</th>
              <th scope="col">Last sign-in</th>
              <th scope="col" className="figure">
                Sessions
              </th>
            </tr>
          </thead>
          <tbody>
            {people.map((person) => (
              <tr key={person.id}>
                <th scope="row">
                  <Link to={paths.person(person.id)}>{person.name}</Link>
                </th>
                <td>{person.email}</td>
                <td>{person.roles.join(", ") || <span className="text-soft">none</span>}</td>
                <td className="tight">{person.state}</td>
                <td className="tight">
                  {person.lastSignIn ? (
                    <Time at={person.lastSignIn} withTime />
                  ) : (
                    <span className="text-soft">never</span>
                  )}
                </td>
                <td className="figure">{person.sessions}</td>
              </tr>
            ))}
          </tbody>
        </Table>
      )}
      <Section head="Invite somebody">
        <InviteForm lastResult={actionData} asksPassword={loaderData.asksPassword} />
      </Section>
    </Leaf>
  );
}

function InviteForm({
  lastResult,
  asksPassword,
}: {
  lastResult: Route.ComponentProps["actionData"];
  asksPassword: boolean;
}) {
  const [form, fields] = useForm<z.input<typeof inviteForm>>({
    lastResult: lastResult ?? null,
    constraint: getZodConstraint(inviteForm),
  });
  const pending = usePending("intent", "invite");
  return (
    <>
      <FormErrors
        errors={form.errors}
        fields={[
          [fields.name, "Name"],
          [fields.email, "E-mail address"],
          [fields.password, "Your password"],
        ]}
      />
      <Form method="post" id={form.id} onSubmit={form.onSubmit} noValidate={form.noValidate}>
        <Field
          field={fields.name}
          label="Name"
          hint="As it shall stand beside what the person does."
          autoComplete="off"
        />
        <Field
          field={fields.email}
          label="E-mail address"
          hint="The invitation goes there; the person chooses the password."
          type="email"
          autoComplete="off"
        />
        <fieldset className="field">
          <legend className="field-label">Roles</legend>
          <RoleBoxes held={[fields.roles.initialValue ?? []].flat().map(String)} />
        </fieldset>
        {asksPassword && (
          <Field
            field={{ ...fields.password, required: true }}
            label="Your password"
            hint="You signed in a while ago, so it is asked for once more."
            type="password"
            autoComplete="current-password"
          />
        )}
        <Button kind="main" name="intent" value="invite" pending={pending} pendingLabel="Inviting…">
          Invite
        </Button>
      </Form>
    </>
  );
}
