import { execFileSync } from "node:child_process";
import { readFileSync } from "node:fs";
import { beforeAll, describe, expect, test } from "vitest";
import { database, useDatabase as workOn } from "#app/db/database.server.ts";
import { type DetailAsOf, findDetailsAsOf, findEditions } from "#app/editions/editions.queries.server.ts";
import { makeKey } from "#app/people/apiKey.server.ts";
import { demoPeople } from "#app/people/demoPeople.ts";
import { SCOPES } from "#app/people/key.ts";
import { asPerson, findAccountByEmail } from "#app/people/people.queries.server.ts";
import type { Acting } from "#app/people/person.ts";
import { signedIn } from "#tests/support/people.ts";
import { useServer } from "#tests/support/server.ts";
import { seed } from "../../db/seeds/20261201_calder_point.ts";

/*
 * The demo as a program sees it. Every species of every edition is fetched by path, by query and by lookup, and is the same
 * one each time; every request that the guide shows is sent as it is typed.
 */

let steward: Acting;
let key = "";

const server = useServer({
  async prepare({ app }) {
    workOn(app);
    await seed(app);
    const account = await findAccountByEmail(demoPeople.steward.email, app);
    if (!account) throw new Error("the demo has no steward");
    steward = { person: asPerson(account), apiKeyId: null, requestId: null };
    key = (await makeKey(steward, { name: "walk", scopes: [...SCOPES], days: 1 })).key;
  },
});

const table = new Map<number, DetailAsOf[]>();
beforeAll(async () => {
  workOn(server.database.app);
  for (const { number } of await findEditions(database())) {
    table.set(number, await findDetailsAsOf(number, {}, database()));
  }
});

const ask = (path: string, init: RequestInit = {}): Promise<Response> =>
  server.fetch(`/api/v1${path}`, { ...init, headers: { Authorization: `Bearer ${key}`, ...init.headers } });

/** Does the work for each item, a few at a time, and gives what it says is wrong. */
async function wrongIn<Item>(items: readonly Item[], work: (item: Item) => Promise<string | null>): Promise<string[]> {
  const wrong: string[] = [];
  const waiting = [...items];
  const one = async (): Promise<void> => {
    for (let item = waiting.shift(); item !== undefined; item = waiting.shift()) {
      const said = await work(item);
      if (said !== null) wrong.push(said);
    }
  };
  await Promise.all(Array.from({ length: 6 }, one));
  return wrong;
}

/** Calls the work for every edition of the demo; there are at least two, of many species. */
async function inEveryEdition(work: (n: number, species: readonly DetailAsOf[]) => Promise<string[]>): Promise<void> {
  expect(table.size).toBeGreaterThanOrEqual(2);
  for (const [n, species] of table) {
    expect(species.length).toBeGreaterThan(150);
    expect(await work(n, species), `edition ${n}`).toEqual([]);
  }
}

function portions<Item>(items: readonly Item[], size: number): Item[][] {
  return Array.from({ length: Math.ceil(items.length / size) }, (_, index) =>
    items.slice(index * size, (index + 1) * size),
  );
}

/** The same key as a handbook would write it. */
function variantOf(one: string): string {
  return one
    .replace(/\(g([,)])/, "(gas$1")
    .replace(/\(l([,)])/, "(liq$1")
    .replace(/\(cr([,)])/, "(c$1")
    .replace(/\(aq\)$/, "(ao)");
}

interface Entry {
  asked: string;
  outcome: string;
  species?: { id: string };
  candidates?: { id: string }[];
}
async function lookUp(n: number, question: object): Promise<Entry[]> {
  const answer = await ask(`/editions/${n}/lookup`, {
    method: "POST",
    headers: { "Content-Type": "application/json" },
    body: JSON.stringify(question),
  });
  return ((await answer.json()) as { entries: Entry[] }).entries;
}

