import { useMutation, useQueryClient } from "@tanstack/react-query";
import { useRef } from "react";
import { callAsMember } from "../../../lib/call-api.ts";
import { CancelledError } from "../../../lib/service-error.ts";
import { useAttemptKey } from "../../../lib/use-attempt-key.ts";

export interface TriedCall {
  readonly path: string;
  readonly bodyText: string;
  /** The parsed body, for the figure beside the answer. */
  readonly request: unknown;
}

/** Sends a call exactly as it is written. A long one can be cancelled. */
export function useSendCall() {
  const controller = useRef<AbortController | null>(null);
  const attempt = useAttemptKey();
  const queryClient = useQueryClient();
  const mutation = useMutation({
    mutationFn: async ({ path, bodyText }: TriedCall) => {
      controller.current = new AbortController();
      const { signal } = controller.current;
      const begun = performance.now();
      const idempotencyKey = attempt.keyFor(`${path}\n${bodyText}`);
      try {
        const answer = await callAsMember({ method: "POST", path, bodyText, idempotencyKey, signal });
        return { ...answer, tookMs: performance.now() - begun };
      } catch (error) {
        throw signal.aborted ? new CancelledError() : error;
      }
    },
    onSettled: async (_, error) => {
      attempt.settle(error ?? undefined);
      await queryClient.invalidateQueries({ queryKey: ["calculations", "list"] });
    },
  });
  return { ...mutation, cancel: () => controller.current?.abort() };
}
