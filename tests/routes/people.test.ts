import { describe, expect, test } from "vitest";
import { useDatabase as makeApplicationUse } from "#app/db/database.server.ts";
import { findOwnKeys, makeKey } from "#app/people/apiKey.server.ts";
import type { Acting } from "#app/people/person.ts";
import { makePerson, PASSWORD, signedIn } from "#tests/support/people.ts";
import { useServer } from "#tests/support/server.ts";

const people: Record<"analyst" | "second" | "administrator", Acting> = Object.create(null) as never;
const server = useServer({
  worker: true,
  prepare: async (database) => {
    makeApplicationUse(database.app);
    people.analyst = await makePerson("Mina Corvin", "analyst");
    people.second = await makePerson("Second Analyst", "analyst");
    people.administrator = await makePerson("Pell Ostrander", "administrator");
  },
});
const NEW = "nine oak drawers";

function post(path: string, body: Record<string, string> | URLSearchParams, cookie = ""): Promise<Response> {
  const headers = { Origin: server.url, ...(cookie ? { Cookie: cookie } : {}) };
  return server.fetch(path, { method: "POST", body: new URLSearchParams(body), headers });
}
const get = (path: string, cookie = ""): Promise<Response> =>
  server.fetch(path, { headers: cookie ? { Cookie: cookie } : {} });
const cookieOf = (response: Response): string => response.headers.get("Set-Cookie")?.split(";", 1)[0] ?? "";
const signIn = (email: string, password: string, more: Record<string, string> = {}) =>
  post("/sign-in", { email, password, ...more });
const text = (html: string): string => html.replace(/<script[\s\S]*?<\/script>/g, "").replace(/<[^>]*>/g, " ");

describe("signing in", () => {
  test("sets a cookie that only this host gets back, and goes to the page that was asked for", async () => {
    const response = await signIn(people.analyst.person.email, PASSWORD, { to: "/account/keys" });
    expect(response.status).toBe(302);
    expect(response.headers.get("Location")).toBe("/account/keys");
    expect(response.headers.get("Set-Cookie")).toMatch(
      /^__Host-tablewright=[\w-]{43}; Path=\/; Secure; HttpOnly; SameSite=Lax$/,
    );
    const page = await get("/account/keys", cookieOf(response));
    expect(page.status).toBe(200);
    expect(page.headers.get("Cache-Control")).toContain("no-store");
    expect(await page.text()).toContain("Mina Corvin");
  });

  test.each(["//evil.example", "/\\evil.example", "https://evil.example", "javascript:alert(1)"])(
    "never leads away from this site: %s",
    async (to) => {
      const response = await signIn(people.analyst.person.email, PASSWORD, { to });
      expect(response.headers.get("Location")).toBe("/");
      expect(await (await get(`/sign-in?to=${encodeURIComponent(to)}`)).text()).toContain('name="to" value="/"');
    },
  );

  test("that fails keeps the address, never the password, and says the same for everybody", async () => {
    const wrong = "my wrong password";
    const bodies: string[] = [];
    for (const email of [people.analyst.person.email, "nobody@calderpoint.example"]) {
      const response = await signIn(email, wrong);
      expect(response.status).toBe(401);
      expect(response.headers.get("Set-Cookie")).toBeNull();
      const body = await response.text();
      expect(body).toContain(`value="${email}"`);
      expect(body).not.toContain(wrong);
      bodies.push(text(body));
    }
    expect(bodies[0]).toBe(bodies[1]);
  });

  test("without address or password says at which field", async () => {
    const response = await signIn("", "");
    expect(response.status).toBe(422);
    const body = text(await response.text());
    expect(body).toContain("Give the e-mail address.");
    expect(body).toContain("Give the password.");
  });

  test("tried too often from one source answers 429 with the time to wait", async () => {
    const statuses: number[] = [];
    let last: Response | undefined;
    for (let run = 0; run < 20; run++) {
      last = await signIn("guessed.at@calderpoint.example", "wrong password");
      statuses.push(last.status);
    }
    expect(statuses.filter((status) => status === 401)).toHaveLength(10);
    expect(statuses.at(-1)).toBe(429);
    expect(Number(last?.headers.get("Retry-After"))).toBeGreaterThan(0);
  });

  test("leaves no secret in the log", async () => {
    const response = await signIn(people.analyst.person.email, PASSWORD);
    const [, token = "none"] = cookieOf(response).split("=");
    await get("/account", cookieOf(response));
    expect(server.log()).not.toContain(token);
    expect(server.log()).not.toContain(PASSWORD);
  });

  test("with a name that forges a line of the log stays one line", async () => {
    await signIn('x\n{"event":"forged"}', "wrong password");
    expect(
      server
        .log()
        .split("\n")
        .filter((line) => line.startsWith('{"event":"forged"')),
    ).toEqual([]);
  });
});

