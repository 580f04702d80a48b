import type { Transaction } from "kysely";
import { database } from "#app/db/database.server.ts";
import type { DB } from "#app/db/types.ts";
import { type DomainError, Forbidden, Refused } from "#app/http/errors.ts";
import type { Acting } from "#app/people/person.ts";
import { insertEntries, type NewEntry } from "./audit.queries.server.ts";
import { acts, type ActEntry } from "./acts.ts";

/** What an act works with: its transaction, and the way to put itself on record. */
export interface ActScope {
  trx: Transaction<DB>;
  record(entry: ActEntry): void;
}

/**
 * Runs one act in one transaction (READ COMMITTED) and writes its audit entries as the last statement of it: the act and
 * its record stand or fall together. `acting` is null for the system itself and the command line.
 * @throws the domain error that the database's own refusal stands for, or whatever the act throws.
 */
export async function act<T>(acting: Acting | null, work: (scope: ActScope) => Promise<T>): Promise<T> {
  try {
    return await database()
      .transaction()
      .execute(async (trx) => {
        const entries: NewEntry[] = [];
        const result = await work({
          trx,
          record: (entry) => {
            entries.push({
              actor: acting?.person.id ?? null,
              apiKeyId: acting?.apiKeyId ?? null,
              act: entry.act,
              objectKind: acts[entry.act],
              objectId: String(entry.objectId),
              detail: entry.detail ?? {},
              requestId: acting?.requestId ?? null,
            });
          },
        });
        await insertEntries(entries, trx);
        return result;
      });
  } catch (error) {
    throw refusalOf(error) ?? error;
  }
}

/** The sentences for constraints that two people can run into at the same moment. */
const CONSTRAINT_SENTENCES: Record<string, string> = {
  revision_line_one_waits_species:
    "Another accepted line already waits for this value; publish it or have it declined first.",
  revision_line_one_waits_source:
    "Another accepted line already waits for this source; publish it or have it declined first.",
  revision_line_once_species: "This revision already has a line for this value.",
  revision_line_once_source: "This revision already has a line for this source.",
  species_detail_key_once_an_edition:
    "Two species of this edition would have one key. Have one of the lines that name them declined or written anew.",
  person_email_unique: "There is already an account with this address.",
  edition_withdrawn_once: "That edition was already withdrawn.",
  finding_set_aside_once: "This finding was already set aside.",
};

/** The domain error behind the database's own refusal (codes TW001 to TW009, see the migrations), or undefined. */
export function refusalOf(error: unknown): DomainError | undefined {
  if (!(error instanceof Error) || !("code" in error)) return undefined;
  const code = String(error.code);
  if (code === "TW008") return new Forbidden(error.message);
  if (/^TW00\d$/.test(code)) return new Refused(error.message);
  if (code === "23505" || code === "23P01") {
    const constraint = "constraint" in error ? String(error.constraint) : "";
    const sentence = CONSTRAINT_SENTENCES[constraint];
    return sentence ? new Refused(sentence) : undefined;
  }
  if (code === "40P01" || code === "40001") {
    return new Refused("Somebody else changed the same thing at the same moment. Look at it again, then repeat.");
  }
  return undefined;
}
