import argon2 from "argon2";
import { asTyped } from "./passwordRules.ts";

/** argon2id with 19 MiB, two passes and one lane: the least that ASVS 5.0 Appendix C accepts, about 50 ms a core. */
const OPTIONS = { type: argon2.argon2id, memoryCost: 19_456, timeCost: 2, parallelism: 1 } as const;

/**
 * Stands in where there is no account or no password yet, so that the answer takes as long as for a wrong password. No
 * password leads to it: its hash part is 32 arbitrary bytes.
 */
const NOBODYS_HASH = "$argon2id$v=19$m=19456,t=2,p=1$bm9ib2R5cyBzYWx0IQ$bm9ib2R5cyBoYXNoLCBvbmx5IGZvciBpdHMgdGltZSE";

/** The hash to store for a password, in PHC form (parameters and salt included). */
export async function hashPassword(password: string): Promise<string> {
  return argon2.hash(asTyped(password), OPTIONS);
}

/**
 * Whether a password is the one behind a stored hash. With no hash (`null`: no such account, or no password set yet) it
 * does the same work and answers false.
 */
export async function isPassword(stored: string | null, password: string): Promise<boolean> {
  const right = await argon2.verify(stored ?? NOBODYS_HASH, asTyped(password));
  return stored !== null && right;
}
