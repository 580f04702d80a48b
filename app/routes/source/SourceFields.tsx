import { SOURCE_FORM, type ShownSourceField, type SourceField } from "#app/sources/sourceFields.ts";
import { Field, Select, TextArea } from "#app/ui/Field.tsx";
import { type FieldState, plainField } from "#app/ui/fieldState.ts";

/** A field of the form of a source with what stands in it and what is wrong with it. */
export interface DescribedField extends ShownSourceField {
  field: FieldState;
}

/** The form of a source with its content; `prefix` stands before the fields' names where other fields are beside them. */
export function describedFields(
  initial: (name: SourceField) => string,
  errors: (name: SourceField) => string[],
  prefix = "",
): DescribedField[] {
  return SOURCE_FORM.map((shown) => ({
    ...shown,
    field: plainField(`${prefix}${shown.name}`, { initialValue: initial(shown.name), errors: errors(shown.name) }),
  }));
}

/** The fields that describe a source, wherever that is done: beside a sheet, on their own, or to mend one. */
export function SourceFields({ fields }: { fields: readonly DescribedField[] }) {
  return (
    <>
      {fields.map(({ field, label, hint, options, rows, required }) => {
        const words = required ? label : `${label} (may stay empty)`;
        if (options) return <Select key={field.name} field={field} label={words} hint={hint} options={options} />;
        if (rows) return <TextArea key={field.name} field={field} label={words} hint={hint} rows={rows} />;
        return <Field key={field.name} field={field} label={words} hint={hint} />;
      })}
    </>
  );
}
