import { useState } from "react";
import { writeJson } from "../../lib/write-json.ts";
import { CopyButton } from "./copy-button.tsx";

/** A stored or answered body, closed until asked for. */
export function JsonView({ title, value }: { title: string; value: unknown }) {
  const [open, setOpen] = useState(false);
  const write = (): string => writeJson(value);
  return (
    <details className="no-print border border-hair" onToggle={(event) => setOpen(event.currentTarget.open)}>
      <summary className="cursor-pointer px-3 py-2">{title}</summary>
      <div className="border-t border-hair">
        <div className="flex justify-end border-b border-hair p-2">
          <CopyButton text={write} what={title} label="Copy" />
        </div>
        {open && (
          <pre className="max-h-[30rem] overflow-auto p-3 text-xs" tabIndex={0} aria-label={title}>
            {write()}
          </pre>
        )}
      </div>
    </details>
  );
}
