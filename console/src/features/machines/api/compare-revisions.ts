import { useQuery } from "@tanstack/react-query";
import { machineComparison } from "../../../../../shared/schemas/machines.ts";
import { apiPaths } from "../../../config/paths.ts";
import { callAsMember, readAnswer } from "../../../lib/call-api.ts";
import { machinesKey } from "./list-machines.ts";

/** Every place where two revisions of a machine differ; null asks nothing. */
export function useComparison(id: string, pair: { readonly from: string; readonly to: string } | null) {
  return useQuery({
    queryKey: [...machinesKey, "comparison", id, pair],
    enabled: pair !== null,
    staleTime: Infinity,
    queryFn: async ({ signal }) => {
      const path = `${apiPaths.machine(id)}/comparison?${new URLSearchParams({ ...pair }).toString()}`;
      return readAnswer(machineComparison, await callAsMember({ method: "GET", path, signal }));
    },
  });
}
