import type { Deps } from "../deps.ts";
import type { WebhookDelivery } from "../models/webhook-delivery.ts";
import { inTransaction } from "../services/in-transaction.ts";
import { claimDue, SLOTS } from "./claim-due.ts";
import { attemptDelivery, testEvent } from "./deliver.ts";
import { recordOutcome } from "./record-outcome.ts";

/** How often it looks for what is due. */
const EVERY_MS = 1_000;
/** How long attempts under way may take to end when the service stops; those cut are made anew elsewhere. */
const STOP_MS = 5_000;

/** Sends what is due, a bounded number at a time. As many processes as like may run one each. */
export class DeliveryWorker {
  private readonly underWay = new Map<string, { row: WebhookDelivery; done: Promise<void> }>();
  private readonly cut = new AbortController();
  private timer: NodeJS.Timeout | null = null;
  private pass: Promise<number> | null = null;
  private stopped = false;

  constructor(private readonly deps: Deps) {}

  start(): void {
    this.timer = setInterval(() => void this.look(), EVERY_MS);
    this.timer.unref();
  }

  /** Takes no more, and waits for what is under way; cuts it when that takes too long. */
  async stop(): Promise<void> {
    this.stopped = true;
    if (this.timer) clearInterval(this.timer);
    await this.pass;
    const cut = setTimeout(() => this.cut.abort(), STOP_MS);
    await this.settled();
    clearTimeout(cut);
  }

  /** Sends everything that is due now and waits until it is through: what tests call instead of waiting. */
  async runDue(): Promise<number> {
    let sent = 0;
    for (let claimed = await this.look(); claimed > 0; claimed = await this.look()) {
      sent += claimed;
      await this.settled();
    }
    return sent;
  }

  private async settled(): Promise<void> {
    await Promise.all([...this.underWay.values()].map(({ done }) => done));
  }

  /** One pass at a time: whoever asks meanwhile gets the one that runs. */
  private look(): Promise<number> {
    this.pass ??= this.claim()
      .catch((error: unknown) => {
        this.deps.log.warn({ err: error }, "deliveries could not be claimed; it will be tried again");
        return 0;
      })
      .finally(() => {
        this.pass = null;
      });
    return this.pass;
  }

  private async claim(): Promise<number> {
    if (this.stopped || this.underWay.size >= SLOTS) return 0;
    const rows = await claimDue(
      this.deps,
      [...this.underWay.values()].map(({ row }) => row),
    );
    for (const row of rows) this.underWay.set(row.id, { row, done: this.deliver(row) });
    return rows.length;
  }

  private async deliver(row: WebhookDelivery): Promise<void> {
    try {
      await sendClaimed(this.deps, row, this.cut.signal);
    } catch (error) {
      // The lease frees it.
      this.deps.log.warn({ err: error, delivery: row.id }, "a delivery did not come to its end");
    } finally {
      this.underWay.delete(row.id);
      if (this.timer && !this.stopped) setImmediate(() => void this.look());
    }
  }
}

/** Makes one attempt at a delivery that is leased to this process, and keeps how it ended. */
export async function sendClaimed(deps: Deps, row: WebhookDelivery, stop: AbortSignal): Promise<void> {
  const { models } = deps.database;
  const endpoint = await models.webhookEndpoints.findOne({
    where: { id: row.endpointId, organisationId: row.organisationId },
  });
  if (!endpoint) {
    // Written while its endpoint was being removed.
    await row.destroy();
  } else if (!endpoint.active && row.type !== testEvent) {
    await pause(deps, row);
  } else {
    try {
      await recordOutcome(deps, row, endpoint, await attemptDelivery(deps, row, endpoint, stop));
    } catch (error) {
      if (!stop.aborted) throw error;
      await models.webhookDeliveries.update(
        { nextAttemptAt: deps.now(), leaseToken: null },
        { where: { id: row.id, leaseToken: row.leaseToken ?? "" } },
      );
    }
  }
}

/** Puts a delivery aside unless its endpoint was switched on again meanwhile, under the lock that switching it on takes. */
async function pause({ database }: Deps, { id, leaseToken }: WebhookDelivery): Promise<void> {
  await inTransaction(database.sequelize, (transaction) =>
    database.sequelize.query(
      `UPDATE webhook_deliveries d JOIN webhook_endpoints e ON e.id = d.endpointId
       SET d.state = 'paused', d.nextAttemptAt = NULL, d.leaseToken = NULL
       WHERE d.id = $id AND d.leaseToken = $leaseToken AND e.active = FALSE`,
      { bind: { id, leaseToken }, transaction },
    ),
  );
}
