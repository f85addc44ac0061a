import { useQuery } from "@tanstack/react-query";
import { jobLog } from "../../../../../shared/schemas/job-log.ts";
import { apiPaths } from "../../../config/paths.ts";
import { callAsMember, readAnswer } from "../../../lib/call-api.ts";
import { jobsKey } from "./list-jobs.ts";

/** Every entry of a job; read only once it is asked for. */
export function useJobLog(id: string, asked: boolean) {
  return useQuery({
    queryKey: [...jobsKey, "log", id],
    enabled: asked,
    staleTime: 0,
    queryFn: async ({ signal }) => {
      const path = `${apiPaths.job(id)}/log`;
      return readAnswer(jobLog, await callAsMember({ method: "GET", path, signal }));
    },
  });
}
