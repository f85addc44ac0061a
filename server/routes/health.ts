import { z } from "zod";
import { healthSchema } from "../../shared/schemas/meta.ts";
import { databaseChecks } from "../database.ts";
import { HttpProblem } from "../http/http-problem.ts";
import { defineOperation, reply } from "../http/operation.ts";

const readLiveness = defineOperation({
  operationId: "readLiveness",
  method: "get",
  path: "/livez",
  tag: "Service",
  summary: "Tell whether the process lives",
  description: "Asks nothing else: a database that is down is no reason to restart this process.",
  response: { status: 200, description: "It lives.", schema: healthSchema },
  errors: [],
  limit: "none",
  handle: () => reply(200, { status: "ok" }),
});

const readReadiness = defineOperation({
  operationId: "readReadiness",
  method: "get",
  path: "/readyz",
  tag: "Service",
  summary: "Tell whether calls can be answered",
  description:
    "200 only while the database answers, its tables are current, and the service is not shutting down.",
  response: { status: 200, description: "Ready.", schema: healthSchema },
  errors: ["unavailable"],
  limit: "none",
  handle: async ({ deps }) => {
    const checks = { ...(await databaseChecks(deps.database)), running: !deps.shutdown.begun };
    if (Object.values(checks).every(Boolean)) return reply(200, { status: "ok", checks });
    throw new HttpProblem(
      "unavailable",
      `Not ready: ${failing(checks)}.`,
      { retryAfterSeconds: 2 },
      { "Retry-After": "2" },
    );
  },
});

const readMetrics = defineOperation({
  operationId: "readMetrics",
  method: "get",
  path: "/metrics",
  tag: "Service",
  summary: "Read metrics",
  description:
    "Prometheus text. With METRICS_TOKEN as Bearer, or from loopback where none is set and no proxy is trusted; else 404.",
  response: { status: 200, description: "Prometheus text.", schema: z.string(), mediaType: "text/plain" },
  errors: ["not_found"],
  limit: "none",
  handle: async ({ deps, request }) => {
    const { metricsToken, trustedProxies } = deps.config;
    const fromLoopback = /^(::ffff:)?127\.|^::1$/.test(request.socket.remoteAddress ?? "");
    const allowed =
      metricsToken === null
        ? fromLoopback && trustedProxies === 0
        : request.get("Authorization") === `Bearer ${metricsToken}`;
    if (!allowed) throw new HttpProblem("not_found", "There is nothing here.");
    return reply(200, await deps.metrics.text(), { "Content-Type": deps.metrics.contentType });
  },
});

function failing(checks: Record<string, boolean>): string {
  return Object.entries(checks)
    .filter(([, holds]) => !holds)
    .map(([name]) => name)
    .join(", ");
}

export const healthOperations = [readLiveness, readReadiness, readMetrics];
