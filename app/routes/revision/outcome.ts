import type { MixtureQuestion } from "#app/review/mixture.ts";

/** What came of a form on the page of a revision; the same for a page sent anew and for a form sent by script. */
export type Outcome =
  | {
      ok: true;
      intent: string;
      /** Said in the status region: "Accepted NH3(g) ΔfH°." */
      said: string;
    }
  | {
      ok: false;
      status: number;
      intent: string;
      /** What is wrong with the form as a whole; empty where the fields say all. */
      sentence: string;
      errors: Readonly<Record<string, readonly string[]>>;
      /** What was typed, so that nothing is lost. */
      typed: Readonly<Record<string, string>>;
      /** What the checks find in the mixture that would stand, to be answered; with the form as it was sent. */
      asks?: MixtureQuestion & { fields: readonly (readonly [string, string])[] };
    };

/** Which form of the page an outcome belongs to: its intent and what it was about. */
export function formKey(intent: string, subject = ""): string {
  return subject === "" ? intent : `${intent}-${subject}`;
}

/** The key of the form that was sent, from what was typed into it. */
export function sentForm(outcome: Outcome & { ok: false }): string {
  const { typed, intent } = outcome;
  return formKey(
    intent,
    typed["comment"] ?? typed["line"] ?? typed["finding"] ?? typed["seen"]?.split(":", 1)[0] ?? "",
  );
}
