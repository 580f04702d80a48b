import { insertEntries } from "#app/audit/audit.queries.server.ts";
import type { Database } from "#app/db/database.server.ts";
import { DEMO_PASSWORD, type DemoPerson, demoPeople } from "./demoPeople.ts";
import { hashPassword } from "./passwordHash.server.ts";
import { insertPerson, replaceRoles } from "./people.queries.server.ts";
import type { Person } from "./person.ts";

/**
 * Makes the demo's people with their one documented password. Only the seeds call it, on the demo's own database.
 * @returns each as a person who can act in the rest of the demo
 */
export async function makeDemoPeople(trx: Database): Promise<Record<DemoPerson, Person>> {
  const made: Partial<Record<DemoPerson, Person>> = {};
  for (const key of Object.keys(demoPeople) as DemoPerson[]) {
    const { name, email, roles } = demoPeople[key];
    const id = await insertPerson({ email, name, passwordHash: await hashPassword(DEMO_PASSWORD) }, trx);
    await replaceRoles(id, roles, null, trx);
    made[key] = { id, name, email, roles };
  }
  const people = made as Record<DemoPerson, Person>;
  await insertEntries(
    Object.values(people).map(({ id, name, email, roles }) => ({
      actor: null,
      apiKeyId: null,
      act: "person.made",
      objectKind: "person",
      objectId: id,
      detail: { name, email, roles, by: "demo" },
      requestId: null,
    })),
    trx,
  );
  return people;
}
