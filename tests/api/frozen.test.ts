import { createHash } from "node:crypto";
import { expect, test } from "vitest";
import { database, useDatabase as workOn } from "#app/db/database.server.ts";
import { findDetailsAsOf, findEditions } from "#app/editions/editions.queries.server.ts";
import { verifyEditions } from "#app/editions/verify.server.ts";
import { makeKey } from "#app/people/apiKey.server.ts";
import type { Acting } from "#app/people/person.ts";
import { acceptLines, closeReview, returnRevision } from "#app/review/decide.server.ts";
import { restateLines, sendToReview } from "#app/review/revise.server.ts";
import { expanded, publishThreeEditions } from "#tests/support/editions.ts";
import { acceptAll, actor, propose, publishWaiting, seenLines } from "#tests/support/revisions.ts";
import { useServer } from "#tests/support/server.ts";

/*
 * What a program pinned to an edition reads never changes: every frozen answer of every older edition is fetched, byte
 * for byte and header for header, before and after each kind of later change. Only the request's own id and the clock
 * may differ.
 */

let key = "";
let steward: Acting;
let second: Acting;
let reviewer: Acting;

const server = useServer({
  async prepare(cloned) {
    workOn(cloned.app);
    await publishThreeEditions(cloned.app);
    steward = await actor("Sela Marsh", "steward");
    second = await actor("Tomas Reed", "steward");
    reviewer = await actor("Rosa Field", "reviewer");
    key = (await makeKey(reviewer, { name: "pinned", scopes: ["read"], days: 30 })).key;
  },
});

const PASSING = new Set(["date", "x-request-id", "connection", "keep-alive", "transfer-encoding"]);

/** Status, headers and the SHA-256 of the bytes of one answer. */
async function fetched(path: string, question?: unknown): Promise<string> {
  const answer = await server.fetch(`/api/v1${path}`, {
    headers: { Authorization: `Bearer ${key}`, ...(question ? { "Content-Type": "application/json" } : {}) },
    ...(question ? { method: "POST", body: JSON.stringify(question) } : {}),
  });
  const body = createHash("sha256")
    .update(Buffer.from(await answer.arrayBuffer()))
    .digest("hex");
  const headers = [...answer.headers]
    .filter(([name]) => !PASSING.has(name))
    .map(([name, value]) => `${name}: ${value}`);
  return [String(answer.status), ...headers.sort(), body].join("\n");
}

/** Asked of every edition: keys of old and new, names, numbers, and what is ambiguous or unknown. */
const QUESTION = [
  "H2O(l)",
  "water",
  "7732-18-5",
  "NH3(g)",
  "ammonia",
  "azane",
  "NH3(g,ammonia)",
  "CaCO3(cr)",
  "XeF6(g)",
];

/** Every frozen answer of these editions, by address: each species by itself, its values, the list and the files. */
async function frozenAnswers(editions: readonly number[]): Promise<Map<string, string>> {
  const answers = new Map<string, string>();
  for (const n of editions) {
    const species = await findDetailsAsOf(n, {}, database());
    const paths = [
      `/editions/${n}/species?limit=3`,
      `/editions/${n}/species?limit=200`,
      `/editions/${n}/values?species=${encodeURIComponent(species.map((one) => one.key).join(","))}`,
      `/editions/${n}/table.csv`,
      `/editions/${n}/table.csv-metadata.json`,
      `/editions/${n}/table.json`,
      `/editions/${n}/table.ndjson`,
      ...species.map((one) => `/editions/${n}/species/${encodeURIComponent(one.key)}`),
    ];
    for (const path of paths) answers.set(path, await fetched(path));
    const lookup = `/editions/${n}/lookup`;
    answers.set(lookup, await fetched(lookup, { species: QUESTION }));
  }
  return answers;
}

const digests = async () =>
  (await findEditions(database())).map((edition) => `${edition.number} ${edition.digest.toString("hex")}`).reverse();

const entropy = (digits: string) => ({
  key: "NH3(g)",
  property: "entropy" as const,
  digits,
  uncertainty: expanded("0.05"),
  sourceId: "src_codata1989",
});

test.each<[string, () => Promise<unknown>]>([
  [
    "two revisions were accepted for the same value",
    async () => {
      const one = await propose(steward, { values: [entropy("192.78")] });
      const two = await propose(second, { values: [entropy("192.79")] });
      await acceptAll(steward, reviewer, one);
      await sendToReview(second, two, "");
      await expect(acceptLines(reviewer, two, await seenLines(two))).rejects.toThrow(`revision ${one}`);
      await publishWaiting(reviewer);
      await returnRevision(reviewer, two, "Overtaken; please restate it.");
      await restateLines(second, two);
      await sendToReview(second, two, "");
      await acceptLines(reviewer, two, await seenLines(two));
      await closeReview(reviewer, two);
      return publishWaiting(reviewer);
    },
  ],
  [
    "a species was renamed",
    async () => {
      const id = await propose(steward, { species: [{ key: "NH3(g,ammonia)", was: "NH3(g)", name: "ammonia" }] });
      await acceptAll(steward, reviewer, id);
      return publishWaiting(reviewer);
    },
  ],
  [
    "a value was withdrawn",
    async () => {
      const id = await propose(steward, {
        withdrawals: [{ key: "H2O(l)", property: "entropy", reason: "Two rows of the notebook were exchanged." }],
      });
      await acceptAll(steward, reviewer, id);
      return publishWaiting(reviewer);
    },
  ],
  [
    "a citation was mended",
    async () => {
      const id = await propose(steward, {
        sources: [
          { id: "src_nbstables1982", title: "The NBS Tables", doi: "10.1063/1.555845", notice: "An erratum stands." },
        ],
      });
      await acceptAll(steward, reviewer, id);
      return publishWaiting(reviewer);
    },
  ],
  [
    "an edition was withdrawn",
    async () => {
      const id = await propose(steward, {
        values: [entropy("192.77")].map((one) => ({ ...one, key: "NH3(g,ammonia)" })),
      });
      await acceptAll(steward, reviewer, id);
      return publishWaiting(reviewer, "Takes edition 3 back.", { edition: 3, reason: "Read from the wrong row." });
    },
  ],
])("after %s, every frozen answer of every older edition is as before", { timeout: 60_000 }, async (_what, change) => {
  const before = await digests();
  const numbers = before.map((line) => Number(line.split(" ")[0]));
  const answers = await frozenAnswers(numbers);
  for (const answer of answers.values()) expect(answer.startsWith("200\n")).toBe(true);
  await change();
  expect((await digests()).slice(0, before.length)).toEqual(before);
  expect((await digests()).length).toBeGreaterThan(before.length);
  expect(await frozenAnswers(numbers)).toEqual(answers);
  expect(await verifyEditions(database())).toEqual([]);
});
