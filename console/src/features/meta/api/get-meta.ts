import { queryOptions, useQuery } from "@tanstack/react-query";
import { metaSchema } from "../../../../../shared/schemas/meta.ts";
import { apiPaths } from "../../../config/paths.ts";
import { readAnswer } from "../../../lib/call-api.ts";
import { sendRequest } from "../../../lib/send-request.ts";

/** What of it the console shows. */
export const shownMeta = metaSchema.pick({ engineVersion: true, engineChangelog: true, cautions: true });

/** What the service says of itself, its cautions among it. Anyone may read it. */
export const metaQuery = queryOptions({
  queryKey: ["meta"],
  staleTime: 3_600_000,
  queryFn: async ({ signal }) =>
    readAnswer(shownMeta, await sendRequest({ method: "GET", path: apiPaths.meta, signal })),
});

export function useMeta() {
  return useQuery(metaQuery);
}
