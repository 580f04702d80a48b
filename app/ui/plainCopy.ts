/**
 * Text as a spreadsheet or a program wants it: ASCII minus for the true one, no thin or fixed spaces. The `copy` listener
 * and the tests use it.
 */
export function plainAscii(text: string): string {
  return text
    .replaceAll("−", "-")
    .replace(/\u2009|\u202f/g, "")
    .replaceAll("\u00a0", " ");
}
