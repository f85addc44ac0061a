import { keepPreviousData, useQuery } from "@tanstack/react-query";
import { machineRevisionPage } from "../../../../../shared/schemas/machines.ts";
import { apiPaths } from "../../../config/paths.ts";
import { callAsMember, readAnswer } from "../../../lib/call-api.ts";
import { machinesKey } from "./list-machines.ts";

/** Who changed a machine, when and why, newest first. */
export function useMachineRevisions(id: string, cursor: string | null) {
  return useQuery({
    queryKey: [...machinesKey, "revisions", id, cursor],
    placeholderData: keepPreviousData,
    staleTime: 0,
    queryFn: async ({ signal }) => {
      const query = cursor === null ? "" : `?cursor=${encodeURIComponent(cursor)}`;
      const path = `${apiPaths.machine(id)}/revisions${query}`;
      return readAnswer(machineRevisionPage, await callAsMember({ method: "GET", path, signal }));
    },
  });
}
