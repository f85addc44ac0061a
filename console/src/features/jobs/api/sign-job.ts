import { useMutation, useQueryClient } from "@tanstack/react-query";
import type { z } from "zod";
import { jobRecord, type signatureRequest } from "../../../../../shared/schemas/jobs.ts";
import { apiPaths } from "../../../config/paths.ts";
import { callAsMember, readAnswer } from "../../../lib/call-api.ts";
import { jobsKey } from "./list-jobs.ts";

/**
 * Signs a job. The password is read when it is sent and kept nowhere: not as a variable of the mutation, and under no
 * Idempotency-Key, which would keep the body to compare with. Signing twice cannot happen: a signed job refuses it.
 */
export function useSignJob(id: string, read: () => z.infer<typeof signatureRequest>) {
  const queryClient = useQueryClient();
  return useMutation({
    gcTime: 0,
    mutationFn: async () => {
      const path = `${apiPaths.job(id)}/signature`;
      const answer = await callAsMember({ method: "POST", path, bodyText: JSON.stringify(read()) });
      return readAnswer(jobRecord, answer);
    },
    onSettled: () => queryClient.invalidateQueries({ queryKey: jobsKey }),
  });
}
