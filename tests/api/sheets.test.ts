import { createHash } from "node:crypto";
import { readFileSync } from "node:fs";
import { beforeAll, describe, expect, test } from "vitest";
import { database, useDatabase as workOn } from "#app/db/database.server.ts";
import { buildRevision } from "#app/intake/buildRevision.server.ts";
import { leaveRowsOut } from "#app/intake/repairCell.server.ts";
import { makeKey } from "#app/people/apiKey.server.ts";
import type { Acting } from "#app/people/person.ts";
import { acceptLines } from "#app/review/decide.server.ts";
import { sendToReview } from "#app/review/revise.server.ts";
import { publishThreeEditions } from "#tests/support/editions.ts";
import { runJobs } from "#tests/support/jobs.ts";
import { makePerson } from "#tests/support/people.ts";
import { seenLines } from "#tests/support/revisions.ts";
import { useServer } from "#tests/support/server.ts";
import { confirmGuess } from "#tests/support/sheets.ts";

let steward: Acting;
let both: Acting;
let key = "";
let otherKey = "";
let bothKey = "";
let readKey = "";

const server = useServer({
  async prepare(cloned) {
    workOn(cloned.app);
    await publishThreeEditions(cloned.app);
    steward = await makePerson("S. Steward", "steward");
    both = await makePerson("B. Both", "steward", "reviewer");
    const other = await makePerson("O. Other", "steward");
    const keyOf = async (acting: Acting, scope: "read" | "sheets:write") =>
      (await makeKey(acting, { name: "calorimeter", scopes: [scope], days: 30 })).key;
    key = await keyOf(steward, "sheets:write");
    otherKey = await keyOf(other, "sheets:write");
    bothKey = await keyOf(both, "sheets:write");
    readKey = await keyOf(steward, "read");
  },
});
beforeAll(() => workOn(server.database.app));

const SOURCE = "src_codata1989";

interface Sheet {
  id: number;
  state: string;
  sha256: string;
  plan: { id: number } | null;
  rows: Record<string, number>;
  values: number;
  findings: Record<string, number>;
  revision: { number: number; state: string; lines: number } | null;
  links: Record<string, string>;
}
interface Row {
  row: number;
  outcome: string;
  species: string | null;
  values: { property: string; digits: string; column: string }[];
  why: string[];
}
interface Finding {
  row: number | null;
  column: string | null;
  species: string | null;
  check: string;
  severity: string;
  sentence: string;
  suggestions: { becomes: string; sentence: string }[];
}

const ask = (path: string, as = key): Promise<Response> =>
  server.fetch(`/api/v1${path}`, { headers: { Authorization: `Bearer ${as}` } });
const sheetOf = async (id: number): Promise<Sheet> => (await (await ask(`/sheets/${id}`)).json()) as Sheet;

function send(body: BodyInit, query: string, type = "text/csv", as = key): Promise<Response> {
  return server.fetch(`/api/v1/sheets${query}`, {
    method: "POST",
    body,
    headers: { Authorization: `Bearer ${as}`, ...(type ? { "Content-Type": type } : {}) },
  });
}
const sendCsv = (text: string, query = "?name=bench.csv", as = key) => send(text, query, "text/csv", as);
async function handedIn(text: string, query?: string): Promise<Sheet> {
  const answer = await sendCsv(text, query);
  expect(answer.status).toBe(201);
  return (await answer.json()) as Sheet;
}
const errorsOf = async (answer: Response) =>
  ((await answer.json()) as { errors?: { pointer: string }[] }).errors?.map((one) => one.pointer);

/** Every page of a list, one entry at a time. */
async function walked<Entry>(path: string, member: string, limit = 1): Promise<Entry[]> {
  const found: Entry[] = [];
  let next: string | undefined = `${path}${path.includes("?") ? "&" : "?"}limit=${limit}`;
  while (next !== undefined) {
    const answer = await ask(next);
    const page = (await answer.json()) as Record<string, Entry[]>;
    found.push(...(page[member] ?? []));
    next = /^<\/api\/v1([^>]+)>; rel="next"$/.exec(answer.headers.get("Link") ?? "")?.[1];
  }
  return found;
}

