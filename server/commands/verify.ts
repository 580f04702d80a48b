import { verifyRecord } from "#app/audit/verify.server.ts";
import { closeDatabase, database } from "#app/db/database.server.ts";
import { verifyEditions } from "#app/editions/verify.server.ts";

const HELP = `npm run verify

Recomputes every row hash and every edition's digest from the database, and the chain of the record of acts.
Ends with 0 when everything is what was published and recorded, with 1 and one line for each fault otherwise.
`;

if (process.argv.includes("--help")) {
  process.stdout.write(HELP);
} else {
  try {
    const editions = await verifyEditions(database());
    const record = await verifyRecord(database());
    const faults = [...editions, ...record.faults];
    for (const fault of faults) process.stdout.write(`${fault}\n`);
    process.stdout.write(
      faults.length === 0
        ? `Every edition is what was published; ${record.entries} entries of the record follow one another, the last ${record.head}.\n`
        : `${faults.length} ${faults.length === 1 ? "fault" : "faults"}.\n`,
    );
    process.exitCode = faults.length === 0 ? 0 : 1;
  } finally {
    await closeDatabase();
  }
}
