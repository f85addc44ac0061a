import type { Transaction } from "sequelize";
import type { z } from "zod";
import { limits } from "../../shared/limits.ts";
import type { createWebhookRequest, updateWebhookRequest } from "../../shared/schemas/webhooks.ts";
import type { Deps } from "../deps.ts";
import { HttpProblem, problemOfFaults } from "../http/http-problem.ts";
import { eventsOf, type WebhookEndpoint } from "../models/webhook-endpoint.ts";
import { checkTarget, TargetRefused } from "../webhooks/check-target.ts";
import { makeSigningSecret } from "../webhooks/sign-message.ts";
import type { By } from "./author.ts";
import { inTransaction } from "./in-transaction.ts";
import { refuseStale } from "./machines.ts";
import { recordAudit, type AuditAction } from "./record-audit.ts";

const HOUR_MS = 60 * 60 * 1000;
const DEFAULT_OVERLAP_HOURS = 24;
/** What had waited for a webhook comes out over this time, not all at once. */
const SPREAD_SECONDS = 60;

/** @throws HttpProblem not_found, alike for an id that never was and for another organisation's */
export async function findWebhook(
  deps: Deps,
  { id, organisationId }: { readonly id: string; readonly organisationId: string },
  transaction?: Transaction,
): Promise<WebhookEndpoint> {
  const row = await deps.database.models.webhookEndpoints.findOne({
    where: { id, organisationId },
    ...(transaction ? { transaction, lock: transaction.LOCK.UPDATE } : {}),
  });
  if (!row) throw new HttpProblem("not_found", "There is no webhook with this id.");
  return row;
}

/**
 * Makes a webhook and returns it with the signing secret to show once.
 * @throws HttpProblem webhook_target_refused with the reason, webhook_limit_reached
 */
export async function createWebhook(
  deps: Deps,
  { name, url, events }: z.infer<typeof createWebhookRequest>,
  by: By,
): Promise<{ row: WebhookEndpoint; secret: string }> {
  await refuseTarget(deps, url);
  const organisationId = by.caller.organisation.id;
  const { models, sequelize } = deps.database;
  const id = deps.newId();
  const secret = makeSigningSecret();
  const row = await inTransaction(sequelize, async (transaction) => {
    // Held while they are counted, so that two calls at once cannot both be the last.
    await models.organisations.findByPk(organisationId, { lock: transaction.LOCK.UPDATE, transaction });
    const standing = await models.webhookEndpoints.count({ where: { organisationId }, transaction });
    if (standing >= limits.webhooksPerOrganisation) {
      throw new HttpProblem(
        "webhook_limit_reached",
        `An organisation has at most ${limits.webhooksPerOrganisation} webhooks.`,
        { limit: limits.webhooksPerOrganisation },
      );
    }
    const made = await models.webhookEndpoints.create(
      {
        id,
        organisationId,
        name,
        url,
        events: [...new Set(events)].join(" "),
        active: true,
        secretSealed: deps.secrets.seal("webhook", id, secret),
        createdAt: deps.now(),
      },
      { transaction },
    );
    await audit(deps, transaction, "webhook.created", made, by, { name, url, events });
    await by.claim?.settle({ status: 201, resourceId: id }, transaction);
    return made;
  });
  by.claim?.markSettled();
  deps.listeners.forget(organisationId);
  return { row, secret };
}

/**
 * Changes a webhook where it still is at the version the caller read. Switched on again, it is sent what had waited.
 * @throws HttpProblem not_found, version_stale, webhook_target_refused
 */
