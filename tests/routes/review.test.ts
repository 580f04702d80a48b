import { beforeAll, describe, expect, test } from "vitest";
import { useDatabase as makeApplicationUse } from "#app/db/database.server.ts";
import type { Acting } from "#app/people/person.ts";
import { findLines, findRevision } from "#app/review/review.queries.server.ts";
import { sendToReview, takeLineOut } from "#app/review/revise.server.ts";
import { findNewestEdition } from "#app/editions/editions.queries.server.ts";
import { ANY_SOURCE, expanded, type ValueRow } from "#tests/support/editions.ts";
import { makePerson, PASSWORD, signedIn } from "#tests/support/people.ts";
import { acceptAll, propose, publishWaiting } from "#tests/support/revisions.ts";
import { useServer } from "#tests/support/server.ts";

/*
 * The forms of the review pages as a browser without scripts sends them, and as a damaged or hostile client does: the
 * right status, a sentence on the page, and what was typed still in its field. Values: CODATA Key Values (1989).
 */

let steward: Acting;
let reviewer: Acting;
const cookies: Record<"steward" | "reviewer" | "reviewerSinceMorning" | "administrator", string> = {
  steward: "",
  reviewer: "",
  reviewerSinceMorning: "",
  administrator: "",
};
let campaign = 0;
let draft = 0;

const codata = (key: string, property: ValueRow["property"], text: string): ValueRow => ({
  key,
  property,
  digits: text,
  uncertainty: expanded("0.35"),
});

const server = useServer({
  prepare: async (database) => {
    makeApplicationUse(database.app);
    steward = await makePerson("Ines Halvard", "steward");
    reviewer = await makePerson("Ruth Amsel", "reviewer");
    cookies.steward = await signedIn(steward);
    cookies.reviewer = await signedIn(reviewer);
    cookies.reviewerSinceMorning = await signedIn(reviewer, new Date(Date.now() - 60 * 60 * 1000));
    cookies.administrator = await signedIn(await makePerson("Pell Ostrander", "administrator"));
    const first = await propose(steward, {
      sources: [{ id: ANY_SOURCE, title: "Calder Point Laboratory, in-house notes (invented)" }],
      species: ["H2(g)", "N2(g)", "NH3(g)"].map((key) => ({ key })),
      values: [
        codata("H2(g)", "entropy", "130.680"),
        codata("N2(g)", "entropy", "191.609"),
        codata("NH3(g)", "entropy", "192.77"),
        codata("NH3(g)", "enthalpyOfFormation", "-45.94"),
        codata("NH3(g)", "gibbsEnergyOfFormation", "-16.41"),
      ],
    });
    await acceptAll(steward, reviewer, first);
    await publishWaiting(reviewer);
    const values = [codata("NH3(g)", "enthalpyOfFormation", "-49.54"), codata("N2(g)", "heatCapacity", "29.124")];
    campaign = await propose(steward, { values }, "Ammonia <b>again</b>");
    await sendToReview(steward, campaign, "");
    draft = await propose(steward, { values: [codata("H2(g)", "heatCapacity", "28.836")] });
  },
});

beforeAll(() => makeApplicationUse(server.database.app));

type Who = keyof typeof cookies;

async function get(path: string, who: Who): Promise<{ status: number; text: string }> {
  const response = await server.fetch(path, { headers: { Cookie: cookies[who] } });
  return { status: response.status, text: textOf(await response.text()) };
}

async function post(path: string, who: Who, fields: readonly (readonly [string, string])[] | Record<string, string>) {
  const body = new URLSearchParams(
    Array.isArray(fields) ? (fields as [string, string][]) : (fields as Record<string, string>),
  );
  const response = await server.fetch(path, { method: "POST", headers: { Cookie: cookies[who] }, body });
  const html = await response.text();
  return { status: response.status, text: textOf(html), html, location: response.headers.get("Location") };
}

