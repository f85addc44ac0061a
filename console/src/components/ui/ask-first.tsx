import type { UseMutationResult } from "@tanstack/react-query";
import { useState, type ReactNode } from "react";
import { Button } from "./button.tsx";
import { Dialog } from "./dialog.tsx";
import { Failure } from "./failure.tsx";

interface AskFirstProps {
  /** What the button does, in the words of both buttons. */
  action: string;
  label?: string;
  /** What leaving it be is called. */
  keep: string;
  look: "main" | "grave";
  title: string;
  change: Pick<UseMutationResult, "isPending" | "isError" | "error" | "reset">;
  /** What to say when the change failed. */
  failed: string;
  /** `done` closes the question. */
  onConfirm: (done: () => void) => void;
  children: ReactNode;
}

/** A button for what cannot be taken back: asks first, and keeps the question open while the change fails. */
export function AskFirst({
  action,
  label,
  keep,
  look,
  title,
  change,
  failed,
  onConfirm,
  children,
}: AskFirstProps) {
  const [asking, setAsking] = useState(false);
  const close = (): void => {
    setAsking(false);
    change.reset();
  };
  return (
    <>
      <Button
        {...(look === "grave" ? { look } : {})}
        {...(label === undefined ? {} : { "aria-label": label })}
        onClick={() => setAsking(true)}
      >
        {action}
      </Button>
      {asking && (
        <Dialog title={title} onDismiss={close}>
          {children}
          {change.isError && (
            <div className="mt-4">
              <Failure error={change.error} what={failed} />
            </div>
          )}
          <div className="mt-5 flex flex-wrap justify-end gap-2">
            <Button onClick={close} autoFocus>
              {keep}
            </Button>
            <Button look={look} busy={change.isPending} onClick={() => onConfirm(close)}>
              {action}
            </Button>
          </div>
        </Dialog>
      )}
    </>
  );
}
