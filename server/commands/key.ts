import { parseArgs } from "node:util";
import { closeDatabase } from "#app/db/database.server.ts";
import { DomainError } from "#app/http/errors.ts";
import { makeKeyFor, type NewKey } from "#app/people/apiKey.server.ts";
import { LONGEST_KEY_DAYS, type Scope, SCOPES, USUAL_KEY_DAYS } from "#app/people/key.ts";

const HELP = `npm run key -- --person EMAIL --name NAME --scope SCOPE [--scope SCOPE] [--days DAYS]

Makes an API key for a person and prints it, this once: only its hash is kept.

  --person EMAIL   whose key it is; it can do no more than this person's roles
  --name NAME      which program uses it
  --scope SCOPE    what it may do: ${SCOPES.join(" or ")}; given once for each
  --days DAYS      how long it can be used, at most ${LONGEST_KEY_DAYS} [${USUAL_KEY_DAYS}]
  --help           this text
`;

/** Reads the arguments; a sentence when they cannot be used. */
function readArguments(): { person: string; key: NewKey } | { help: true } | { sentence: string } {
  try {
    const { values } = parseArgs({
      options: {
        person: { type: "string" },
        name: { type: "string" },
        scope: { type: "string", multiple: true },
        days: { type: "string" },
        help: { type: "boolean" },
      },
    });
    if (values.help) return { help: true };
    const { person, name, scope = [], days = String(USUAL_KEY_DAYS) } = values;
    if (!person) return { sentence: "--person is missing." };
    if (!name) return { sentence: "--name is missing." };
    if (scope.length === 0) return { sentence: "--scope is missing." };
    const isScope = (word: string): word is Scope => SCOPES.some((one) => one === word);
    const unknown = scope.find((word) => !isScope(word));
    if (unknown !== undefined)
      return { sentence: `There is no scope "${unknown}"; there are ${SCOPES.join(" and ")}.` };
    return { person, key: { name, scopes: scope.filter(isScope), days: /^\d{1,4}$/.test(days) ? Number(days) : 0 } };
  } catch (error) {
    return { sentence: error instanceof Error ? error.message : String(error) };
  }
}

const given = readArguments();
if ("help" in given) {
  process.stdout.write(HELP);
} else if ("sentence" in given) {
  process.stderr.write(`${given.sentence}\n\n${HELP}`);
  process.exitCode = 2;
} else {
  try {
    const { key } = await makeKeyFor(given.person, given.key);
    // Nothing but the key, so that it can be handed on by a script.
    process.stdout.write(`${key}\n`);
  } catch (error) {
    if (!(error instanceof DomainError)) throw error;
    process.stderr.write(`${error.message}\n`);
    process.exitCode = 1;
  } finally {
    await closeDatabase();
  }
}
