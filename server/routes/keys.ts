import {
  createKeyRequest,
  createdKeySchema,
  keyPage,
  keySchema,
  listKeysQuery,
} from "../../shared/schemas/keys.ts";
import { versionTag } from "../http/entity-tag.ts";
import { HttpProblem } from "../http/http-problem.ts";
import { callerOf, defineOperation, reply } from "../http/operation.ts";
import { presentKey } from "../presenters/present-key.ts";
import { issueKey, revokeKey } from "../services/issue-key.ts";
import { readPage } from "../services/read-page.ts";

const listKeys = defineOperation({
  operationId: "listKeys",
  method: "get",
  path: "/v1/keys",
  tag: "Keys",
  summary: "List API keys",
  description: "Keys of the organisation, newest first. Secrets are never among them.",
  query: listKeysQuery,
  response: { status: 200, description: "One page.", schema: keyPage },
  errors: ["invalid_cursor"],
  handle: async (call) => {
    const { deps, query } = call;
    const scope = { list: "keys", organisationId: callerOf(call).organisation.id, filters: {} };
    const page = await readPage(deps, deps.database.models.apiKeys, scope, query, { include: "maker" });
    const { nextCursor, limit } = page;
    return reply(200, { data: page.rows.map((row) => presentKey(row, deps.now())), nextCursor, limit });
  },
});

const createKey = defineOperation({
  operationId: "createKey",
  method: "post",
  path: "/v1/keys",
  tag: "Keys",
  summary: "Issue an API key",
  description: "The answer shows the secret, this once. A key can never do more than whoever issued it.",
  body: createKeyRequest,
  requestExamples: () => ({
    plantSoftware: {
      summary: "A key for plant software that fits bores and reads its records",
      value: { name: "Outage planner", scopes: ["calculations:write", "calculations:read"] },
    },
  }),
  response: { status: 201, description: "The key and its secret.", schema: createdKeySchema },
  errors: ["secret_already_shown"],
  answersSecret: true,
  handle: async (call) => {
    const caller = callerOf(call);
    const { row, secret } = await issueKey(call.deps, call.body, {
      caller,
      claim: call.claim,
      requestId: call.requestId,
    });
    const maker =
      caller.by === "member" ? { createdBy: { id: caller.member.id, name: caller.member.name } } : {};
    const headers = { Location: `/v1/keys/${row.id}`, ETag: versionTag(row.version) };
    return reply(201, { ...presentKey(row, call.deps.now()), ...maker, secret }, headers);
  },
});

const readKey = defineOperation({
  operationId: "readKey",
  method: "get",
  path: "/v1/keys/{id}",
  tag: "Keys",
  summary: "Read an API key",
  description: "What it may do, when it ends, when it was last used.",
  response: { status: 200, description: "The key.", schema: keySchema },
  errors: [],
  handle: async (call) => {
    const organisationId = callerOf(call).organisation.id;
    const row = await call.deps.database.models.apiKeys.findOne({
      where: { id: call.params.id ?? "", organisationId },
      include: "maker",
    });
    if (!row) throw new HttpProblem("not_found", "There is no key with this id.");
    return reply(200, presentKey(row, call.deps.now()), { ETag: versionTag(row.version) });
  },
});

const revokeKeyOperation = defineOperation({
  operationId: "revokeKey",
  method: "post",
  path: "/v1/keys/{id}/revoke",
  tag: "Keys",
  summary: "Revoke an API key",
  description: "Refused everywhere within a second, for good. Revoking it again changes nothing.",
  response: { status: 200, description: "The key, revoked.", schema: keySchema },
  errors: [],
  handle: async (call) => {
    const row = await revokeKey(call.deps, call.params.id ?? "", callerOf(call), call.requestId);
    return reply(200, presentKey(row, call.deps.now()), { ETag: versionTag(row.version) });
  },
});

export const keyOperations = [listKeys, createKey, readKey, revokeKeyOperation];