/** What a page says, without its markup and the data that its scripts would read. */
function textOf(html: string): string {
  return html
    .replace(/<script[\s\S]*?<\/script>/g, "")
    .replace(/<!--.*?-->/g, "")
    .replace(/<[^>]+>/g, " ")
    .replace(/\s+/g, " ");
}

const at = (id: number): string => `/revisions/${id}`;
const seenOf = async (id: number, property: string): Promise<string> => {
  const line = (await findLines(id, server.database.app)).find((one) => one.property === property);
  return line ? `${line.id}:${line.versionId}` : "";
};
const statesOf = async (id: number) => (await findLines(id, server.database.app)).map((line) => line.state);

describe("a revision's page", () => {
  test("says what blocks, with its arithmetic, what stands and what is proposed; words of people are text", async () => {
    const { status, text } = await get(at(campaign), "reviewer");
    expect(status).toBe(200);
    expect(text).toContain("Gibbs closure");
    expect(text).toMatch(/Two digits of .*exchanged would explain it/);
    expect(text).toContain("Accept the clean line");
    expect(text).toContain("Caution.");
    const raw = await (await server.fetch(at(campaign), { headers: { Cookie: cookies.reviewer } })).text();
    expect(raw).toContain("Ammonia &lt;b&gt;again&lt;/b&gt;");
    expect(raw).not.toContain("<b>again</b>");
  });

  test.each([
    ["/revisions/999999", 404],
    ["/revisions/none", 404],
    ["/revisions/0", 404],
    ["/revisions/99999999999999999999", 404],
    ["/revisions/1?page=x", 400],
    ["/revisions/1?page=99999", 200],
  ])("%s answers %i", async (path, status) => {
    expect((await get(path, "reviewer")).status).toBe(status);
  });
});

describe("deciding", () => {
  test("the steward who wrote it is refused with a sentence, and nothing is decided", async () => {
    const seen = await seenOf(campaign, "heatCapacity");
    const forms: Record<string, string>[] = [
      { intent: "accept", seen },
      { intent: "decline", seen, reason: "no" },
      { intent: "close" },
    ];
    for (const fields of forms) {
      const { status, text } = await post(at(campaign), "steward", fields);
      expect(status).toBe(403);
      expect(text).toContain("This needs the role reviewer");
      // The page is still the revision's page.
      expect(text).toContain("Ammonia");
    }
    expect(await statesOf(campaign)).toEqual(["open", "open"]);
  });

  test("a line that blocks is not accepted, and the sentence says why", async () => {
    const seen = await seenOf(campaign, "enthalpyOfFormation");
    const { status, text } = await post(at(campaign), "reviewer", { intent: "accept", seen });
    expect(status).toBe(409);
    expect(text).toContain("would not pass");
  });

  test.each([
    ["decline", "Say why the line is declined."],
    ["return", "Say what should be mended."],
    ["comment", "Write something first."],
  ])("%s without words is 422, with the sentence in the summary and at the field", async (intent, sentence) => {
    const seen = await seenOf(campaign, "heatCapacity");
    const fields = { intent, reason: " ", remark: "", body: "", ...(intent === "decline" ? { seen } : {}) };
    const { status, text } = await post(at(campaign), "reviewer", fields);
    expect(status).toBe(422);
    expect(text.split(sentence)).toHaveLength(3);
  });

  test("what was typed is not lost when it is refused", async () => {
    const words = `kept ${"x".repeat(5000)}`;
    const { status, html } = await post(at(campaign), "reviewer", { intent: "return", remark: words });
    expect(status).toBe(422);
    expect(html).toContain(words);
  });

  test("a form of an older version, a line of another revision and a line that is nowhere are refused", async () => {
    const [lineId = ""] = (await seenOf(campaign, "heatCapacity")).split(":");
    const stale = await post(at(campaign), "reviewer", { intent: "accept", seen: `${lineId}:1` });
    expect(stale.status).toBe(409);
    expect(stale.text).toContain("was edited since you opened this page");
    const foreign = await post(at(campaign), "reviewer", {
      intent: "accept",
      seen: await seenOf(draft, "heatCapacity"),
    });
    expect(foreign.status).toBe(404);
    expect((await post(at(campaign), "reviewer", { intent: "accept", seen: "999999:1" })).status).toBe(404);
    expect((await post(at(campaign), "reviewer", { intent: "set-aside", finding: "999999", reason: "x" })).status).toBe(
      404,
    );
  });

  test("accepting leads back to the line; accepting it twice changes nothing more", async () => {
    const seen = await seenOf(campaign, "heatCapacity");
    const first = await post(at(campaign), "reviewer", { intent: "accept", seen });
    expect([first.status, first.location]).toEqual([303, `${at(campaign)}#line-${seen.split(":", 1)[0]}`]);
    await post(at(campaign), "reviewer", { intent: "accept", seen });
    expect((await statesOf(campaign)).sort()).toEqual(["accepted", "open"]);
  });

  test("the review is not closed while a line is open", async () => {
    const { status, text } = await post(at(campaign), "reviewer", { intent: "close" });
    expect(status).toBe(409);
    expect(text).toContain("1 line has no decision yet");
  });

  test("in the background the same form answers with what came of it", async () => {
    const response = await server.fetch(`/resources/revisions/${campaign}/act`, {
      method: "POST",
      headers: { Cookie: cookies.reviewer },
      body: new URLSearchParams({ intent: "comment", body: "Which batch?" }),
    });
    expect(response.status).toBe(200);
    expect(await response.text()).toContain("Comment written.");
    expect((await get(at(campaign), "steward")).text).toContain("Which batch?");
    const gone = await server.fetch(`/resources/revisions/${campaign}/act`, { headers: { Cookie: cookies.reviewer } });
    expect([gone.status, gone.headers.get("Location")]).toEqual([302, at(campaign)]);
  });
});

