import { ROLES } from "#app/people/person.ts";

/** A box for each role, those that somebody holds ticked. */
export function RoleBoxes({ held }: { held: readonly string[] }) {
  return ROLES.map((role) => (
    <label key={role} className="flex items-start gap-2 py-0.5">
      <input className="check" type="checkbox" name="roles" value={role} defaultChecked={held.includes(role)} />
      <span>{role}</span>
    </label>
  ));
}
