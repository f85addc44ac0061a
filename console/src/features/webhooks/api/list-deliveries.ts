import { keepPreviousData, useQuery } from "@tanstack/react-query";
import { deliveryPage } from "../../../../../shared/schemas/webhooks.ts";
import { apiPaths } from "../../../config/paths.ts";
import { callAsMember, readAnswer } from "../../../lib/call-api.ts";
import { webhooksKey } from "./list-webhooks.ts";

/** One page of what was sent to a webhook and what waits, newest first. */
export function useDeliveries(id: string, cursor: string | null) {
  return useQuery({
    queryKey: [...webhooksKey, "deliveries", id, cursor],
    placeholderData: keepPreviousData,
    staleTime: 0,
    queryFn: async ({ signal }) => {
      const query = cursor === null ? "" : `?cursor=${encodeURIComponent(cursor)}`;
      const path = apiPaths.deliveries(id) + query;
      return readAnswer(deliveryPage, await callAsMember({ method: "GET", path, signal }));
    },
  });
}
