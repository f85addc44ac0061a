import { z } from "zod";
import { limits } from "../limits.ts";
import { pageOf, pageQuery } from "./paging.ts";

/** What can be told. A test is not among them: it goes to one endpoint, when somebody asks for it. */
export const webhookEvents = ["calculation.stored", "survey.computed", "job.signed", "key.expiring"] as const;
export type WebhookEventType = (typeof webhookEvents)[number];

const eventSchema = z.enum(webhookEvents).meta({ id: "WebhookEvent" });
const nameSchema = z
  .string()
  .trim()
  .min(1)
  .max(limits.nameLength)
  .meta({ description: "What listens there." });
const urlSchema = z.string().trim().min(1).max(limits.webhookUrlLength).meta({
  description:
    "https, on the public network, port 443 or 8443 unless whoever runs the service allows others.",
});
const eventsSchema = z.array(eventSchema).min(1).max(webhookEvents.length);

export const createWebhookRequest = z
  .strictObject({ name: nameSchema, url: urlSchema, events: eventsSchema })
  .meta({ id: "CreateWebhookRequest" });

export const updateWebhookRequest = z
  .strictObject({
    name: nameSchema.optional(),
    url: urlSchema.optional(),
    events: eventsSchema.optional(),
    active: z.boolean().optional(),
  })
  .meta({ id: "UpdateWebhookRequest", description: "Send what is to change, with If-Match." });

export const rotateSecretRequest = z
  .strictObject({
    overlapHours: z.int().min(0).max(limits.secretOverlapHours).optional().meta({
      description:
        "How long the old secret signs beside the new one: 24 hours when absent, 0 ends it at once.",
    }),
  })
  .meta({ id: "RotateWebhookSecretRequest" });

export const webhookSchema = z
  .object({
    id: z.uuid(),
    name: z.string(),
    url: z.string(),
    events: z.array(eventSchema),
    active: z.boolean(),
    stopReason: z.enum(["gone", "failing"]).nullable().meta({
      description: "Why the service switched it off: it answered 410, or failed for five days.",
    }),
    stoppedAt: z.iso.datetime().nullable(),
    failingSince: z.iso.datetime().nullable().meta({
      description: "The first failure since a delivery last arrived.",
    }),
    previousSecretUntil: z.iso.datetime().nullable().meta({
      description: "Until then deliveries are signed with the replaced secret as well.",
    }),
    createdAt: z.iso.datetime(),
    version: z.number().int().meta({ description: "Also served as ETag." }),
  })
  .meta({ id: "Webhook" });

export const webhookWithSecret = webhookSchema
  .extend({
    secret: z.string().meta({ description: "whsec_…, by Standard Webhooks; shown this once." }),
  })
  .meta({ id: "WebhookWithSecret" });

const attemptSchema = z
  .object({
    attempt: z.number().int(),
    at: z.iso.datetime(),
    status: z.number().int().nullable().meta({ description: "null when no answer came." }),
    durationMs: z.number(),
    error: z.enum(["timeout", "target_refused", "connection_failed"]).nullable(),
    detail: z.string().nullable(),
    reply: z.string().nullable().meta({ description: "Up to 1 kB of the answer; of a test never." }),
  })
  .meta({ id: "WebhookAttempt" });

export const deliverySchema = z
  .object({
    id: z.uuid().meta({ description: "The webhook-id header: the same in every attempt." }),
    webhook: z.uuid(),
    type: z.string(),
    state: z.enum(["pending", "delivered", "failed", "paused"]).meta({
      description: "paused: its webhook is off, and it is sent when that is switched on again.",
    }),
    payload: z.record(z.string(), z.unknown()).meta({ description: "What is sent, as JSON." }),
    createdAt: z.iso.datetime(),
    nextAttemptAt: z.iso.datetime().nullable(),
    attempts: z.array(attemptSchema),
  })
  .meta({ id: "WebhookDelivery" });

export const listWebhooksQuery = z.strictObject(pageQuery);
export const webhookPage = pageOf("WebhookPage", webhookSchema);
export const listDeliveriesQuery = z.strictObject({
  ...pageQuery,
  state: z.enum(["pending", "delivered", "failed", "paused"]).optional(),
});
export const deliveryPage = pageOf("WebhookDeliveryPage", deliverySchema);

export type Webhook = z.infer<typeof webhookSchema>;
export type WebhookWithSecret = z.infer<typeof webhookWithSecret>;
export type Delivery = z.infer<typeof deliverySchema>;
