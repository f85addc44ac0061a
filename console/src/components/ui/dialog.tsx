import { useEffect, useId, useRef, useState, type ReactNode } from "react";

interface DialogProps {
  title: string;
  /** Asked for with Escape; absent when the dialog must be answered. */
  onDismiss?: () => void;
  children: ReactNode;
}

/**
 * A modal dialog while it is mounted. The browser's own element keeps focus inside and the page behind inert; where
 * focus was before, it goes back to. It begins at what is marked `data-first-focus`, else at the first control.
 */
export function Dialog({ title, onDismiss, children }: DialogProps) {
  const ref = useRef<HTMLDialogElement>(null);
  const titleId = useId();
  const [before] = useState(() => document.activeElement);
  useEffect(() => {
    const dialog = ref.current;
    // One dialog may follow another, whose end has just put focus back; focus inside is the page's own doing.
    const now = document.activeElement;
    const opener = dialog?.contains(now) ? before : now;
    if (dialog && !dialog.open) dialog.showModal();
    dialog?.querySelector<HTMLElement>("[data-first-focus]")?.focus();
    return () => {
      dialog?.close();
      if (opener instanceof HTMLElement && opener.isConnected) opener.focus();
    };
  }, [before]);
  return (
    <dialog
      ref={ref}
      className="dialog"
      aria-labelledby={titleId}
      onCancel={(event) => {
        event.preventDefault();
        onDismiss?.();
      }}
    >
      <h2 id={titleId} className="border-b border-rule px-5 py-3 font-semibold">
        {title}
      </h2>
      <div className="px-5 py-4">{children}</div>
    </dialog>
  );
}
