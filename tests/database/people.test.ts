import { describe, expect, test } from "vitest";
import { Forbidden, Invalid, NotFound, Refused } from "#app/http/errors.ts";
import { makeDemoPeople } from "#app/people/demo.server.ts";
import { DEMO_PASSWORD, demoPeople } from "#app/people/demoPeople.ts";
import { passwordProblem } from "#app/people/passwordRules.ts";
import { makeKey, requireKey, withdrawKeyOf } from "#app/people/apiKey.server.ts";
import { setPasswordByLink } from "#app/people/passwords.server.ts";
import { inviteAgain, invitePerson, withdrawInvitation } from "#app/people/invitations.server.ts";
import { findUsableLink } from "#app/people/links.server.ts";
import {
  changeAccount,
  endSessionsOf,
  findPeople,
  giveRoles,
  makeFirstAdministrator,
  switchOff,
  switchOn,
} from "#app/people/people.server.ts";
import { findPersonPage } from "#app/people/personPage.server.ts";
import type { Acting } from "#app/people/person.ts";
import { beginSession } from "#app/people/sessions.server.ts";
import { useDatabase } from "#tests/support/database.ts";
import { runJobs } from "#tests/support/jobs.ts";
import { linkIn, useOutbox } from "#tests/support/mail.ts";
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
        () => withdrawInvitation(acting, id),
        () => changeAccount(acting, id, { name: "X", email: "x@calderpoint.example" }),
        () => withdrawKeyOf(acting, id, "a".repeat(12)),
        () => endSessionsOf(acting, id),
        () => findPersonPage(acting, id),
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
      lastSignIn: null,
      sessions: 0,
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

  test("gives and takes roles, which is on record with before and after and told by letter", async () => {
    const admin = await makePerson("Role Changer", "administrator");
    const { person } = await makePerson("Many Hats", "analyst", "steward");
    await giveRoles(admin, person.id, ["reviewer", "steward"]);
    await runJobs(database);
    expect(outbox.newestTo(person.email).text).toMatch(/Before: analyst, steward\.\s+Now: steward, reviewer\./);
    await expect(giveRoles(admin, person.id, ["steward", "reviewer"])).rejects.toThrow("exactly these roles already");
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

  test("cannot change their own roles, neither up nor down", async () => {
    const admin = await makePerson("Self Promoter", "administrator");
    for (const roles of [["administrator", "reviewer"], ["analyst"], []] as const) {
      await expect(giveRoles(admin, admin.person.id, roles)).rejects.toThrow("Nobody changes their own roles.");
    }
    expect(await actsOn(admin.person.id)).toEqual([]);
  });

  test("withdraws an invitation: its link no longer opens, and inviting again makes another", async () => {
    const admin = await makePerson("Withdrawer", "administrator");
    const email = "too.early@calderpoint.example";
    const { id } = await invitePerson(admin, { email, name: "Too Early", roles: ["analyst"] });
    expect((await findPersonPage(admin, id)).invitation).toBe("its letter waits to be sent");
    await runJobs(database);
    const first = linkIn(outbox.newestTo(email)).replace("/invitation/", "");
    const { invitation } = await findPersonPage(admin, id);
    const days = ((invitation as { endsAt: Date }).endsAt.getTime() - Date.now()) / (24 * 60 * 60 * 1000);
    expect(days).toBeGreaterThan(6.9);
    expect(days).toBeLessThanOrEqual(7);
    expect(await findUsableLink("invitation", first)).toBeDefined();

    await withdrawInvitation(admin, id);
    expect(await findUsableLink("invitation", first)).toBeUndefined();
    await expect(withdrawInvitation(admin, id)).rejects.toThrow("withdrawn already");
    await expect(setPasswordByLink("invitation", first, "nine oak drawers", { requestId: null })).rejects.toThrow(
      Refused,
    );

    await switchOn(admin, id);
    await runJobs(database);
    const second = linkIn(outbox.newestTo(email)).replace("/invitation/", "");
    expect(await findUsableLink("invitation", first)).toBeUndefined();
    await setPasswordByLink("invitation", second, "nine oak drawers", { requestId: null });
    await expect(withdrawInvitation(admin, id)).rejects.toThrow("taken up the invitation already");
    expect(await actsOn(id)).toEqual([
      "person.invited",
      "person.invitation-withdrawn",
      "person.switched-on",
      "person.invited",
      "person.invitation-taken",
    ]);
  });

  test("sends an invitation again, which voids the link of the first letter", async () => {
    const admin = await makePerson("Sender Again", "administrator");
    const email = "lost.letter@calderpoint.example";
    const { id } = await invitePerson(admin, { email, name: "Lost Letter", roles: [] });
    await runJobs(database);
    const first = linkIn(outbox.newestTo(email)).replace("/invitation/", "");
    await inviteAgain(admin, id);
    await runJobs(database);
    const second = linkIn(outbox.newestTo(email)).replace("/invitation/", "");
    expect(await findUsableLink("invitation", first)).toBeUndefined();
    expect(await findUsableLink("invitation", second)).toBeDefined();
  });

  test("changes name and address: both addresses hear of it, and it is on record with before and after", async () => {
    const admin = await makePerson("Name Changer", "administrator");
    const { person } = await makePerson("Old Name", "analyst");
    const email = "new.name@calderpoint.example";
    await changeAccount(admin, person.id, { name: "New Name", email });
    await runJobs(database);
    for (const address of [person.email, email]) {
      expect(outbox.newestTo(address).text).toContain(`from ${person.email} to ${email}`);
    }
    const entries = await database.owner
      .selectFrom("audit_entry")
      .select(["act", "detail"])
      .where("object_id", "=", person.id)
      .orderBy("number")
      .execute();
    expect(entries).toEqual([
      { act: "person.renamed", detail: { before: "Old Name", after: "New Name" } },
      { act: "person.address-changed", detail: { before: person.email, after: email } },
    ]);
    await expect(changeAccount(admin, person.id, { name: "New Name", email })).rejects.toThrow("already");
    await expect(changeAccount(admin, person.id, { name: "New Name", email: admin.person.email })).rejects.toThrow(
      "already an account with this address",
    );
  });

  test("mends the address of an invitation: the old letter's link is void, the new address gets its own", async () => {
    const admin = await makePerson("Typo Mender", "administrator");
    const [wrong, right] = ["typpo@calderpoint.example", "typo@calderpoint.example"];
    const { id } = await invitePerson(admin, { email: wrong, name: "Typo", roles: [] });
    await runJobs(database);
    const old = linkIn(outbox.newestTo(wrong)).replace("/invitation/", "");
    const before = outbox.sent.length;
    await changeAccount(admin, id, { name: "Typo", email: right });
    await runJobs(database);
    expect(outbox.sent.slice(before).map(({ subject }) => subject)).toEqual(["Your account on Tablewright"]);
    expect(await findUsableLink("invitation", old)).toBeUndefined();
    const link = linkIn(outbox.newestTo(right)).replace("/invitation/", "");
    expect(await findUsableLink("invitation", link)).toMatchObject({ personId: id, email: right });
  });

  test("withdraws a key of somebody: its next request is refused, and its owner hears of it", async () => {
    const admin = await makePerson("Key Withdrawer", "administrator");
    const analyst = await makePerson("Key Owner", "analyst");
    const { id, key } = await makeKey(analyst, { name: "balance-4", scopes: ["read"], days: 1 });
    const ask = () =>
      requireKey(new Request("http://localhost/api", { headers: { Authorization: `Bearer ${key}` } }), "read");
    await Promise.all([ask(), ask(), ask()]);
    await withdrawKeyOf(admin, analyst.person.id, id);
    await expect(ask()).rejects.toThrow("withdrawn");
    await expect(withdrawKeyOf(admin, analyst.person.id, id)).rejects.toThrow(NotFound);
    await expect(withdrawKeyOf(admin, admin.person.id, id)).rejects.toThrow(NotFound);
    await runJobs(database);
    expect(outbox.newestTo(analyst.person.email).text).toContain("balance-4");
    // First used once, however many first requests came at the same moment.
    expect(await actsOn(id)).toEqual(["key.made", "key.first-used", "key.withdrawn"]);
  });

  test("finds people by name, address, role and how their account stands", async () => {
    const admin = await makePerson("Finding Admin", "administrator");
    const { person } = await makePerson("Percy 100% Sign", "steward");
    const names = async (filter: Parameters<typeof findPeople>[1]) =>
      (await findPeople(admin, filter)).map(({ name }) => name);
    expect(await names({ text: "percy" })).toEqual(["Percy 100% Sign"]);
    expect(await names({ text: "percy.100.sign@" })).toEqual(["Percy 100% Sign"]);
    // The text is looked for as it is.
    expect(await names({ text: "0% s" })).toEqual(["Percy 100% Sign"]);
    expect(await names({ text: "percy%sign" })).toEqual([]);
    expect(await names({ text: "percy", role: "reviewer" })).toEqual([]);
    expect(await names({ text: "percy", role: "steward", state: "in use" })).toEqual(["Percy 100% Sign"]);
    await switchOff(admin, person.id);
    expect(await names({ text: "percy", state: "in use" })).toEqual([]);
    expect(await names({ text: "percy", state: "switched off" })).toEqual(["Percy 100% Sign"]);
  });

  test("sees when somebody last signed in and how many sessions are open", async () => {
    const admin = await makePerson("Watching Admin", "administrator");
    const { person } = await makePerson("Watched", "analyst");
    const now = new Date("2026-03-02T08:00:00Z");
    const later = new Date("2026-03-02T09:00:00Z");
    const begin = (at: Date) => beginSession(person, { agent: "bench", formerToken: null, requestId: null }, at);
    await begin(now);
    await begin(later);
    const line = async (at: Date) => (await findPeople(admin, { text: "watched" }, at))[0];
    expect(await line(later)).toMatchObject({ lastSignIn: later, sessions: 2 });
    // Twelve hours after its last use the first one has ended by itself.
    expect(await line(new Date("2026-03-02T20:30:00Z"))).toMatchObject({ lastSignIn: later, sessions: 1 });
    const { sessions } = await findPersonPage(admin, person.id, later);
    await endSessionsOf(admin, person.id, { only: sessions[0]!.id }, later);
    expect(await line(later)).toMatchObject({ sessions: 1 });
    await expect(endSessionsOf(admin, person.id, { only: sessions[0]!.id }, later)).rejects.toThrow(NotFound);
  });

  test("hears when there is no such account", async () => {
    const admin = await makePerson("Seeking Admin", "administrator");
    for (const id of ["00000000-0000-0000-0000-000000000000", "nonsense", "' or 1=1"]) {
      await expect(switchOff(admin, id)).rejects.toThrow(NotFound);
    }
  });
});

