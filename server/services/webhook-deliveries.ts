import type { Transaction } from "sequelize";
import type { Deps } from "../deps.ts";
import { HttpProblem } from "../http/http-problem.ts";
import type { WebhookAttempt } from "../models/webhook-attempt.ts";
import type { WebhookDelivery } from "../models/webhook-delivery.ts";
import { LEASE_MS } from "../webhooks/claim-due.ts";
import { testEvent } from "../webhooks/deliver.ts";
import { sendClaimed } from "../webhooks/delivery-worker.ts";
import { newDelivery } from "../webhooks/events.ts";
import { findWebhook } from "./webhooks.ts";

interface DeliveryPlace {
  readonly organisationId: string;
  readonly endpointId: string;
  readonly id: string;
}

/** @throws HttpProblem not_found */
export async function findDelivery(
  deps: Deps,
  { organisationId, endpointId, id }: DeliveryPlace,
  transaction?: Transaction,
): Promise<WebhookDelivery> {
  const row = await deps.database.models.webhookDeliveries.findOne({
    where: { id, organisationId, endpointId },
    ...(transaction ? { transaction, lock: transaction.LOCK.UPDATE } : {}),
  });
  if (!row) throw new HttpProblem("not_found", "The webhook has no delivery with this id.");
  return row;
}

/** The attempts of deliveries, by delivery, in order. */
export async function readAttempts(
  { database }: Deps,
  organisationId: string,
  deliveries: readonly Pick<WebhookDelivery, "id">[],
  transaction?: Transaction,
): Promise<Map<string, WebhookAttempt[]>> {
  const rows =
    deliveries.length === 0
      ? []
      : await database.models.webhookAttempts.findAll({
          where: { organisationId, deliveryId: deliveries.map(({ id }) => id) },
          order: ["deliveryId", "attempt"],
          ...(transaction ? { transaction } : {}),
        });
  const byDelivery = new Map<string, WebhookAttempt[]>(deliveries.map(({ id }) => [id, []]));
  for (const row of rows) byDelivery.get(row.deliveryId)?.push(row);
  return byDelivery;
}

/**
 * Makes a delivery due again at once, from the start of the schedule and under its old id. One that is being sent
 * at this moment is left to it.
 * @throws HttpProblem not_found, webhook_inactive
 */
export async function redeliver(
  deps: Deps,
  transaction: Transaction,
  place: DeliveryPlace,
): Promise<WebhookDelivery> {
  const { organisationId, endpointId } = place;
  const endpoint = await findWebhook(deps, { id: endpointId, organisationId }, transaction);
  const row = await findDelivery(deps, place, transaction);
  if (!endpoint.active)
    throw new HttpProblem("webhook_inactive", "Nothing is sent while the webhook is off.");
  const now = deps.now();
  if (row.leaseToken && row.nextAttemptAt && row.nextAttemptAt > now) return row;
  return row.update({ state: "pending", tries: 0, nextAttemptAt: now, leaseToken: null }, { transaction });
}

/**
 * Sends a test now and once, and answers how it went. It is leased to this call, so that no worker sends it as well
 * unless this process dies over it.
 * @throws HttpProblem not_found
 */
export async function sendTest(
  deps: Deps,
  organisationId: string,
  endpointId: string,
): Promise<WebhookDelivery> {
  const { webhookDeliveries } = deps.database.models;
  await findWebhook(deps, { id: endpointId, organisationId });
  const made = newDelivery(deps, {
    organisationId,
    endpointId,
    type: testEvent,
    data: { webhookId: endpointId },
  });
  const row = await webhookDeliveries.create({
    ...made,
    leaseToken: deps.newId(),
    nextAttemptAt: new Date(deps.now().getTime() + LEASE_MS),
  });
  await sendClaimed(deps, row, new AbortController().signal);
  return row.reload();
}
