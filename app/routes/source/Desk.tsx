import { Field, Select, TextArea } from "#app/ui/Field.tsx";
import { type FieldState, plainField } from "#app/ui/fieldState.ts";
import { FormErrors } from "#app/ui/FormErrors.tsx";
import { Section } from "#app/ui/Section.tsx";
import type { SourceOutcome } from "./outcome.ts";
import { describedFields, SourceFields } from "./SourceFields.tsx";

interface DeskProps {
  drafts: readonly { id: number; title: string }[];
  outcome: SourceOutcome | undefined;
  /** What stands in the fields before anything was typed. */
  initial: Readonly<Record<string, string>>;
  /** What is asked of the reason. */
  reasonHint: string;
  reasonRequired: boolean;
}

/** The fields of a form about a source, and of the revision its line goes into, above them what is wrong. */
export function SourceDesk({ drafts, outcome, initial, reasonHint, reasonRequired }: DeskProps) {
  const said = (name: string): string => outcome?.typed[name] ?? initial[name] ?? "";
  const wrong = (name: string): string[] =>
    (outcome?.errors ?? []).filter((error) => error.field === name).map((error) => error.detail);
  const field = (name: string): FieldState => plainField(name, { initialValue: said(name), errors: wrong(name) });
  const described = describedFields(said, wrong);
  const [into, title] = [field("into"), field("revisionTitle")];
  const reason = { ...field("reason"), ...(reasonRequired ? {} : { required: false }) };
  return (
    <>
      <FormErrors
        errors={outcome?.sentences}
        fields={[
          ...described.map(({ field: one, label }) => [one, label] as const),
          [into, "Revision"],
          [title, "Title of the new draft"],
          [reason, "Reason"],
        ]}
      />
      <SourceFields fields={described} />
      <Section head="The revision it goes into">
        <Select
          field={into}
          label="Revision"
          options={[
            ["", "a new draft"],
            ...drafts.map(({ id, title: called }) => [String(id), `revision ${id}: ${called}`] as const),
          ]}
        />
        <Field
          field={title}
          label="Title of the new draft"
          hint="Not looked at where it goes into a revision of yours."
        />
        <TextArea field={reason} label="Reason" hint={reasonHint} rows={2} />
      </Section>
    </>
  );
}
