import { describe, expect, test } from "vitest";
import { Forbidden, Invalid, NotFound, Refused } from "#app/http/errors.ts";
import { makeDemoPeople } from "#app/people/demo.server.ts";
import { DEMO_PASSWORD, demoPeople } from "#app/people/demoPeople.ts";
import { passwordProblem } from "#app/people/passwordRules.ts";
import { setPasswordByLink } from "#app/people/passwords.server.ts";
import {
  findPeople,
  giveRoles,
  inviteAgain,
  invitePerson,
  makeFirstAdministrator,
  switchOff,
  switchOn,
} from "#app/people/people.server.ts";
import type { Acting } from "#app/people/person.ts";
import { useDatabase } from "#tests/support/database.ts";
import { runJobs } from "#tests/support/jobs.ts";
import { useOutbox } from "#tests/support/mail.ts";
import { actsOn, makePerson } from "#tests/support/people.ts";

const database = useDatabase();
const outbox = useOutbox();

// First of all: a migrated database without a single account.
test("a new database holds no account, and its first administrator is made once", async () => {
  const count = () => database.owner.selectFrom("person").select("email").execute();
  expect(await count()).toEqual([]);
  const first = await makeFirstAdministrator({ email: "Chief@calderpoint.example", name: "The Chief" });
  // Lost before it was used: the same command gives a new link, and no second account.
  const again = await makeFirstAdministrator({ email: "chief@calderpoint.example", name: "The Chief" });
  expect(await count()).toEqual([{ email: "chief@calderpoint.example" }]);
  await setPasswordByLink("invitation", again.token, "nine oak drawers", { requestId: null });
  await expect(setPasswordByLink("invitation", first.token, "ten oak drawers", { requestId: null })).rejects.toThrow(
    Refused,
  );
  await expect(makeFirstAdministrator({ email: "other@calderpoint.example", name: "Other" })).rejects.toThrow(
    "There is an administrator already",
  );
});

