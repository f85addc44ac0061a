import { Op } from "sequelize";
import type { Deps } from "../deps.ts";
import type { WebhookDelivery } from "../models/webhook-delivery.ts";
import { inTransaction } from "../services/in-transaction.ts";

/** How long a process may hold a delivery. Longer than an attempt takes: a process that dies frees it by this. */
export const LEASE_MS = 60_000;

/** At once, in one process: of all, of one organisation, of one endpoint, so that one that hangs keeps nobody waiting. */
export const SLOTS = 24;
const SLOTS_PER_ORGANISATION = 6;
const SLOTS_PER_ENDPOINT = 2;
/** Due rows looked at to fill the slots. */
const LOOKED_AT = 100;

export interface Place {
  readonly id: string;
  readonly organisationId: string;
  readonly endpointId: string;
}

/** Which of the due deliveries to take, oldest first, beside those that are under way. */
export function chooseDue<Row extends Place>(due: readonly Row[], underWay: readonly Place[]): Row[] {
  const taken: Place[] = [...underWay];
  return due.filter((row) => {
    const free =
      taken.length < SLOTS &&
      count(taken, "organisationId", row) < SLOTS_PER_ORGANISATION &&
      count(taken, "endpointId", row) < SLOTS_PER_ENDPOINT;
    if (free) taken.push(row);
    return free;
  });
}

function count(taken: readonly Place[], by: "organisationId" | "endpointId", row: Place): number {
  return taken.filter((place) => place[by] === row[by]).length;
}

function full(underWay: readonly Place[], by: "organisationId" | "endpointId", slots: number): string[] {
  const found = new Set(underWay.filter((row) => count(underWay, by, row) >= slots).map((row) => row[by]));
  return [...found];
}

/**
 * Leases due deliveries to this process. Several processes may ask at once: each row goes to one of them. Reads by an
 * index that holds nothing but what waits, so that asking in vain costs next to nothing.
 */
export async function claimDue(
  deps: Pick<Deps, "database" | "now" | "newId">,
  underWay: readonly Place[],
): Promise<WebhookDelivery[]> {
  const { webhookDeliveries } = deps.database.models;
  const now = deps.now();
  const due = { state: "pending" as const, nextAttemptAt: { [Op.lte]: now } };
  const endpoints = full(underWay, "endpointId", SLOTS_PER_ENDPOINT);
  const organisations = full(underWay, "organisationId", SLOTS_PER_ORGANISATION);
  const rows = await webhookDeliveries.findAll({
    where: {
      ...due,
      ...(endpoints.length > 0 ? { endpointId: { [Op.notIn]: endpoints } } : {}),
      ...(organisations.length > 0 ? { organisationId: { [Op.notIn]: organisations } } : {}),
    },
    attributes: ["id", "organisationId", "endpointId"],
    order: ["nextAttemptAt"],
    limit: LOOKED_AT,
  });
  const id = chooseDue(rows, underWay).map((row) => row.id);
  if (id.length === 0) return [];
  const leaseToken = deps.newId();
  const leaseUntil = new Date(now.getTime() + LEASE_MS);
  return inTransaction(deps.database.sequelize, async (transaction) => {
    await webhookDeliveries.update(
      { leaseToken, nextAttemptAt: leaseUntil },
      { where: { ...due, id }, transaction },
    );
    return webhookDeliveries.findAll({ where: { id, leaseToken }, transaction });
  });
}
