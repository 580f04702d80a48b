import type pg from "pg";
import { afterAll, beforeAll, describe, expect, test } from "vitest";
import { editionDigest } from "#app/editions/digest.ts";
import {
  findDetailsAsOf,
  findEdition,
  findEditions,
  findSourceDetailsAsOf,
  findValuesAsOf,
} from "#app/editions/editions.queries.server.ts";
import { testPool, useDatabase } from "#tests/support/database.ts";
import { expanded, publishEditionOf } from "#tests/support/editions.ts";

/*
 * Published is frozen (house rule 2): proved in plain SQL as the application's own role, which is what an attacker or a
 * mistake in the code would have. Values: CODATA Key Values for Thermodynamics (1989).
 */

const database = useDatabase();
let pool: pg.Pool;
let before: { number: number; digest: string }[];

async function digests(): Promise<{ number: number; digest: string }[]> {
  const editions = await findEditions(database.app);
  return editions.map((edition) => ({ number: edition.number, digest: edition.digest.toString("hex") }));
}

/** The digest of an edition from its rows, by the published recipe, outside the database. */
async function recomputed(n: number): Promise<string> {
  const edition = await findEdition(n, database.app);
  const values = await findValuesAsOf(n, {}, database.app);
  const species = await findDetailsAsOf(n, {}, database.app);
  const sources = await findSourceDetailsAsOf(n, {}, database.app);
  return editionDigest({
    values: values.map((row) => ({ key: row.key, property: row.property, hash: row.rowHash })),
    species: species.map((row) => ({ key: row.key, hash: row.rowHash })),
    sources: sources.map((row) => ({ id: row.sourceId, hash: row.rowHash })),
    previousDigest: edition?.previousDigest ?? null,
    number: n,
    licence: edition?.licence ?? "",
  }).toString("hex");
}

async function refusal(statement: string, client: pg.Pool | pg.PoolClient = pool): Promise<string> {
  try {
    await client.query(statement);
  } catch (error) {
    if (error instanceof Error && "code" in error) return String(error.code);
    throw error;
  }
  return "accepted";
}

beforeAll(async () => {
  await publishEditionOf(
    {
      values: [
        { key: "H2O(l)", property: "enthalpyOfFormation", digits: "-285.830", uncertainty: expanded("0.040") },
        { key: "H2O(l)", property: "entropy", digits: "69.95", uncertainty: expanded("0.03") },
        { key: "H2(g)", property: "entropy", digits: "130.680", uncertainty: expanded("0.003") },
      ],
    },
    database.app,
  );
  await publishEditionOf(
    {
      values: [
        { key: "NH3(g)", property: "enthalpyOfFormation", digits: "-45.94", uncertainty: expanded("0.35") },
        { key: "H2O(l)", property: "entropy", digits: "69.950", uncertainty: expanded("0.030") },
      ],
    },
    database.app,
  );
  pool = testPool(database.appUrl);
  before = await digests();
});

afterAll(async () => {
  await pool.end();
});

const COLUMNS = `species_id, property, value, temperature, standard_pressure, origin, given_text, given_unit, source_id, line_version_id, row_hash`;
const COPY = `select species_id, 'heatCapacity', 75.291, temperature, standard_pressure, origin, given_text, given_unit, source_id, line_version_id, row_hash`;
const WATER = `from table_value v where property = 'enthalpyOfFormation' and value = -285.830`;

