import { data, Form, Link, redirect } from "react-router";
import { findRecordPage } from "#app/audit/recordPage.server.ts";
import { actInWords } from "#app/audit/words.ts";
import { readForm } from "#app/http/forms.server.ts";
import { requestContext } from "#app/http/requestContext.server.ts";
import { forPage } from "#app/http/respond.server.ts";
import { paths } from "#app/paths.ts";
import { scopeInfo } from "#app/people/key.ts";
import { findPersonPage, type PersonPage } from "#app/people/personPage.server.ts";
import { requireActing, requireVisitor } from "#app/people/visitor.server.ts";
import { Button, usePending } from "#app/ui/Button.tsx";
import { Field } from "#app/ui/Field.tsx";
import { plainField } from "#app/ui/fieldState.ts";
import { FormErrors } from "#app/ui/FormErrors.tsx";
import { Leaf } from "#app/ui/Leaf.tsx";
import { Columns, Lede, Section } from "#app/ui/Section.tsx";
import { StatusLine } from "#app/ui/StatusLine.tsx";
import { Table } from "#app/ui/Table.tsx";
import { Time } from "#app/ui/Time.tsx";
import type { Route } from "./+types/person";
import { type Answer, changePerson } from "./person/act.server.ts";
import { NOTICES } from "./person/change.ts";
import { RoleBoxes } from "./person/RoleBoxes.tsx";
import { SessionsTable } from "./person/SessionsTable.tsx";

export const meta: Route.MetaFunction = ({ data: page }) => [
  { title: `${page ? page.person.name : "People"} · Tablewright` },
];

/** How long to wait after too many wrong passwords. */
export const headers: Route.HeadersFunction = ({ actionHeaders }) => actionHeaders;

/** Acts shown on the page; the record holds the rest. */
const ACTS_SHOWN = 8;

export const loader = forPage(async ({ request, params }: Route.LoaderArgs) => {
  const acting = await requireActing(request, "people:manage");
  const person = await findPersonPage(acting, params.person);
  const { entries } = await findRecordPage(acting, { actor: person.id }, ACTS_SHOWN);
  const done = new URL(request.url).searchParams.get("done") ?? "";
  return {
    person,
    own: person.id === acting.person.id,
    notice: Object.hasOwn(NOTICES, done) ? NOTICES[done as keyof typeof NOTICES] : null,
    acts: entries.map(({ number, at, act, objectKind, objectId, objectName }) => ({
      number,
      at,
      act,
      to: objectId === person.id ? "own account" : `${objectKind} ${objectName ?? objectId}`,
    })),
  };
});

export const action = forPage(async ({ request, params, context }: Route.ActionArgs) => {
  const visitor = await requireVisitor(request, "people:manage");
  const { address } = context.get(requestContext);
  const outcome = await changePerson({ ...visitor, address }, params.person, await readForm(request));
  if ("done" in outcome) return redirect(`${paths.person(params.person)}?done=${outcome.done}`);
  return data(outcome, { status: outcome.status });
});

export default function PersonPageView({ loaderData, actionData }: Route.ComponentProps) {
  const { person, own, notice, acts } = loaderData;
  if (actionData?.ask) return <Confirm person={person} answer={actionData} ask={actionData.ask} />;
  const name = plainField("name", {
    initialValue: actionData?.typed.name ?? person.name,
    errors: [...(actionData?.errors["name"] ?? [])],
  });
  const email = plainField("email", {
    initialValue: actionData?.typed.email ?? person.email,
    errors: [...(actionData?.errors["email"] ?? [])],
  });
  return (
    <Leaf
      heading={person.name}
      section="people"
      lede={
        <>
          {person.email} · {person.roles.join(", ") || "no role"} · {person.state}
        </>
      }
    >
      <p className="fine">
        <Link to={paths.people()}>All people</Link>
      </p>
      {notice && !actionData && <StatusLine>{notice}</StatusLine>}
      <FormErrors
        errors={actionData?.sentences}
        fields={[
          [name, "Name"],
          [email, "E-mail address"],
        ]}
      />
      {!person.takenUp && <Invitation person={person} />}
      <Columns>
        <Section head="Roles">
          {own ? (
            <Lede>
              These are your own: {person.roles.join(", ")}. Nobody changes their own roles; another administrator does.
            </Lede>
          ) : (
            <Form method="post">
              <fieldset className="field">
                <legend className="said">Roles of {person.name}</legend>
                {/* Ticked anew when the roles held have changed. */}
                <div key={person.roles.join()}>
                  <RoleBoxes held={actionData?.typed.roles ?? person.roles} />
                </div>
              </fieldset>
              <Act intent="roles">Change the roles…</Act>
            </Form>
          )}
        </Section>
        <Section head="Name and address">
          <Form method="post" key={`${person.name} ${person.email}`}>
            <Field field={name} label="Name" autoComplete="off" />
            <Field field={email} label="E-mail address" type="email" autoComplete="off" />
            <Act intent="change">Change name or address…</Act>
          </Form>
        </Section>
      </Columns>
      {person.state === "in use" && <Sessions person={person} />}
      {person.keys.length > 0 && <Keys person={person} />}
      <Section head="Lately done">
        {acts.length === 0 ? (
          <Lede>Nothing of {person.name}’s doing is on record yet.</Lede>
        ) : (
          <Table caption={`What ${person.name} did lately`} even className="max-w-4xl">
            <thead>
              <tr>
                <th scope="col">When</th>
                <th scope="col">What</th>
                <th scope="col">To</th>
              </tr>
            </thead>
            <tbody>
              {acts.map((entry) => (
                <tr key={entry.number}>
                  <td className="tight">
                    <Time at={entry.at} withTime />
                  </td>
                  <td className="tight">{actInWords(entry.act)}</td>
                  <td className="tight">{entry.to}</td>
                </tr>
              ))}
            </tbody>
          </Table>
        )}
        <p className="fine mt-3 flex flex-wrap gap-x-6 gap-y-1">
          <Link to={paths.record({ person: person.id })}>Everything this person did</Link>
          <Link to={paths.record({ object: "person", id: person.id })}>What was done to this account</Link>
        </p>
      </Section>
      {person.takenUp && <Switch person={person} />}
    </Leaf>
  );
}

