import type { JobSummary } from "../../../../../shared/schemas/jobs.ts";

export function JobState({ state }: { state: JobSummary["state"] }) {
  return state === "signed" ? <span className="font-semibold">signed</span> : "open";
}
