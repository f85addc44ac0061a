import { queryOptions, useQuery } from "@tanstack/react-query";
import { selfTestSchema } from "../../../../../shared/schemas/engine.ts";
import { apiPaths } from "../../../config/paths.ts";
import { callAsMember, readAnswer } from "../../../lib/call-api.ts";

/** Each reading runs the test anew: it is read once a visit, and again when the member asks. */
export const selfTestQuery = queryOptions({
  queryKey: ["self-test"],
  staleTime: Infinity,
  gcTime: 0,
  queryFn: async ({ signal }) =>
    readAnswer(selfTestSchema, await callAsMember({ method: "GET", path: apiPaths.selfTest, signal })),
});

export function useSelfTest() {
  return useQuery(selfTestQuery);
}
