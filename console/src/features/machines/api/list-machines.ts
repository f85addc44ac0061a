import { keepPreviousData, queryOptions, useQuery } from "@tanstack/react-query";
import { machinePage } from "../../../../../shared/schemas/machines.ts";
import { apiPaths } from "../../../config/paths.ts";
import { callAsMember, readAnswer } from "../../../lib/call-api.ts";

export const machinesKey = ["machines"] as const;
/** What may stand in the address of the list. */
export const machineFilterNames = ["archived", "q"] as const;

function machinesQuery(query: URLSearchParams) {
  return queryOptions({
    queryKey: [...machinesKey, "list", query.toString()],
    placeholderData: keepPreviousData,
    staleTime: 0,
    queryFn: async ({ signal }) => {
      const path = `${apiPaths.machines}?${query.toString()}`;
      return readAnswer(machinePage, await callAsMember({ method: "GET", path, signal }));
    },
  });
}

export function useMachines(search: URLSearchParams) {
  const query = new URLSearchParams({ limit: "25" });
  for (const name of [...machineFilterNames, "cursor"]) {
    const value = search.get(name)?.trim();
    if (value) query.set(name, value);
  }
  return useQuery(machinesQuery(query));
}

/** Machines to choose from: as many as one page of the service holds. */
export function useMachineChoices() {
  return useQuery(machinesQuery(new URLSearchParams({ limit: "200" })));
}