let made = 0;
/** A sheet of other bytes each time, with these rows. */
function sheet(rows: readonly string[]): string {
  made += 1;
  return [`# bench ${made}`, "Species,dHf (kJ/mol),S (J/mol K)", ...rows, ""].join("\n");
}
const GOOD = ["NH3(g),-45.95,192.78", "H2O(l),-285.84,69.96"];

describe("handing in a sheet", () => {
  test("answers 201 with its address, and keeps its bytes untouched", async () => {
    const text = sheet(GOOD);
    const answer = await sendCsv(text);
    const taken = (await answer.json()) as Sheet;
    expect([answer.status, answer.headers.get("Location")]).toEqual([201, `/api/v1/sheets/${taken.id}`]);
    expect(taken).toMatchObject({ state: "planned", sha256: createHash("sha256").update(text).digest("hex") });
    expect(await sheetOf(taken.id)).toEqual(taken);
  });

  test("may be the file of a form", async () => {
    const form = new FormData();
    form.set("sheet", new File([sheet(GOOD)], "from a form.csv", { type: "text/csv" }));
    const answer = await send(form, "", "");
    expect([answer.status, await answer.json()]).toMatchObject([201, { name: "from a form.csv", state: "planned" }]);
  });

  test("the same bytes again are the same sheet", async () => {
    const text = sheet(GOOD);
    const first = await handedIn(text);
    const again = await sendCsv(text, "?name=other.csv");
    expect([again.status, ((await again.json()) as Sheet).id]).toEqual([200, first.id]);
    const at = await Promise.all(Array.from({ length: 4 }, () => sendCsv(`${text}\n`)));
    expect(at.map((one) => one.status).sort()).toEqual([200, 200, 200, 201]);
    expect((await sendCsv(text, "?name=theirs.csv", otherKey)).status).toBe(409);
  });

  test("is its owner's alone: others find nothing", async () => {
    const { id } = await handedIn(sheet(GOOD));
    for (const path of [`/sheets/${id}`, `/sheets/${id}/rows`, `/sheets/${id}/findings`]) {
      expect((await ask(path, otherKey)).status, path).toBe(404);
      expect((await ask(path, readKey)).status, path).toBe(403);
      expect((await ask(path)).status, path).toBe(200);
    }
    expect((await sendCsv(sheet(GOOD), "?name=a.csv", readKey)).status).toBe(403);
  });
});

describe("a remembered plan", () => {
  test("reads the rows without asking, where the source is named; and nothing is read without one", async () => {
    const first = await handedIn(sheet(GOOD));
    await confirmGuess(steward, first.id, { source: { kind: "known", sourceId: SOURCE } });
    await runJobs(server.database);
    expect((await sheetOf(first.id)).state).toBe("read");
    const { plan } = await sheetOf(first.id);

    expect(await handedIn(sheet(GOOD))).toMatchObject({ state: "planned", plan });
    const fitting = await handedIn(sheet(GOOD), `?name=fits.csv&source=${SOURCE}`);
    expect(fitting.state).toBe("reading");
    const named = await handedIn(sheet(GOOD), `?name=named.csv&source=${SOURCE}&plan=${plan?.id}`);
    expect(named.state).toBe("reading");
    await runJobs(server.database);
    expect(await sheetOf(named.id)).toMatchObject({ state: "read", rows: { read: 2, refused: 0 }, values: 4 });
  });

  test("is refused where it is of other heads, unknown, or of no source; nothing is kept then", async () => {
    const before = await database().selectFrom("sheet").select("id").execute();
    const other = "Species;Cp (J/mol K)\nH2O(l);75,3\n";
    const { plan } = await sheetOf((await handedIn(sheet(GOOD))).id);
    expect(await errorsOf(await sendCsv(other, `?name=a.csv&plan=${plan?.id}`))).toEqual(["/plan"]);
    expect(await errorsOf(await sendCsv(other, "?name=a.csv&plan=999999"))).toEqual(["/plan"]);
    expect(await errorsOf(await sendCsv(other, "?name=a.csv&plan=first"))).toEqual(["/plan"]);
    expect(await errorsOf(await sendCsv(other, "?name=a.csv&source=nobody"))).toEqual(["/source"]);
    const after = await database().selectFrom("sheet").select("id").execute();
    expect(after.length).toBe(before.length + 1);
  });
});