export async function updateWebhook(
  deps: Deps,
  { id, version }: { readonly id: string; readonly version: number },
  change: z.infer<typeof updateWebhookRequest>,
  by: Omit<By, "claim">,
): Promise<WebhookEndpoint> {
  const organisationId = by.caller.organisation.id;
  refuseStale("webhook", (await findWebhook(deps, { id, organisationId })).version, version);
  if (change.url !== undefined) await refuseTarget(deps, change.url);
  const row = await inTransaction(deps.database.sequelize, async (transaction) => {
    const endpoint = await findWebhook(deps, { id, organisationId }, transaction);
    refuseStale("webhook", endpoint.version, version);
    const { name, url, events, active } = change;
    const before = {
      name: endpoint.name,
      url: endpoint.url,
      events: eventsOf(endpoint),
      active: endpoint.active,
    };
    const starts = active === true && !endpoint.active;
    await endpoint.update(
      {
        ...(name === undefined ? {} : { name }),
        ...(url === undefined ? {} : { url, failingSince: null }),
        ...(events === undefined ? {} : { events: [...new Set(events)].join(" ") }),
        ...(active === undefined ? {} : { active }),
        ...(starts ? { stopReason: null, stoppedAt: null, failingSince: null } : {}),
      },
      { transaction },
    );
    if (starts) await resumeDeliveries(deps, transaction, endpoint);
    await audit(deps, transaction, "webhook.changed", endpoint, by, { before, change });
    return endpoint;
  });
  deps.listeners.forget(organisationId);
  return row;
}

/**
 * Replaces the signing secret. The old one signs beside it until its time is over, so that a receiver can change over
 * without missing anything.
 * @throws HttpProblem not_found
 */
export async function rotateSecret(
  deps: Deps,
  id: string,
  overlapHours: number | undefined,
  by: By,
): Promise<{ row: WebhookEndpoint; secret: string }> {
  const organisationId = by.caller.organisation.id;
  const secret = makeSigningSecret();
  const row = await inTransaction(deps.database.sequelize, async (transaction) => {
    const endpoint = await findWebhook(deps, { id, organisationId }, transaction);
    const hours = overlapHours ?? DEFAULT_OVERLAP_HOURS;
    const until = hours === 0 ? null : new Date(deps.now().getTime() + hours * HOUR_MS);
    await endpoint.update(
      {
        secretSealed: deps.secrets.seal("webhook", id, secret),
        previousSecretSealed: until ? endpoint.secretSealed : null,
        previousSecretUntil: until,
      },
      { transaction },
    );
    await audit(deps, transaction, "webhook.secret_replaced", endpoint, by, { overlapHours: hours });
    await by.claim?.settle({ status: 201, resourceId: id }, transaction);
    return endpoint;
  });
  by.claim?.markSettled();
  return { row, secret };
}

/** Takes a webhook away with its log. What is being sent at this moment still arrives. @throws HttpProblem not_found */
export async function removeWebhook(deps: Deps, id: string, by: Omit<By, "claim">): Promise<void> {
  const organisationId = by.caller.organisation.id;
  const { models, sequelize } = deps.database;
  await inTransaction(sequelize, async (transaction) => {
    const endpoint = await findWebhook(deps, { id, organisationId }, transaction);
    await models.webhookDeliveries.destroy({ where: { organisationId, endpointId: id }, transaction });
    await endpoint.destroy({ transaction });
    await audit(deps, transaction, "webhook.removed", endpoint, by, {
      name: endpoint.name,
      url: endpoint.url,
    });
  });
  deps.listeners.forget(organisationId);
}

async function refuseTarget(deps: Deps, url: string): Promise<void> {
  try {
    await checkTarget(url, deps.config, deps.resolveHost);
  } catch (error) {
    if (!(error instanceof TargetRefused)) throw error;
    throw problemOfFaults([{ pointer: "/url", code: "webhook_target_refused", detail: error.message }]);
  }
}

async function resumeDeliveries(
  { database, now }: Deps,
  transaction: Transaction,
  { id, organisationId }: WebhookEndpoint,
): Promise<void> {
  await database.sequelize.query(
    `UPDATE webhook_deliveries
     SET state = 'pending', nextAttemptAt = TIMESTAMPADD(SECOND, FLOOR(RAND() * ${SPREAD_SECONDS}), $now)
     WHERE organisationId = $organisationId AND endpointId = $id AND state = 'paused'`,
    { bind: { id, organisationId, now: now() }, transaction },
  );
}

async function audit(
  deps: Deps,
  transaction: Transaction,
  action: AuditAction,
  { id, organisationId }: WebhookEndpoint,
  { caller, requestId }: Omit<By, "claim">,
  details: Record<string, unknown>,
): Promise<void> {
  const subject = id;
  await recordAudit(deps, transaction, { action, subject, organisationId, by: caller, requestId, details });
}
