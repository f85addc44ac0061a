import { keepPreviousData, useQuery } from "@tanstack/react-query";
import { webhookPage, webhookSchema } from "../../../../../shared/schemas/webhooks.ts";
import { apiPaths } from "../../../config/paths.ts";
import { callAsMember, readAnswer } from "../../../lib/call-api.ts";

export const webhooksKey = ["webhooks"] as const;

/** One page of the organisation's webhooks, newest first. */
export function useWebhooks(cursor: string | null) {
  return useQuery({
    queryKey: [...webhooksKey, "list", cursor],
    placeholderData: keepPreviousData,
    // The service switches off what fails, by itself.
    staleTime: 0,
    queryFn: async ({ signal }) => {
      const query = cursor === null ? "" : `?cursor=${encodeURIComponent(cursor)}`;
      const path = apiPaths.webhooks + query;
      return readAnswer(webhookPage, await callAsMember({ method: "GET", path, signal }));
    },
  });
}

export function useWebhook(id: string) {
  return useQuery({
    queryKey: [...webhooksKey, "one", id],
    staleTime: 0,
    queryFn: async ({ signal }) =>
      readAnswer(webhookSchema, await callAsMember({ method: "GET", path: apiPaths.webhook(id), signal })),
  });
}
