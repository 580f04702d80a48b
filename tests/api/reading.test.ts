import { createHash } from "node:crypto";
import { describe, expect, test } from "vitest";
import { useDatabase as workOn } from "#app/db/database.server.ts";
import { makeKey } from "#app/people/apiKey.server.ts";
import routes from "#app/routes.ts";
import { publishEditionOf, publishThreeEditions } from "#tests/support/editions.ts";
import { makePerson } from "#tests/support/people.ts";
import { useServer } from "#tests/support/server.ts";

let key = "";
let sheetsKey = "";

const server = useServer({
  async prepare(database) {
    await publishThreeEditions(database.app);
    workOn(database.app);
    const analyst = await makePerson("A. Analyst", "analyst");
    const steward = await makePerson("T. Steward", "steward");
    key = (await makeKey(analyst, { name: "titration-2", scopes: ["read"], days: 30 })).key;
    sheetsKey = (await makeKey(steward, { name: "hands in only", scopes: ["sheets:write"], days: 30 })).key;
  },
});

/** Asks as the program does. */
function ask(path: string, init: RequestInit = {}): Promise<Response> {
  return server.fetch(`/api/v1${path}`, {
    ...init,
    headers: { Authorization: `Bearer ${key}`, ...init.headers },
  });
}

const FROZEN = "private, max-age=31536000, immutable";

/** One address of each operation, with what the contract calls it. */
const addresses: readonly [operation: string, path: string][] = [
  ["get /editions", "/editions"],
  ["get /editions/{edition}", "/editions/2"],
  ["get /editions/{edition}/species", "/editions/2/species?limit=3"],
  ["get /editions/{edition}/species/{key}", "/editions/2/species/H2O(l)"],
  ["get /editions/{edition}/values", "/editions/2/values?species=H2O(l),Na+(aq)&property=entropy,enthalpyOfFormation"],
  ["get /editions/{edition}/table.csv", "/editions/2/table.csv"],
  ["get /editions/{edition}/table.csv-metadata.json", "/editions/2/table.csv-metadata.json"],
  ["get /editions/{edition}/table.json", "/editions/2/table.json"],
  ["get /editions/{edition}/table.ndjson", "/editions/2/table.ndjson"],
  ["get /editions/{a}/compare/{b}", "/editions/1/compare/3"],
  ["get /changes", "/changes?since=1"],
  ["get /sources/{source}", "/sources/src_codata1989"],
  ["get /openapi.json", "/openapi.json"],
];
const locked = addresses.filter(([operation]) => !operation.endsWith("openapi.json"));