describe("the steward", () => {
  test("sees what is wrong with a value at its field, and what was typed", async () => {
    const [line = ""] = (await seenOf(draft, "heatCapacity")).split(":");
    const fields = {
      intent: "rewrite",
      line,
      version: "1",
      unit: "J/(mol K)",
      uncertainty: "",
      kind: "none",
      reason: "typed",
    };
    const { status, text, html } = await post(at(draft), "steward", { ...fields, value: "twenty-nine" });
    expect(status).toBe(422);
    expect(text).toContain("is not a number");
    expect(html).toContain('value="twenty-nine"');
    expect((await post(at(draft), "steward", { ...fields, value: "28.84" })).status).toBe(303);
    // The version that was seen is no longer the newest.
    expect((await post(at(draft), "steward", { ...fields, value: "28.85" })).status).toBe(409);
  });

  test("cannot send a revision without lines", async () => {
    const empty = await propose(steward, { values: [codata("H2(g)", "enthalpyIncrement", "8.467")] });
    const [line] = await findLines(empty, server.database.app);
    await takeLineOut(steward, empty, line?.id ?? "", "not ours");
    const { status, text } = await post(at(empty), "steward", { intent: "send", remark: "" });
    expect(status).toBe(409);
    expect(text).toContain("has nothing to review");
    expect((await get(at(empty), "steward")).text).toContain("This revision has no lines");
  });

  test("withdraws with a reason only, and it stays to be read", async () => {
    expect((await post(at(draft), "steward", { intent: "withdraw", reason: "" })).status).toBe(422);
    expect((await post(at(draft), "steward", { intent: "withdraw", reason: "Wrong sheet." })).status).toBe(303);
    expect((await get(at(draft), "reviewer")).text).toContain("Wrong sheet.");
    expect((await post(at(draft), "steward", { intent: "send", remark: "" })).status).toBe(409);
  });
});

