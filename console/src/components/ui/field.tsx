import { useId, type ReactNode } from "react";

interface FieldProps {
  label: string;
  hint?: ReactNode;
  error?: string | undefined;
  children: (attributes: {
    id: string;
    "aria-invalid": boolean;
    "aria-describedby": string | undefined;
  }) => ReactNode;
}

/** A labelled control with its hint and its fault, tied together for who hears the page. */
export function Field({ label, hint, error, children }: FieldProps) {
  const id = useId();
  const described = [hint && `${id}-hint`, error && `${id}-error`].filter(Boolean).join(" ");
  return (
    <div className="min-w-0">
      <label htmlFor={id} className="field-name mb-1 block">
        {label}
      </label>
      {children({ id, "aria-invalid": error !== undefined, "aria-describedby": described || undefined })}
      {hint !== undefined && (
        <p id={`${id}-hint`} className="mt-1 text-xs text-muted">
          {hint}
        </p>
      )}
      {error !== undefined && (
        <p id={`${id}-error`} className="mt-1 text-xs text-signal">
          {error}
        </p>
      )}
    </div>
  );
}
