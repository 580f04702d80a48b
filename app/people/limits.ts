const MINUTE = 60 * 1000;

/** A limit on tries: how many within one window. The window begins with the first try. */
export interface Limit {
  name: string;
  most: number;
  /** Length of the window in milliseconds. */
  window: number;
}

/**
 * The limits on what a stranger can try. Sign-in is counted by account and source together, and by source alone, never by
 * account alone: whoever guesses at an account from elsewhere cannot lock its owner out.
 */
export const limits = {
  /** Failed sign-ins to one account from one source. */
  signInAccount: { name: "sign-in-account", most: 10, window: 15 * MINUTE },
  /** Failed sign-ins from one source, to whatever accounts. */
  signInSource: { name: "sign-in-source", most: 100, window: 15 * MINUTE },
  /** Reset letters to one address. */
  resetAddress: { name: "reset-address", most: 3, window: 60 * MINUTE },
  /** Reset letters asked for from one source. */
  resetSource: { name: "reset-source", most: 20, window: 60 * MINUTE },
  /** Letters by which one person confirms a new address. */
  addressLetters: { name: "address-letters", most: 5, window: 60 * MINUTE },
} as const satisfies Record<string, Limit>;

/**
 * What counts as one source: an IPv4 address, or the /64 network of an IPv6 address, of which one household or server
 * commonly holds all 2^64 addresses.
 *
 * @param address as the socket or a trusted proxy gives it
 */
export function sourceOf(address: string): string {
  const plain = address.replace(/^::ffff:(?=\d+\.)/i, "").replace(/%.*$/, "");
  if (!plain.includes(":")) return plain;
  if (!URL.canParse(`http://[${plain}]/`)) return plain;
  // The parser writes every spelling of an address in one way, with at most one "::".
  const canonical = new URL(`http://[${plain}]/`).hostname.slice(1, -1);
  const [head = "", tail] = canonical.split("::");
  const before = head === "" ? [] : head.split(":");
  const after = tail === undefined || tail === "" ? [] : tail.split(":");
  const filling = tail === undefined ? [] : Array<string>(8 - before.length - after.length).fill("0");
  return `${[...before, ...filling, ...after].slice(0, 4).join(":")}::/64`;
}