describe("every operation", () => {
  test.each(addresses)("%s answers as the contract says", async (_operation, path) => {
    const answer = await ask(path);
    expect(answer.status).toBe(200);
    expect(answer.headers.get("X-Request-Id")).toMatch(/^[0-9a-f-]{36}$/);
  });

  test("the contract and the manifest name the same addresses, and each reading one stands above", async () => {
    const contract = await server.contract();
    const reading = contract.operations.filter(
      (operation) => operation.startsWith("get ") && !/sheets/.test(operation),
    );
    expect(addresses.map(([operation]) => operation).sort()).toEqual(reading.sort());
    const manifest = routes.flatMap((route) =>
      route.path?.startsWith("api/v1/") ? [route.path.slice("api/v1".length).replace(/:(\w+)/g, "{$1}")] : [],
    );
    const told = contract.operations.map((operation) => operation.split(" ")[1] ?? "");
    expect(manifest.sort()).toEqual([...new Set(told)].sort());
  });

  test.each(locked)("%s wants a key", async (_operation, path) => {
    const answer = await server.fetch(`/api/v1${path}`);
    expect(answer.status).toBe(401);
    expect(answer.headers.get("WWW-Authenticate")).toMatch(/^Bearer/);
  });

  test.each(locked)("%s wants the scope read", async (_operation, path) => {
    const answer = await server.fetch(`/api/v1${path}`, { headers: { Authorization: `Bearer ${sheetsKey}` } });
    expect(answer.status).toBe(403);
  });

  test.each(addresses)("%s says which methods it answers", async (_operation, path) => {
    for (const method of ["POST", "PUT", "PATCH", "DELETE"]) {
      const answer = await ask(path, { method, ...(method === "DELETE" ? {} : { body: "{}" }) });
      expect(answer.status, method).toBe(405);
      expect(answer.headers.get("Allow")).toBe("GET, HEAD, OPTIONS");
    }
    const options = await ask(path, { method: "OPTIONS" });
    expect([options.status, options.headers.get("Allow"), await options.text()]).toEqual([
      204,
      "GET, HEAD, OPTIONS",
      "",
    ]);
  });

  test.each(addresses)("%s answers HEAD with the headers of GET and no body", async (_operation, path) => {
    const full = await ask(path);
    const head = await ask(path, { method: "HEAD" });
    expect(head.status).toBe(200);
    expect(await head.text()).toBe("");
    for (const name of ["ETag", "Cache-Control", "Content-Type", "Content-Length", "Link", "Repr-Digest"]) {
      expect(head.headers.get(name), name).toBe(full.headers.get(name));
    }
  });

  test.each(addresses)("%s: the ETag is the SHA-256 of the bytes, and having them is 304", async (_operation, path) => {
    const full = await ask(path);
    const sha256 = createHash("sha256").update(Buffer.from(await full.arrayBuffer()));
    const etag = full.headers.get("ETag") ?? "";
    expect(etag).toBe(`"${sha256.digest("hex")}"`);
    for (const known of [etag, `W/${etag}`, `"other", ${etag}`, "*"]) {
      const again = await ask(path, { headers: { "If-None-Match": known } });
      expect(again.status, known).toBe(304);
      expect(again.headers.get("ETag")).toBe(etag);
      expect(again.headers.get("Cache-Control")).toBe(full.headers.get("Cache-Control"));
    }
    const other = await ask(path, { headers: { "If-None-Match": '"other"' } });
    expect(other.status).toBe(200);
  });

  test.each(addresses)("%s refuses what it does not know, and anything given twice", async (_operation, path) => {
    const joint = path.includes("?") ? "&" : "?";
    for (const query of ["surprise=1", "limit=1&limit=2", "species=a&species=b"]) {
      const answer = await ask(`${path}${joint}${query}`);
      expect(answer.status, query).toBe(400);
    }
  });

  test("a signed-in browser's cookie opens nothing here", async () => {
    const answer = await server.fetch("/api/v1/editions", { headers: { Cookie: "__Host-session=anything" } });
    expect(answer.status).toBe(401);
  });
});

describe("what is not there", () => {
  test.each([
    "/editions/9",
    "/editions/0",
    "/editions/02",
    "/editions/two",
    "/editions/9/species",
    "/editions/1/species/AgCl(cr)",
    "/editions/1/species/not-a-key",
    "/editions/3/values?species=H2O(l),XeF6(g)",
    "/editions/9/table.csv",
    "/editions/1/compare/9",
    "/editions/1/species?key=XeF6(g)",
  ])("%s is a problem document that says so", async (path) => {
    const answer = await ask(path);
    expect(answer.status).toBe(404);
    expect(answer.headers.get("Content-Type")).toBe("application/problem+json");
    expect(answer.headers.get("Cache-Control")).toBe("no-store");
    const problem = (await answer.json()) as Record<string, unknown>;
    expect(problem).toMatchObject({ status: 404, title: "Not found", type: `${server.url}/problems/not-found` });
    expect(String(problem["detail"]).length).toBeGreaterThan(15);
    expect((await server.fetch("/problems/not-found")).status).toBe(200);
  });

  test.each([
    "/api/v1",
    "/api/v1/",
    "/api/v2/editions",
    "/api/v1/editions/1/tables",
    "/api/v1/editions/1/species.data",
  ])("%s is 404 without HTML, whatever the method", async (path) => {
    for (const method of ["GET", "POST", "DELETE"]) {
      const answer = await server.fetch(path, { method });
      expect([answer.status, answer.headers.get("Content-Type")]).toEqual([404, "application/problem+json"]);
    }
  });

  test.each([
    ["limit=0", "/limit"],
    ["limit=many", "/limit"],
    ["limit=501", "/limit"],
    ["cursor=!!", "/cursor"],
    ["property=colour", "/property"],
    ["phase=plasma", "/phase"],
    ["element=Xx", "/element"],
    ["cas=7732-18-4", "/cas"],
  ])("a parameter of the wrong kind, %s, is 422 with a pointer to it", async (query, pointer) => {
    const answer = await ask(`/editions/1/species?${query}`);
    expect(answer.status).toBe(422);
    const problem = (await answer.json()) as { errors: { pointer: string }[] };
    expect(problem.errors[0]?.pointer).toBe(pointer);
  });
});