describe("signing out", () => {
  test("ends the session on the server and has the browser forget", async () => {
    const cookie = await signedIn(people.analyst);
    const response = await post("/sign-out", {}, cookie);
    expect(response.status).toBe(302);
    expect(response.headers.get("Set-Cookie")).toMatch(/^__Host-tablewright=; .*Max-Age=0$/);
    expect(response.headers.get("Clear-Site-Data")).toBe('"cache", "storage"');
    expect((await get("/account", cookie)).headers.get("Location")).toBe("/sign-in?to=%2Faccount");
  });

  test("does not happen by following a link", async () => {
    const cookie = await signedIn(people.analyst);
    await get("/sign-out", cookie);
    expect((await get("/account", cookie)).status).toBe(200);
  });
});

test("a forgotten password is set anew by letter, once, and the old one no longer opens", async () => {
  const { email } = people.second.person;
  const open = await signedIn(people.second);
  const asked = await post("/forgotten", { email });
  expect(asked.headers.get("Location")).toBe("/forgotten?asked");
  const unknown = await post("/forgotten", { email: "nobody@calderpoint.example" });
  expect(unknown.headers.get("Location")).toBe(asked.headers.get("Location"));

  const letter = await server.letterTo(email);
  expect(letter.subject).toBe("Choose a new password");
  const link = /http:\S+\/reset\/\S+/.exec(letter.text ?? "")?.[0] ?? "";
  expect(link.startsWith(`${server.url}/reset/`)).toBe(true);
  const path = new URL(link).pathname;

  const weak = await post(path, { password: "password123" });
  expect(weak.status).toBe(422);
  const body = await weak.text();
  expect(body).toContain("tried first");
  expect(body).not.toContain('value="password123"');
  expect((await post(path, { password: NEW })).headers.get("Location")).toBe("/sign-in?notice=password-set");
  expect((await post(path, { password: NEW })).status).toBe(409);
  expect(text(await (await get(path)).text())).toContain("This link has gone");

  expect((await get("/account", open)).status).toBe(302);
  expect((await signIn(email, PASSWORD)).status).toBe(401);
  expect((await signIn(email, NEW)).status).toBe(302);
  expect(server.log()).not.toContain(path.slice("/reset/".length));
});

test("an administrator invites; the invited person chooses the password and signs in", async () => {
  const admin = await signedIn(people.administrator);
  const email = "tess.marlow@calderpoint.example";
  const form = new URLSearchParams([
    ["intent", "invite"],
    ["name", "Tess Marlow"],
    ["email", email],
    ["roles", "analyst"],
    // No field of these forms sets a password or switches anything but what it says.
    ["password", "chosen by another"],
    ["passwordHash", "chosen by another"],
  ]);
  const invited = (await post("/people", form, admin)).headers.get("Location") ?? "";
  expect(invited).toMatch(/^\/people\/[0-9a-f-]{36}\?done=invite$/);
  expect(text(await (await get(invited, admin)).text())).toContain("A letter is on its way.");
  expect((await signIn(email, "chosen by another")).status).toBe(401);
  const path = new URL(/http:\S+\/invitation\/\S+/.exec((await server.letterTo(email)).text ?? "")?.[0] ?? "").pathname;
  expect(text(await (await get(path)).text())).toContain("Welcome, Tess Marlow");
  expect((await post(path, { password: NEW })).status).toBe(302);
  expect((await signIn(email, NEW)).status).toBe(302);
  expect(text(await (await get("/people", admin)).text())).toContain(email);
});

