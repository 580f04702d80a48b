import { describe, expect, test } from "vitest";
import { Invalid, Refused, TooMany } from "#app/http/errors.ts";
import { limits } from "#app/people/limits.ts";
import { findUsableLink } from "#app/people/links.server.ts";
import {
  askForReset,
  changePassword,
  RESET_ANSWER_MILLISECONDS,
  setPasswordByLink,
} from "#app/people/passwords.server.ts";
import { invitePerson } from "#app/people/invitations.server.ts";
import { switchOff } from "#app/people/people.server.ts";
import { findHolder, beginSession } from "#app/people/sessions.server.ts";
import { checkCredentials, SignInFailed } from "#app/people/signIn.server.ts";
import { useDatabase } from "#tests/support/database.ts";
import { runJobs } from "#tests/support/jobs.ts";
import { linkIn, useOutbox } from "#tests/support/mail.ts";
import { actsOn, makePerson, PASSWORD } from "#tests/support/people.ts";

const database = useDatabase();
const outbox = useOutbox();
const NEW = "nine oak drawers";
let source = 0;
const from = () => ({ address: `203.0.113.${(source += 1)}`, requestId: null });
const canSignIn = (email: string, password: string) =>
  checkCredentials({ email, password }, from()).then(
    () => true,
    (error: unknown) => {
      if (error instanceof SignInFailed) return false;
      throw error;
    },
  );
const hashOf = async (id: string) =>
  (await database.owner.selectFrom("person").select("password_hash").where("id", "=", id).executeTakeFirstOrThrow())
    .password_hash;

/** Asks for a reset letter and gives the token of its link. */
async function resetToken(email: string): Promise<string> {
  await askForReset(email, from());
  await runJobs(database);
  return linkIn(outbox.newestTo(email)).replace("/reset/", "");
}

test("typed in wide or narrow letters, as one code point or two, a password is the same", async () => {
  const analyst = await makePerson("Two Keyboards", "analyst");
  const chosen = "ｎｉｎｅ\u3000ｏａｋ drawers for März";
  await changePassword(
    analyst,
    { current: PASSWORD, password: chosen },
    { sessionId: "00".repeat(32), address: from().address },
  );
  expect(await canSignIn(analyst.person.email, "nine oak drawers for März".normalize("NFD"))).toBe(true);
  expect(await canSignIn(analyst.person.email, "nine oak drawers for Marz")).toBe(false);
});

describe("changing the password", () => {
  test("needs the current one; a wrong one changes nothing", async () => {
    const analyst = await makePerson("No Current", "analyst");
    const before = await hashOf(analyst.person.id);
    for (const current of ["", "wrong password"]) {
      const error: unknown = await changePassword(
        analyst,
        { current, password: NEW },
        { sessionId: "00".repeat(32), address: "203.0.113.200" },
      ).catch((thrown: unknown) => thrown);
      expect(error).toBeInstanceOf(Invalid);
      expect((error as Invalid).errors[0]?.pointer).toBe("/current");
    }
    expect(await hashOf(analyst.person.id)).toBe(before);
  });

  test("keeps this session, ends the others, tells the owner and is on record", async () => {
    const analyst = await makePerson("Changing", "analyst");
    const begin = () => beginSession(analyst.person, { agent: "", formerToken: null, requestId: null });
    const [here, there] = [await begin(), await begin()];
    const { sessionId } = (await findHolder(here))!;
    await changePassword(analyst, { current: PASSWORD, password: NEW }, { sessionId, address: "203.0.113.201" });
    expect(await findHolder(here)).not.toBeNull();
    expect(await findHolder(there)).toBeNull();
    expect(await canSignIn(analyst.person.email, PASSWORD)).toBe(false);
    expect(await canSignIn(analyst.person.email, NEW)).toBe(true);
    await runJobs(database);
    expect(outbox.newestTo(analyst.person.email).subject).toBe("Your password was changed");
    expect(await actsOn(analyst.person.id)).toContain("person.password-changed");
  });

  test("refuses a password that is too short, common or one's own name", async () => {
    const analyst = await makePerson("Weak Choice", "analyst");
    for (const password of ["short", "password123", "Weak-Choice1"]) {
      const error: unknown = await changePassword(
        analyst,
        { current: PASSWORD, password },
        { sessionId: "00".repeat(32), address: from().address },
      ).catch((thrown: unknown) => thrown);
      expect(error).toBeInstanceOf(Invalid);
      expect((error as Invalid).errors[0]?.pointer).toBe("/password");
    }
  });

  test("does not let an open session try current passwords without end", async () => {
    const analyst = await makePerson("Left Open", "analyst");
    const guess = () =>
      changePassword(
        analyst,
        { current: "wrong password", password: NEW },
        { sessionId: "00".repeat(32), address: "203.0.113.202" },
      );
    for (let run = 0; run < limits.signInAccount.most; run++) await expect(guess()).rejects.toThrow(Invalid);
    await expect(guess()).rejects.toThrow(TooMany);
  });
});

