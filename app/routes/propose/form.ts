import { ANSWER } from "#app/review/proposal.ts";
import { SOURCE_FORM } from "#app/sources/sourceFields.ts";
import { PROPERTIES, propertyInfo } from "#app/thermo/property.ts";
import { type FieldState, plainField } from "#app/ui/fieldState.ts";
import type { ProposeReply } from "./outcome.ts";

/** The fields of one form with what was typed into them and what is wrong with it. */
export interface FormState {
  reply: ProposeReply | undefined;
  /** A field's state; `initial` is what stands in it before anything was sent. */
  field(name: string, initial?: string, required?: boolean): FieldState;
  typed(name: string): string | undefined;
}

/** The state of a form: fresh, or as it was sent and held. */
export function formState(reply: ProposeReply | undefined): FormState {
  return {
    reply,
    typed: (name) => reply?.typed[name],
    field(name, initial = "", required = true) {
      const errors = reply?.errors[name];
      return plainField(name, {
        errors: errors ? [...errors] : undefined,
        initialValue: reply ? (reply.typed[name] ?? "") : initial,
        // What must be there is said by the server, in a sentence that keeps what was typed elsewhere.
        required: required ? undefined : false,
      });
    },
  };
}

const LABELS: Readonly<Record<string, string>> = {
  kind: "Kind of the uncertainty",
  k: "Coverage factor k",
  pressure: "Standard pressure",
  basis: "Standard state of the solute",
  method: "How it was obtained",
  remark: "Remark of the source",
  source: "Source",
  reason: "Reason",
  revision: "Goes into",
  title: "Title of the new draft",
  formula: "Formula",
  phase: "Phase",
  label: "Form or isomer",
  name: "Name",
  cas: "CAS number",
  inchikey: "InChIKey",
  synonyms: "Synonyms",
  takes: "Values",
  [ANSWER]: "Question",
};

/** What a field is called where its error is listed above the form. */
function labelOf(name: string): string {
  const [subject = "", part = ""] = name.split(".");
  const property = PROPERTIES.find((one) => one === subject);
  if (property) return `${propertyInfo[property].symbol}, ${part}`;
  if (subject === "source" && part !== "") return SOURCE_FORM.find((field) => field.name === part)?.label ?? part;
  return LABELS[name] ?? name;
}

/** Everything that is wrong with a form, for the list above it. */
export function errorList(reply: ProposeReply | undefined): {
  errors: readonly string[];
  fields: (readonly [FieldState, string])[];
} {
  return {
    errors: reply?.sentence ? [reply.sentence] : [],
    fields: Object.entries(reply?.errors ?? {}).map(([name, errors]) => [
      plainField(name, { errors: [...errors] }),
      labelOf(name),
    ]),
  };
}
