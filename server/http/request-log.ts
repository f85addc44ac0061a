import type { Request, RequestHandler, Response } from "express";
import { pino, type Logger } from "pino";
import { pinoHttp } from "pino-http";
import { requestIdOf } from "../middleware/request-id.ts";
import { credentialOf, type Caller } from "../services/caller.ts";

const SECRETS = [
  "password",
  "secret",
  "token",
  "accessToken",
  "authorization",
  "cookie",
  "*.password",
  "*.secret",
  "*.token",
];

/** One JSON line an event; anything named like a secret is struck out. */
export function createLog(level: string): Logger {
  return pino({ level, redact: { paths: SECRETS, censor: "[redacted]" }, base: null });
}

/** One line an answer: what was asked by whom, and how it ended. Headers, queries and bodies are never written. */
export function requestLog(log: Logger): RequestHandler {
  return pinoHttp<Request, Response>({
    logger: log,
    quietReqLogger: true,
    serializers: { req: () => undefined, res: () => undefined, err: () => undefined },
    customProps: (request, response) => {
      // Asked when a request arrives, too: what is said then is written a second time into the line of its answer.
      if (!response.headersSent) return {};
      const caller = response.locals.caller as Caller | null | undefined;
      return {
        requestId: requestIdOf(response.locals),
        method: request.method,
        route: (response.locals as { route?: string }).route ?? "unmatched",
        status: response.statusCode,
        ...(caller ? { organisation: caller.organisation.id, credential: credentialOf(caller) } : {}),
      };
    },
    customLogLevel: (_request, response) => (response.statusCode >= 500 ? "error" : "info"),
    customSuccessMessage: () => "answered",
    customErrorMessage: () => "failed",
  });
}
