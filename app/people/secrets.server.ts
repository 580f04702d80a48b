import { createHash, randomBytes, randomInt } from "node:crypto";

/** A secret as its holder gets it, and what is stored of it. */
export interface Secret {
  /** 32 random bytes in base64url: 43 characters. Handed over once, never stored. */
  text: string;
  /** SHA-256 of the text. A slow hash would add nothing: nobody can go through 2^256 texts. */
  hash: Buffer;
}

/** Makes a new secret for a session, a link or an API key. */
export function makeSecret(): Secret {
  const text = randomBytes(32).toString("base64url");
  return { text, hash: hashSecret(text) };
}

/** What is stored of a secret: the SHA-256 of its text. */
export function hashSecret(text: string): Buffer {
  return createHash("sha256").update(text).digest();
}

const ID_CHARACTERS = "0123456789abcdefghijklmnopqrstuvwxyz";

/** The public part of an API key: 12 characters, for looking it up and for naming it. No secret. */
export function makeKeyId(): string {
  return Array.from({ length: 12 }, () => ID_CHARACTERS[randomInt(ID_CHARACTERS.length)]).join("");
}
