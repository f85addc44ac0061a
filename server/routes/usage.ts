import { readUsageQuery, usageSchema } from "../../shared/schemas/usage.ts";
import { callerOf, defineOperation, reply } from "../http/operation.ts";
import { readUsage } from "../services/read-usage.ts";

const readUsageOperation = defineOperation({
  operationId: "readUsage",
  method: "get",
  path: "/v1/usage",
  tag: "Usage",
  summary: "Read usage",
  description:
    "Calls that reached the engine, by day, key or endpoint. A call counts in the very next answer.",
  query: readUsageQuery,
  response: { status: 200, description: "Counts.", schema: usageSchema },
  errors: [],
  handle: async (call) => reply(200, await readUsage(call.deps, callerOf(call).organisation.id, call.query)),
});

export const usageOperations = [readUsageOperation];
