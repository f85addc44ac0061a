import { keepPreviousData, queryOptions, useQuery } from "@tanstack/react-query";
import { jobPage } from "../../../../../shared/schemas/jobs.ts";
import { apiPaths } from "../../../config/paths.ts";
import { callAsMember, readAnswer } from "../../../lib/call-api.ts";

export const jobsKey = ["jobs"] as const;
/** What may stand in the address of the list. */
export const jobFilterNames = ["machineId", "state", "q"] as const;

export function jobsQuery(search: URLSearchParams) {
  const query = new URLSearchParams({ limit: "25" });
  for (const name of [...jobFilterNames, "cursor"]) {
    const value = search.get(name)?.trim();
    if (value) query.set(name, value);
  }
  return queryOptions({
    queryKey: [...jobsKey, "list", query.toString()],
    placeholderData: keepPreviousData,
    staleTime: 0,
    queryFn: async ({ signal }) => {
      const path = `${apiPaths.jobs}?${query.toString()}`;
      return readAnswer(jobPage, await callAsMember({ method: "GET", path, signal }));
    },
  });
}

export function useJobs(search: URLSearchParams) {
  return useQuery(jobsQuery(search));
}
