import { beforeAll, describe, expect, test } from "vitest";
import { useDatabase as makeApplicationUse } from "#app/db/database.server.ts";
import { SHEET_LIMITS } from "#app/intake/decode.ts";
import { findSheetBytes } from "#app/intake/intake.queries.server.ts";
import type { Acting } from "#app/people/person.ts";
import { makePerson, signedIn } from "#tests/support/people.ts";
import { useServer } from "#tests/support/server.ts";
import { fixture } from "#tests/support/sheets.ts";

/*
 * Sheets over HTTP, as a browser without scripts sends them: the upload with its limits, the forms of the page one after
 * the other, and the original again byte for byte.
 */

let steward: Acting;
let cookie = "";
let reviewerCookie = "";
const server = useServer({
  worker: true,
  prepare: async ({ app }) => {
    makeApplicationUse(app);
    steward = await makePerson("S. Steward", "steward");
    cookie = await signedIn(steward);
    reviewerCookie = await signedIn(await makePerson("R. Reviewer", "reviewer"));
  },
});
beforeAll(() => makeApplicationUse(server.database.app));

const get = (path: string, as = cookie) => server.fetch(path, { headers: { Cookie: as } });
const post = (path: string, fields: Record<string, string>, as = cookie) =>
  server.fetch(path, { method: "POST", body: new URLSearchParams(fields), headers: { Cookie: as } });

function upload(bytes: Uint8Array | string, name: string): Promise<Response> {
  const form = new FormData();
  form.set("sheet", new File([typeof bytes === "string" ? bytes : new Uint8Array(bytes)], name));
  return server.fetch("/sheets/new", { method: "POST", body: form, headers: { Cookie: cookie } });
}

/** Uploads what can be taken in; answers the address of the sheet. */
async function received(bytes: Uint8Array | string, name: string): Promise<string> {
  const answer = await upload(bytes, name);
  expect(answer.status).toBe(303);
  return answer.headers.get("Location") ?? "";
}

async function until(condition: () => Promise<boolean>): Promise<void> {
  const deadline = Date.now() + 20_000;
  while (!(await condition())) {
    if (Date.now() > deadline) throw new Error("It did not come about in time.");
    await new Promise((resolve) => setTimeout(resolve, 100));
  }
}

describe("an upload that is no sheet", () => {
  test.each<[string, Uint8Array | string, RegExp]>([
    ["a zip archive", Uint8Array.from([0x50, 0x4b, 3, 4, 0, 0]), /zip archive/],
    ["a picture", Uint8Array.from([0x89, 0x50, 0x4e, 0x47, 13, 10]), /picture/],
    ["UTF-16 cut off", Uint8Array.from([0xff, 0xfe, 0x48, 0, 0x32, 0, 0x2c]), /middle of a character/],
    // 9D (hexadecimal) is no character of Windows-1252 either.
    [
      "bytes of no encoding",
      Uint8Array.from([0x66, 0x2c, 0x53, 0x0a, 0x9d, 0x2c, 0x31]),
      /neither UTF-8 nor Windows-1252/,
    ],
    ["a NUL byte", "formula,S\nH2\u0000O,1\n", /NUL byte/],
    ["nothing", "", /No file was chosen|empty/],
  ])("%s named .csv: 422 with a sentence on the form", async (_what, bytes, sentence) => {
    const answer = await upload(bytes, "values.csv");
    expect(answer.status).toBe(422);
    expect(await answer.text()).toMatch(sentence);
  });

  test("one byte over the limit: 413, and the server goes on", async () => {
    const answer = await upload(new Uint8Array(SHEET_LIMITS.bytes + 1).fill(0x31), "large.csv");
    expect(answer.status).toBe(413);
    expect(await answer.text()).toContain("larger than 10 MB");
    expect((await get("/sheets")).status).toBe(200);
  });

  test("a stream that never says how long it is stops at the limit", async () => {
    const head = `--b\r\nContent-Disposition: form-data; name="sheet"; filename="x.csv"\r\n\r\n`;
    let sent = 0;
    const body = new ReadableStream<Uint8Array>({
      pull(controller) {
        controller.enqueue(sent === 0 ? new TextEncoder().encode(head) : new Uint8Array(256 * 1024).fill(0x31));
        sent += 256 * 1024;
        if (sent > 64 * 1024 * 1024) controller.close();
      },
    });
    const answer = await server
      .fetch("/sheets/new", {
        method: "POST",
        body,
        headers: { Cookie: cookie, "Content-Type": "multipart/form-data; boundary=b" },
        // Node's own addition to fetch, without which no stream can be sent.
        ...({ duplex: "half" } as object),
      })
      .catch(() => null);
    // Answered, or cut off while still sending; never taken in.
    if (answer) expect(answer.status).toBe(413);
    expect(sent).toBeLessThan(64 * 1024 * 1024);
    expect((await get("/sheets")).status).toBe(200);
  });

  test("a form without a file, and one with two", async () => {
    const none = new FormData();
    none.set("other", "x");
    expect(
      (await server.fetch("/sheets/new", { method: "POST", body: none, headers: { Cookie: cookie } })).status,
    ).toBe(422);
    const two = new FormData();
    two.append("sheet", new File(["a,b\n1,2"], "a.csv"));
    two.append("sheet", new File(["a,b\n1,2"], "b.csv"));
    expect((await server.fetch("/sheets/new", { method: "POST", body: two, headers: { Cookie: cookie } })).status).toBe(
      400,
    );
  });
});

