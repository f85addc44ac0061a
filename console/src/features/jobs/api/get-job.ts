import { queryOptions, useQuery } from "@tanstack/react-query";
import { jobRecord } from "../../../../../shared/schemas/jobs.ts";
import { apiPaths } from "../../../config/paths.ts";
import { callAsMember, readAnswer } from "../../../lib/call-api.ts";
import { jobsKey } from "./list-jobs.ts";

/** A job's record; `revision` null is the newest. */
export function jobQuery(id: string, revision: string | null) {
  return queryOptions({
    queryKey: [...jobsKey, "record", id, revision],
    // Others write into the same job.
    staleTime: 0,
    queryFn: async ({ signal }) => {
      const newest = apiPaths.job(id);
      const path = revision === null ? newest : `${newest}/revisions/${encodeURIComponent(revision)}`;
      return readAnswer(jobRecord, await callAsMember({ method: "GET", path, signal }));
    },
  });
}

export function useJob(id: string, revision: string | null) {
  return useQuery(jobQuery(id, revision));
}