test("somebody always remains administrator, also when many take each other out at once", async () => {
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

test("of five administrators who all switch off and demote each other at once, one is left, round after round", async () => {
  const chief = await makePerson("Round Chief", "administrator");
  const others = async () =>
    (await findPeople(chief, { role: "administrator", state: "in use" })).filter(({ id }) => id !== chief.person.id);
  for (const { id } of await others()) await switchOff(chief, id);
  // Each act runs on a connection of its own: the pool of the test holds ten.
  for (let round = 0; round < 5; round++) {
    const five = [chief];
    for (let n = 1; n < 5; n++) five.push(await makePerson(`Round ${round} Number ${n}`, "administrator"));
    const pairs = five.flatMap((acting) =>
      five.filter((other) => other !== acting).map((other) => [acting, other] as const),
    );
    const results = await Promise.allSettled(
      pairs.map(([acting, other], index) =>
        index % 2 === 0 ? switchOff(acting, other.person.id) : giveRoles(acting, other.person.id, ["analyst"]),
      ),
    );
    for (const result of results) {
      if (result.status === "rejected") expect(result.reason).toBeInstanceOf(Refused);
    }
    const left = await database.owner
      .selectFrom("person")
      .innerJoin("person_role", "person_role.person_id", "person.id")
      .where("role", "=", "administrator")
      .where("switched_off_at", "is", null)
      .where("password_hash", "is not", null)
      .select("person.id")
      .execute();
    expect(left.length).toBeGreaterThanOrEqual(1);
    // Whoever was left out of office comes back for the next round, as the database's owner puts it.
    await database.owner
      .updateTable("person")
      .set({ switched_off_at: null })
      .where("id", "=", chief.person.id)
      .execute();
    await database.owner
      .insertInto("person_role")
      .values({ person_id: chief.person.id, role: "administrator" })
      .onConflict((conflict) => conflict.doNothing())
      .execute();
  }
});

test("the demo's people can sign in with a password that the rules accept, each in one role", async () => {
  const people = await database.app.transaction().execute((trx) => makeDemoPeople(trx));
  for (const person of Object.values(demoPeople)) expect(passwordProblem(DEMO_PASSWORD, person)).toBeNull();
  expect(people.reviewer).toMatchObject({ email: "reviewer@calderpoint.example", roles: ["reviewer"] });
  expect(await actsOn(people.steward.id)).toEqual(["person.made"]);
});