test("the original comes back byte for byte, as an attachment under its own name", async () => {
  const bytes = fixture("codata-key-values.csv");
  const address = await received(bytes, '../../x/Tab"elle ä.csv');
  const answer = await get(`${address}/original`);
  expect(Buffer.compare(Buffer.from(await answer.arrayBuffer()), Buffer.from(bytes))).toBe(0);
  expect(answer.headers.get("Content-Disposition")).toBe(
    `attachment; filename="Tab_elle a.csv"; filename*=UTF-8''Tab%22elle%20%C3%A4.csv`,
  );
  expect(answer.headers.get("X-Content-Type-Options")).toBe("nosniff");
  expect((await get(`${address}/original`, reviewerCookie)).status).toBe(200);
});

test("the same bytes again while they are being worked on: 409 that names the sheet", async () => {
  const text = "formula,phase,S (J/mol/K)\nH2O,l,69.97\n";
  const address = await received(text, "one.csv");
  const answer = await upload(text, "two.csv");
  expect(answer.status).toBe(409);
  expect(await answer.text()).toContain(`already here as sheet ${address.split("/").at(-1)}`);
});

describe("without scripts", () => {
  const plan = {
    intent: "confirm",
    "means.0": "formula",
    "means.1": "phase",
    "means.2": "value:entropy",
    "unit.2": "J/(mol K)",
    temperature: "298.15",
    standardPressure: "100000",
    uncertaintyKind: "unstated",
    basis: "",
    decimalComma: "",
    solidIs: "cr",
    method: "",
    source: "new",
    "source.title": "Bench notes (invented)",
    "source.sourceKind": "measurement",
  };

  test("a sheet goes all the way to its revision by plain forms", async () => {
    const address = await received(
      "formula,phase,S (J/mol K)\nKBr,cr,-95.9\nSO42-,aq,18.5\nNaF,cr,51.1\n",
      "plain.csv",
    );
    const incomplete = await post(address, { ...plan, temperature: "", "source.title": "" });
    expect(incomplete.status).toBe(422);
    const said = await incomplete.text();
    expect(said).toContain("Say that the values are at 298.15 K");
    expect(said).toContain("Give the title");
    expect(said).toContain('value="measurement" selected');

    expect((await post(address, plan)).status).toBe(303);
    const id = address.split("/").at(-1) ?? "";
    await until(async () => {
      const progress = (await (await get(`/resources/sheets/${id}/progress`)).json()) as {
        state: string;
        done: number;
      };
      return progress.state === "read" && progress.done === 3;
    });
    const page = await (await get(address)).text();
    expect(page).toContain("cannot be negative");

    const refused = await get(`${address}/refused.csv`);
    expect(refused.headers.get("Content-Disposition")).toContain("attachment");
    expect(await refused.text()).toContain("2,S (J/mol K),-95.9,");

    expect((await post(address, { intent: "build", title: "Plain" })).status).toBe(409);
    const mended = await post(address, { intent: "repair", row: "2", column: "2", was: "-95.9", becomes: "95.9" });
    expect(mended.headers.get("Location")).toBe(`${address}#row-2`);
    expect((await post(address, { intent: "leave-out", row: "3" })).status).toBe(303);
    const built = await post(address, { intent: "build", title: "Plain", summary: "" });
    expect(built.status).toBe(303);
    expect(built.headers.get("Location")).toMatch(/^\/revisions\/\d+$/);
    expect((await post(address, { intent: "build", title: "Plain", summary: "" })).status).toBe(409);
    expect((await findSheetBytes(Number(id), server.database.app)).toString()).toContain("KBr,cr,-95.9");
  }, 60_000);

  test("forms that are not the page's own get a 4xx", async () => {
    const address = await received("formula,phase,S (J/mol K)\nLiF,cr,35.6\n", "own.csv");
    for (const fields of [
      {},
      { intent: "__proto__" },
      { intent: "repair" },
      { intent: "repair", row: "1e3", column: "-1" },
      { intent: "repair", row: "2", column: "0", was: "LiF", becomes: "NaF" },
      { intent: "leave-out", row: "99999999999" },
      { intent: "stop" },
      { intent: "reopen" },
      { intent: "confirm" },
    ] as Record<string, string>[]) {
      const { status } = await post(address, fields);
      expect(status, JSON.stringify(fields)).toBeGreaterThanOrEqual(400);
      expect(status, JSON.stringify(fields)).toBeLessThan(500);
    }
    expect((await post(address, plan, reviewerCookie)).status).toBe(403);
    expect((await get(`${address}?after=x`)).status).toBe(400);
    expect((await get("/sheets/0")).status).toBe(404);
    expect((await get("/sheets/4711")).status).toBe(404);
    expect((await get("/sheets/4711/original")).status).toBe(404);
  });
});
