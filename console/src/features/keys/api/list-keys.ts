import { keepPreviousData, queryOptions, useQuery } from "@tanstack/react-query";
import { keyPage } from "../../../../../shared/schemas/keys.ts";
import { apiPaths } from "../../../config/paths.ts";
import { callAsMember, readAnswer } from "../../../lib/call-api.ts";

export const keysKey = ["keys"] as const;

export function keysQuery(cursor: string | null) {
  return queryOptions({
    queryKey: [...keysKey, cursor],
    placeholderData: keepPreviousData,
    // Keys are issued and revoked elsewhere too.
    staleTime: 0,
    queryFn: async ({ signal }) => {
      const query = cursor === null ? "" : `?cursor=${encodeURIComponent(cursor)}`;
      return readAnswer(keyPage, await callAsMember({ method: "GET", path: apiPaths.keys + query, signal }));
    },
  });
}

/** One page of the organisation's keys, newest first. */
export function useKeys(cursor: string | null) {
  return useQuery(keysQuery(cursor));
}

/** Names to filter by; nothing while they are not read, or for a role that may not read them. */
export function useKeyNames(mayRead: boolean): { id: string; name: string }[] {
  const keys = useQuery({ ...keysQuery(null), enabled: mayRead });
  return (keys.data?.data ?? []).map(({ id, name }) => ({ id, name }));
}