describe("the application's role cannot change what is published", () => {
  test.each([
    ["a back-dated row", `insert into table_value (${COLUMNS}, since) ${COPY}, 1 ${WATER}`, "TW002"],
    [
      "a row into the newest sealed edition",
      `insert into table_value (${COLUMNS}, since) ${COPY}, 2 ${WATER}`,
      "TW002",
    ],
    [
      "a row into an edition that does not exist",
      `insert into table_value (${COLUMNS}, since) ${COPY}, 3 ${WATER}`,
      "TW002",
    ],
    [
      "a row that had already gone out",
      `insert into table_value (${COLUMNS}, since, until) ${COPY}, 1, 2 ${WATER}`,
      "TW002",
    ],
    ["until set without an open edition", `update table_value set until = 2 where until is null`, "TW003"],
    ["until set twice", `update table_value set until = 3 where until = 2`, "TW003"],
    ["until taken back", `update table_value set until = null where until = 2`, "TW003"],
    ["another value", `update table_value set value = 0`, "42501"],
    ["another since", `update table_value set since = 2 where since = 1`, "42501"],
    ["a value removed", `delete from table_value`, "42501"],
    ["all values emptied", `truncate table_value`, "42501"],
    ["a species renamed by hand", `update species_detail set key = 'H2O(g)'`, "42501"],
    ["a species put out by hand", `update species_detail set until = 2 where since = 1`, "TW003"],
    ["a species removed", `delete from species_detail`, "42501"],
    ["what a species is made of", `update species set charge = 1`, "42501"],
    ["a citation changed", `update source_detail set doi = '10.1/x'`, "42501"],
    ["a citation put out", `update source_detail set until = 2`, "TW003"],
    [
      "an edition row by hand",
      `insert into edition (number, state, published_at, published_by, notes, licence) select 3, 'open', now(), published_by, '', 'CC0-1.0' from edition limit 1`,
      "42501",
    ],
    ["an edition's notes", `update edition set notes = 'other'`, "42501"],
    ["an edition removed", `delete from edition where number = 2`, "42501"],
    ["all editions emptied", `truncate edition cascade`, "42501"],
    ["a trigger switched off", `alter table table_value disable trigger all`, "42501"],
    ["triggers bypassed for the session", `set session_replication_role = replica`, "42501"],
    ["a decision rewritten", `update line_decision set decision = 'decline'`, "42501"],
    ["a line version rewritten", `update line_version set content = '{}'`, "42501"],
    ["a line called accepted by hand", `update revision_line set state = 'accepted'`, "TW006"],
  ])("%s is refused", async (_what, statement, code) => {
    expect(await refusal(statement)).toBe(code);
    expect(await digests()).toEqual(before);
  });

  test("an edition opened by hand cannot be committed, sealed or not", async () => {
    const reviewer = (await database.app.selectFrom("edition").select("published_by").executeTakeFirstOrThrow())
      .published_by;
    const client = await pool.connect();
    try {
      await client.query("begin");
      await client.query(`select open_edition(2, '${reviewer}', 'by hand', 'CC0-1.0')`);
      expect(await refusal("commit", client)).toBe("TW004");
      await client.query("begin");
      await client.query(`select open_edition(2, '${reviewer}', 'by hand', 'CC0-1.0')`);
      expect(await refusal("select seal_edition(3)", client)).toBe("TW008");
      await client.query("rollback");
    } finally {
      client.release();
    }
    expect(await digests()).toEqual(before);
  });

  test("inside an edition opened by hand, a row without an accepted line behind it cannot be sealed", async () => {
    const reviewer = (await database.app.selectFrom("edition").select("published_by").executeTakeFirstOrThrow())
      .published_by;
    const client = await pool.connect();
    try {
      await client.query("begin");
      await client.query(`select open_edition(2, '${reviewer}', 'by hand', 'CC0-1.0')`);
      await client.query(`insert into table_value (${COLUMNS}, since) ${COPY}, 3 ${WATER}`);
      expect(await refusal("select seal_edition(3)", client)).toBe("TW008");
      await client.query("rollback");
    } finally {
      client.release();
    }
    expect(await digests()).toEqual(before);
  });
});

describe("even the owner of the tables is stopped by the triggers", () => {
  test.each([
    ["a back-dated row", `insert into table_value (${COLUMNS}, since) ${COPY}, 1 ${WATER}`, "TW002"],
    ["another value", `update table_value set value = 0`, "TW003"],
    ["a value removed", `delete from table_value`, "TW001"],
    ["all values emptied", `truncate table_value`, "TW001"],
    ["an edition changed", `update edition set notes = 'other'`, "TW001"],
    [
      "an edition out of order",
      `insert into edition (number, state, published_at, published_by, notes, licence) select 7, 'open', now(), published_by, '', 'CC0-1.0' from edition limit 1`,
      "TW004",
    ],
  ])("%s", async (_what, statement, code) => {
    const owner = testPool(database.ownerUrl);
    try {
      expect(await refusal(statement, owner)).toBe(code);
    } finally {
      await owner.end();
    }
    expect(await digests()).toEqual(before);
  });
});

test("the digest of every edition is what its rows give by the published recipe", async () => {
  for (const { number, digest } of before) expect(await recomputed(number)).toBe(digest);
});
