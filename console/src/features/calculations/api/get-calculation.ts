import { queryOptions, useQuery } from "@tanstack/react-query";
import { calculationRecord } from "../../../../../shared/schemas/calculations.ts";
import { apiPaths } from "../../../config/paths.ts";
import { callAsMember, readAnswer } from "../../../lib/call-api.ts";

export function calculationQuery(id: string) {
  return queryOptions({
    queryKey: ["calculations", "record", id],
    // A record never changes.
    staleTime: Infinity,
    queryFn: async ({ signal }) => {
      const answer = await callAsMember({ method: "GET", path: apiPaths.calculation(id), signal });
      return readAnswer(calculationRecord, answer);
    },
  });
}

export function useCalculation(id: string) {
  return useQuery(calculationQuery(id));
}