test("a refused invitation says why, and loses nothing", async () => {
  const admin = await signedIn(people.administrator);
  const twice = await post("/people", { intent: "invite", name: "Twin", email: people.analyst.person.email }, admin);
  expect(twice.status).toBe(409);
  const body = await twice.text();
  expect(text(body)).toContain("There is already an account with this address.");
  expect(body).toContain('value="Twin"');
});

describe("a person's page", () => {
  const pageOf = ({ person }: Acting) => `/people/${person.id}`;
  const rolesOf = async ({ person }: Acting) => {
    const rows = server.database.owner.selectFrom("person_role").select("role").where("person_id", "=", person.id);
    return (await rows.orderBy("role").execute()).map(({ role }) => role);
  };
  const rolesForm = (...roles: string[]) =>
    new URLSearchParams([["intent", "roles"], ...roles.map((role) => ["roles", role] as [string, string])]);
  const confirmed = (form: URLSearchParams, more: Record<string, string> = {}) =>
    new URLSearchParams([...form, ["confirmed", "yes"], ...Object.entries(more)]);
  /** Signed in longer ago than the quarter of an hour in which no password is asked. */
  const stale = () => signedIn(people.administrator, new Date(Date.now() - 20 * 60 * 1000));

  test("asks first, showing what will change, and changes nothing until it is confirmed", async () => {
    const admin = await signedIn(people.administrator);
    const changed = await makePerson("Changed Roles", "analyst");
    const form = rolesForm("steward", "reviewer");
    const asked = await post(pageOf(changed), form, admin);
    expect(asked.status).toBe(200);
    const body = await asked.text();
    expect(text(body)).toContain("Changed Roles gets the roles steward and reviewer.");
    expect(text(body)).toContain("Changed Roles loses the role analyst.");
    // The question carries the whole change on, for a browser without scripts.
    expect(body).toContain('name="roles" value="steward"');
    expect(await rolesOf(changed)).toEqual(["analyst"]);
    const done = await post(pageOf(changed), confirmed(form), admin);
    expect(done.headers.get("Location")).toBe(`${pageOf(changed)}?done=roles`);
    expect(await rolesOf(changed)).toEqual(["reviewer", "steward"]);
  });

  test.each([
    ["roles", { roles: "reviewer" }],
    ["change", { name: "Another Name", email: "another@calderpoint.example" }],
    ["switch-off", {}],
    ["end-sessions", {}],
  ])("asks for the password for %s when the sign-in is no longer fresh", async (intent, fields) => {
    const admin = await stale();
    const changed = await makePerson(`Stale ${intent}`, "analyst");
    const before = await signedIn(changed);
    const form = new URLSearchParams({ intent, ...fields });
    const asked = await post(pageOf(changed), form, admin);
    expect(asked.status).toBe(200);
    expect(await asked.text()).toContain('autoComplete="current-password"');
    for (const [password, sentence] of [
      ["", "Give your password once more for this change."],
      ["a wrong guess", "This is not your password. Nothing was changed."],
    ] as const) {
      const refused = await post(pageOf(changed), confirmed(form, { password }), admin);
      expect(refused.status).toBe(422);
      const body = await refused.text();
      expect(text(body)).toContain(sentence);
      expect(body).not.toContain("a wrong guess");
    }
    expect((await get("/account", before)).status).toBe(200);
    expect(await rolesOf(changed)).toEqual(["analyst"]);
    const done = await post(pageOf(changed), confirmed(form, { password: PASSWORD }), admin);
    expect(done.status).toBe(302);
  });

  test("of one's own account has no form for roles, and refuses one sent all the same", async () => {
    const admin = await signedIn(people.administrator);
    expect(text(await (await get(pageOf(people.administrator), admin)).text())).toContain(
      "Nobody changes their own roles",
    );
    const refused = await post(pageOf(people.administrator), confirmed(rolesForm("administrator", "reviewer")), admin);
    expect(refused.status).toBe(409);
    expect(text(await refused.text())).toContain("Nobody changes their own roles.");
    expect(await rolesOf(people.administrator)).toEqual(["administrator"]);
  });

  test("does not switch off the last administrator", async () => {
    const admin = await signedIn(people.administrator);
    const form = new URLSearchParams({ intent: "switch-off" });
    const refused = await post(pageOf(people.administrator), confirmed(form), admin);
    expect(refused.status).toBe(409);
    expect(text(await refused.text())).toContain("This would leave no administrator.");
    expect((await get("/account", admin)).status).toBe(200);
  });

  test("keeps what was typed when it cannot be taken, and says what is wrong at the field", async () => {
    const admin = await signedIn(people.administrator);
    const changed = await makePerson("Badly Typed", "analyst");
    const form = new URLSearchParams({ intent: "change", name: "Better Typed", email: "no address" });
    const response = await post(pageOf(changed), confirmed(form), admin);
    expect(response.status).toBe(422);
    const body = await response.text();
    expect(body).toContain('value="Better Typed"');
    expect(body).toContain('value="no address"');
    expect(text(body)).toContain("This is not an e-mail address");
  });

  test("sets nobody's password, whatever is posted", async () => {
    const admin = await signedIn(people.administrator);
    const changed = await makePerson("Own Password", "analyst");
    const fields = { intent: "change", name: "Own Password", email: "own.password.2@calderpoint.example" };
    const form = new URLSearchParams({ ...fields, password: NEW, passwordHash: "x", switchedOffAt: "2026-01-01" });
    expect((await post(pageOf(changed), confirmed(form), admin)).status).toBe(302);
    expect((await signIn(fields.email, NEW)).status).toBe(401);
    expect((await signIn(fields.email, PASSWORD)).status).toBe(302);
  });

  test("ends one session of somebody, and withdraws a key", async () => {
    const admin = await signedIn(people.administrator);
    const changed = await makePerson("Two Benches", "analyst");
    const [first, second] = [await signedIn(changed), await signedIn(changed)];
    const { key } = await makeKey(changed, { name: "bench-9", scopes: ["read"], days: 1 });
    const body = await (await get(pageOf(changed), admin)).text();
    expect(body).not.toContain(key);
    const session = /name="session" value="([0-9a-f]{64})"/.exec(body)?.[1] ?? "";
    expect((await post(pageOf(changed), { intent: "end-session", session }, admin)).status).toBe(302);
    const statuses = [(await get("/account", first)).status, (await get("/account", second)).status];
    expect(statuses.sort()).toEqual([200, 302]);
    const ask = () => server.fetch("/api/v1/editions", { headers: { Authorization: `Bearer ${key}` } });
    expect((await ask()).status).toBe(200);
    const form = new URLSearchParams({ intent: "withdraw-key", key: key.slice(4, 16) });
    expect((await post(pageOf(changed), confirmed(form), admin)).status).toBe(302);
    expect((await ask()).status).toBe(401);
  });

  test("that nobody has, or whose address is no id, is not there", async () => {
    const admin = await signedIn(people.administrator);
    for (const id of ["00000000-0000-4000-8000-000000000000", "nonsense", "%27%20or%201=1"]) {
      expect((await get(`/people/${id}`, admin)).status).toBe(404);
    }
  });
});

