import { useForm } from "@conform-to/react";
import { getZodConstraint, parseWithZod } from "@conform-to/zod/v4";
import { Form, redirect } from "react-router";
import type { z } from "zod";
import { readForm } from "#app/http/forms.server.ts";
import { invalidReply, refusedReply } from "#app/http/formReply.server.ts";
import { forPage } from "#app/http/respond.server.ts";
import { paths } from "#app/paths.ts";
import { inviteForm, peopleForm } from "#app/people/forms.ts";
import {
  endSessionsOf,
  findPeople,
  giveRoles,
  inviteAgain,
  invitePerson,
  type ListedAccount,
  switchOff,
  switchOn,
} from "#app/people/people.server.ts";
import { ROLES } from "#app/people/person.ts";
import { requireActing } from "#app/people/visitor.server.ts";
import { Button, usePending } from "#app/ui/Button.tsx";
import { Field } from "#app/ui/Field.tsx";
import { FormErrors } from "#app/ui/FormErrors.tsx";
import { Leaf } from "#app/ui/Leaf.tsx";
import { Section } from "#app/ui/Section.tsx";
import { StatusLine } from "#app/ui/StatusLine.tsx";
import { RowUnder, Table } from "#app/ui/Table.tsx";
import type { Route } from "./+types/people";

export const meta: Route.MetaFunction = () => [{ title: "People · Tablewright" }];

/** What is said after each act, by the intent that asked for it. */
const NOTICES: Readonly<Record<string, string>> = {
  invite: "Invited. A letter is on its way.",
  "invite-again": "Invited again. A letter is on its way.",
  roles: "The roles are changed, from the person’s next request on.",
  "switch-off": "The account is switched off and its sessions are ended.",
  "switch-on": "The account is in use again.",
  "end-sessions": "The sessions are ended.",
};

export const loader = forPage(async ({ request }: Route.LoaderArgs) => {
  const acting = await requireActing(request, "people:manage");
  return {
    people: await findPeople(acting),
    notice: NOTICES[new URL(request.url).searchParams.get("done") ?? ""] ?? null,
  };
});

export const action = forPage(async ({ request }: Route.ActionArgs) => {
  const acting = await requireActing(request, "people:manage");
  const form = await readForm(request);
  const submission = parseWithZod(form, { schema: peopleForm });
  if (submission.status !== "success") return invalidReply(submission);
  const { value } = submission;
  try {
    switch (value.intent) {
      case "invite":
        await invitePerson(acting, value);
        break;
      case "invite-again":
        await inviteAgain(acting, value.person);
        break;
      case "roles":
        await giveRoles(acting, value.person, value.roles);
        break;
      case "switch-off":
        await switchOff(acting, value.person);
        break;
      case "switch-on":
        await switchOn(acting, value.person);
        break;
      case "end-sessions":
        await endSessionsOf(acting, value.person);
        break;
    }
    return redirect(`${paths.people()}?done=${value.intent}`);
  } catch (error) {
    return refusedReply(submission, error);
  }
});

export default function PeoplePage({ loaderData, actionData }: Route.ComponentProps) {
  const { people, notice } = loaderData;
  const refused = actionData?.initialValue?.["intent"] !== "invite" ? actionData : undefined;
  return (
    <Leaf
      heading="People"
      section="people"
      lede="Who has an account, and what each may do. An account is never deleted, only switched off: its name stays beside what the person did."
    >
      {notice && !actionData && <StatusLine>{notice}</StatusLine>}
      <Table caption="Accounts" even className="max-w-5xl">
        <thead>
          <tr>
            <th scope="col">Name</th>
            <th scope="col">Address</th>
            <th scope="col">Roles</th>
            <th scope="col">Account</th>
          </tr>
        </thead>
        <tbody>
          {people.map((person) => (
            <PersonRows
              key={person.id}
              person={person}
              refusal={
                refused?.initialValue?.["person"] === person.id
                  ? Object.values(refused.error ?? {})
                      .flat()
                      .join(" ")
                  : ""
              }
            />
          ))}
        </tbody>
      </Table>
      <Section head="Invite somebody">
        <InviteForm lastResult={refused ? undefined : actionData} />
      </Section>
    </Leaf>
  );
}

/** A person's line, and under it what an administrator can do, folded away. */
function PersonRows({ person, refusal }: { person: ListedAccount; refusal: string }) {
  const act = (intent: string, label: string) => (
    <Button name="intent" value={intent}>
      {label}
    </Button>
  );
  return (
    <>
      <tr>
        <th scope="row">{person.name}</th>
        <td>{person.email}</td>
        <td>{person.roles.join(", ") || <span className="text-soft">none</span>}</td>
        <td>{person.state}</td>
      </tr>
      <RowUnder columns={4}>
        {refusal !== "" && (
          <p className="field-error" role="alert">
            {refusal}
          </p>
        )}
        <details open={refusal !== ""}>
          <summary className="cursor-pointer text-fine text-verdigris">
            Change<span className="said"> the account of {person.name}</span>
          </summary>
          <Form method="post" className="mt-2 flex flex-wrap items-center gap-x-5 gap-y-2">
            <input type="hidden" name="person" value={person.id} />
            <fieldset className="flex flex-wrap gap-x-4 gap-y-1">
              <legend className="said">Roles of {person.name}</legend>
              <RoleBoxes held={person.roles} />
            </fieldset>
            {act("roles", "Save roles")}
          </Form>
          <Form method="post" className="my-3 flex flex-wrap gap-3">
            <input type="hidden" name="person" value={person.id} />
            {person.state === "switched off" ? act("switch-on", "Switch on") : act("switch-off", "Switch off")}
            {person.state === "in use" && act("end-sessions", "End sessions")}
            {person.state === "invited" && act("invite-again", "Invite again")}
          </Form>
        </details>
      </RowUnder>
    </>
  );
}

function RoleBoxes({ held }: { held: readonly string[] }) {
  return ROLES.map((role) => (
    <label key={role} className="flex items-start gap-2">
      <input className="check" type="checkbox" name="roles" value={role} defaultChecked={held.includes(role)} />
      <span>{role}</span>
    </label>
  ));
}

function InviteForm({ lastResult }: { lastResult: Route.ComponentProps["actionData"] }) {
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
        <Button kind="main" name="intent" value="invite" pending={pending} pendingLabel="Inviting…">
          Invite
        </Button>
      </Form>
    </>
  );
}