describe("what is no form of ours", () => {
  const addresses = () => [at(campaign), `/resources/revisions/${campaign}/act`, "/publish"];
  const boundary = "----broken";
  const bodies: readonly (readonly [string, string, string])[] = [
    ["JSON", "application/json", '{"intent":"close"}'],
    ["text", "text/plain", "intent=close"],
    ["broken multipart", `multipart/form-data; boundary=${boundary}`, `--${boundary}\r\nContent-Disp`],
    ["multipart without a boundary", "multipart/form-data", "x"],
    [
      "a file",
      `multipart/form-data; boundary=${boundary}`,
      `--${boundary}\r\nContent-Disposition: form-data; name="intent"; filename="a"\r\n\r\nx\r\n--${boundary}--\r\n`,
    ],
    ["NUL", "application/x-www-form-urlencoded", "intent=close%00"],
    ["an empty body", "application/x-www-form-urlencoded", ""],
    [
      "names of the language",
      "application/x-www-form-urlencoded",
      "__proto__=1&constructor=2&intent[0][1]=3&intent=a&intent=b",
    ],
  ];

  test.each(bodies)("%s gets a 4xx everywhere, and the server still answers", async (_what, type, body) => {
    for (const address of addresses()) {
      const response = await server.fetch(address, {
        method: "POST",
        headers: { Cookie: cookies.reviewer, "Content-Type": type },
        body,
      });
      expect(response.status, address).toBeGreaterThanOrEqual(400);
      expect(response.status, address).toBeLessThan(500);
    }
    expect((await server.fetch("/healthz")).status).toBe(200);
    expect((await findRevision(campaign, server.database.app))?.state).toBe("in_review");
  });

  test("a form from elsewhere is refused", async () => {
    for (const address of addresses()) {
      const response = await server.fetch(address, {
        method: "POST",
        headers: { Cookie: cookies.reviewer, Origin: "https://elsewhere.example" },
        body: new URLSearchParams({ intent: "close" }),
      });
      expect(response.status, address).toBe(403);
    }
  });
});

describe("publishing", () => {
  const fields = async (rest: Record<string, string> = {}) => {
    const page = await (await server.fetch("/publish", { headers: { Cookie: cookies.reviewer } })).text();
    const hidden = (name: string) => new RegExp(`name="${name}" value="([^"]*)"`).exec(page)?.[1] ?? "";
    return {
      intent: "publish",
      expectedPrevious: hidden("expectedPrevious"),
      listDigest: hidden("listDigest"),
      notes: "Ammonia, decided.",
      licence: "CC-BY-4.0",
      withdraws: "",
      withdrawalReason: "",
      ...rest,
    };
  };

  test("with nothing accepted says what would stand here", async () => {
    const { status, text } = await get("/publish", "reviewer");
    expect(status).toBe(200);
    expect(text).toContain("Nothing is accepted for edition 2 yet");
  });

  test("asks once more before anything is published, showing what will change", async () => {
    await post(at(campaign), "reviewer", {
      intent: "decline",
      seen: await seenOf(campaign, "enthalpyOfFormation"),
      reason: "digits exchanged",
    });
    await post(at(campaign), "reviewer", { intent: "close" });
    const { status, text } = await post("/publish", "reviewer", await fields({ intent: "look" }));
    expect(status).toBe(200);
    expect(text).toContain("Publish edition 2?");
    expect(text).toContain("Ammonia, decided.");
    expect(text).toContain("1 new value");
    expect((await findNewestEdition(server.database.app))?.number).toBe(1);
  });

  test.each([
    ["no notes", { notes: "" }, 422, "Say what this edition brings."],
    ["a licence that is none", { licence: "all rights!" }, 422, "SPDX"],
    ["a withdrawal without a reason", { withdraws: "1" }, 422, "Say why that edition is withdrawn."],
    ["an edition that is not there", { withdraws: "77", withdrawalReason: "wrong" }, 404, "There is no edition 77"],
    ["a list that has moved", { listDigest: "0".repeat(64) }, 409, "has changed since it was shown"],
  ])("%s is refused with its sentence, and nothing typed is lost", async (_what, rest, status, sentence) => {
    const answer = await post("/publish", "reviewer", await fields({ notes: "Kept words.", ...rest }));
    expect(answer.status).toBe(status);
    expect(answer.text).toContain(sentence);
    if (!("notes" in rest)) expect(answer.html).toContain("Kept words.");
    expect((await findNewestEdition(server.database.app))?.number).toBe(1);
  });

  test("pressed twice at once: one edition, and the other press is told which", async () => {
    const sent = await fields();
    const answers = await Promise.all([post("/publish", "reviewer", sent), post("/publish", "reviewer", sent)]);
    expect(answers.map((answer) => answer.status).sort()).toEqual([303, 409]);
    expect(answers.find((answer) => answer.status === 303)?.location).toBe("/editions/2");
    const other = answers.find((answer) => answer.status === 409);
    expect(other?.text).toContain("Edition 2 was published by Ruth Amsel");
    expect(other?.text).toContain("Ammonia, decided.");
    expect((await findNewestEdition(server.database.app))?.number).toBe(2);
  });
});

