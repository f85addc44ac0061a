import { Op, type Transaction } from "sequelize";
import type { Deps } from "../deps.ts";
import type { WebhookDelivery } from "../models/webhook-delivery.ts";
import type { WebhookEndpoint } from "../models/webhook-endpoint.ts";
import { inTransaction } from "../services/in-transaction.ts";
import { recordAudit } from "../services/record-audit.ts";
import { queueMailToAdmins } from "../mail/queue-mail.ts";
import { testEvent, type Outcome } from "./deliver.ts";
import { nextDelayMs } from "./retry-schedule.ts";

/** An endpoint that has failed for this long, without one delivery that arrived, is switched off. */
export const FAILING_MS = 5 * 24 * 60 * 60 * 1000;

/** Status by which a receiver says that it is gone for good. */
const GONE = 410;

type RecordDeps = Pick<Deps, "database" | "now" | "newId" | "listeners" | "random">;

/**
 * Keeps how an attempt ended, and what follows: delivered, tried again, given up, or the endpoint switched off and its
 * organisation's administrators told. Does nothing when the lease ran out and another process took the delivery over.
 */
export async function recordOutcome(
  deps: RecordDeps,
  delivery: WebhookDelivery,
  endpoint: WebhookEndpoint,
  outcome: Outcome,
): Promise<void> {
  const { models, sequelize } = deps.database;
  const isTest = delivery.type === testEvent;
  await inTransaction(sequelize, async (transaction) => {
    const attempt = delivery.attempts + 1;
    const [held] = await models.webhookDeliveries.update(
      { ...followUp(deps, delivery, outcome, isTest), attempts: attempt, leaseToken: null },
      { where: { id: delivery.id, leaseToken: delivery.leaseToken ?? "" }, transaction },
    );
    if (held === 0) return;
    const { at, status, durationMs, error, detail, replyText } = outcome;
    await models.webhookAttempts.create(
      {
        deliveryId: delivery.id,
        attempt,
        organisationId: delivery.organisationId,
        at,
        status,
        durationMs,
        error,
        detail,
        replyText,
      },
      { transaction },
    );
    if (!isTest) await noteHealth(deps, transaction, endpoint, outcome);
  });
  if (!outcome.delivered) deps.listeners.forget(endpoint.organisationId);
}

function followUp(deps: RecordDeps, { tries }: WebhookDelivery, outcome: Outcome, isTest: boolean) {
  const made = tries + 1;
  if (outcome.delivered) return { state: "delivered" as const, tries: made, nextAttemptAt: null };
  const delay = isTest ? null : nextDelayMs(made, outcome.retryAfterMs, deps.random());
  return delay === null
    ? { state: "failed" as const, tries: made, nextAttemptAt: null }
    : {
        state: "pending" as const,
        tries: made,
        nextAttemptAt: new Date(deps.now().getTime() + delay),
      };
}

async function noteHealth(
  deps: RecordDeps,
  transaction: Transaction,
  { id, organisationId, url, name, failingSince }: WebhookEndpoint,
  outcome: Outcome,
): Promise<void> {
  const { webhookEndpoints } = deps.database.models;
  // Silent and by `update` of the model, so that a version that somebody read still matches: they changed nothing.
  if (outcome.delivered) {
    if (failingSince)
      await webhookEndpoints.update({ failingSince: null }, { where: { id }, transaction, silent: true });
    return;
  }
  await webhookEndpoints.update(
    { failingSince: outcome.at },
    { where: { id, failingSince: null }, transaction, silent: true },
  );
  const now = deps.now();
  const gone = outcome.status === GONE;
  const failedLong = failingSince !== null && now.getTime() - failingSince.getTime() >= FAILING_MS;
  if (!gone && !failedLong) return;
  const row = await webhookEndpoints.findOne({
    where: { id, active: true, url: { [Op.eq]: url } },
    lock: transaction.LOCK.UPDATE,
    transaction,
  });
  if (!row) return;
  const stopReason = gone ? "gone" : "failing";
  await row.update({ active: false, stopReason, stoppedAt: now }, { transaction });
  await recordAudit(deps, transaction, {
    action: "webhook.stopped",
    subject: id,
    organisationId,
    by: null,
    requestId: null,
    details: { name, stopReason },
  });
  await queueMailToAdmins(deps, transaction, organisationId, {
    subject: `Webhook switched off: ${name}`,
    text: [
      gone
        ? `The webhook "${name}" answered 410: it is gone.`
        : `The webhook "${name}" has failed for five days.`,
      "It was switched off. What happens from now on is not told to it; what had come due waits.",
      "",
      `Address: ${url}`,
      "Switch it on again once it is sound: PATCH /v1/webhooks/{id} with active true, or in the console.",
    ].join("\n"),
  });
}
