import type { ReactNode } from "react";
import { joinClasses } from "./join-classes.ts";

export interface TitleField {
  readonly name: string;
  readonly value: ReactNode;
  /** Twice or four times as wide as the others. */
  readonly span?: 2 | 4;
}

const spans = { 1: "", 2: "col-span-2", 4: "col-span-2 md:col-span-4" } as const;

/** The title block of a sheet, with the fields that ISO 7200 names. Hairlines are the gaps of the grid. */
export function TitleBlock({ label, fields }: { label: string; fields: readonly TitleField[] }) {
  return (
    <dl
      aria-label={label}
      className="title-block keep-together grid grid-flow-row-dense grid-cols-2 gap-px border border-ink bg-rule md:grid-cols-4"
    >
      {fields.map((field) => (
        <div key={field.name} className={joinClasses("min-w-0 bg-sheet px-3 py-2", spans[field.span ?? 1])}>
          <dt className="field-name">{field.name}</dt>
          <dd className="mt-0.5 min-w-0 break-words">{field.value}</dd>
        </div>
      ))}
    </dl>
  );
}
