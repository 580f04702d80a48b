import { Invalid } from "#app/http/errors.ts";
import { readEmail } from "./email.ts";

const LONGEST_NAME = 120;

/**
 * The name of a person as it shall stand beside what they do: trimmed, on one line.
 * @throws Invalid at `/name`
 */
export function demandName(text: string): string {
  const name = text.trim();
  if (name === "" || name.length > LONGEST_NAME || /[\p{Cc}\u2028\u2029]/u.test(name)) {
    const detail = `Give a name of 1 to ${LONGEST_NAME} characters on one line.`;
    throw new Invalid(detail, [{ pointer: "/name", detail }]);
  }
  return name;
}

/**
 * An e-mail address as accounts are kept.
 * @throws Invalid at `/email`
 */
export function demandEmail(text: string): string {
  const email = readEmail(text);
  if (!email) {
    const detail = "This is not an e-mail address of the form name@example.org.";
    throw new Invalid(detail, [{ pointer: "/email", detail }]);
  }
  return email;
}
