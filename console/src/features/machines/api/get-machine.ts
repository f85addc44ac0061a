import { queryOptions, useQuery } from "@tanstack/react-query";
import { machineRevisionSchema, machineSchema } from "../../../../../shared/schemas/machines.ts";
import { apiPaths } from "../../../config/paths.ts";
import { callAsMember, readAnswer } from "../../../lib/call-api.ts";
import { machinesKey } from "./list-machines.ts";

export function machineQuery(id: string) {
  return queryOptions({
    queryKey: [...machinesKey, "record", id],
    staleTime: 0,
    queryFn: async ({ signal }) => {
      const answer = await callAsMember({ method: "GET", path: apiPaths.machine(id), signal });
      return readAnswer(machineSchema, answer);
    },
  });
}

export function useMachine(id: string) {
  return useQuery({ ...machineQuery(id), enabled: id !== "" });
}

/** A revision as it stood; null asks nothing. It never changes. */
export function useMachineRevision(id: string, revision: string | null) {
  return useQuery({
    queryKey: [...machinesKey, "revision", id, revision],
    enabled: revision !== null,
    staleTime: Infinity,
    queryFn: async ({ signal }) => {
      const path = `${apiPaths.machine(id)}/revisions/${encodeURIComponent(revision ?? "")}`;
      return readAnswer(machineRevisionSchema, await callAsMember({ method: "GET", path, signal }));
    },
  });
}
