import { createHash } from "node:crypto";
import canonicalize from "canonicalize";
import Papa from "papaparse";
import { describe, expect, test } from "vitest";
import { exportRecord } from "#app/audit/exportRecord.server.ts";
import { insertEntries, type RecordFilter } from "#app/audit/audit.queries.server.ts";
import type { RecordFormat } from "#app/audit/recordFile.ts";
import { findRecordPage } from "#app/audit/recordPage.server.ts";
import { verifyRecord } from "#app/audit/verify.server.ts";
import { Forbidden } from "#app/http/errors.ts";
import { invitePerson } from "#app/people/invitations.server.ts";
import { makeKey } from "#app/people/apiKey.server.ts";
import { giveRoles } from "#app/people/people.server.ts";
import type { Acting } from "#app/people/person.ts";
import { renameOneself } from "#app/people/profile.server.ts";
import { useDatabase } from "#tests/support/database.ts";
import { makePerson } from "#tests/support/people.ts";

const database = useDatabase();

async function fileOf(acting: Acting, filter: RecordFilter, format: RecordFormat): Promise<string> {
  const portions: Buffer[] = [];
  for await (const portion of (await exportRecord(acting, filter, format)).bytes) portions.push(portion);
  return Buffer.concat(portions).toString("utf8");
}
const linesOf = (file: string): Record<string, unknown>[] =>
  file
    .split("\n")
    .filter((line) => line !== "")
    .map((line) => JSON.parse(line) as Record<string, unknown>);

/** The recipe that the page Record gives to whoever verifies the chain outside, and nothing of the application's. */
function faultsOf(lines: readonly Record<string, unknown>[]): string[] {
  let previous = "0".repeat(64);
  return lines.flatMap(({ hash, person: _person, ...hashed }) => {
    const computed = createHash("sha256").update(canonicalize(hashed)!).digest("hex");
    const faults = [
      ...(computed === hash ? [] : [`entry ${String(hashed["number"])} was changed`]),
      ...(hashed["previousHash"] === previous ? [] : [`before entry ${String(hashed["number"])} one is missing`]),
    ];
    previous = String(hash);
    return faults;
  });
}