describe("following a sheet", () => {
  test("accounts for every row, and names what is wrong with its repair", async () => {
    const { id } = await handedIn(
      sheet([...GOOD, "remark only,,", "H2O(q),1.0,2.0", "Hg2+(aq),171.1,-32.2", "CO2(g),about -393,213.8"]),
      `?name=messy.csv&source=${SOURCE}`,
    );
    await runJobs(server.database);
    const found = await sheetOf(id);
    expect(found.state).toBe("read");
    const rows = await walked<Row>(`/sheets/${id}/rows`, "rows");
    const counted = (outcome: string) => rows.filter((row) => row.outcome === outcome).length;
    expect(found.rows).toMatchObject({
      read: counted("read"),
      refused: counted("refused"),
      skipped: counted("skipped"),
    });
    expect(rows.map((row) => row.row)).toEqual([...rows.map((row) => row.row)].sort((a, b) => a - b));
    expect(found.rows["read"]).toBe(2);
    expect(rows.find((row) => row.species === "H2O(l)")?.values).toMatchObject([
      { property: "enthalpyOfFormation", digits: "-285.84", column: "dHf (kJ/mol)" },
      { property: "entropy", digits: "69.96", column: "S (J/mol K)" },
    ]);
    for (const row of rows.filter((one) => one.outcome !== "read")) expect(row.why.join("").length).toBeGreaterThan(10);
    const refused = await walked<Row>(`/sheets/${id}/rows?outcome=refused`, "rows", 2);
    expect(refused).toEqual(rows.filter((row) => row.outcome === "refused"));

    const findings = await walked<Finding>(`/sheets/${id}/findings`, "findings");
    expect(findings.length).toBe(found.findings["block"]);
    expect(new Set(findings.map((one) => one.row))).toEqual(new Set(refused.map((row) => row.row)));
    const ambiguous = findings.find((one) => one.sentence.includes("Hg2+"));
    expect(ambiguous).toMatchObject({ check: "reading", severity: "block", column: "Species" });
    expect(ambiguous?.suggestions.length).toBeGreaterThan(1);
  });

  test("shows the findings of the revision built from it, with row and column, and follows the revision", async () => {
    // The sign of ΔfH° is lost: −45.94 kJ/mol in CODATA Key Values (1989).
    const { id } = await handedIn(sheet(["NH3(g),45.94,192.79"]), `?name=sign.csv&source=${SOURCE}`);
    await runJobs(server.database);
    const { revisionId } = await buildRevision(steward, id, { title: "Sign", summary: "" });
    const followed = await sheetOf(id);
    expect(followed).toMatchObject({ state: "built", revision: { number: revisionId, state: "draft" } });
    expect(followed.links["revision"]).toBe(`${server.url}/revisions/${revisionId}`);
    const findings = await walked<Finding>(`/sheets/${id}/findings`, "findings");
    expect(findings.length).toBe(Object.values(followed.findings).reduce((sum, n) => sum + n, 0));
    expect(findings).toContainEqual(
      expect.objectContaining({ row: 3, column: "dHf (kJ/mol)", species: "NH3(g)" }) as Finding,
    );
  });

  test("counts as its person's: whoever's key handed it in does not decide its lines", async () => {
    const answer = await sendCsv(sheet(["NH3(g),-45.97,192.76"]), `?name=mine.csv&source=${SOURCE}`, bothKey);
    const { id, state } = (await answer.json()) as Sheet;
    expect(state).toBe("reading");
    await runJobs(server.database);
    await leaveRowsOut(both, id, null).catch(() => 0);
    const { revisionId } = await buildRevision(both, id, { title: "Mine", summary: "" });
    await sendToReview(both, revisionId, "");
    await expect(acceptLines(both, revisionId, await seenLines(revisionId))).rejects.toThrow();
  });

  test.each(["/sheets/999999", "/sheets/0", "/sheets/x", "/sheets/999999/rows", "/sheets/x/findings"])(
    "%s is none",
    async (path) => {
      expect((await ask(path)).status).toBe(404);
    },
  );

  test.each(["outcome=eaten", "limit=0", "cursor=!!", "cursor=WyJhIl0", "cursor=WyIxIiwiMiIsIjMiXQ"])(
    "a list refuses %s",
    async (query) => {
      const { id } = await handedIn(sheet(GOOD));
      expect((await ask(`/sheets/${id}/rows?${query}`)).status).toBe(422);
    },
  );
});

