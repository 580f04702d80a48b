import type { Database } from "#app/db/database.server.ts";
import { NotFound } from "#app/http/errors.ts";
import { type Account, findAccount } from "./people.queries.server.ts";

/** The account of an id out of an address or a form. @throws NotFound, also for a text that is no id */
export async function findKnownAccount(personId: string, db: Database): Promise<Account> {
  const account = /^[0-9a-f]{8}-(?:[0-9a-f]{4}-){3}[0-9a-f]{12}$/i.test(personId)
    ? await findAccount(personId, db)
    : undefined;
  if (!account) throw new NotFound("There is no such account.");
  return account;
}
