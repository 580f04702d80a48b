import { describe, expect, test } from "vitest";
import { Invalid, Refused, TooMany } from "#app/http/errors.ts";
import { limits } from "#app/people/limits.ts";
import { findUsableAddressChange } from "#app/people/links.server.ts";
import { askForReset } from "#app/people/passwords.server.ts";
import { changeAccount, switchOff } from "#app/people/people.server.ts";
import type { Acting } from "#app/people/person.ts";
import { askForAddress, renameOneself, takeAddress } from "#app/people/profile.server.ts";
import { checkCredentials, SignInFailed } from "#app/people/signIn.server.ts";
import { useDatabase } from "#tests/support/database.ts";
import { runJobs } from "#tests/support/jobs.ts";
import { linkIn, useOutbox } from "#tests/support/mail.ts";
import { actsOn, makePerson, PASSWORD } from "#tests/support/people.ts";

const database = useDatabase();
const outbox = useOutbox();
const byNobody = { requestId: null };
let source = 0;
const from = () => ({ address: `203.0.113.${(source += 1)}`, requestId: null });
const ask = (acting: Acting, email: string, current = PASSWORD) => askForAddress(acting, { email, current }, from());

/** Asks for a new address and gives the token of the letter that came there. */
async function tokenFor(acting: Acting, email: string): Promise<string> {
  await ask(acting, email);
  await runJobs(database);
  return linkIn(outbox.newestTo(email)).replace("/address/", "");
}
const emailOf = async (id: string) =>
  (await database.owner.selectFrom("person").select("email").where("id", "=", id).executeTakeFirstOrThrow()).email;

describe("one's own name", () => {
  test("is written anew, and the record keeps the former one", async () => {
    const analyst = await makePerson("Maiden Name", "analyst");
    await renameOneself(analyst, "  Married Name ");
    const { detail } = await database.owner
      .selectFrom("audit_entry")
      .select("detail")
      .where("object_id", "=", analyst.person.id)
      .executeTakeFirstOrThrow();
    expect(detail).toEqual({ before: "Maiden Name", after: "Married Name" });
    await expect(renameOneself(analyst, "Maiden Name")).rejects.toThrow(Refused);
    await expect(renameOneself(analyst, "A\r\nBcc: b@calderpoint.example")).rejects.toThrow(Invalid);
  });
});

describe("one's own address", () => {
  test("changes once it is confirmed by letter, and the old address hears of it", async () => {
    const analyst = await makePerson("Moving House", "analyst");
    const { id, email: old } = analyst.person;
    const email = "moved.house@calderpoint.example";
    const token = await tokenFor(analyst, email);
    expect(await emailOf(id)).toBe(old);
    expect(await findUsableAddressChange(token)).toMatchObject({ email: old, newEmail: email });

    await takeAddress(token, byNobody);
    expect(await emailOf(id)).toBe(email);
    await expect(takeAddress(token, byNobody)).rejects.toThrow("was used, has run out");
    await runJobs(database);
    expect(outbox.newestTo(old).text).toContain(`from ${old} to ${email}`);
    await expect(checkCredentials({ email, password: PASSWORD }, from())).resolves.toMatchObject({ id });
    await expect(checkCredentials({ email: old, password: PASSWORD }, from())).rejects.toThrow(SignInFailed);
    expect(await actsOn(id)).toEqual(["person.address-asked", "person.address-changed"]);
  });

  test("needs the current password", async () => {
    const analyst = await makePerson("Open Session", "analyst");
    const error: unknown = await ask(analyst, "thief@calderpoint.example", "a guess").catch(
      (thrown: unknown) => thrown,
    );
    expect(error).toBeInstanceOf(Invalid);
    expect((error as Invalid).errors[0]?.pointer).toBe("/current");
    await runJobs(database);
    expect(outbox.sent).toEqual([]);
  });

  test("of another account gets no letter and the same answer, and cannot be taken meanwhile either", async () => {
    const [analyst, other] = [await makePerson("Curious", "analyst"), await makePerson("Already There", "analyst")];
    await expect(ask(analyst, other.person.email)).resolves.toBeUndefined();
    await runJobs(database);
    expect(outbox.sent).toEqual([]);

    const email = "contested@calderpoint.example";
    const token = await tokenFor(analyst, email);
    const admin = await makePerson("Giving It Away", "administrator");
    await changeAccount(admin, other.person.id, { name: "Already There", email });
    await expect(takeAddress(token, byNobody)).rejects.toThrow("already an account with this address");
    expect(await emailOf(analyst.person.id)).toBe(analyst.person.email);
  });

  test("is taken once when two press the button at once", async () => {
    const analyst = await makePerson("Double Press", "analyst");
    const token = await tokenFor(analyst, "double.press.new@calderpoint.example");
    const both = await Promise.allSettled([takeAddress(token, byNobody), takeAddress(token, byNobody)]);
    expect(both.filter(({ status }) => status === "fulfilled")).toHaveLength(1);
    expect(await actsOn(analyst.person.id)).toEqual(["person.address-asked", "person.address-changed"]);
  });

  test("cannot be confirmed after an hour, nor once the account is switched off", async () => {
    const admin = await makePerson("Address Admin", "administrator");
    const analyst = await makePerson("Too Slow", "analyst");
    const token = await tokenFor(analyst, "too.slow.new@calderpoint.example");
    const later = new Date(Date.now() + 60 * 60 * 1000 + 1000);
    await expect(takeAddress(token, byNobody, later)).rejects.toThrow(Refused);
    await switchOff(admin, analyst.person.id);
    await expect(takeAddress(token, byNobody)).rejects.toThrow(Refused);
  });

  test("once changed voids the reset letters that went to the old one", async () => {
    const analyst = await makePerson("Left Behind", "analyst");
    await askForReset(analyst.person.email, from());
    await runJobs(database);
    const reset = database.owner
      .selectFrom("password_reset")
      .select("used_at")
      .where("person_id", "=", analyst.person.id);
    expect(await reset.execute()).toEqual([{ used_at: null }]);
    await takeAddress(await tokenFor(analyst, "left.behind.new@calderpoint.example"), byNobody);
    expect((await reset.executeTakeFirstOrThrow()).used_at).not.toBeNull();
  });

  test("is not a way to flood anybody with letters", async () => {
    const analyst = await makePerson("Flooding", "analyst");
    for (let run = 0; run < limits.addressLetters.most; run++) await ask(analyst, `victim${run}@calderpoint.example`);
    await expect(ask(analyst, "victim@calderpoint.example")).rejects.toThrow(TooMany);
    await runJobs(database);
    const toVictims = outbox.sent.filter(({ to }) => JSON.stringify(to).includes("victim"));
    expect(toVictims).toHaveLength(limits.addressLetters.most);
  });

  test.each([
    "no address",
    "a@calderpoint.example, b@calderpoint.example",
    "a@calderpoint.example\r\nBcc: c@d.example",
  ])("cannot become %j", async (email) => {
    const analyst = await makePerson(`Odd Address ${email.length}`, "analyst");
    const error: unknown = await ask(analyst, email).catch((thrown: unknown) => thrown);
    expect((error as Invalid).errors[0]?.pointer).toBe("/email");
  });
});
