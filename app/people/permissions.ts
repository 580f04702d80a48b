import { Forbidden, Unauthenticated } from "#app/http/errors.ts";
import type { Acting, Role } from "./person.ts";

/**
 * The one table of permissions. Every loader, action and act asks it; the access test walks every route of the manifest
 * against it. A line names the roles that hold the permission.
 */
export const permissions = {
  /** Read the table, species, editions, comparisons, sources and downloads. */
  "table:read": ["analyst", "steward", "reviewer", "administrator"],
  /** Bring sheets, plan their columns, repair their cells and build revisions. */
  "sheet:work": ["steward"],
  /** See sheets as they were received and read. */
  "sheet:read": ["steward", "reviewer", "administrator"],
  /** See revisions, their lines, findings and comments. */
  "revision:read": ["analyst", "steward", "reviewer", "administrator"],
  /** Write lines, send to review, answer, withdraw. */
  "revision:write": ["steward"],
  /** Write comments on a revision. */
  "revision:comment": ["steward", "reviewer"],
  /** Accept, decline, return, set findings aside. */
  "revision:decide": ["reviewer"],
  /** Publish an edition. */
  "edition:publish": ["reviewer"],
  /** Make and withdraw one's own API keys. */
  "key:own": ["analyst", "steward", "reviewer", "administrator"],
  /** Look after one's own account. */
  "account:own": ["analyst", "steward", "reviewer", "administrator"],
  /** Invite people, give roles, switch accounts off, end sessions. */
  "people:manage": ["administrator"],
  /** Read the record of acts. */
  "record:read": ["administrator"],
} as const satisfies Record<string, readonly Role[]>;

export type Permission = keyof typeof permissions;

/** Whether one of these roles holds the permission. */
export function may(roles: readonly Role[], permission: Permission): boolean {
  return permissions[permission].some((role) => roles.includes(role));
}

/**
 * Lets the act go on, or throws.
 * @throws Unauthenticated when nobody acts; Forbidden when none of the person's roles holds the permission.
 */
export function demand(acting: Acting | null, permission: Permission): asserts acting is Acting {
  if (!acting) throw new Unauthenticated("Sign in to do this.");
  if (!may(acting.person.roles, permission)) {
    throw new Forbidden(`This needs the role ${permissions[permission].join(" or ")}. Ask an administrator for it.`);
  }
}