describe("the record as a file", () => {
  test("of JSON Lines is the whole chain, which anybody can recompute", async () => {
    const admin = await makePerson("Record Keeper", "administrator");
    const { person } = await makePerson("Kept", "analyst");
    await giveRoles(admin, person.id, ["steward"]);
    await invitePerson(admin, { email: "zoe@calderpoint.example", name: "Zoë Ünal", roles: [] });
    const lines = linesOf(await fileOf(admin, {}, "jsonl"));
    expect(lines.map(({ number }) => number)).toEqual(lines.map((_line, index) => index + 1));
    expect(lines.length).toBeGreaterThanOrEqual(2);
    expect(faultsOf(lines)).toEqual([]);
    const { entries, head } = await verifyRecord(database.owner);
    // The file ends with what stood when it was asked for; that it was asked for is the next entry.
    expect(entries).toBe(lines.length + 1);
    expect(head).not.toBe(lines.at(-1)?.["hash"]);

    const changed = lines.map((line) => (line["number"] === 1 ? { ...line, objectId: "another" } : line));
    expect(faultsOf(changed)).toEqual(["entry 1 was changed"]);
    expect(faultsOf(lines.slice(1))).toEqual(["before entry 2 one is missing"]);
  });

  test("is itself on record: with what filter, how many entries, up to which hash", async () => {
    const admin = await makePerson("File Taker", "administrator");
    const lines = linesOf(await fileOf(admin, { objectKind: "person", before: "2" }, "jsonl"));
    const { entries } = await findRecordPage(admin, { actor: admin.person.id });
    const newest = linesOf(await fileOf(admin, {}, "jsonl")).find(
      ({ number }) => number === Number(entries[0]?.objectId),
    );
    expect(entries[0]).toMatchObject({
      act: "record.exported",
      objectKind: "record",
      detail: { format: "jsonl", filter: { objectKind: "person" }, entries: lines.length, head: newest?.["hash"] },
    });
  });

  test("holds only what fits the filter", async () => {
    const admin = await makePerson("Filterer", "administrator");
    const other = await makePerson("Filtered", "analyst");
    await renameOneself(other, "Filtered Twice");
    await makeKey(other, { name: "bench", scopes: ["read"], days: 1 });
    const acts = async (filter: RecordFilter) => linesOf(await fileOf(admin, filter, "jsonl")).map(({ act }) => act);
    expect(await acts({ actor: other.person.id })).toEqual(["person.renamed", "key.made"]);
    expect(await acts({ actor: other.person.id, objectKind: "key" })).toEqual(["key.made"]);
    expect(await acts({ objectId: other.person.id })).toEqual(["person.renamed"]);
    expect(await acts({ actor: other.person.id, from: "2999-01-01" })).toEqual([]);
    expect(await acts({ actor: other.person.id, to: "2999-01-01", act: "key.made" })).toEqual(["key.made"]);
  });

  test("of CSV keeps formulas of spreadsheets from being any", async () => {
    const admin = await makePerson("Spreadsheet Opener", "administrator");
    const attacker = await makePerson("Attacker", "analyst");
    await renameOneself(attacker, '=HYPERLINK("https://thief.example","+1")');
    const file = await fileOf(admin, { actor: attacker.person.id }, "csv");
    const { data } = Papa.parse<Record<string, string>>(file, { header: true, skipEmptyLines: true });
    expect(data).toHaveLength(1);
    expect(data[0]?.["person"]).toBe(`'=HYPERLINK("https://thief.example","+1")`);
    expect(JSON.parse(data[0]?.["detail"] ?? "")).toEqual({
      before: "Attacker",
      after: '=HYPERLINK("https://thief.example","+1")',
    });
    for (const row of data) for (const cell of Object.values(row)) expect(cell).not.toMatch(/^[=+\-@\t\r]/);
    expect(data[0]?.["hash"]).toMatch(/^[0-9a-f]{64}$/);
    expect(file.split("\r\n")[0]).toBe(
      "number,at,actor,person,apiKeyId,act,objectKind,objectId,detail,requestId,previousHash,hash",
    );
  });

  test("is read in portions: 2500 entries come out whole and in order", async () => {
    const admin = await makePerson("Long Record", "administrator");
    const many = await makePerson("Busy", "analyst");
    await database.app.transaction().execute(async (trx) => {
      const entry = { actor: many.person.id, apiKeyId: null, act: "person.signed-out", objectKind: "person" };
      const entries = Array.from({ length: 2500 }, () => ({
        ...entry,
        objectId: many.person.id,
        detail: {},
        requestId: null,
      }));
      await insertEntries(entries, trx);
    });
    const lines = linesOf(await fileOf(admin, { actor: many.person.id }, "jsonl"));
    expect(lines).toHaveLength(2500);
    expect(faultsOf(lines).filter((fault) => fault.includes("changed"))).toEqual([]);
    const numbers = lines.map(({ number }) => Number(number));
    expect(numbers).toEqual([...numbers].sort((a, b) => a - b));
  });

  test("is handed to administrators only", async () => {
    for (const role of ["analyst", "steward", "reviewer"] as const) {
      const acting = await makePerson(`No ${role} Exports`, role);
      await expect(exportRecord(acting, {}, "jsonl")).rejects.toThrow(Forbidden);
    }
  });
});

test("the page of the record goes on where the one before ended, and misses nothing", async () => {
  const admin = await makePerson("Page Turner", "administrator");
  const numbers: number[] = [];
  let before: string | undefined;
  for (;;) {
    const { entries, next } = await findRecordPage(admin, { before });
    numbers.push(...entries.map(({ number }) => Number(number)));
    if (!next) break;
    before = next;
  }
  expect(numbers.length).toBeGreaterThan(2500);
  expect(numbers).toEqual(numbers.map((_number, index) => numbers.length - index));
});