describe("each species of the demo is the same one", { timeout: 240_000 }, () => {
  test("by path, with its key encoded", async () => {
    await inEveryEdition((n, species) =>
      wrongIn(species, async ({ key: one, speciesId }) => {
        const answer = await ask(`/editions/${n}/species/${encodeURIComponent(one)}`);
        const body = (await answer.json()) as { id?: string; key?: string };
        return body.id === speciesId && body.key === one ? null : `${one}: ${answer.status} ${body.id}`;
      }),
    );
  });

  test("by path in another usual spelling, which leads to the key", async () => {
    await inEveryEdition((n, species) =>
      wrongIn(
        species.filter(({ key: one }) => variantOf(one) !== one),
        async ({ key: one }) => {
          const answer = await ask(`/editions/${n}/species/${encodeURIComponent(variantOf(one))}`);
          const to = answer.headers.get("Location");
          const meant = `/api/v1/editions/${n}/species/${encodeURIComponent(one)}`;
          return answer.status === 308 && to === meant ? null : `${variantOf(one)}: ${answer.status} ${to}`;
        },
      ),
    );
  });

  test("or none, where a key may be two of them", async () => {
    for (const two of ["Hg2+(aq)", "SO42-(aq)"]) {
      const answer = await ask(`/editions/2/species/${encodeURIComponent(two)}`);
      expect(answer.status).toBe(404);
      expect(((await answer.json()) as { detail: string }).detail).toContain("has two readings");
      expect(await lookUp(2, { species: [two] })).toMatchObject([{ outcome: "ambiguous" }]);
    }
  });

  test("by ?key=", async () => {
    await inEveryEdition((n, species) =>
      wrongIn(species, async ({ key: one, speciesId }) => {
        const answer = await ask(`/editions/${n}/species?key=${encodeURIComponent(one)}`);
        const body = (await answer.json()) as { species?: { id: string }[] };
        const ids = body.species?.map(({ id }) => id) ?? [];
        return ids.length === 1 && ids[0] === speciesId ? null : `${one}: ${answer.status} ${ids.join(" ")}`;
      }),
    );
  });

  test("by a list of keys, each with all its values", async () => {
    await inEveryEdition((n, species) =>
      wrongIn(portions(species, 40), async (some) => {
        const list = encodeURIComponent(some.map((one) => one.key).join(","));
        const body = (await (await ask(`/editions/${n}/values?species=${list}`)).json()) as {
          values: { id: string; species: string }[];
        };
        const named = new Map(body.values.map((value) => [value.species, value.id]));
        const astray = some.filter((one) => named.get(one.key) !== one.speciesId);
        return astray.length === 0 ? null : `not in the list: ${astray.map((one) => one.key).join(" ")}`;
      }),
    );
  });

  test("by lookup of its key, of another spelling, of its name and of its CAS number", async () => {
    await inEveryEdition(async (n, species) => {
      const wrong: string[] = [];
      const compare = (entries: Entry[], meant: readonly DetailAsOf[], mayBeSeveral: boolean): void => {
        expect(entries).toHaveLength(meant.length);
        for (const [index, { asked, outcome, species: found, candidates }] of entries.entries()) {
          const id = meant[index]?.speciesId;
          const isIt = found?.id === id || (mayBeSeveral && candidates?.some((one) => one.id === id));
          if (!isIt) wrong.push(`${asked}: ${outcome}`);
        }
      };
      for (const some of portions(species, 500)) {
        compare(await lookUp(n, { species: some.map((one) => one.key) }), some, false);
        compare(await lookUp(n, { species: some.map((one) => variantOf(one.key)) }), some, false);
        const numbered = some.filter((one) => one.cas !== null);
        if (numbered.length > 0) compare(await lookUp(n, { species: numbered.map((one) => one.cas) }), numbered, true);
        const named = some.filter((one) => one.name !== "");
        if (named.length > 0) {
          compare(await lookUp(n, { species: named.map((one) => one.name.toUpperCase()) }), named, true);
        }
      }
      return wrong;
    });
  });

  test("by walking the pages, which meet each of them once", async () => {
    await inEveryEdition(async (n, species) => {
      const ids: string[] = [];
      for (let next: string | undefined = `/editions/${n}/species?limit=37`; next !== undefined;) {
        const answer = await ask(next);
        ids.push(...((await answer.json()) as { species: { id: string }[] }).species.map((one) => one.id));
        next = /^<\/api\/v1([^>]+)>; rel="next"$/.exec(answer.headers.get("Link") ?? "")?.[1];
      }
      expect(ids).toEqual(species.map((one) => one.speciesId));
      return [];
    });
  });
});

/** The words of a command as a shell hands them to the program. */
function wordsOf(command: string): string[] {
  const script = `curl() { for word in "$@"; do printf '%s\\0' "$word"; done; }\n${command}`;
  const out = execFileSync("/bin/sh", ["-c", script], { env: { TABLEWRIGHT_KEY: key }, encoding: "utf8" });
  return out.split("\0").slice(0, -1);
}

/** A curl command as a request. */
function requestOf(command: string): { url: string; init: RequestInit } {
  const headers: Record<string, string> = {};
  let body: BodyInit | undefined;
  let url = "";
  const words = wordsOf(command);
  for (let index = 0; index < words.length; index += 1) {
    const word = words[index] ?? "";
    const next = (): string => words[(index += 1)] ?? "";
    if (word === "-H") {
      const [name = "", ...value] = next().split(": ");
      headers[name] = value.join(": ");
    } else if (word === "--data-binary") {
      const data = next();
      body = data.startsWith("@")
        ? new Uint8Array(readFileSync(new URL("../../fixtures/calder-point-calorimetry.csv", import.meta.url)))
        : data;
    } else if (!word.startsWith("-")) url = word;
  }
  return { url, init: { headers, ...(body === undefined ? {} : { method: "POST", body }) } };
}

describe("the guide, against the demo", () => {
  const unescaped = (html: string): string =>
    html
      .replace(/<[^>]*>/g, "")
      .replaceAll("&quot;", '"')
      .replaceAll("&#x27;", "'")
      .replaceAll("&lt;", "<")
      .replaceAll("&gt;", ">")
      .replaceAll("&amp;", "&");

  test("every request that it shows is answered as it is typed, and each operation has one", async () => {
    const html = await (await server.fetch("/api", { headers: { Cookie: await signedIn(steward) } })).text();
    const commands = [...html.matchAll(/<pre[^>]*>([^]*?)<\/pre>/g)]
      .map((found) => unescaped(found[1] ?? ""))
      .filter((text) => text.startsWith("curl"));
    const contract = await server.contract();
    expect(commands.length).toBeGreaterThanOrEqual(contract.operations.length);
    const refused: string[] = [];
    for (const command of commands) {
      const { url, init } = requestOf(command);
      expect(url.startsWith(server.url), command).toBe(true);
      const answer = await server.fetch(url.slice(server.url.length), init);
      await answer.arrayBuffer();
      if (!answer.ok) refused.push(`${answer.status}: ${command}`);
    }
    expect(refused).toEqual([]);
    const answered = [...contract.seen].filter(([, statuses]) => statuses.has(200) || statuses.has(201));
    expect(answered.map(([operation]) => operation).sort()).toEqual(contract.operations.sort());
  });
});
