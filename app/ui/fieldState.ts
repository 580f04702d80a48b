/**
 * What a form field needs to know. Conform's field metadata fits it as it is; a form without conform can write one by
 * hand with `plainField`.
 */
export interface FieldState {
  id: string;
  name: string;
  errorId: string;
  descriptionId: string;
  errors?: string[] | undefined;
  initialValue?: unknown;
  required?: boolean | undefined;
  minLength?: number | undefined;
  maxLength?: number | undefined;
  min?: string | number | undefined;
  max?: string | number | undefined;
  pattern?: string | undefined;
}

/** A field for a form that does not use conform. */
export function plainField(
  name: string,
  state: Partial<Pick<FieldState, "id" | "errors" | "initialValue" | "required" | "maxLength">> = {},
): FieldState {
  const id = state.id ?? name;
  return { name, errorId: `${id}-error`, descriptionId: `${id}-hint`, ...state, id };
}

/** The attributes every control takes from its field: name, id, limits, and which texts describe it. */
export function controlProps(field: FieldState, hinted: boolean) {
  const wrong = (field.errors?.length ?? 0) > 0;
  const described = [hinted ? field.descriptionId : null, wrong ? field.errorId : null].filter(Boolean).join(" ");
  return {
    id: field.id,
    name: field.name,
    required: field.required,
    minLength: field.minLength,
    maxLength: field.maxLength,
    "aria-invalid": wrong ? (true as const) : undefined,
    "aria-describedby": described || undefined,
  };
}

/** The text a control starts with; anything but text and numbers starts empty. */
export function startsWith(field: FieldState): string {
  const value = field.initialValue;
  return typeof value === "string" || typeof value === "number" ? String(value) : "";
}
