import { Button } from "../../../components/ui/button.tsx";
import { NoAnswerError, ProblemError } from "../../../lib/service-error.ts";
import type { StreamState } from "../../../lib/follow-events.ts";
import type { JobWatch } from "../api/job-watch.ts";

interface LiveStateProps extends Pick<JobWatch, "start" | "stop"> {
  state: StreamState;
  error: unknown;
}

/** Whether what is shown follows the job, in a word, and the way to have it so. */
export function LiveState({ state, error, start, stop }: LiveStateProps) {
  return (
    <div className="no-print flex flex-wrap items-center gap-x-4 gap-y-2">
      <p role="status" aria-label="Live state" aria-live="polite" className="min-w-0">
        <strong className="font-semibold">{state}</strong>
        <span className="text-muted">{wordsOf(state, error)}</span>
      </p>
      {state === "stopped" ? (
        <Button look="main" onClick={() => start("now")}>
          Follow live
        </Button>
      ) : (
        <Button onClick={stop}>Stop following</Button>
      )}
      <Button onClick={() => start("first")}>Show earlier readings</Button>
    </div>
  );
}

function wordsOf(state: StreamState, error: unknown): string {
  if (state === "live") return ": readings appear as they are sent.";
  if (state === "reconnecting") {
    return error === null ? ": asking the service." : `: ${reasonOf(error)} It is tried again.`;
  }
  return error === null ? ": the page shows what it was last told." : `: ${reasonOf(error)}`;
}

function reasonOf(error: unknown): string {
  if (error instanceof ProblemError) return error.problem.detail || error.problem.title;
  return error instanceof NoAnswerError ? error.message : "The stream broke off.";
}