test("the list of people is searched and filtered in its address", async () => {
  const admin = await signedIn(people.administrator);
  await makePerson("Needle <b>In</b> Haystack", "reviewer");
  const found = await (await get("/people?q=needle", admin)).text();
  expect(found).toContain("Needle &lt;b&gt;In&lt;/b&gt; Haystack");
  expect(found).not.toContain("Mina Corvin");
  expect(text(await (await get("/people?q=needle&role=analyst", admin)).text())).toContain("No account fits.");
  expect((await get("/people?role=king&account=lost", admin)).status).toBe(200);
  expect((await get("/people?nonsense=1", admin)).status).toBe(400);
});

test("one's own address changes by letter, and the letter's link alone changes nothing", async () => {
  const mover = await makePerson("Mover", "analyst");
  const cookie = await signedIn(mover);
  const email = "mover.new@calderpoint.example";
  const wrong = await post("/account", { intent: "address", email, current: "a wrong guess" }, cookie);
  expect(wrong.status).toBe(422);
  expect(await wrong.text()).not.toContain("a wrong guess");
  const asked = await post("/account", { intent: "address", email, current: PASSWORD }, cookie);
  expect(asked.headers.get("Location")).toBe("/account?done=address-asked");
  const path = new URL(/http:\S+\/address\/\S+/.exec((await server.letterTo(email)).text ?? "")?.[0] ?? "").pathname;
  expect(text(await (await get(path)).text())).toContain("mover.new@calderpoint.example");
  expect((await signIn(email, PASSWORD)).status).toBe(401);
  expect((await post(path, {}, cookie)).headers.get("Location")).toBe("/account?done=address");
  expect((await signIn(email, PASSWORD)).status).toBe(302);
  expect((await post(path, {})).status).toBe(409);
  expect(text(await (await get(path)).text())).toContain("This link has gone");
  expect(server.log()).not.toContain(path.slice("/address/".length));
});

