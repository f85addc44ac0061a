import type { Transaction } from "sequelize";
import type { WebhookEventType } from "../../shared/schemas/webhooks.ts";
import type { Database } from "../database.ts";
import { eventsOf } from "../models/webhook-endpoint.ts";
import { timeOfId } from "../services/ids.ts";

/** How long it may be believed where an organisation listens: a webhook made elsewhere is told from then on. */
const BELIEVED_MS = 1_000;
const CACHED_ORGANISATIONS = 10_000;

interface Listener {
  readonly id: string;
  readonly events: readonly WebhookEventType[];
}

/** Where each organisation listens, as read within the last second: an organisation without webhooks costs nothing. */
export class Listeners {
  private readonly known = new Map<string, { readonly readAt: number; readonly list: Promise<Listener[]> }>();

  constructor(private readonly database: Database) {}

  /** Active endpoints that want events of a type. Reads through `transaction` inside of one. */
  async of(organisationId: string, type: WebhookEventType, transaction?: Transaction): Promise<Listener[]> {
    const list = await this.believed(organisationId, transaction);
    return list.filter(({ events }) => events.includes(type));
  }

  /** Forgets an organisation in this process at once; other processes follow within a second. */
  forget(organisationId: string): void {
    this.known.delete(organisationId);
  }

  private believed(organisationId: string, transaction?: Transaction): Promise<Listener[]> {
    const at = performance.now();
    const known = this.known.get(organisationId);
    if (known && at - known.readAt < BELIEVED_MS) return known.list;
    if (this.known.size >= CACHED_ORGANISATIONS) this.known.clear();
    const list = this.read(organisationId, transaction);
    this.known.set(organisationId, { readAt: at, list });
    // A failed read is not an answer: the next one asks again.
    list.catch(() => this.known.delete(organisationId));
    return list;
  }

  private async read(organisationId: string, transaction?: Transaction): Promise<Listener[]> {
    const rows = await this.database.models.webhookEndpoints.findAll({
      where: { organisationId, active: true },
      attributes: ["id", "events"],
      ...(transaction ? { transaction } : {}),
    });
    return rows.map((row) => ({ id: row.id, events: eventsOf(row) }));
  }
}

/** What is told: ids, a kind, a state. Never a secret, never a reading. */
export interface WebhookEvent {
  readonly organisationId: string;
  readonly type: WebhookEventType;
  readonly data: Readonly<Record<string, string | number | null>>;
}

/** A delivery as it is first written, due at once. */
export interface NewDelivery {
  readonly id: string;
  readonly organisationId: string;
  readonly endpointId: string;
  readonly type: string;
  readonly payloadText: string;
  readonly state: "pending";
  readonly nextAttemptAt: Date;
  readonly createdAt: Date;
}

interface Telling {
  readonly database: Database;
  readonly listeners: Listeners;
  readonly now: () => Date;
  readonly newId: () => string;
}

/** The deliveries of an event, one to each endpoint that wants it; mostly none. */
export async function deliveriesOf(
  { listeners, now, newId }: Omit<Telling, "database">,
  { organisationId, type, data }: WebhookEvent,
  transaction?: Transaction,
): Promise<NewDelivery[]> {
  const endpoints = await listeners.of(organisationId, type, transaction);
  return endpoints.map(({ id }) =>
    newDelivery({ now, newId }, { organisationId, endpointId: id, type, data }),
  );
}

export function newDelivery(
  { now, newId }: Pick<Telling, "now" | "newId">,
  made: { organisationId: string; endpointId: string; type: string; data: WebhookEvent["data"] },
): NewDelivery {
  const { data, ...columns } = made;
  const id = newId();
  const at = now();
  const payloadText = JSON.stringify({ type: columns.type, timestamp: at.toISOString(), data });
  return { ...columns, id, payloadText, state: "pending", nextAttemptAt: at, createdAt: timeOfId(id) ?? at };
}

/** Writes what is to be told, in the transaction of what it tells of: both are kept, or neither. */
export async function tell(deps: Telling, transaction: Transaction, event: WebhookEvent): Promise<void> {
  const deliveries = await deliveriesOf(deps, event, transaction);
  if (deliveries.length > 0)
    await deps.database.models.webhookDeliveries.bulkCreate(deliveries, { transaction });
}
