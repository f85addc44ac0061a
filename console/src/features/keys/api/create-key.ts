import { useMutation, useQueryClient } from "@tanstack/react-query";
import type { z } from "zod";
import { createdKeySchema, type createKeyRequest } from "../../../../../shared/schemas/keys.ts";
import { apiPaths } from "../../../config/paths.ts";
import { callAsMember, readAnswer } from "../../../lib/call-api.ts";
import { useAttemptKey } from "../../../lib/use-attempt-key.ts";
import { keysKey } from "./list-keys.ts";

export type KeyOrder = z.infer<typeof createKeyRequest>;

/** Issues a key. Its secret is in this answer and nowhere else, so the answer is never cached. */
export function useCreateKey() {
  const attempt = useAttemptKey();
  const queryClient = useQueryClient();
  return useMutation({
    gcTime: 0,
    mutationFn: async (order: KeyOrder) => {
      const bodyText = JSON.stringify(order);
      const idempotencyKey = attempt.keyFor(bodyText);
      const answer = await callAsMember({ method: "POST", path: apiPaths.keys, bodyText, idempotencyKey });
      return readAnswer(createdKeySchema, answer);
    },
    onSettled: async (_, error) => {
      attempt.settle(error ?? undefined);
      await queryClient.invalidateQueries({ queryKey: keysKey });
    },
  });
}
