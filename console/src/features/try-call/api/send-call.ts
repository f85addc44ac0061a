import { useMutation, useQueryClient } from "@tanstack/react-query";
import { callAsMember } from "../../../lib/call-api.ts";
import { useAttemptKey } from "../../../lib/use-attempt-key.ts";

export interface TriedCall {
  readonly path: string;
  readonly bodyText: string;
  /** The parsed body, for the figure beside the answer. */
  readonly request: unknown;
}

/** Sends a call exactly as it is written. */
export function useSendCall() {
  const attempt = useAttemptKey();
  const queryClient = useQueryClient();
  return useMutation({
    mutationFn: async ({ path, bodyText }: TriedCall) => {
      const begun = performance.now();
      const idempotencyKey = attempt.keyFor(`${path}\n${bodyText}`);
      const answer = await callAsMember({ method: "POST", path, bodyText, idempotencyKey });
      return { ...answer, tookMs: performance.now() - begun };
    },
    onSettled: async (_, error) => {
      attempt.settle(error ?? undefined);
      await queryClient.invalidateQueries({ queryKey: ["calculations", "list"] });
    },
  });
}
