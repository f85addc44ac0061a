import { queryOptions, useQuery } from "@tanstack/react-query";
import { problemListSchema } from "../../../../../shared/schemas/problem.ts";
import { apiPaths } from "../../../config/paths.ts";
import { readAnswer } from "../../../lib/call-api.ts";
import { sendRequest } from "../../../lib/send-request.ts";

/** Every code the service can answer with. Anyone may read it. */
export const problemsQuery = queryOptions({
  queryKey: ["problems"],
  staleTime: Infinity,
  queryFn: async ({ signal }) => {
    const answer = await sendRequest({ method: "GET", path: apiPaths.problems, signal });
    return readAnswer(problemListSchema, answer).data;
  },
});

export function useProblems() {
  return useQuery(problemsQuery);
}
