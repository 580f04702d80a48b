/** The roles a person may hold; several at once. */
export const ROLES = ["analyst", "steward", "reviewer", "administrator"] as const;
export type Role = (typeof ROLES)[number];

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
