import { defineConfig } from "kysely-ctl";
import pg from "pg";

// Migrations are the owner's; seeds are made with the application's own acts, so with the application's own rights.
const variable = process.argv.some((word) => /^seed\b/.test(word)) ? "DATABASE_URL" : "DATABASE_OWNER_URL";
const url = process.env[variable];
if (!url) throw new Error(`${variable} is not set; use npm run db:migrate or npm run db:seed, which set it.`);

export default defineConfig({
  dialect: "pg",
  dialectConfig: { pool: new pg.Pool({ connectionString: url, max: 2 }) },
  migrations: { migrationFolder: "db/migrations" },
  seeds: { seedFolder: "db/seeds" },
});
