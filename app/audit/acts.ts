/**
 * The acts that go on record: what was done, to which kind of object. A typed list, so that an act nobody listed does
 * not compile.
 */
export const acts = {
  "person.made": "person",
  "person.invited": "person",
  "person.invitation-taken": "person",
  "person.invitation-withdrawn": "person",
  "person.renamed": "person",
  "person.address-asked": "person",
  "person.address-changed": "person",
  "person.roles-changed": "person",
  "person.switched-off": "person",
  "person.switched-on": "person",
  "person.password-changed": "person",
  "person.password-reset-asked": "person",
  "person.signed-in": "person",
  "person.sign-in-failed": "person",
  "person.signed-out": "person",
  "person.sessions-ended": "person",
  "key.made": "key",
  "key.first-used": "key",
  "key.withdrawn": "key",
  "sheet.received": "sheet",
  "sheet.planned": "sheet",
  "sheet.plan-confirmed": "sheet",
  "sheet.read": "sheet",
  "sheet.failed": "sheet",
  "sheet.cell-repaired": "sheet",
  "sheet.rows-left-out": "sheet",
  "sheet.built": "sheet",
  "revision.begun": "revision",
  "revision.line-written": "revision",
  "revision.lines-added": "revision",
  "revision.line-taken-out": "revision",
  "revision.lines-restated": "revision",
  "revision.lines-taken-over": "revision",
  "revision.described": "revision",
  "revision.sent": "revision",
  "revision.commented": "revision",
  "revision.answered": "revision",
  "revision.lines-accepted": "revision",
  "revision.line-declined": "revision",
  "revision.finding-set-aside": "revision",
  "revision.returned": "revision",
  "revision.decided": "revision",
  "revision.withdrawn": "revision",
  "edition.published": "edition",
  "record.exported": "record",
} as const;

export type Act = keyof typeof acts;

/** One entry as an act hands it in. `detail` holds before and after, reasons and lists; strings and numbers only. */
export interface ActEntry {
  act: Act;
  objectId: string | number;
  detail?: Record<string, unknown>;
}
