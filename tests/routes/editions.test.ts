import { createHash } from "node:crypto";
import { beforeAll, describe, expect, test } from "vitest";
import { useDatabase as makeApplicationUse } from "#app/db/database.server.ts";
import { publishThreeEditions } from "#tests/support/editions.ts";
import { makePerson, signedIn } from "#tests/support/people.ts";
import { useServer } from "#tests/support/server.ts";

/*
 * The pages of the editions from outside: three editions, the third of which withdraws the second.
 */

let analyst = "";
let reviewer = "";

const server = useServer({
  prepare: async (database) => {
    makeApplicationUse(database.app);
    await publishThreeEditions(database.app);
    analyst = await signedIn(await makePerson("Mina Corvin", "analyst"));
    reviewer = await signedIn(await makePerson("Ruth Amsel", "reviewer"));
  },
});

beforeAll(() => makeApplicationUse(server.database.app));

async function get(path: string, cookie = analyst) {
  const response = await server.fetch(path, { headers: { Cookie: cookie } });
  const html = await response.text();
  return { status: response.status, location: response.headers.get("Location"), html, text: textOf(html) };
}

/** What a page says, without its markup and the data that its scripts would read. */
function textOf(html: string): string {
  return html
    .replace(/<script[\s\S]*?<\/script>/g, "")
    .replace(/<!--.*?-->/g, "")
    .replace(/<[^>]+>/g, " ")
    .replace(/\s+/g, " ");
}

describe("the list of editions", () => {
  test("has every edition with the ways on, and says which was withdrawn, by which and why", async () => {
    const { status, text, html } = await get("/editions");
    expect(status).toBe(200);
    expect(text.indexOf("Edition 3")).toBeLessThan(text.indexOf("Edition 1"));
    expect(text).toContain("Withdrawn by edition 3 : The ammonia value was read from the wrong column.");
    for (const way of ["/editions/3/table", "/editions/2/compare/3", "/editions/1/table.csv"]) {
      expect(html).toContain(`href="${way}"`);
    }
  });

  test("tells reviewers only of the next edition", async () => {
    expect((await get("/editions", reviewer)).html).toContain('href="/publish"');
    expect((await get("/editions")).html).not.toContain('href="/publish"');
  });

  test.each([
    ["?from=1&to=3", "/editions/1/compare/3"],
    ["?from=3&to=1", "/editions/3/compare/1"],
    ["?from=1&to=current", "/editions/1/compare/3"],
  ])("sends the form's %s on to %s", async (query, to) => {
    const { status, location } = await get(`/editions${query}`);
    expect([status, location]).toEqual([302, to]);
  });

  test.each([
    ["?from=2&to=2", "does not differ from itself"],
    ["?from=1&to=9", "There is no edition “9” to compare; the newest is edition 3."],
    ["?from=1", "Choose both editions"],
    ["?from=%F0%9F%92%A9&to=1", "There is no edition"],
    ["?from=1%27--&to=1", "There is no edition"],
    ["?from=<script>&to=1", "There is no edition “&lt;script&gt;”"],
    ["?from=1&from=2&to=1&to=1", "does not differ from itself"],
  ])("answers %s with a sentence on the page: %s", async (query, sentence) => {
    const { status, text } = await get(`/editions${query}`);
    expect(status).toBe(200);
    expect(text).toContain(sentence);
  });
});

describe("the page of an edition", () => {
  test("under the word current leads to the newest number", async () => {
    const { status, location } = await get("/editions/current");
    expect([status, location]).toEqual([302, "/editions/3"]);
  });

  test("stays readable when it was withdrawn, with the reason and the way to its successor", async () => {
    const { status, text, html } = await get("/editions/2");
    expect(status).toBe(200);
    expect(text).toContain("Edition 2 was withdrawn by edition 3");
    expect(text).toContain("The ammonia value was read from the wrong column.");
    expect(html).toContain('href="/editions/3"');
    expect((await get("/editions/3")).text).toContain("Edition 3 withdraws edition 2");
  });

  test("names its version in title, heading, address, citation, file name and record alike", async () => {
    const { html, text } = await get("/editions/2");
    expect(html).toContain("<title>Edition 2 · Tablewright</title>");
    expect(html).toMatch(/<h1[^>]*>Edition 2<\/h1>/);
    expect(html).toContain('id="cite"');
    expect(text).toContain(`edition 2. Published by`);
    expect(text).toContain(`${server.url}/editions/2. Licence CC-BY-4.0. SHA-256 `);
    expect(text).toContain("tablewright-edition-2.csv");
    const record = /<script type="application\/ld\+json"[^>]*>(.*?)<\/script>/s.exec(html)?.[1];
    const read = JSON.parse(record ?? "null") as Record<string, unknown>;
    expect(read).toMatchObject({
      "@id": `${server.url}/editions/2`,
      "@type": "dcat:Dataset",
      "dcat:version": "2",
      "dct:license": { "@id": "https://spdx.org/licenses/CC-BY-4.0.html" },
      "dcat:previousVersion": { "@id": `${server.url}/editions/1` },
      "dct:isReplacedBy": { "@id": `${server.url}/editions/3` },
    });
    const [digest] = /[0-9a-f]{64}/.exec(text.slice(text.indexOf("Licence CC-BY-4.0. SHA-256"))) ?? [];
    expect(read["dct:identifier"]).toBe(`sha256:${digest}`);
  });

  test.each([
    ["999", "There is no edition 999; the newest is edition 3."],
    ["0", "is not an edition"],
    ["01", "is not an edition"],
    ["two", "is not an edition"],
    ["%F0%9F%92%A9", "is not an edition"],
    ["99999999999999999999", "is not an edition"],
    ["-1", "is not an edition"],
  ])("at /editions/%s is not found, with a sentence: %s", async (edition, sentence) => {
    const { status, text } = await get(`/editions/${edition}`);
    expect(status).toBe(404);
    expect(text).toContain(sentence);
  });
});

describe("the files of an edition", () => {
  test("are the bytes whose hash the page shows, and say where their description is", async () => {
    const { text } = await get("/editions/1");
    const response = await server.fetch("/editions/1/table.csv", { headers: { Cookie: analyst } });
    expect(response.status).toBe(200);
    expect(response.headers.get("Content-Disposition")).toContain("tablewright-edition-1.csv");
    const bytes = Buffer.from(await response.arrayBuffer());
    expect(text).toContain(createHash("sha256").update(bytes).digest("hex"));
    const described = /<([^>]+)>; rel="describedby"; type="application\/csvm\+json"/.exec(
      response.headers.get("Link") ?? "",
    )?.[1];
    const description = await server.fetch(described ?? "", { headers: { Cookie: analyst } });
    expect(description.headers.get("Content-Type")).toContain("application/csvm+json");
    const { tableSchema } = (await description.json()) as { tableSchema: { columns: { name: string }[] } };
    const head = bytes.toString("utf8").split("\r\n", 1)[0];
    expect(tableSchema.columns.map((column) => column.name).join(",")).toBe(head);
  });

  test("are for whoever may read the table, and not kept for whoever comes after", async () => {
    for (const path of ["/editions/1/table.csv", "/editions/1/table.csv-metadata.json"]) {
      const shut = await server.fetch(path);
      expect(shut.headers.get("Location")).toBe(`/sign-in?to=${encodeURIComponent(path)}`);
      const open = await server.fetch(path, { headers: { Cookie: analyst } });
      expect(open.headers.get("Cache-Control")).toBe("private, no-cache");
      await open.body?.cancel();
    }
  });
});
