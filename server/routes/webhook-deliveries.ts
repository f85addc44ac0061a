import { deliveryPage, deliverySchema, listDeliveriesQuery } from "../../shared/schemas/webhooks.ts";
import { callerOf, defineOperation, reply, type Call } from "../http/operation.ts";
import { presentDelivery } from "../presenters/present-webhook.ts";
import { changeOnce } from "../services/change-once.ts";
import { readPage } from "../services/read-page.ts";
import { findDelivery, readAttempts, redeliver, sendTest } from "../services/webhook-deliveries.ts";
import { findWebhook } from "../services/webhooks.ts";

const tag = "Webhooks";

const testWebhook = defineOperation({
  operationId: "testWebhook",
  method: "post",
  path: "/v1/webhooks/{id}/test",
  tag,
  summary: "Send a test",
  description:
    "One `webhook.test`, signed like any other, sent now and once; the answer says how it went within 15 seconds, by status and time alone.",
  response: { status: 201, description: "The delivery and its one attempt.", schema: deliverySchema },
  errors: [],
  handle: async (call) => {
    const organisationId = callerOf(call).organisation.id;
    const row = await sendTest(call.deps, organisationId, call.params.id ?? "");
    const attempts = await readAttempts(call.deps, organisationId, [row]);
    return reply(201, presentDelivery(row, attempts.get(row.id)));
  },
});

const listWebhookDeliveries = defineOperation({
  operationId: "listWebhookDeliveries",
  method: "get",
  path: "/v1/webhooks/{id}/deliveries",
  tag,
  summary: "List deliveries",
  description: "What was sent and what waits, newest first, with every attempt. Kept for 30 days.",
  query: listDeliveriesQuery,
  response: { status: 200, description: "One page.", schema: deliveryPage },
  errors: ["invalid_cursor"],
  handle: async (call) => {
    const { deps, query } = call;
    const { endpointId, organisationId } = placeOf(call);
    await findWebhook(deps, { id: endpointId, organisationId });
    const { state } = query;
    const filters = { endpointId, state: state ?? null };
    const page = await readPage(
      deps,
      deps.database.models.webhookDeliveries,
      { list: "webhook-deliveries", organisationId, filters },
      query,
      { where: { endpointId, ...(state === undefined ? {} : { state }) } },
    );
    const attempts = await readAttempts(deps, organisationId, page.rows);
    const data = page.rows.map((row) => presentDelivery(row, attempts.get(row.id)));
    return reply(200, { data, nextCursor: page.nextCursor, limit: page.limit });
  },
});

const readWebhookDelivery = defineOperation({
  operationId: "readWebhookDelivery",
  method: "get",
  path: "/v1/webhooks/{id}/deliveries/{delivery}",
  tag,
  summary: "Read a delivery",
  description: "What is sent, where it stands, and every attempt.",
  response: { status: 200, description: "The delivery.", schema: deliverySchema },
  errors: [],
  handle: async (call) => {
    const place = placeOf(call);
    const row = await findDelivery(call.deps, place);
    const attempts = await readAttempts(call.deps, place.organisationId, [row]);
    return reply(200, presentDelivery(row, attempts.get(row.id)));
  },
});

const redeliverWebhook = defineOperation({
  operationId: "redeliverWebhook",
  method: "post",
  path: "/v1/webhooks/{id}/deliveries/{delivery}/redelivery",
  tag,
  summary: "Deliver again",
  description: "The same message under the same webhook-id, due at once and tried as often as a new one.",
  response: { status: 200, description: "The delivery, due.", schema: deliverySchema },
  errors: ["webhook_inactive"],
  handle: (call) =>
    changeOnce(call.deps, call, 200, async (transaction) => {
      const place = placeOf(call);
      const row = await redeliver(call.deps, transaction, place);
      const attempts = await readAttempts(call.deps, place.organisationId, [row], transaction);
      return { body: presentDelivery(row, attempts.get(row.id)) };
    }),
});

function placeOf(call: Pick<Call, "caller" | "params">) {
  const { id = "", delivery = "" } = call.params;
  return { organisationId: callerOf(call).organisation.id, endpointId: id, id: delivery };
}

export const webhookDeliveryOperations = [
  testWebhook,
  listWebhookDeliveries,
  readWebhookDelivery,
  redeliverWebhook,
];
