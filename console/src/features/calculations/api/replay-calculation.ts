import { useMutation } from "@tanstack/react-query";
import { replaySchema } from "../../../../../shared/schemas/calculations.ts";
import { apiPaths } from "../../../config/paths.ts";
import { callAsMember, readAnswer } from "../../../lib/call-api.ts";
import { useAttemptKey } from "../../../lib/use-attempt-key.ts";

/** Computes the stored request again and compares. Makes no record. */
export function useReplay(id: string) {
  const attempt = useAttemptKey();
  return useMutation({
    mutationFn: async () => {
      const path = apiPaths.replay(id);
      const answer = await callAsMember({ method: "POST", path, idempotencyKey: attempt.keyFor(path) });
      return readAnswer(replaySchema, answer);
    },
    onSettled: (_, error) => attempt.settle(error ?? undefined),
  });
}
