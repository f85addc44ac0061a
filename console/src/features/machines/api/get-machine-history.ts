import { useQuery } from "@tanstack/react-query";
import { machineHistory } from "../../../../../shared/schemas/machine-history.ts";
import { apiPaths } from "../../../config/paths.ts";
import { callAsMember, readAnswer } from "../../../lib/call-api.ts";
import { machinesKey } from "./list-machines.ts";

/** Every station of a machine over its jobs. */
export function useMachineHistory(id: string) {
  return useQuery({
    queryKey: [...machinesKey, "history", id],
    staleTime: 0,
    queryFn: async ({ signal }) => {
      const path = `${apiPaths.machine(id)}/history`;
      return readAnswer(machineHistory, await callAsMember({ method: "GET", path, signal }));
    },
  });
}
