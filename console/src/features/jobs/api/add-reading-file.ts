import { addedReadingFile } from "../../../../../shared/schemas/reading-files.ts";
import { useChange } from "../../../lib/use-change.ts";
import { jobsKey } from "./list-jobs.ts";

/** Stores a file of readings and what it holds. */
export function useAddReadingFile() {
  return useChange(addedReadingFile, [jobsKey]);
}