function Act({ intent, children }: { intent: string; children: React.ReactNode }) {
  const pending = usePending("intent", intent);
  return (
    <Button name="intent" value={intent} pending={pending} pendingLabel="One moment…">
      {children}
    </Button>
  );
}

/** What stands in the place of the page while a change is to be confirmed: what will happen, and the two ways on. */
function Confirm({ person, answer, ask }: { person: PersonPage; answer: Answer; ask: NonNullable<Answer["ask"]> }) {
  const password = plainField("password", { errors: [...(answer.errors["password"] ?? [])], required: true });
  const pending = usePending("confirmed", "yes");
  return (
    <Leaf heading={ask.head} section="people" lede={person.email}>
      <ul className="mb-4 max-w-[60ch] list-none">
        {ask.sentences.map((sentence) => (
          <li key={sentence} className="py-0.5">
            {sentence}
          </li>
        ))}
      </ul>
      <FormErrors fields={[[password, "Your password"]]} />
      <Form method="post">
        {ask.fields.map(([name, value], index) => (
          <input key={index} type="hidden" name={name} value={value} />
        ))}
        {ask.password && (
          <Field
            field={password}
            label="Your password"
            hint="You signed in a while ago, so it is asked for once more."
            type="password"
            autoComplete="current-password"
          />
        )}
        <div className="flex flex-wrap items-center gap-5">
          <Button kind="main" name="confirmed" value="yes" pending={pending} pendingLabel="One moment…">
            {ask.verb}
          </Button>
          <Link to={paths.person(person.id)}>Leave it as it is</Link>
        </div>
      </Form>
    </Leaf>
  );
}

function Invitation({ person }: { person: PersonPage }) {
  const { invitation, state } = person;
  return (
    <Section head="Invitation">
      <Lede>
        {state === "switched off" ? (
          "It was withdrawn before a password was chosen."
        ) : invitation === null || typeof invitation === "string" ? (
          <>Invited; the letter waits to be sent.</>
        ) : invitation.over ? (
          <>
            It ran out on <Time at={invitation.endsAt} withTime /> without being taken up. Invite again for a new link.
          </>
        ) : (
          <>
            Not taken up yet. Its link opens until <Time at={invitation.endsAt} withTime />.
          </>
        )}
      </Lede>
      <Form method="post" className="flex flex-wrap gap-3">
        {state === "switched off" ? (
          <Act intent="switch-on">Switch on and invite again</Act>
        ) : (
          <>
            <Act intent="invite-again">Invite again</Act>
            <Act intent="withdraw-invitation">Withdraw the invitation…</Act>
          </>
        )}
      </Form>
    </Section>
  );
}

function Sessions({ person }: { person: PersonPage }) {
  return (
    <Section head="Sessions">
      {person.sessions.length === 0 ? (
        <Lede>{person.name} is not signed in anywhere.</Lede>
      ) : (
        <>
          <SessionsTable caption={`Sessions of ${person.name}`} sessions={person.sessions} />
          <Form method="post" className="mt-4">
            <Act intent="end-sessions">End every session</Act>
          </Form>
        </>
      )}
    </Section>
  );
}

function Keys({ person }: { person: PersonPage }) {
  return (
    <Section head="API keys in use">
      <Table caption={`API keys of ${person.name} in use`} even className="max-w-5xl">
        <thead>
          <tr>
            <th scope="col">Program</th>
            <th scope="col">Key</th>
            <th scope="col">May</th>
            <th scope="col">Last used</th>
            <th scope="col">Good until</th>
            <th scope="col">
              <span className="said">Withdraw</span>
            </th>
          </tr>
        </thead>
        <tbody>
          {person.keys.map((key) => (
            <tr key={key.id}>
              <th scope="row">{key.name}</th>
              <td className="tight">twk_{key.id}…</td>
              <td className="wide">{key.scopes.map((scope) => scopeInfo[scope].sentence).join(" ")}</td>
              <td className="tight">
                {key.lastUsedAt ? <Time at={key.lastUsedAt} withTime /> : <span className="text-soft">never</span>}
              </td>
              <td className="tight">
                <Time at={key.endsAt} />
              </td>
              <td>
                <Form method="post">
                  <input type="hidden" name="key" value={key.id} />
                  <Button kind="text" name="intent" value="withdraw-key" aria-label={`Withdraw the key ${key.name}`}>
                    Withdraw…
                  </Button>
                </Form>
              </td>
            </tr>
          ))}
        </tbody>
      </Table>
    </Section>
  );
}

function Switch({ person }: { person: PersonPage }) {
  const off = person.state === "switched off";
  return (
    <Section head={off ? "Switched off" : "Switch off"}>
      <Lede>
        {off
          ? "Nobody can sign in with this account, and its API keys are refused. What was done with it stays."
          : "Sessions end and API keys are refused at once; what was done stays under the same name."}
      </Lede>
      <Form method="post">
        <Act intent={off ? "switch-on" : "switch-off"}>{off ? "Switch on" : "Switch off…"}</Act>
      </Form>
    </Section>
  );
}
