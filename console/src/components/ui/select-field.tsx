import type { ComponentProps } from "react";
import { Field } from "./field.tsx";

export interface Choice {
  readonly value: string;
  readonly words: string;
}

interface SelectFieldProps extends Omit<ComponentProps<"select">, "id" | "className" | "children"> {
  label: string;
  options: readonly Choice[];
  hint?: string;
  error?: string | undefined;
}

/** One of several, with its label, hint and fault. A value that is none of them is shown as it is. */
export function SelectField({ label, options, hint, error, ...select }: SelectFieldProps) {
  const chosen = String(select.value ?? select.defaultValue ?? "");
  const isKnown = chosen === "" || options.some(({ value }) => value === chosen);
  return (
    <Field label={label} error={error} {...(hint === undefined ? {} : { hint })}>
      {(attributes) => (
        <select {...select} {...attributes} className="control">
          {!isKnown && <option value={chosen}>{chosen}</option>}
          {options.map(({ value, words }) => (
            <option key={value} value={value}>
              {words}
            </option>
          ))}
        </select>
      )}
    </Field>
  );
}
