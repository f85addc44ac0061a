import { addedEntries } from "../../../../../shared/schemas/jobs.ts";
import { useChange } from "../../../lib/use-change.ts";
import { jobsKey } from "./list-jobs.ts";

/** Adds to a job's log, whatever the entry: the path says which. */
export function useAddToJob() {
  return useChange(addedEntries, [jobsKey]);
}
