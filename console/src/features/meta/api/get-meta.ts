import { queryOptions, useQuery } from "@tanstack/react-query";
import { metaSchema } from "../../../../../shared/schemas/meta.ts";
import { apiPaths } from "../../../config/paths.ts";
import { readAnswer } from "../../../lib/call-api.ts";
import { sendRequest } from "../../../lib/send-request.ts";

/** What the service says of itself, its cautions among it. Anyone may read it. */
export const metaQuery = queryOptions({
  queryKey: ["meta"],
  staleTime: 3_600_000,
  queryFn: async ({ signal }) =>
    readAnswer(metaSchema, await sendRequest({ method: "GET", path: apiPaths.meta, signal })),
});

export function useMeta() {
  return useQuery(metaQuery);
}
