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
    field: {
      ...plainField(`${prefix}${shown.name}`, { initialValue: initial(shown.name), errors: errors(shown.name) }),
      // Only so that the label can say what may stay empty: the page itself says what is missing, in words.
      ...(shown.required ? {} : { required: false }),
    },
  }));
}

/** The fields that describe a source, wherever that is done: beside a sheet, on their own, or to mend one. */
export function SourceFields({ fields }: { fields: readonly DescribedField[] }) {
  return (
    <div className="grid max-w-[48rem] grid-cols-1 gap-x-4 sm:grid-cols-4">
      {fields.map((described) => (
        <div key={described.name} className={`self-end [&>.field]:max-w-none ${WIDTHS[described.quarters ?? 4]}`}>
          <SourceControl {...described} />
        </div>
      ))}
    </div>
  );
}

const WIDTHS = { 1: "sm:col-span-1", 2: "sm:col-span-2", 4: "sm:col-span-4" } as const;

function SourceControl({ field, label, hint, options, rows }: DescribedField) {
  if (options) return <Select field={field} label={label} hint={hint} options={options} />;
  if (rows) return <TextArea field={field} label={label} hint={hint} rows={rows} />;
  return <Field field={field} label={label} hint={hint} />;
}
