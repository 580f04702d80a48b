import { commonWords, ownWords } from "./commonPasswords.ts";

/** Fewest characters of a password. */
export const SHORTEST_PASSWORD = 8;
/** Most characters of a password: long phrases fit, a megabyte to hash does not. */
export const LONGEST_PASSWORD = 256;

/**
 * A password in the form in which it is counted, judged and hashed: NFKC, so that the same letters are the same password
 * whether a keyboard sends one code point or two, wide or narrow forms, one kind of space or another. Case and length as
 * typed stay. (NIST SP 800-63B advises NFKC or NFKD; from memory.)
 */
export function asTyped(password: string): string {
  return password.normalize("NFKC");
}

/** Whether a password is longer than any that is taken. */
export function isTooLong(password: string): boolean {
  return [...asTyped(password)].length > LONGEST_PASSWORD;
}

/** What a person is told above the field. */
export const PASSWORD_HINT = `At least ${SHORTEST_PASSWORD} characters; 15 or more are better. A phrase of a few words is easy to keep.`;

/**
 * Why a password cannot be taken, as a sentence, or null when it can. There are no rules on which kinds of characters it
 * holds: length, and that it is not among the first ones a stranger would try.
 *
 * @param own the person's own address and name, which make a bad password
 */
export function passwordProblem(password: string, own: { email?: string; name?: string } = {}): string | null {
  const typed = asTyped(password);
  const length = [...typed].length;
  if (length < SHORTEST_PASSWORD) {
    return `This has ${length} ${length === 1 ? "character" : "characters"}; a password needs at least ${SHORTEST_PASSWORD}.`;
  }
  if (length > LONGEST_PASSWORD) return `This is longer than ${LONGEST_PASSWORD} characters; shorten it.`;
  if (/\p{Cc}/u.test(typed)) return "This holds a control character that cannot be typed again; leave it out.";
  const lower = typed.toLowerCase();
  if (isPattern(lower)) {
    return "This is a row of keys, a sequence or a repetition, which is tried first by strangers. Take a phrase of a few words.";
  }
  if (spellings(lower).some((word) => isWordOf(word, wordsOfPerson(own)))) {
    return "This is made of your own name or address. Take something that others do not know of you.";
  }
  if (spellings(lower).some((word) => isWordOf(word, ownWords, commonWords))) {
    return "This is among the passwords that are tried first. Take a phrase of a few words, or let a password manager make one.";
  }
  return null;
}

function wordsOfPerson({ email = "", name = "" }: { email?: string; name?: string }): ReadonlySet<string> {
  const local = email.toLowerCase().split("@", 1)[0] ?? "";
  const host = email.toLowerCase().split("@")[1] ?? "";
  const parts = [local, ...local.split(/[^\p{L}]+/u), ...host.split("."), ...name.toLowerCase().split(/[^\p{L}]+/u)];
  return new Set([...parts, name.toLowerCase().replace(/\s+/g, "")].filter((word) => word.length >= 3));
}

// Digits and signs that people write in the place of letters.
const LETTERS_FOR: Readonly<Record<string, string>> = {
  "0": "o",
  "1": "i",
  "3": "e",
  "4": "a",
  "5": "s",
  "7": "t",
  "8": "b",
  "9": "g",
  "@": "a",
  $: "s",
  "!": "i",
  "|": "l",
  "+": "t",
  "€": "e",
};

/** The words a password may stand for: as it is, without what is put around a word, and with letters for digits. */
function spellings(lower: string): string[] {
  const bare = (text: string): string => text.replace(/^[^\p{L}]+|[^\p{L}]+$/gu, "");
  const joined = (text: string): string => text.replace(/[\s._\-/]+/g, "");
  const asLetters = (text: string): string => text.replace(/[^\p{L}]/gu, (sign) => LETTERS_FOR[sign] ?? sign);
  const withL = (text: string): string => text.replaceAll("1", "l");
  const trimmed = lower.replace(/[^\p{L}]+$/gu, "");
  return [
    lower,
    bare(lower),
    joined(bare(lower)),
    ...[lower, trimmed, withL(lower), withL(trimmed)].map((text) => joined(bare(asLetters(text)))),
    // Digits between the words ("admin2024lab") stand for nothing.
    lower.replace(/[^\p{L}]+/gu, ""),
  ];
}

/** Whether the text is one word of the lists, one word repeated, or two words together. */
function isWordOf(text: string, ...lists: ReadonlySet<string>[]): boolean {
  const isWord = (word: string): boolean => lists.some((list) => list.has(word) || list.has(word.replace(/s$/, "")));
  const unit = repeatedUnit(text);
  if (unit.length >= 3 && isWord(unit)) return true;
  for (let cut = 3; cut <= text.length - 3; cut++) {
    if (isWord(text.slice(0, cut)) && isWord(text.slice(cut))) return true;
  }
  return false;
}

/** The shortest text whose repetition gives this one: "abcabc" gives "abc". */
function repeatedUnit(text: string): string {
  for (let length = 1; length <= text.length / 2; length++) {
    const unit = text.slice(0, length);
    if (text.length % length === 0 && unit.repeat(text.length / length) === text) return unit;
  }
  return text;
}

const ROWS = [
  "1234567890",
  "qwertyuiop",
  "qwertzuiop",
  "azertyuiop",
  "asdfghjkl",
  "zxcvbnm",
  "yxcvbnm",
  "1qaz2wsx3edc4rfv5tgb6yhn7ujm8ik9ol0p",
  "abcdefghijklmnopqrstuvwxyz",
  "0123456789",
];
const RUNS = ROWS.flatMap((row) => [row, [...row].reverse().join("")]);

/**
 * Whether a text is no more than at most three different characters, or is put together from pieces of rows of keys, of
 * the alphabet, of counting or of repetitions, each at least three long ("qwert12345", "aaabbbccc").
 */
function isPattern(lower: string): boolean {
  const characters = [...lower];
  if (new Set(characters).size <= 3) return true;
  if (repeatedUnit(lower).length <= 3) return true;
  let start = 0;
  while (start < characters.length) {
    let length = 1;
    while (
      start + length < characters.length &&
      (RUNS.some((run) => run.includes(characters.slice(start, start + length + 1).join(""))) ||
        characters.slice(start, start + length + 1).every((character) => character === characters[start]))
    ) {
      length += 1;
    }
    if (length < 3) return false;
    start += length;
  }
  return true;
}
