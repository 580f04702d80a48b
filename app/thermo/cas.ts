import { isTooLong, quote, read, type Reading, refused } from "./reading.ts";
import { plainText } from "./typography.ts";

/**
 * Reads a CAS Registry Number (`7732-18-5`) and checks its last digit: the other digits, taken from the right and
 * multiplied by 1, 2, 3 …, sum to a number whose last digit it must be (CAS, Check Digit Verification).
 *
 * The check digit shows every single wrong digit but misses some exchanges; it does not prove that the number belongs
 * to the substance.
 *
 * @returns the number with its hyphens
 */
export function readCas(text: string): Reading<string> {
  if (isTooLong(text)) return refused(`${quote(text)} is too long for a CAS Registry Number.`);
  const plain = plainText(text)
    .trim()
    .replace(/^(?:CAS(?:\s?(?:RN|No\.?|number))?|RN)[\s:#.]*/i, "")
    .replace(/^[[(]\s*(.*?)\s*[\])]$/, "$1");
  if (plain === "") return refused("No CAS Registry Number is given.");
  const match = /^(\d{2,7})\s?-\s?(\d{2})\s?-\s?(\d)$/.exec(plain) ?? /^(\d{2,7})(\d{2})(\d)$/.exec(plain);
  if (match === null) {
    return refused(
      `${quote(text.trim())} is not a CAS Registry Number: two to seven digits, two digits and a check digit, as in 7732-18-5.`,
    );
  }
  const [, body = "", group = "", last = ""] = match;
  const number = `${body.replace(/^0+(?=\d{2})/, "")}-${group}-${last}`;
  const expected = checkDigit(body + group);
  if (expected !== Number(last)) {
    return refused(
      `The CAS Registry Number ${number} ends in ${last}, but its other digits call for ${expected}. A digit was mistyped.`,
    );
  }
  return read(number, plain.includes("-") ? [] : [`${quote(text.trim())} is read as ${number}.`]);
}

/** The digits from the right times 1, 2, 3 …, summed, modulo 10. */
function checkDigit(others: string): number {
  const weighted = Array.from(others)
    .reverse()
    .reduce((sum, digit, index) => sum + Number(digit) * (index + 1), 0);
  return weighted % 10;
}
