import { database } from "#app/db/database.server.ts";
import type { LinkMaker } from "#app/notify/sendLetter.server.ts";
import { paths } from "#app/paths.ts";
import {
  findAddressChange,
  findLink,
  type FoundAddressChange,
  type FoundLink,
  insertAddressChange,
  insertInvitation,
  insertReset,
  type LinkTable,
} from "./links.queries.server.ts";
import { findAccount } from "./people.queries.server.ts";
import { hashSecret, makeSecret } from "./secrets.server.ts";

/** How long an invitation can be taken up, in days. */
export const INVITATION_DAYS = 7;
/** How long a reset link can be used, in minutes. */
export const RESET_MINUTES = 60;
/** How long a new address can be confirmed, in minutes. */
export const ADDRESS_MINUTES = 60;

/**
 * Makes the secret link of a letter at the moment it is sent. A letter sent twice carries two links; both run out, and
 * using one voids the other. A letter to an address that the account no longer has gets none: its reader may be a stranger.
 */
export const makeLinkOf: LinkMaker = async ({ kind, toPerson, toAddress, fromPerson }) => {
  const account = toPerson ? await findAccount(toPerson, database()) : undefined;
  if (!account || account.switchedOffAt) return null;
  if (kind === "address-change") {
    const secret = makeSecret();
    const endsAt = new Date(Date.now() + ADDRESS_MINUTES * 60 * 1000);
    const link = { tokenHash: secret.hash, personId: account.id, email: toAddress, endsAt };
    await insertAddressChange(link, database());
    return paths.newAddress(secret.text);
  }
  if (account.email !== toAddress) return null;
  const secret = makeSecret();
  const now = Date.now();
  if (kind === "invitation") {
    const endsAt = new Date(now + INVITATION_DAYS * 24 * 60 * 60 * 1000);
    await insertInvitation({ tokenHash: secret.hash, personId: account.id, invitedBy: fromPerson, endsAt }, database());
    return paths.invitation(secret.text);
  }
  const endsAt = new Date(now + RESET_MINUTES * 60 * 1000);
  await insertReset({ tokenHash: secret.hash, personId: account.id, endsAt }, database());
  return paths.reset(secret.text);
};

/** The invitation or reset behind the token of an address, while it can be used. */
export async function findUsableLink(
  table: LinkTable,
  token: string | undefined,
  now: Date = new Date(),
): Promise<FoundLink | undefined> {
  return token ? findLink(table, hashSecret(token), now, database()) : undefined;
}

/** The new address behind the token of an address, while it can be confirmed. */
export async function findUsableAddressChange(
  token: string | undefined,
  now: Date = new Date(),
): Promise<FoundAddressChange | undefined> {
  return token ? findAddressChange(hashSecret(token), now, database()) : undefined;
}