describe("an administrator", () => {
  test("alone may look after people", async () => {
    const others: Acting[] = [
      await makePerson("An Analyst", "analyst"),
      await makePerson("A Steward", "steward"),
      await makePerson("A Reviewer", "reviewer"),
    ];
    const { id } = others[0]!.person;
    for (const acting of others) {
      const acts = [
        () => findPeople(acting),
        () => invitePerson(acting, { email: "x@calderpoint.example", name: "X", roles: [] }),
        () => inviteAgain(acting, id),
        () => giveRoles(acting, id, ["administrator"]),
        () => switchOff(acting, id),
        () => switchOn(acting, id),
      ];
      for (const act of acts) await expect(act()).rejects.toThrow(Forbidden);
    }
  });

  test("invites somebody with roles and sees them as invited", async () => {
    const admin = await makePerson("First Inviter", "administrator");
    const { id } = await invitePerson(admin, {
      email: "tess@calderpoint.example",
      name: "Tess Marlow",
      roles: ["reviewer", "analyst"],
    });
    expect((await findPeople(admin)).find((one) => one.id === id)).toEqual({
      id,
      name: "Tess Marlow",
      email: "tess@calderpoint.example",
      roles: ["analyst", "reviewer"],
      state: "invited",
    });
    await inviteAgain(admin, id);
    await runJobs(database);
    expect(outbox.sent).toHaveLength(2);
    expect(await actsOn(id)).toEqual(["person.invited", "person.invited"]);
  });

  test("cannot invite an address twice, however it is written", async () => {
    const admin = await makePerson("Second Inviter", "administrator");
    const invite = (email: string) => invitePerson(admin, { email, name: "Twin", roles: ["analyst"] });
    await invite("twin@calderpoint.example");
    await expect(invite(" TWIN@calderpoint.example")).rejects.toThrow("already an account");
    const both = await Promise.allSettled([invite("rival@calderpoint.example"), invite("rival@calderpoint.example")]);
    expect(both.filter(({ status }) => status === "fulfilled")).toHaveLength(1);
    expect(both.find(({ status }) => status === "rejected")).toMatchObject({ reason: expect.any(Refused) as unknown });
  });

  test.each([
    ["a@b", "Name", "/email"],
    ["a@calderpoint.example, b@calderpoint.example", "Name", "/email"],
    ["a@calderpoint.example\r\nBcc: b@calderpoint.example", "Name", "/email"],
    ["<a@calderpoint.example>", "Name", "/email"],
    ["a@calderpoint.example", "", "/name"],
    ["a@calderpoint.example", "Name\r\nBcc: b@calderpoint.example", "/name"],
    ["a@calderpoint.example", "n".repeat(121), "/name"],
  ])("cannot invite %j called %j", async (email, name, pointer) => {
    const admin = {
      person: { id: "", name: "", email: "", roles: ["administrator"] as const },
      apiKeyId: null,
      requestId: null,
    };
    const error: unknown = await invitePerson(admin, { email, name, roles: [] }).catch((thrown: unknown) => thrown);
    expect(error).toBeInstanceOf(Invalid);
    expect((error as Invalid).errors.map((one) => one.pointer)).toEqual([pointer]);
  });

  test("gives and takes roles, which is on record with before and after", async () => {
    const admin = await makePerson("Role Changer", "administrator");
    const { person } = await makePerson("Many Hats", "analyst", "steward");
    await giveRoles(admin, person.id, ["reviewer", "steward"]);
    const { detail } = await database.owner
      .selectFrom("audit_entry")
      .select("detail")
      .where("object_id", "=", person.id)
      .where("act", "=", "person.roles-changed")
      .executeTakeFirstOrThrow();
    expect(detail).toEqual({ before: ["analyst", "steward"], after: ["steward", "reviewer"] });
  });

  test("switches an account off and on again; twice is refused", async () => {
    const admin = await makePerson("Switching Admin", "administrator");
    const { person } = await makePerson("On And Off", "analyst");
    await switchOff(admin, person.id);
    await expect(switchOff(admin, person.id)).rejects.toThrow(Refused);
    await switchOn(admin, person.id);
    await expect(switchOn(admin, person.id)).rejects.toThrow(Refused);
    expect(await actsOn(person.id)).toEqual(["person.switched-off", "person.switched-on"]);
  });

  test("hears when there is no such account", async () => {
    const admin = await makePerson("Seeking Admin", "administrator");
    for (const id of ["00000000-0000-0000-0000-000000000000", "nonsense", "' or 1=1"]) {
      await expect(switchOff(admin, id)).rejects.toThrow(NotFound);
    }
  });
});

test("somebody always remains administrator, also when two take each other out at once", async () => {
  const [one, two] = [await makePerson("Left Hand", "administrator"), await makePerson("Right Hand", "administrator")];
  const rest = (await findPeople(one)).filter(
    (account) =>
      account.roles.includes("administrator") && account.id !== one.person.id && account.id !== two.person.id,
  );
  for (const account of rest.filter(({ state }) => state !== "switched off")) await switchOff(one, account.id);
  const results = await Promise.allSettled([switchOff(one, two.person.id), giveRoles(two, one.person.id, ["analyst"])]);
  expect(results.filter(({ status }) => status === "fulfilled")).toHaveLength(1);
  expect(results.find(({ status }) => status === "rejected")).toMatchObject({
    reason: { message: "This would leave no administrator. Give somebody else that role first." },
  });
});

test("the demo's people can sign in with a password that the rules accept, each in one role", async () => {
  const people = await database.app.transaction().execute((trx) => makeDemoPeople(trx));
  for (const person of Object.values(demoPeople)) expect(passwordProblem(DEMO_PASSWORD, person)).toBeNull();
  expect(people.reviewer).toMatchObject({ email: "reviewer@calderpoint.example", roles: ["reviewer"] });
  expect(await actsOn(people.steward.id)).toEqual(["person.made"]);
});
