import { controlProps, startsWith, type FieldState } from "./fieldState.ts";

interface LabelledProps {
  field: FieldState;
  label: React.ReactNode;
  /** One sentence under the label: what belongs here, in which form. */
  hint?: React.ReactNode;
}

/** Label, hint, control and what is wrong, in this order. The four field kinds below are built on it. */
export function FieldFrame({ field, label, hint, children }: LabelledProps & { children: React.ReactNode }) {
  return (
    <div className="field">
      <label className="field-label" htmlFor={field.id}>
        {label}
        {field.required === false && <span className="font-normal text-soft"> (may stay empty)</span>}
      </label>
      {hint && (
        <p className="field-hint" id={field.descriptionId}>
          {hint}
        </p>
      )}
      {children}
      <FieldError field={field} />
    </div>
  );
}

/** What is wrong with a field, in words, tied to it. */
export function FieldError({ field }: { field: FieldState }) {
  if (!field.errors?.length) return null;
  return (
    <p className="field-error" id={field.errorId}>
      {field.errors.join(" ")}
    </p>
  );
}

type InputProps = Omit<React.ComponentPropsWithRef<"input">, "id" | "name" | "className">;

/** One line of text. Passwords never start filled. */
export function Field({ field, label, hint, ...input }: LabelledProps & InputProps) {
  return (
    <FieldFrame field={field} label={label} hint={hint}>
      <input
        className="input"
        type="text"
        defaultValue={input.type === "password" || input.type === "file" ? undefined : startsWith(field)}
        {...controlProps(field, hint !== undefined)}
        {...input}
      />
    </FieldFrame>
  );
}

/** Several lines of text. */
export function TextArea({
  field,
  label,
  hint,
  ...input
}: LabelledProps & Omit<React.ComponentPropsWithRef<"textarea">, "id" | "name" | "className">) {
  return (
    <FieldFrame field={field} label={label} hint={hint}>
      <textarea
        className="input"
        defaultValue={startsWith(field)}
        {...controlProps(field, hint !== undefined)}
        {...input}
      />
    </FieldFrame>
  );
}

/** One choice of a list: `options` are [value, label] pairs. */
export function Select({
  field,
  label,
  hint,
  options,
  ...input
}: LabelledProps & { options: readonly (readonly [string, string])[] } & Omit<
    React.ComponentPropsWithRef<"select">,
    "id" | "name" | "className"
  >) {
  return (
    <FieldFrame field={field} label={label} hint={hint}>
      <select
        className="input"
        defaultValue={startsWith(field)}
        {...controlProps(field, hint !== undefined)}
        {...input}
      >
        {options.map(([value, text]) => (
          <option key={value} value={value}>
            {text}
          </option>
        ))}
      </select>
    </FieldFrame>
  );
}

/** A box to tick, its label beside it. */
export function Check({ field, label, hint, ...input }: LabelledProps & InputProps) {
  return (
    <div className="field">
      <label className="flex items-start gap-2.5">
        <input
          className="check"
          type="checkbox"
          value="on"
          defaultChecked={field.initialValue === "on" || field.initialValue === true}
          {...controlProps(field, hint !== undefined)}
          {...input}
        />
        <span>{label}</span>
      </label>
      {hint && (
        <p className="field-hint" id={field.descriptionId}>
          {hint}
        </p>
      )}
      <FieldError field={field} />
    </div>
  );
}

/** A choice that stands in a sentence or a row, without frame. `label` is for readers only. */
export function InlineSelect({
  label,
  options,
  wrong,
  ...input
}: {
  label: string;
  options: readonly (readonly [string, string])[];
  wrong?: boolean | undefined;
} & Omit<React.ComponentPropsWithRef<"select">, "className">) {
  return (
    <select className="input-inline" aria-label={label} aria-invalid={wrong || undefined} {...input}>
      {options.map(([value, text]) => (
        <option key={value} value={value}>
          {text}
        </option>
      ))}
    </select>
  );
}

/** A cell of a sheet under repair, or another short entry inside a row. `label` names row and column for readers. */
export function InlineField({
  label,
  wrong,
  figure,
  ...input
}: { label: string; wrong?: boolean | undefined; figure?: boolean | undefined } & Omit<
  React.ComponentPropsWithRef<"input">,
  "className"
>) {
  return (
    <input
      className={`input-inline${figure ? " input-cell" : ""}`}
      type="text"
      aria-label={label}
      aria-invalid={wrong || undefined}
      {...input}
    />
  );
}

/** Filters written as a sentence: words and inline choices in one flow. Put it in a GET form with a button. */
export function Sentence({ children }: { children: React.ReactNode }) {
  return <div className="sentence">{children}</div>;
}
