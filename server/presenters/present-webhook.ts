import type { Delivery, Webhook } from "../../shared/schemas/webhooks.ts";
import type { WebhookAttempt } from "../models/webhook-attempt.ts";
import type { WebhookDelivery } from "../models/webhook-delivery.ts";
import { eventsOf, type WebhookEndpoint } from "../models/webhook-endpoint.ts";
import { isoTime, isoTimeOrNull } from "./time.ts";

/** A webhook as it may be shown: never its secret. */
export function presentWebhook(row: WebhookEndpoint, now: Date): Webhook {
  const { previousSecretUntil } = row;
  return {
    id: row.id,
    name: row.name,
    url: row.url,
    events: eventsOf(row),
    active: row.active,
    stopReason: row.stopReason ?? null,
    stoppedAt: isoTimeOrNull(row.stoppedAt),
    failingSince: isoTimeOrNull(row.failingSince),
    previousSecretUntil:
      previousSecretUntil && previousSecretUntil > now ? isoTime(previousSecretUntil) : null,
    createdAt: isoTime(row.createdAt),
    version: row.version,
  };
}

export function presentDelivery(row: WebhookDelivery, attempts: readonly WebhookAttempt[] = []): Delivery {
  return {
    id: row.id,
    webhook: row.endpointId,
    type: row.type,
    state: row.state,
    payload: JSON.parse(row.payloadText) as Delivery["payload"],
    createdAt: isoTime(row.createdAt),
    nextAttemptAt: isoTimeOrNull(row.nextAttemptAt),
    attempts: attempts.map(({ attempt, at, status, durationMs, error, detail, replyText }) => ({
      attempt,
      at: isoTime(at),
      status,
      durationMs,
      error,
      detail,
      reply: replyText,
    })),
  };
}
