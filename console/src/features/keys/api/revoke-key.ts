import { useMutation, useQueryClient } from "@tanstack/react-query";
import { keySchema } from "../../../../../shared/schemas/keys.ts";
import { apiPaths } from "../../../config/paths.ts";
import { callAsMember, readAnswer } from "../../../lib/call-api.ts";
import { useAttemptKey } from "../../../lib/use-attempt-key.ts";
import { keysKey } from "./list-keys.ts";

/** Revokes a key at once and everywhere. */
export function useRevokeKey() {
  const attempt = useAttemptKey();
  const queryClient = useQueryClient();
  return useMutation({
    mutationFn: async (id: string) => {
      const path = apiPaths.revokeKey(id);
      const answer = await callAsMember({ method: "POST", path, idempotencyKey: attempt.keyFor(path) });
      return readAnswer(keySchema, answer);
    },
    onSettled: async (_, error) => {
      attempt.settle(error ?? undefined);
      await queryClient.invalidateQueries({ queryKey: keysKey });
    },
  });
}
