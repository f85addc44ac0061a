import { useEffect, useId, useRef, type ReactNode } from "react";

interface DialogProps {
  title: string;
  /** Asked for with Escape; absent when the dialog must be answered. */
  onDismiss?: () => void;
  children: ReactNode;
}

/**
 * A modal dialog while it is mounted. The browser's own element keeps focus inside and the page behind inert; where
 * focus was before, it goes back to.
 */
export function Dialog({ title, onDismiss, children }: DialogProps) {
  const ref = useRef<HTMLDialogElement>(null);
  const titleId = useId();
  useEffect(() => {
    const opener = document.activeElement;
    const dialog = ref.current;
    if (dialog && !dialog.open) dialog.showModal();
    return () => {
      dialog?.close();
      if (opener instanceof HTMLElement && opener.isConnected) opener.focus();
    };
  }, []);
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