describe("signing off an hour after signing in", () => {
  const morning = "reviewerSinceMorning";
  const right = { password: PASSWORD };

  test("asks for the password once more to close a review", async () => {
    const id = await propose(steward, { values: [codata("H2(g)", "heatCapacity", "28.84")] });
    await sendToReview(steward, id, "");
    await post(at(id), morning, { intent: "accept", seen: await seenOf(id, "heatCapacity") });
    expect(await statesOf(id)).toEqual(["accepted"]);
    for (const password of ["", "seven grey kettle"]) {
      const { status, text, html } = await post(at(id), morning, { intent: "close", password });
      expect(status).toBe(422);
      expect(text).toMatch(/Give your password once more|This is not your password/);
      if (password) expect(html).not.toContain(password);
    }
    expect((await findRevision(id, server.database.app))?.state).toBe("in_review");
    expect((await post(at(id), morning, { intent: "close", ...right })).status).toBe(303);
    expect((await get(at(id), "steward")).text).toContain("Ruth Amsel reviewed it and closed the review");
  });

  test("asks for it to publish, and takes it", async () => {
    const page = await (await server.fetch("/publish", { headers: { Cookie: cookies[morning] } })).text();
    const hidden = (name: string) => new RegExp(`name="${name}" value="([^"]*)"`).exec(page)?.[1] ?? "";
    const fields = {
      expectedPrevious: hidden("expectedPrevious"),
      listDigest: hidden("listDigest"),
      notes: "Hydrogen.",
      licence: "CC-BY-4.0",
    };
    const look = await post("/publish", morning, { intent: "look", ...fields });
    expect(look.html).toContain('autoComplete="current-password"');
    const wrong = await post("/publish", morning, { intent: "publish", ...fields, password: "no" });
    expect(wrong.status).toBe(422);
    expect(wrong.text).toContain("This is not your password. Nothing was signed off.");
    expect(wrong.text).toContain("Hydrogen.");
    expect((await findNewestEdition(server.database.app))?.number).toBe(2);
    expect((await post("/publish", morning, { intent: "publish", ...fields, ...right })).status).toBe(303);
    expect((await findNewestEdition(server.database.app))?.number).toBe(3);
  });
});

describe("the record", () => {
  test("tells who did what, with its filters in the address", async () => {
    const { status, text } = await get("/record?act=edition.published", "administrator");
    expect(status).toBe(200);
    expect(text).toContain("published");
    expect(text).toContain("edition 2");
    expect(text).not.toContain("revision 1");
    const nobody = "00000000-0000-4000-8000-000000000000";
    expect((await get(`/record?person=${nobody}`, "administrator")).text).toContain("No entry of the record fits.");
  });

  test.each(["act=nothing", "object=nothing", "person=100%25", "from=2026-13-01", "to=yesterday", "before=x"])(
    "%s restricts nothing and gets a sentence",
    async (query) => {
      const { status, text } = await get(`/record?${query}`, "administrator");
      expect(status).toBe(200);
      expect(text).toContain("Entries of the record, newest first");
    },
  );

  test("an unknown parameter is refused", async () => {
    expect((await get("/record?what=ever", "administrator")).status).toBe(400);
  });
});