describe("pinning", () => {
  test.each(locked)("%s is kept for good under a number only where it never changes", async (operation, path) => {
    const asked = /\/editions$|\/editions\/\{edition\}$|compare|changes|sources/.test(operation);
    expect((await ask(path)).headers.get("Cache-Control")).toBe(asked ? "private, no-cache" : FROZEN);
  });

  test("current answers the newest edition's body, for moments, and names the numbered address", async () => {
    for (const path of [
      "/species/H2O(l)",
      "/values?species=H2O(l)",
      "/table.csv",
      "/table.json",
      "/table.ndjson",
      "/species?limit=2",
    ]) {
      const current = await ask(`/editions/current${path}`);
      const numbered = await ask(`/editions/3${path}`);
      expect(current.status).toBe(200);
      expect(await current.text(), path).toBe(await numbered.text());
      expect(current.headers.get("ETag")).toBe(numbered.headers.get("ETag"));
      expect(current.headers.get("Cache-Control")).toBe("private, max-age=30, must-revalidate");
      const named = current.headers.get("Content-Location") ?? "";
      expect((await server.fetch(named, { headers: { Authorization: `Bearer ${key}` } })).status).toBe(200);
      expect(decodeURIComponent(named)).toBe(`/api/v1/editions/3${path}`);
      expect(numbered.headers.get("Content-Location")).toBeNull();
    }
  });

  test("nothing of an older edition's frozen answers moves when another edition is published", async () => {
    const paths = [1, 2, 3].flatMap((n) => [
      `/editions/${n}/species`,
      `/editions/${n}/species/NH3(g)`,
      `/editions/${n}/values`,
      `/editions/${n}/values?species=H2O(l)&property=entropy`,
      `/editions/${n}/table.csv`,
      `/editions/${n}/table.csv-metadata.json`,
    ]);
    const read = async (path: string) => {
      const answer = await ask(path);
      const headers = [...answer.headers].filter(([name]) => !["date", "x-request-id"].includes(name));
      return { path, status: answer.status, headers, body: await answer.text() };
    };
    const before = [];
    for (const path of paths) before.push(await read(path));
    await publishEditionOf(
      {
        withdraws: { edition: 3, reason: "A test of freezing." },
        sources: [{ id: "src_codata1989", title: "Another title altogether" }],
        species: [{ key: "NH3(g)", name: "azane" }],
        values: [{ key: "NH3(g)", property: "enthalpyOfFormation", digits: "-45.90" }],
        withdrawals: [{ key: "H2O(l)", property: "entropy", reason: "A test of freezing." }],
      },
      server.database.app,
    );
    for (const [index, path] of paths.entries()) expect(await read(path)).toEqual(before[index]);
    expect(await (await ask("/editions/3")).json()).toMatchObject({
      withdrawnBy: { edition: 4, reason: "A test of freezing." },
    });
  });
});

