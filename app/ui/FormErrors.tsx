import { useEffect, useRef } from "react";
import type { FieldState } from "./fieldState.ts";

interface FormErrorsProps {
  /** What is wrong with the form as a whole (conform: `form.errors`). */
  errors?: readonly string[] | undefined;
  /** The fields in their order on the page, each with its label. */
  fields?: readonly (readonly [FieldState, string])[] | undefined;
}

/**
 * What is wrong with a form, above it: each entry leads to its field. It takes the focus when it appears, so nobody has
 * to look for it. Renders nothing while all is well.
 */
export function FormErrors({ errors = [], fields = [] }: FormErrorsProps) {
  const box = useRef<HTMLDivElement>(null);
  const wrong = fields.flatMap(([field, label]) => (field.errors ?? []).map((text) => ({ id: field.id, label, text })));
  const all = [...errors, ...wrong.map(({ text }) => text)].join("\n");
  useEffect(() => {
    if (all !== "") box.current?.focus();
  }, [all]);
  if (all === "") return null;
  return (
    <div ref={box} className="error-summary" role="alert" tabIndex={-1} aria-labelledby="error-summary-title">
      <h2 id="error-summary-title" className="font-semibold text-madder">
        {wrong.length > 1 ? `${wrong.length} things to put right` : "This needs putting right"}
      </h2>
      <ul>
        {errors.map((text) => (
          <li key={text}>{text}</li>
        ))}
        {wrong.map(({ id, label, text }) => (
          <li key={`${id}${text}`}>
            <a href={`#${id}`}>{label}</a>: {text}
          </li>
        ))}
      </ul>
    </div>
  );
}
