import { parseArgs } from "node:util";
import { config } from "#app/config.server.ts";
import { closeDatabase } from "#app/db/database.server.ts";
import { DomainError } from "#app/http/errors.ts";
import { paths } from "#app/paths.ts";
import { makeFirstAdministrator } from "#app/people/people.server.ts";

const HELP = `npm run admin -- --email ADDRESS [--name NAME]

Makes the account of the first administrator, and prints a link by which that person chooses the password.
The link can be used once, within 24 hours. Once there is an administrator, further people are invited on the page People.

  --email ADDRESS   the address the person signs in with
  --name NAME       the name that stands beside what the person does [the part of the address before the @]
  --help            this text
`;

/** Reads the arguments; a sentence when they cannot be used. */
function readArguments(): { email: string; name: string } | { help: true } | { sentence: string } {
  try {
    const { values } = parseArgs({
      options: { email: { type: "string" }, name: { type: "string" }, help: { type: "boolean" } },
    });
    if (values.help) return { help: true };
    if (!values.email) return { sentence: "--email is missing." };
    return { email: values.email, name: values.name ?? values.email.split("@", 1)[0] ?? "" };
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
    const { token, endsAt } = await makeFirstAdministrator(given);
    process.stdout.write(
      `${given.email} is an administrator once the password is chosen. Open this link, once, until ${endsAt.toISOString()}:\n` +
        `${config().publicUrl}${paths.invitation(token)}\n`,
    );
  } catch (error) {
    if (!(error instanceof DomainError)) throw error;
    process.stderr.write(`${error.message}\n`);
    process.exitCode = 1;
  } finally {
    await closeDatabase();
  }
}
