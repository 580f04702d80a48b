import { Button, type ButtonKind } from "#app/ui/Button.tsx";
import { TextArea } from "#app/ui/Field.tsx";
import { plainField } from "#app/ui/fieldState.ts";
import { FormErrors } from "#app/ui/FormErrors.tsx";
import { ActForm, OpenLink, useDesk, useFocusOnOpen } from "./desk.tsx";
import { formKey } from "./outcome.ts";

interface ReasonFormProps {
  intent: string;
  subject?: string;
  line?: string;
  fields?: readonly (readonly [string, string | number])[];
  /** Name of the text's field. */
  name: "reason" | "remark" | "body";
  label: string;
  hint?: string;
  /** Whether the text may stay empty. */
  optional?: boolean;
  /** What the button says. */
  act: string;
  pendingLabel: string;
  kind?: ButtonKind;
  /** Id of the element at which the form stands. */
  anchor: string;
  /** What will happen, above the field. */
  children?: React.ReactNode;
}

/** A form with one text: a reason, a remark, a comment. It takes the focus when it opens. */
export function ReasonForm(props: ReasonFormProps) {
  const { intent, subject = "", name, label, hint, optional, act, pendingLabel, kind = "plain", anchor } = props;
  const { started } = useDesk();
  const field = useFocusOnOpen<HTMLTextAreaElement>();
  const key = formKey(intent, subject);
  return (
    <ActForm
      intent={intent}
      subject={subject}
      line={props.line}
      fields={props.fields ?? []}
      className="my-2 max-w-[46rem]"
    >
      {({ pending, errors, typed }) => {
        const text = plainField(name, {
          id: `${key}-${name}`,
          errors: errors[name] ? [...errors[name]] : undefined,
          initialValue: typed[name] ?? started,
          required: !optional,
        });
        return (
          <>
            {props.children}
            <FormErrors fields={[[text, label]]} />
            <TextArea ref={field} rows={2} label={label} hint={hint} field={text} />
            <div className="-mt-2 flex flex-wrap items-baseline gap-x-4 gap-y-2">
              <Button kind={kind} type="submit" pending={pending} pendingLabel={pendingLabel}>
                {act}
              </Button>
              <OpenLink form={key} anchor={anchor}>
                Never mind
              </OpenLink>
            </div>
          </>
        );
      }}
    </ActForm>
  );
}