describe("a reset letter", () => {
  test("sets a new password once, ends every session and skips nothing else", async () => {
    const analyst = await makePerson("Forgetful", "analyst");
    const token = await resetToken(analyst.person.email);
    const session = await beginSession(analyst.person, { agent: "", formerToken: null, requestId: null });
    await setPasswordByLink("password_reset", token, NEW, { requestId: null });
    expect(await findHolder(session)).toBeNull();
    expect(await canSignIn(analyst.person.email, NEW)).toBe(true);
    await expect(setPasswordByLink("password_reset", token, "yet another phrase", { requestId: null })).rejects.toThrow(
      Refused,
    );
    expect(await actsOn(analyst.person.id)).toEqual(
      expect.arrayContaining(["person.password-reset-asked", "person.password-changed"]),
    );
  });

  test("used by two at once sets one password", async () => {
    const analyst = await makePerson("Raced", "analyst");
    const token = await resetToken(analyst.person.email);
    const results = await Promise.allSettled(
      ["first of the phrases", "second of the phrases"].map((password) =>
        setPasswordByLink("password_reset", token, password, { requestId: null }),
      ),
    );
    expect(results.filter(({ status }) => status === "fulfilled")).toHaveLength(1);
  });

  test("runs out after an hour, and its link with it", async () => {
    const analyst = await makePerson("Too Late", "analyst");
    const token = await resetToken(analyst.person.email);
    const in59 = new Date(Date.now() + 59 * 60_000);
    const in61 = new Date(Date.now() + 61 * 60_000);
    expect(await findUsableLink("password_reset", token, in59)).toMatchObject({ personId: analyst.person.id });
    expect(await findUsableLink("password_reset", token, in61)).toBeUndefined();
    await expect(setPasswordByLink("password_reset", token, NEW, { requestId: null }, in61)).rejects.toThrow(Refused);
  });

  test("is void once another one set a password, and is no invitation", async () => {
    const analyst = await makePerson("Asked Twice", "analyst");
    const [first, second] = [await resetToken(analyst.person.email), await resetToken(analyst.person.email)];
    expect(await findUsableLink("invitation", first)).toBeUndefined();
    await setPasswordByLink("password_reset", second, NEW, { requestId: null });
    expect(await findUsableLink("password_reset", first)).toBeUndefined();
  });

  test("with a weak password leaves the link usable", async () => {
    const analyst = await makePerson("Try Again", "analyst");
    const token = await resetToken(analyst.person.email);
    await expect(setPasswordByLink("password_reset", token, "short", { requestId: null })).rejects.toThrow(Invalid);
    await setPasswordByLink("password_reset", token, NEW, { requestId: null });
  });

  test("is not written to an unknown address or a switched-off account, with the same answer in the same time", async () => {
    const admin = await makePerson("Reset Admin", "administrator");
    const off = await makePerson("Off For Reset", "analyst");
    const known = await makePerson("Known For Reset", "analyst");
    await switchOff(admin, off.person.id);
    const times: number[] = [];
    for (const email of ["nobody@calderpoint.example", off.person.email, known.person.email]) {
      const begun = performance.now();
      expect(await askForReset(email, from())).toBeUndefined();
      times.push(performance.now() - begun);
    }
    await runJobs(database);
    const reset = outbox.sent.filter(({ subject }) => subject === "Choose a new password");
    expect(reset.map(({ envelope }) => envelope?.to)).toEqual([[known.person.email]]);
    // Nobody is answered before the set time, in which the work of all three is done. A timer may be a millisecond early.
    expect(Math.min(...times)).toBeGreaterThanOrEqual(RESET_ANSWER_MILLISECONDS - 2);
  });

  test("is written three times an hour to one address, however often and from wherever it is asked for", async () => {
    const analyst = await makePerson("Flooded", "analyst");
    await Promise.all(Array.from({ length: 10 }, () => askForReset(analyst.person.email, from())));
    await runJobs(database);
    const toThem = outbox.sent.filter(({ envelope }) => String(envelope?.to) === analyst.person.email);
    expect(toThem).toHaveLength(limits.resetAddress.most);
  });

  test("is refused to a source that asks for too many", async () => {
    const ask = (run: number) =>
      askForReset(`n${run}@calderpoint.example`, { address: "198.51.100.9", requestId: null });
    await Promise.all(Array.from({ length: limits.resetSource.most }, (_, run) => ask(run)));
    await expect(ask(99)).rejects.toThrow(TooMany);
  });

  test("leaves no trace of its link in the database: neither in the outbox nor in the queue", async () => {
    const analyst = await makePerson("Secret Kept", "analyst");
    await askForReset(analyst.person.email, from());
    const before = await everything();
    await runJobs(database);
    const token = linkIn(outbox.newestTo(analyst.person.email)).replace("/reset/", "");
    expect(token).toMatch(/^[A-Za-z0-9_-]{43}$/);
    expect(before + (await everything())).not.toContain(token);
  });

  async function everything(): Promise<string> {
    const letters = await database.owner.selectFrom("letter").selectAll().execute();
    const resets = await database.owner.selectFrom("password_reset").selectAll().execute();
    const audit = await database.owner.selectFrom("audit_entry").selectAll().execute();
    return JSON.stringify([letters, resets, audit]);
  }
});

test("an invitation sets the first password once, within its days", async () => {
  const admin = await makePerson("Inviting Admin", "administrator");
  const { id } = await invitePerson(admin, {
    email: "Newcomer@calderpoint.example",
    name: "New Comer",
    roles: ["analyst"],
  });
  await runJobs(database);
  const letter = outbox.newestTo("newcomer@calderpoint.example");
  expect(letter.text).toContain("Inviting Admin made an account for you");
  expect(letter.subject).not.toMatch(/http|[A-Za-z0-9_-]{43}/);
  const token = linkIn(letter).replace("/invitation/", "");
  expect(await findUsableLink("invitation", token, new Date(Date.now() + 8 * 24 * 3600_000))).toBeUndefined();
  await setPasswordByLink("invitation", token, NEW, { requestId: null });
  expect(await canSignIn("newcomer@calderpoint.example", NEW)).toBe(true);
  await expect(setPasswordByLink("invitation", token, NEW, { requestId: null })).rejects.toThrow(Refused);
  expect(await actsOn(id)).toEqual(["person.invited", "person.invitation-taken"]);
});
