import type { ComponentProps } from "react";
import { Field } from "./field.tsx";

interface TextFieldProps extends Omit<ComponentProps<"input">, "id" | "className"> {
  label: string;
  hint?: string;
  error?: string | undefined;
}

/** A line of text, a date or a number with its label, hint and fault. */
export function TextField({ label, hint, error, ...input }: TextFieldProps) {
  return (
    <Field label={label} error={error} {...(hint === undefined ? {} : { hint })}>
      {(attributes) => <input autoComplete="off" {...input} {...attributes} className="control" />}
    </Field>
  );
}

interface TextAreaFieldProps extends Omit<ComponentProps<"textarea">, "id" | "className"> {
  label: string;
  hint?: string;
  error?: string | undefined;
}

export function TextAreaField({ label, hint, error, ...area }: TextAreaFieldProps) {
  return (
    <Field label={label} error={error} {...(hint === undefined ? {} : { hint })}>
      {(attributes) => <textarea rows={3} {...area} {...attributes} className="control" />}
    </Field>
  );
}
