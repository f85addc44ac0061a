import type { WebhookEventType } from "../../../../../shared/schemas/webhooks.ts";

/** What each event tells, as whoever adds a webhook reads it. */
export const eventWords: Record<WebhookEventType, string> = {
  "calculation.stored": "A calculation was stored",
  "survey.computed": "A survey of a job was computed",
  "job.signed": "A job was signed",
  "key.expiring": "An API key ends in 14, 7 or 1 days",
};