describe("what is no sheet", () => {
  test.each<[what: string, body: BodyInit, query: string, type: string, status: number]>([
    ["nothing", "", "?name=a.csv", "text/csv", 422],
    ["heads alone", "Species,S (J/mol K)", "?name=a.csv", "text/csv", 422],
    ["a body without a name", "a,b\n1,2\n", "", "text/csv", 422],
    ["an empty name", "a,b\n1,2\n", "?name=%20", "text/csv", 422],
    ["a name of 300 characters", "a,b\n1,2\n", `?name=${"n".repeat(300)}`, "text/csv", 422],
    ["JSON", "{}", "?name=a.csv", "application/json", 415],
    ["plain text", "a,b\n1,2\n", "?name=a.csv", "text/plain", 415],
    ["no type", new Uint8Array([97, 44, 98]), "?name=a.csv", "", 415],
    ["a zip archive", new Uint8Array([0x50, 0x4b, 3, 4, 0, 0]), "?name=a.csv", "text/csv", 422],
    ["NUL bytes", new Uint8Array([97, 44, 98, 10, 0, 44, 0, 10]), "?name=a.csv", "text/csv", 422],
    ["a cell of a million characters", `a,b\n${"x".repeat(1_000_000)},1\n`, "?name=a.csv", "text/csv", 422],
    ["eleven megabytes", new Uint8Array(11 * 1024 * 1024).fill(120), "?name=a.csv", "text/csv", 413],
    ["an unknown parameter", "a,b\n1,2\n", "?name=a.csv&sheet=1", "text/csv", 400],
    ["a parameter given twice", "a,b\n1,2\n", "?name=a.csv&name=b.csv", "text/csv", 400],
    ["a form broken off", "--b\r\nContent-Disposition: form-data; na", "", "multipart/form-data; boundary=b", 400],
    ["a form without a file", "--b--\r\n", "", "multipart/form-data; boundary=b", 422],
  ])("%s", async (_what, body, query, type, status) => {
    expect((await send(body, query, type)).status).toBe(status);
  });

  test.each([
    ["text/csv", "?name=long.csv", ""],
    [
      "multipart/form-data; boundary=b",
      "",
      '--b\r\nContent-Disposition: form-data; name="sheet"; filename="long.csv"\r\n\r\n',
    ],
  ])("a body of %s that grows beyond the limit while it streams is refused", async (type, query, head) => {
    let left = 12;
    const stream = new ReadableStream<Uint8Array>({
      start: (controller) => controller.enqueue(new TextEncoder().encode(head)),
      pull(controller) {
        left -= 1;
        if (left < 0) controller.close();
        else controller.enqueue(new Uint8Array(1024 * 1024).fill(120));
      },
    });
    const init = { method: "POST", body: stream, duplex: "half" as const };
    const answer = await server.fetch(`/api/v1/sheets${query}`, {
      ...init,
      headers: { Authorization: `Bearer ${key}`, "Content-Type": type },
    });
    expect(answer.status).toBe(413);
  });
});

test("the sheets of the demo are handed in by key as they are by hand", async () => {
  const bytes = readFileSync(new URL("../../fixtures/calder-point-messy.csv", import.meta.url));
  const answer = await send(new Uint8Array(bytes), "?name=calder-point-messy.csv");
  expect([answer.status, await answer.json()]).toMatchObject([201, { bytes: bytes.length, state: "planned" }]);
});
