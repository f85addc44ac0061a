import { keepPreviousData, useQuery } from "@tanstack/react-query";
import { outboxPage } from "../../../../../shared/schemas/outbox.ts";
import { apiPaths } from "../../../config/paths.ts";
import { callAsMember, readAnswer } from "../../../lib/call-api.ts";

/** One page of the mail that the service kept for want of a mail server, newest first. */
export function useOutbox(cursor: string | null) {
  return useQuery({
    queryKey: ["outbox", cursor],
    placeholderData: keepPreviousData,
    staleTime: 0,
    queryFn: async ({ signal }) => {
      const query = cursor === null ? "" : `?cursor=${encodeURIComponent(cursor)}`;
      const path = apiPaths.outbox + query;
      return readAnswer(outboxPage, await callAsMember({ method: "GET", path, signal }));
    },
  });
}
