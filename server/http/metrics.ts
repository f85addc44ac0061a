import type { RequestHandler } from "express";
import { collectDefaultMetrics, Histogram, Registry } from "prom-client";

export interface Metrics {
  readonly contentType: string;
  /** Measures each answer under its route's template; whatever no route took shares one label. */
  readonly measure: RequestHandler;
  text(): Promise<string>;
}

/** Metrics of one application: its own registry, so that two can live in one process. */
export function createMetrics(): Metrics {
  const registry = new Registry();
  collectDefaultMetrics({ register: registry });
  const duration = new Histogram({
    name: "http_server_request_duration_seconds",
    help: "Time from request to answer.",
    labelNames: ["route", "method", "status"],
    buckets: [0.002, 0.005, 0.01, 0.025, 0.05, 0.1, 0.25, 0.5, 1, 2.5, 5, 10, 30],
    registers: [registry],
  });
  return {
    contentType: registry.contentType,
    text: () => registry.metrics(),
    measure: (request, response, next) => {
      const stop = duration.startTimer();
      response.once("finish", () => {
        const { route } = response.locals as { route?: string };
        stop({ route: route ?? "unmatched", method: request.method, status: String(response.statusCode) });
      });
      next();
    },
  };
}
