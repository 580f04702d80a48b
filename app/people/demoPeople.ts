import type { Role } from "./person.ts";

/** The one password of all demo accounts. The start prints it; it is never set outside the demo. */
export const DEMO_PASSWORD = "open the fume hood";

/** The people of the fictional Calder Point Laboratory. */
export const demoPeople = {
  steward: { name: "Ines Halvard", email: "steward@calderpoint.example", roles: ["steward"] },
  secondSteward: { name: "Tom Breckan", email: "steward2@calderpoint.example", roles: ["steward"] },
  reviewer: { name: "Ruth Amsel", email: "reviewer@calderpoint.example", roles: ["reviewer"] },
  secondReviewer: { name: "Jonas Fairley", email: "reviewer2@calderpoint.example", roles: ["reviewer"] },
  analyst: { name: "Mina Corvin", email: "analyst@calderpoint.example", roles: ["analyst"] },
  administrator: { name: "Pell Ostrander", email: "administrator@calderpoint.example", roles: ["administrator"] },
} as const satisfies Record<string, { name: string; email: string; roles: readonly Role[] }>;

export type DemoPerson = keyof typeof demoPeople;
