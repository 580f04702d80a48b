/** The roles a person may hold; several at once. */
export const ROLES = ["analyst", "steward", "reviewer", "administrator"] as const;
export type Role = (typeof ROLES)[number];

/** Roles in their usual order, each once. */
export function orderRoles(roles: readonly Role[]): Role[] {
  return ROLES.filter((role) => roles.includes(role));
}

/** A person as the rest of the application knows one. */
export interface Person {
  id: string;
  name: string;
  email: string;
  roles: readonly Role[];
}

/** Who acts, and by which door: passed explicitly from the route inwards, never kept in the background. */
export interface Acting {
  person: Person;
  /** The API key used, when a program acts on the person's behalf. */
  apiKeyId: string | null;
  /** The request's id, for the record and the log. */
  requestId: string | null;
}

/** How an account stands: "invited" until a password was chosen. */
export const ACCOUNT_STATES = ["in use", "invited", "switched off"] as const;
export type AccountState = (typeof ACCOUNT_STATES)[number];