test("one's own name changes, and a name that cannot be taken stays on the page", async () => {
  const renamed = await makePerson("Before Renaming", "analyst");
  const cookie = await signedIn(renamed);
  expect((await post("/account", { intent: "rename", name: "" }, cookie)).status).toBe(422);
  expect((await post("/account", { intent: "rename", name: "After Renaming" }, cookie)).status).toBe(302);
  expect(text(await (await get("/account", cookie)).text())).toContain("After Renaming");
});

describe("the record", () => {
  test("is downloaded as a file, by form only, with a name and no cache", async () => {
    const admin = await signedIn(people.administrator);
    const answer = await post("/resources/record/export", { format: "jsonl", act: "person.signed-in" }, admin);
    expect(answer.status).toBe(200);
    expect(answer.headers.get("Content-Type")).toBe("application/jsonl; charset=utf-8");
    expect(answer.headers.get("Content-Disposition")).toMatch(
      /^attachment; filename="tablewright record to \d+\.jsonl"/,
    );
    expect(answer.headers.get("Cache-Control")).toContain("no-store");
    const lines = (await answer.text()).trim().split("\n");
    expect(lines.length).toBeGreaterThan(5);
    expect(new Set(lines.map((line) => (JSON.parse(line) as { act: string }).act))).toEqual(
      new Set(["person.signed-in"]),
    );
    const csv = await post("/resources/record/export", { format: "csv" }, admin);
    expect(csv.headers.get("Content-Type")).toBe("text/csv; charset=utf-8");
    expect((await csv.text()).split("\r\n").length).toBeGreaterThan(lines.length);
  });

  test.each([{ format: "xml" }, { format: "csv", act: "nothing" }, { format: "csv", from: "yesterday" }])(
    "is not downloaded for %j",
    async (body) => {
      expect(
        (
          await post(
            "/resources/record/export",
            body as unknown as Record<string, string>,
            await signedIn(people.administrator),
          )
        ).status,
      ).toBe(422);
    },
  );

  test("reads in words and leads on, by person", async () => {
    const admin = await signedIn(people.administrator);
    const body = await (await get(`/record?person=${people.administrator.person.id}`, admin)).text();
    expect(text(body)).toMatch(/roles changed\s+person\s+Changed Roles\s+changed\s+analyst to steward, reviewer/);
    expect(body).toContain(`href="/people/${people.administrator.person.id}"`);
  });
});

