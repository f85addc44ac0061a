import { useMutation, useQueryClient } from "@tanstack/react-query";
import type { z } from "zod";
import {
  deliverySchema,
  webhookSchema,
  webhookWithSecret,
  type createWebhookRequest,
  type Webhook,
} from "../../../../../shared/schemas/webhooks.ts";
import { apiPaths } from "../../../config/paths.ts";
import { callAsMember, readAnswer } from "../../../lib/call-api.ts";
import { useAttemptKey } from "../../../lib/use-attempt-key.ts";
import { webhooksKey } from "./list-webhooks.ts";

export type WebhookOrder = z.infer<typeof createWebhookRequest>;

/** A POST that is sent again under the same Idempotency-Key while its answer is out, and reads the lists anew. */
function usePost<Order, Schema extends z.ZodType>(
  schema: Schema,
  sent: (order: Order) => { path: string; bodyText?: string },
) {
  const attempt = useAttemptKey();
  const queryClient = useQueryClient();
  return useMutation({
    // An answer may hold a secret: it is never kept.
    gcTime: 0,
    mutationFn: async (order: Order) => {
      const call = sent(order);
      const idempotencyKey = attempt.keyFor(`${call.path} ${call.bodyText ?? ""}`);
      return readAnswer(schema, await callAsMember({ method: "POST", ...call, idempotencyKey }));
    },
    onSettled: async (_, error) => {
      attempt.settle(error ?? undefined);
      await queryClient.invalidateQueries({ queryKey: webhooksKey });
    },
  });
}

export function useCreateWebhook() {
  return usePost(webhookWithSecret, (order: WebhookOrder) => ({
    path: apiPaths.webhooks,
    bodyText: JSON.stringify(order),
  }));
}

export function useReplaceSecret(id: string) {
  return usePost(webhookWithSecret, (overlapHours: number) => ({
    path: apiPaths.webhookSecret(id),
    bodyText: JSON.stringify({ overlapHours }),
  }));
}

export function useSendTest(id: string) {
  return usePost(deliverySchema, () => ({ path: apiPaths.testWebhook(id) }));
}

export function useRedeliver(id: string) {
  return usePost(deliverySchema, (delivery: string) => ({ path: apiPaths.redelivery(id, delivery) }));
}

export function useSwitchWebhook() {
  const queryClient = useQueryClient();
  return useMutation({
    mutationFn: async ({ id, version, active }: Pick<Webhook, "id" | "version" | "active">) => {
      const bodyText = JSON.stringify({ active: !active });
      const call = {
        method: "PATCH",
        path: apiPaths.webhook(id),
        ifMatch: `"${version}"`,
        bodyText,
      } as const;
      return readAnswer(webhookSchema, await callAsMember(call));
    },
    onSettled: () => queryClient.invalidateQueries({ queryKey: webhooksKey }),
  });
}

export function useRemoveWebhook() {
  const queryClient = useQueryClient();
  return useMutation({
    mutationFn: (id: string) => callAsMember({ method: "DELETE", path: apiPaths.webhook(id) }),
    onSuccess: (_, id) => {
      queryClient.removeQueries({ queryKey: [...webhooksKey, "one", id] });
      queryClient.removeQueries({ queryKey: [...webhooksKey, "deliveries", id] });
      return queryClient.invalidateQueries({ queryKey: [...webhooksKey, "list"] });
    },
  });
}
