import { keepPreviousData, queryOptions, useQuery } from "@tanstack/react-query";
import { calculationPage } from "../../../../../shared/schemas/calculations.ts";
import { apiPaths } from "../../../config/paths.ts";
import { callAsMember, readAnswer } from "../../../lib/call-api.ts";
import { startOfDay } from "../../../lib/write-instant.ts";

/** What may stand in the address of the list. Days are the reader's own; the service is asked for instants. */
export const filterNames = ["kind", "status", "keyId", "from", "to", "q"] as const;
const pageSize = "25";

export function calculationsQuery(search: URLSearchParams) {
  const query = queryFor(search);
  return queryOptions({
    queryKey: ["calculations", "list", query],
    placeholderData: keepPreviousData,
    // Whoever comes back to the list wants what was computed meanwhile.
    staleTime: 0,
    queryFn: async ({ signal }) => {
      const path = `${apiPaths.calculations}?${query}`;
      return readAnswer(calculationPage, await callAsMember({ method: "GET", path, signal }));
    },
  });
}

export function useCalculations(search: URLSearchParams) {
  return useQuery(calculationsQuery(search));
}

/** The service's query for the page's address. */
export function queryFor(search: URLSearchParams): string {
  const query = new URLSearchParams();
  for (const name of ["kind", "status", "keyId", "q", "cursor"]) {
    const value = search.get(name)?.trim();
    if (value) query.set(name, value);
  }
  const from = startOfDay(search.get("from") ?? "");
  // The last day is included: everything before the day after it.
  const to = startOfDay(search.get("to") ?? "", 1);
  if (from) query.set("from", from.toISOString());
  if (to) query.set("to", to.toISOString());
  query.set("limit", pageSize);
  return query.toString();
}
