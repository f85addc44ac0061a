import { useEffect, useState } from "react";
import { copyText } from "../../lib/copy-text.ts";
import { joinClasses } from "./join-classes.ts";

interface CopyButtonProps {
  text: string | (() => string);
  /** What is copied, for who hears the button: "id 0198…". */
  what: string;
  /** Shown on the button; without it the button is a small mark. */
  label?: string;
  className?: string;
}

const toldForMs = 2_000;

export function CopyButton({ text, what, label, className }: CopyButtonProps) {
  const [told, setTold] = useState<"copied" | "not copied" | null>(null);
  useEffect(() => {
    if (told === null) return;
    const timer = setTimeout(() => setTold(null), toldForMs);
    return () => clearTimeout(timer);
  }, [told]);
  const copy = async (): Promise<void> => {
    setTold((await copyText(typeof text === "string" ? text : text())) ? "copied" : "not copied");
  };
  return (
    <button
      type="button"
      className={joinClasses(
        "no-print inline-flex cursor-pointer items-center gap-1.5 border border-hair text-xs text-muted hover:border-ink hover:text-ink",
        label === undefined ? "min-h-6 min-w-6 justify-center px-1" : "min-h-9 px-3 py-1.5",
        className,
      )}
      aria-label={label === undefined ? `Copy ${what}` : undefined}
      title={`Copy ${what}`}
      onClick={() => void copy()}
    >
      <CopyMark done={told === "copied"} />
      {label}
      <span role="status" className={told === null ? "sr-only" : undefined}>
        {told}
      </span>
    </button>
  );
}

function CopyMark({ done }: { done: boolean }) {
  return (
    <svg viewBox="0 0 12 12" width="12" height="12" fill="none" stroke="currentColor" aria-hidden="true">
      {done ? (
        <path d="M2 6.5 5 9.5 10.5 2.5" strokeWidth="1.5" />
      ) : (
        <path d="M3.5 3.5v-2h7v7h-2M1.5 3.5h7v7h-7z" />
      )}
    </svg>
  );
}
