import { jobRecord } from "../../../../../shared/schemas/jobs.ts";
import { useChange } from "../../../lib/use-change.ts";
import { jobsKey } from "./list-jobs.ts";

/** Starts a job, changes its details, or opens it again: what is answered with the whole record. */
export function useChangeJob() {
  return useChange(jobRecord, [jobsKey]);
}
