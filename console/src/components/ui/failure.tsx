import type { ReactNode } from "react";
import { CancelledError, NoAnswerError, ProblemError } from "../../lib/service-error.ts";
import { Button } from "./button.tsx";
import { CopyButton } from "./copy-button.tsx";

interface FailureProps {
  error: unknown;
  /** What could not be done: "The keys could not be read." */
  what: string;
  onRetry?: (() => void) | undefined;
  children?: ReactNode;
}

/** What failed, why, what to do about it, the request's id for who must look it up, and another try. */
export function Failure({ error, what, onRetry, children }: FailureProps) {
  const { sentence, fix, requestId } = explain(error);
  return (
    <div role="alert" className="border border-signal border-l-4 px-4 py-3">
      <p className="font-semibold">{what}</p>
      <p className="mt-1">{sentence}</p>
      {fix !== undefined && <p className="mt-1 text-muted">{fix}</p>}
      {children}
      {(requestId !== null || onRetry) && (
        <div className="mt-3 flex flex-wrap items-center gap-x-4 gap-y-2">
          {onRetry && <Button onClick={onRetry}>Try again</Button>}
          {requestId !== null && (
            <span className="flex min-w-0 items-center gap-2 text-xs text-muted">
              <span className="break-all">request {requestId}</span>
              <CopyButton text={requestId} what="request id" />
            </span>
          )}
        </div>
      )}
    </div>
  );
}

function explain(error: unknown): { sentence: string; fix?: string | undefined; requestId: string | null } {
  if (error instanceof ProblemError) {
    const { problem } = error;
    return { sentence: problem.detail || problem.title, fix: problem.fix, requestId: problem.requestId };
  }
  if (error instanceof CancelledError) {
    return {
      sentence: "It was not waited for. The service may have computed it all the same.",
      fix: "Sent again unchanged, it leaves no second record.",
      requestId: null,
    };
  }
  if (error instanceof NoAnswerError) return { sentence: error.message, requestId: error.requestId };
  return { sentence: "Something in this page failed. Reload it; what was typed is kept.", requestId: null };
}
