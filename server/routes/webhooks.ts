import {
  createWebhookRequest,
  listWebhooksQuery,
  rotateSecretRequest,
  updateWebhookRequest,
  webhookPage,
  webhookSchema,
  webhookWithSecret,
} from "../../shared/schemas/webhooks.ts";
import { byOf, readOf } from "../http/call-parts.ts";
import { versionTag } from "../http/entity-tag.ts";
import { callerOf, defineOperation, reply } from "../http/operation.ts";
import { presentWebhook } from "../presenters/present-webhook.ts";
import { readPage } from "../services/read-page.ts";
import {
  createWebhook,
  findWebhook,
  removeWebhook,
  rotateSecret,
  updateWebhook,
} from "../services/webhooks.ts";

const tag = "Webhooks";

const listWebhooks = defineOperation({
  operationId: "listWebhooks",
  method: "get",
  path: "/v1/webhooks",
  tag,
  summary: "List webhooks",
  description: "Webhooks of the organisation, newest first. Secrets are never among them.",
  query: listWebhooksQuery,
  response: { status: 200, description: "One page.", schema: webhookPage },
  errors: ["invalid_cursor"],
  handle: async (call) => {
    const { deps, query } = call;
    const scope = { list: "webhooks", organisationId: callerOf(call).organisation.id, filters: {} };
    const page = await readPage(deps, deps.database.models.webhookEndpoints, scope, query);
    const { nextCursor, limit } = page;
    return reply(200, {
      data: page.rows.map((row) => presentWebhook(row, deps.now())),
      nextCursor,
      limit,
    });
  },
});

const createWebhookOperation = defineOperation({
  operationId: "createWebhook",
  method: "post",
  path: "/v1/webhooks",
  tag,
  summary: "Add a webhook",
  description:
    "Tells plant software of what happens, by Standard Webhooks: signed, and tried again for three days. The answer shows the signing secret, this once. What is sent names ids; the rest is read with a key.",
  body: createWebhookRequest,
  requestExamples: () => ({
    jobSigned: {
      summary: "Tell the outage planner of surveys and signed jobs",
      value: {
        name: "Outage planner",
        url: "https://hooks.example.com/borewright",
        events: ["survey.computed", "job.signed"],
      },
    },
  }),
  response: { status: 201, description: "The webhook and its secret.", schema: webhookWithSecret },
  errors: ["webhook_target_refused", "webhook_limit_reached", "secret_already_shown"],
  answersSecret: true,
  handle: async (call) => {
    const { row, secret } = await createWebhook(call.deps, call.body, byOf(call));
    const headers = { Location: `/v1/webhooks/${row.id}`, ETag: versionTag(row.version) };
    return reply(201, { ...presentWebhook(row, call.deps.now()), secret }, headers);
  },
});

const readWebhook = defineOperation({
  operationId: "readWebhook",
  method: "get",
  path: "/v1/webhooks/{id}",
  tag,
  summary: "Read a webhook",
  description: "Where it goes, what it is told, and whether it fails.",
  response: { status: 200, description: "The webhook.", schema: webhookSchema },
  errors: [],
  handle: async (call) => {
    const { deps, params } = call;
    const row = await findWebhook(deps, {
      id: params.id ?? "",
      organisationId: callerOf(call).organisation.id,
    });
    return reply(200, presentWebhook(row, deps.now()), { ETag: versionTag(row.version) });
  },
});

const updateWebhookOperation = defineOperation({
  operationId: "updateWebhook",
  method: "patch",
  path: "/v1/webhooks/{id}",
  tag,
  summary: "Change a webhook",
  description:
    "Name, address, events, or whether it is on. What comes due while it is off waits, and is sent when it is switched on again; what happens meanwhile is not told.",
  body: updateWebhookRequest,
  requestExamples: () => ({ on: { summary: "Switch it on again", value: { active: true } } }),
  response: { status: 200, description: "The webhook, changed.", schema: webhookSchema },
  errors: ["webhook_target_refused"],
  conditional: true,
  handle: async (call) => {
    const row = await updateWebhook(call.deps, readOf(call), call.body, byOf(call));
    return reply(200, presentWebhook(row, call.deps.now()), { ETag: versionTag(row.version) });
  },
});

const rotateWebhookSecret = defineOperation({
  operationId: "rotateWebhookSecret",
  method: "post",
  path: "/v1/webhooks/{id}/secret",
  tag,
  summary: "Replace the signing secret",
  description:
    "The answer shows the new secret, this once. Deliveries carry both signatures until the old one's time is over.",
  body: rotateSecretRequest,
  requestExamples: () => ({ twoDays: { summary: "Two days to change over", value: { overlapHours: 48 } } }),
  response: { status: 201, description: "The webhook and its new secret.", schema: webhookWithSecret },
  errors: ["secret_already_shown"],
  answersSecret: true,
  handle: async (call) => {
    const { deps, params, body } = call;
    const { row, secret } = await rotateSecret(deps, params.id ?? "", body.overlapHours, byOf(call));
    const headers = { Location: `/v1/webhooks/${row.id}`, ETag: versionTag(row.version) };
    return reply(201, { ...presentWebhook(row, deps.now()), secret }, headers);
  },
});

const removeWebhookOperation = defineOperation({
  operationId: "removeWebhook",
  method: "delete",
  path: "/v1/webhooks/{id}",
  tag,
  summary: "Remove a webhook",
  description: "With its log, for good. To keep the log, switch it off instead.",
  response: { status: 204, description: "Removed." },
  errors: [],
  handle: async (call) => {
    await removeWebhook(call.deps, call.params.id ?? "", byOf(call));
    return reply(204);
  },
});

export const webhookOperations = [
  listWebhooks,
  createWebhookOperation,
  readWebhook,
  updateWebhookOperation,
  rotateWebhookSecret,
  removeWebhookOperation,
];
