import { sql } from "kysely";
import { beforeAll, expect, test } from "vitest";
import { act } from "#app/audit/act.server.ts";
import { verifyRecord } from "#app/audit/verify.server.ts";
import { verifyEditions } from "#app/editions/verify.server.ts";
import { useDatabase } from "#tests/support/database.ts";
import { expanded, publishEditionOf } from "#tests/support/editions.ts";

/* Altered behind the application's back, by somebody who owns the tables and can switch their triggers off. */

const database = useDatabase();

beforeAll(async () => {
  await publishEditionOf(
    {
      values: [
        { key: "H2O(l)", property: "enthalpyOfFormation", digits: "-285.830", uncertainty: expanded("0.040") },
        { key: "H2O(l)", property: "entropy", digits: "69.95", uncertainty: expanded("0.03") },
      ],
    },
    database.app,
  );
  for (const text of ["one", "two", "three"]) {
    await act(null, ({ record }) => {
      record({ act: "person.made", objectId: text, detail: { text } });
      return Promise.resolve();
    });
  }
});

async function behindTheBack(table: string, statement: string): Promise<void> {
  await sql.raw(`alter table ${table} disable trigger user`).execute(database.owner);
  await sql.raw(statement).execute(database.owner);
  await sql.raw(`alter table ${table} enable trigger user`).execute(database.owner);
}

test("nothing is found where nothing was altered", async () => {
  expect(await verifyEditions(database.app)).toEqual([]);
  expect((await verifyRecord(database.app)).faults).toEqual([]);
});

test("acts at the same moment leave one chain without gaps", async () => {
  await Promise.all(
    Array.from({ length: 50 }, (_, index) =>
      act(null, ({ record }) => {
        record({ act: "person.made", objectId: index });
        return Promise.resolve();
      }),
    ),
  );
  const record = await verifyRecord(database.app);
  expect(record.faults).toEqual([]);
  expect(record.entries).toBe(53);
});

test("an act that fails leaves no entry", async () => {
  await expect(
    act(null, ({ record }) => {
      record({ act: "person.made", objectId: "never" });
      return Promise.reject(new Error("the act failed"));
    }),
  ).rejects.toThrow("the act failed");
  expect((await verifyRecord(database.app)).entries).toBe(53);
});

test("a digit altered in a published value is found and named", async () => {
  await behindTheBack("table_value", "update table_value set value = 69.96 where property = 'entropy'");
  expect(await verifyEditions(database.app)).toEqual(["Edition 1: S° of H2O(l) is not what was published."]);
  await behindTheBack("table_value", "update table_value set value = 69.95 where property = 'entropy'");
  expect(await verifyEditions(database.app)).toEqual([]);
});

test("a dropped last zero is found: digits are data", async () => {
  await behindTheBack("table_value", "update table_value set value = -285.83 where property = 'enthalpyOfFormation'");
  expect(await verifyEditions(database.app)).toEqual(["Edition 1: ΔfH° of H2O(l) is not what was published."]);
  await behindTheBack("table_value", "update table_value set value = -285.830 where property = 'enthalpyOfFormation'");
});

test("a row removed from an edition changes its digest", async () => {
  await behindTheBack("table_value", "delete from table_value where property = 'entropy'");
  expect(await verifyEditions(database.app)).toEqual(["Edition 1: its digest is not that of its rows."]);
});

test("a changed and a missing entry of the record are found and named", async () => {
  await behindTheBack("audit_entry", `update audit_entry set detail = '{"text":"other"}' where number = 2`);
  expect((await verifyRecord(database.app)).faults).toEqual(["Entry 2 of the record was changed."]);
  await behindTheBack("audit_entry", "delete from audit_entry where number = 5");
  expect((await verifyRecord(database.app)).faults).toEqual([
    "Entry 2 of the record was changed.",
    "Entry 5 of the record is missing.",
    "Entry 6 does not follow the entry before it.",
  ]);
});
