import express, { type Express } from "express";
import type { Deps } from "./deps.ts";
import { apiVersionHeader } from "./http/api-version.ts";
import { mountOperations } from "./http/mount-operations.ts";
import { requestLog } from "./http/request-log.ts";
import { serveConsole } from "./http/serve-console.ts";
import { serveDocs } from "./http/serve-docs.ts";
import { errorHandler } from "./middleware/error-handler.ts";
import { notFound } from "./middleware/not-found.ts";
import { rateLimits } from "./middleware/rate-limit.ts";
import { requestId } from "./middleware/request-id.ts";
import { securityHeaders } from "./middleware/security-headers.ts";
import { operations } from "./routes/index.ts";

/** The application: what a request meets, in order. It never listens. */
export function createApp(deps: Deps): Express {
  const app = express();
  app
    .disable("x-powered-by")
    .disable("etag")
    .set("query parser", false)
    .set("trust proxy", deps.config.trustedProxies);
  app.use(requestId(deps), requestLog(deps.log), deps.metrics.measure);
  app.use(securityHeaders(deps.config), apiVersionHeader);
  app.use(mountOperations(operations, deps, rateLimits(deps)));
  app.use(serveDocs(), serveConsole());
  app.use(notFound, errorHandler(deps));
  return app;
}