describe("API keys", () => {
  test("are shown once, open the API, and are refused from the moment they are withdrawn", async () => {
    const cookie = await signedIn(people.analyst);
    const made = await post(
      "/account/keys",
      { intent: "make", name: "titration-2", scopes: "read", days: "30" },
      cookie,
    );
    expect(made.status).toBe(200);
    expect(made.headers.get("Cache-Control")).toContain("no-store");
    const key = /twk_[0-9a-z]{12}_[\w-]{43}/.exec(await made.text())?.[0] ?? "";
    const ask = () => server.fetch("/api/v1/editions", { headers: { Authorization: `Bearer ${key}` } });
    expect((await ask()).status).toBe(200);
    const page = await (await get("/account/keys", cookie)).text();
    expect(page).toContain("titration-2");
    expect(page).not.toContain(key);

    const id = key.slice(4, 16);
    const other = await signedIn(people.administrator);
    expect((await post("/account/keys", { intent: "withdraw", key: id }, other)).status).toBe(404);
    expect((await ask()).status).toBe(200);
    expect((await post("/account/keys", { intent: "withdraw", key: id }, cookie)).status).toBe(302);
    const refused = await ask();
    expect(refused.status).toBe(401);
    expect(refused.headers.get("WWW-Authenticate")).toMatch(/^Bearer/);
    expect(server.log()).not.toContain(key);
  });

  test("that are given no name or too long a life stay on the page with what was typed", async () => {
    const cookie = await signedIn(people.analyst);
    const response = await post("/account/keys", { intent: "make", name: "", scopes: "read", days: "9999" }, cookie);
    expect(response.status).toBe(422);
    expect(text(await response.text())).toContain("Say which program the key is for.");
  });

  test("for more than one's roles allow are refused", async () => {
    const cookie = await signedIn(people.analyst);
    const before = await findOwnKeys(people.analyst);
    const response = await post(
      "/account/keys",
      { intent: "make", name: "sneaky", scopes: "sheets:write", days: "30" },
      cookie,
    );
    expect(response.status).toBe(403);
    expect(await findOwnKeys(people.analyst)).toEqual(before);
  });
});

test("one's sessions are listed, and another's cannot be ended", async () => {
  const [here, there] = [await signedIn(people.analyst), await signedIn(people.analyst)];
  const theirs = await signedIn(people.administrator);
  const sessionsOn = async (cookie: string) =>
    [...(await (await get("/account", cookie)).text()).matchAll(/name="session" value="([0-9a-f]{64})"/g)].map(
      (match) => match[1] ?? "",
    );
  const mine = await sessionsOn(here);
  expect(mine.length).toBeGreaterThan(0);
  const ended = await post("/account", { intent: "end-session", session: mine[0] ?? "" }, theirs);
  expect(ended.status).toBe(404);
  expect((await post("/account", { intent: "end-others" }, here)).status).toBe(302);
  expect((await get("/account", there)).status).toBe(302);
  expect((await get("/account", here)).status).toBe(200);
});

test("the demo's inbox does not exist outside the demo", async () => {
  expect((await get("/inbox")).status).toBe(404);
});

describe("what cannot be a form of these pages is refused, and changes nothing", () => {
  const pages = [
    "/sign-in",
    "/sign-out",
    "/forgotten",
    "/reset/x",
    "/invitation/x",
    "/account",
    "/account/keys",
    "/people",
    "/people/00000000-0000-4000-8000-000000000000",
    "/address/x",
    "/resources/record/export",
  ];
  test.each(pages)("%s", async (path) => {
    const cookie = await signedIn(people.administrator);
    const send = (type: string, body: string) =>
      server.fetch(path, { method: "POST", headers: { "Content-Type": type, Cookie: cookie }, body });
    expect((await send("application/json", '{"email":"x"}')).status).toBe(415);
    expect((await send("multipart/form-data; boundary=x", "--x\r\nbroken")).status).toBe(400);
    expect((await send("application/x-www-form-urlencoded", "intent=nonsense&email=%00")).status).toBe(400);
    expect((await send("application/x-www-form-urlencoded", "intent[a]=1&roles=king&person=1")).status).toBeLessThan(
      500,
    );
  });
});