describe("species and keys", () => {
  test.each([
    ["H2O(liq)", "H2O(l)"],
    ["H2O, l", "H2O(l)"],
    ["OH2(l)", "H2O(l)"],
    ["C(c,graphite)", "C(cr,graphite)"],
    ["Na (aq)", "Na+(aq)"],
    ["CaCO3(cr)", "CaCO3(cr,calcite)"],
  ])("%s moved to %s, in the edition that was asked", async (asked, canonical) => {
    for (const edition of ["2", "current"]) {
      const answer = await ask(`/editions/${edition}/species/${encodeURIComponent(asked)}`);
      expect(answer.status).toBe(308);
      expect(answer.headers.get("Location")).toBe(
        `/api/v1/editions/${edition}/species/${encodeURIComponent(canonical)}`,
      );
    }
  });

  test("a key of a later edition is not known in an older one", async () => {
    expect((await ask("/editions/1/species/CaCO3(cr,calcite)")).status).toBe(404);
    expect((await ask("/editions/1/species/CaCO3(cr)")).status).toBe(200);
  });

  test("a species may be asked for by ?key=, in any spelling, and the answer names its key and id", async () => {
    const answer = await ask("/editions/3/species?key=Na%2B(aq)");
    const body = (await answer.json()) as { species: { key: string; id: string }[] };
    expect(body.species).toEqual([
      expect.objectContaining({ key: "Na+(aq)", id: expect.stringMatching(/^sp_/) as string }),
    ]);
    const variant = await ask("/editions/3/species?key=Na (aq)");
    expect(await variant.json()).toEqual(body);
  });

  test("a list of keys keeps commas inside brackets and reads a lost plus", async () => {
    const answer = await ask("/editions/1/values?species=C(cr,graphite),Na+(aq)&property=entropy");
    const body = (await answer.json()) as { values: { species: string; digits: string }[] };
    expect(body.values.map((value) => [value.species, value.digits])).toEqual([
      ["C(cr,graphite)", "5.74"],
      ["Na+(aq)", "58.45"],
    ]);
  });

  test("walking the pages meets every species once, the same as the CSV", async () => {
    const keys: string[] = [];
    let path = "/editions/3/species?limit=2";
    for (;;) {
      const answer = await ask(path);
      const page = (await answer.json()) as { species: { key: string }[]; next: string | null };
      keys.push(...page.species.map((one) => one.key));
      const link = /^<\/api\/v1([^>]+)>; rel="next"$/.exec(answer.headers.get("Link") ?? "")?.[1];
      expect(link === undefined).toBe(page.next === null);
      if (!link) break;
      path = link;
    }
    const csv = await (await ask("/editions/3/table.csv")).text();
    const inFile = new Set(
      csv
        .split("\r\n")
        .slice(1)
        .filter(Boolean)
        .map((line) => /^3,sp_\w+,("[^"]+"|[^,]+)/.exec(line)?.[1]?.replaceAll('"', "")),
    );
    expect(new Set(keys)).toEqual(inFile);
    expect(new Set(keys).size).toBe(keys.length);
  });

  test.each([
    ["q=water", ["H2O(g)", "H2O(l)"]],
    ["element=H,N", ["NH3(g)"]],
    ["phase=aq", ["Na+(aq)"]],
    ["cas=7732-18-5&phase=l", ["H2O(l)"]],
    ["property=heatCapacity", ["H2O(l)"]],
    ["q=%25", []],
  ])("filter %s", async (query, keys) => {
    const body = (await (await ask(`/editions/3/species?${query}`)).json()) as { species: { key: string }[] };
    expect(body.species.map((one) => one.key)).toEqual(keys);
  });
});

describe("a value", () => {
  test("has the contract's shape, with its digits to the last zero", async () => {
    const body = (await (await ask("/editions/1/species/H2O(l)")).json()) as {
      id: string;
      values: { property: string }[];
    };
    // CODATA Key Values (1989): −285.830 ± 0.040 kJ/mol, k = 2.
    expect(body.values.find((value) => value.property === "enthalpyOfFormation")).toEqual({
      id: body.id,
      species: "H2O(l)",
      property: "enthalpyOfFormation",
      value: -285.83,
      digits: "-285.830",
      unit: "kJ/mol",
      uncertainty: { value: 0.04, digits: "0.040", kind: "expanded", coverageFactor: 2 },
      temperature: 298.15,
      standardPressure: 100000,
      origin: "stated",
      source: {
        id: "src_codata1989",
        citation: "J. D. Cox, D. D. Wagman, V. A. Medvedev, CODATA Key Values for Thermodynamics, Hemisphere, 1989",
        doi: null,
      },
      since: 1,
    });
    expect(body.values.find((value) => value.property === "heatCapacity")).toMatchObject({
      given: { text: "17.995", unit: "cal/(mol K)", note: "× 4.184" },
      uncertainty: null,
      source: { doi: "10.1063/1.555845" },
    });
  });
});

describe("table.csv", () => {
  test("is RFC 4180: one head, CRLF, the same number of cells on every line, quotes where commas are", async () => {
    const text = await (await ask("/editions/2/table.csv")).text();
    expect(text.endsWith("\r\n")).toBe(true);
    expect(text.replaceAll("\r\n", "")).not.toMatch(/[\r\n]/);
    const lines = text.split("\r\n").slice(0, -1);
    const cells = lines.map((line) => line.match(/("(?:[^"]|"")*"|[^,]*)(,|$)/g)?.filter(Boolean).length);
    expect(new Set(cells).size).toBe(1);
    expect(text).toContain('"C(cr,graphite)"');
    const edition = (await (await ask("/editions/2")).json()) as { counts: { values: number } };
    expect(lines.length - 1).toBe(edition.counts.values);
  });

  test("holds the digits as printed and says what it is", async () => {
    const answer = await ask("/editions/1/table.csv");
    const text = await answer.text();
    expect(text).toMatch(/,enthalpyOfFormation,-285\.830,kJ\/mol,0\.040,expanded,2,298\.15,100000,/);
    expect(answer.headers.get("Content-Disposition")).toBe('attachment; filename="tablewright-edition-1.csv"');
    const described = /<([^>]+)>; rel="describedby"/.exec(answer.headers.get("Link") ?? "")?.[1] ?? "";
    const description = (await (
      await server.fetch(described, { headers: { Authorization: `Bearer ${key}` } })
    ).json()) as {
      tableSchema: { columns: { name: string }[] };
    };
    expect(text.split("\r\n")[0]).toBe(description.tableSchema.columns.map((column) => column.name).join(","));
  });
});

describe("comparison", () => {
  interface Comparison {
    counts: Record<string, number>;
    changes: {
      what: string;
      species: string;
      property: string;
      difference: string | null;
      digitsOnly: boolean;
      normalizedError: number | null;
    }[];
    species: { before: string | null; after: string | null; texts: unknown[] }[];
    sources: unknown[];
    next: string | null;
  }
  const compare = async (path: string) => (await (await ask(path)).json()) as Comparison;

  test("says what came, went and changed, by how much, and what is called otherwise", async () => {
    const net = await compare("/editions/1/compare/3");
    expect(net.counts).toEqual({ came: 1, went: 0, changed: 2, unchanged: 11 });
    expect(net.changes.map((change) => [change.what, change.species, change.property, change.difference])).toEqual([
      ["came", "AgCl(cr)", "enthalpyOfFormation", null],
      ["changed", "H2(g)", "entropy", "0.000"],
      ["changed", "NH3(g)", "enthalpyOfFormation", "0.17"],
    ]);
    expect(net.changes[1]?.digitsOnly).toBe(true);
    // NBS gives no uncertainty for ammonia, so E_n is not defined.
    expect(net.changes[2]?.normalizedError).toBeNull();
    expect(net.species).toContainEqual(
      expect.objectContaining({
        before: "CaCO3(cr)",
        after: "CaCO3(cr,calcite)",
        texts: expect.arrayContaining([
          { field: "name", before: "calcium carbonate", after: "calcium carbonate, calcite" },
        ]) as unknown[],
      }),
    );
    expect(net.sources.length).toBe(2);
  });

  test("turned round it is the mirror image", async () => {
    const there = await compare("/editions/2/compare/3");
    const back = await compare("/editions/3/compare/2");
    expect(back.counts).toEqual({
      ...there.counts,
      came: there.counts["went"],
      went: there.counts["came"],
      unchanged: there.counts["unchanged"],
    });
    const mirrored: Record<string, string> = { came: "went", went: "came", changed: "changed" };
    expect(back.changes.map((change) => [mirrored[change.what], change.species, change.property])).toEqual(
      there.changes.map((change) => [change.what, change.species, change.property]),
    );
  });

  test("an edition and itself are the same", async () => {
    expect(await compare("/editions/2/compare/2")).toMatchObject({ changes: [], species: [], sources: [] });
  });

  test("its pages are the whole", async () => {
    const whole = await compare("/editions/1/compare/3");
    const changes: unknown[] = [];
    let cursor: string | null = "";
    while (cursor !== null) {
      const page: Comparison = await compare(`/editions/1/compare/3?limit=1${cursor ? `&cursor=${cursor}` : ""}`);
      changes.push(...page.changes);
      cursor = page.next;
    }
    expect(changes).toEqual(whole.changes);
  });
});

describe("news", () => {
  const since = async (query: string) => {
    const answer = await ask(`/changes${query}`);
    return { status: answer.status, body: (await answer.json()) as Record<string, unknown> };
  };

  test("are the editions after the one that is known, the newest first, with their counts", async () => {
    const { editions: all } = (await (await ask("/editions")).json()) as { editions: { number: number }[] };
    const newest = all[0]?.number ?? 0;
    for (const known of [0, 1, newest]) {
      const { body } = await since(`?since=${known}`);
      expect(body).toEqual({ edition: newest, since: known, editions: all.filter((one) => one.number > known) });
    }
  });

  test("are all editions where none is known", async () => {
    expect(await since("")).toEqual(await since("?since=0"));
  });

  test.each([
    ["?since=-1", "/since"],
    ["?since=01", "/since"],
    ["?since=current", "/since"],
    ["?since=999", "/since"],
  ])("/changes%s is 422", async (query, pointer) => {
    const { status, body } = await since(query);
    expect([status, body]).toMatchObject([422, { errors: [{ pointer }] }]);
  });
});

describe("a source", () => {
  test("is cited as the newest edition cites it, with its DOI and as CSL-JSON", async () => {
    const answer = await ask("/sources/src_nbstables1982");
    const source = (await answer.json()) as Record<string, unknown>;
    expect(source).toMatchObject({
      id: "src_nbstables1982",
      doi: "10.1063/1.555845",
      csl: { title: expect.any(String) as string },
    });
    const value = (await (await ask("/editions/current/values?species=H2O(l)&property=heatCapacity")).json()) as {
      values: { source: { citation: string } }[];
    };
    expect(source["citation"]).toBe(value.values[0]?.source.citation);
  });

  test("is the CSL item by itself where the caller accepts that", async () => {
    const type = "application/vnd.citationstyles.csl+json";
    const plain = await ask("/sources/src_nbstables1982");
    const csl = await ask("/sources/src_nbstables1982", { headers: { Accept: `${type}, */*;q=0.1` } });
    expect(csl.headers.get("Content-Type")?.split(";")[0]).toBe(type);
    expect(csl.headers.get("ETag")).not.toBe(plain.headers.get("ETag"));
    const { csl: item } = (await plain.json()) as { csl: object };
    expect(await csl.json()).toMatchObject({ ...item, id: "src_nbstables1982" });
  });

  test.each(["nothing", "__proto__", "src_CODATA1989", "a%2Fb"])("%s is none", async (id) => {
    expect((await ask(`/sources/${id}`)).status).toBe(404);
  });
});

describe("an edition's record", () => {
  test("names its neighbours in Link, its counts and its digests", async () => {
    const answer = await ask("/editions/2");
    const links = answer.headers.get("Link") ?? "";
    for (const relation of [
      "predecessor-version",
      "successor-version",
      "latest-version",
      "version-history",
      "license",
      "describedby",
    ]) {
      expect(links).toContain(`rel="${relation}"`);
    }
    const body = (await answer.json()) as { digest: string; previousDigest: string; withdrawnBy: unknown };
    const first = (await (await ask("/editions/1")).json()) as { digest: string; previousDigest: unknown };
    expect(body.previousDigest).toBe(first.digest);
    expect(first.previousDigest).toBeNull();
    expect(body.withdrawnBy).toEqual({ edition: 3, reason: "The ammonia value was read from the wrong column." });
  });
});
