/** Longest address a mail server must take (RFC 5321, section 4.5.3.1). */
const LONGEST_ADDRESS = 254;

/**
 * Reads an e-mail address: trimmed and in lower case, as accounts are kept.
 *
 * Only what a laboratory hands out is taken: letters, digits and `.!#$%&'*+/=?^_{|}~-` before the @, a host name with at
 * least one dot after it. Quotes, commas, brackets, spaces and control characters are refused, so an address can never
 * be read as two or break a header.
 *
 * @returns the address, or undefined when the text is none
 */
export function readEmail(text: string): string | undefined {
  const address = text.trim().toLowerCase();
  const form =
    /^[a-z0-9!#$%&'*+/=?^_{|}~-]+(?:\.[a-z0-9!#$%&'*+/=?^_{|}~-]+)*@(?:[a-z0-9](?:[a-z0-9-]{0,61}[a-z0-9])?\.)+[a-z](?:[a-z0-9-]{0,61}[a-z0-9])?$/;
  return address.length <= LONGEST_ADDRESS && form.test(address) ? address : undefined;
}
