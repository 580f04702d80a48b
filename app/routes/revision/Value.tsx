import { unitsFor, writtenFrom } from "#app/review/revisionPageValue.ts";
import type { LineView } from "#app/review/revisionPage.ts";
import type { UncertaintyChoice } from "#app/review/writtenValue.ts";
import type { Property } from "#app/thermo/property.ts";
import { Button } from "#app/ui/Button.tsx";
import { Field, Select } from "#app/ui/Field.tsx";
import { plainField } from "#app/ui/fieldState.ts";
import { FormErrors } from "#app/ui/FormErrors.tsx";
import { ActForm, OpenLink, useFocusOnOpen } from "./desk.tsx";
import { formKey } from "./outcome.ts";

const KINDS: readonly (readonly [UncertaintyChoice, string])[] = [
  ["standard", "standard (k = 1)"],
  ["expanded", "expanded (k = 2)"],
  ["unstated", "the source does not say which"],
  ["exact", "exact by convention"],
  ["none", "none stated"],
];

/** Writes a line's value anew: read as a cell of a sheet is read, in any unit of its kind. */
export function ValueForm({ line, property }: { line: LineView; property: Property }) {
  const first = useFocusOnOpen<HTMLInputElement>();
  const written = line.proposed ? writtenFrom(line.proposed, property) : null;
  return (
    <ActForm
      intent="rewrite"
      subject={line.id}
      fields={[
        ["line", line.id],
        ["version", line.version],
      ]}
      className="my-2 max-w-[46rem]"
    >
      {({ pending, errors, typed }) => {
        const field = (name: string, initial: string, required = true) =>
          plainField(name, {
            id: `rewrite-${line.id}-${name}`,
            errors: errors[name] ? [...errors[name]] : undefined,
            initialValue: typed[name] ?? initial,
            required,
          });
        const fields = {
          value: field("value", written?.value ?? ""),
          unit: field("unit", written?.unit ?? ""),
          uncertainty: field("uncertainty", written?.uncertainty ?? "", false),
          kind: field("kind", written?.kind ?? "none"),
          reason: field("reason", ""),
        };
        return (
          <>
            <FormErrors
              fields={[
                [fields.value, "Value"],
                [fields.unit, "Unit"],
                [fields.uncertainty, "Uncertainty"],
                [fields.reason, "Reason"],
              ]}
            />
            <div className="grid items-end gap-x-6 sm:grid-cols-2">
              <Field
                ref={first}
                field={fields.value}
                label="Value"
                hint="With its digits as the source prints them; −45.94(35) and −45.94 ± 0.35 are read too."
                autoComplete="off"
              />
              <Select field={fields.unit} label="Unit" options={unitsFor(property).map((unit) => [unit, unit])} />
              <Field field={fields.uncertainty} label="Uncertainty" autoComplete="off" />
              <Select field={fields.kind} label="Which kind" options={KINDS} />
            </div>
            <Field
              field={fields.reason}
              label="Reason"
              hint="The reviewer reads it beside the change."
              autoComplete="off"
            />
            <div className="-mt-2 flex flex-wrap items-baseline gap-x-4 gap-y-2">
              <Button type="submit" pending={pending} pendingLabel="Examining…">
                Change the line
              </Button>
              <OpenLink form={formKey("rewrite", line.id)} anchor={`line-${line.id}`}>
                Never mind
              </OpenLink>
            </div>
          </>
        );
      }}
    </ActForm>
  );
}
