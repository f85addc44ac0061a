import type { ErrorRequestHandler, Response } from "express";
import { ConnectionAcquireTimeoutError, ConnectionError } from "sequelize";
import { limits } from "../../shared/limits.ts";
import type { Deps } from "../deps.ts";
import { HttpProblem, problemBody } from "../http/http-problem.ts";
import { requestIdOf } from "./request-id.ts";

/** The one way out for everything that is not a success: RFC 9457, without a stack, whatever NODE_ENV says. */
export function errorHandler({ log }: Pick<Deps, "log">): ErrorRequestHandler {
  return (error: unknown, request, response, _next) => {
    const problem = problemOf(error);
    const requestId = requestIdOf(response.locals);
    if (problem.status >= 500) log.error({ err: error, requestId }, "request failed");
    // Too late for an answer: the client sees the cut and can try again.
    if (response.headersSent || request.socket.destroyed) {
      response.destroy();
      return;
    }
    sendProblem(response, problem, requestId, request.path);
  };
}

export function sendProblem(
  response: Response,
  problem: HttpProblem,
  requestId: string,
  instance: string,
): void {
  response
    .status(problem.status)
    .set({ "Cache-Control": "no-store", ...problem.headers })
    .type("application/problem+json")
    .send(JSON.stringify(problemBody(problem, requestId, instance)));
}

function problemOf(error: unknown): HttpProblem {
  if (error instanceof HttpProblem) return error;
  if (
    error instanceof ConnectionError ||
    error instanceof ConnectionAcquireTimeoutError ||
    isLostConnection(error)
  ) {
    return new HttpProblem(
      "unavailable",
      "The database does not answer.",
      { retryAfterSeconds: 2 },
      { "Retry-After": "2" },
    );
  }
  return (
    bodyProblem(error) ??
    new HttpProblem("internal_error", "The service failed. The request id names it in the log.")
  );
}

/** Errors of Express and its body reader carry a `type` or a status; never matched on their text. */
function bodyProblem(error: unknown): HttpProblem | null {
  if (error instanceof URIError)
    return new HttpProblem("invalid_encoding", "The address is not valid UTF-8.");
  if (typeof error !== "object" || error === null) return null;
  const { type, status, code } = error as { type?: unknown; status?: unknown; code?: unknown };
  switch (type) {
    case "entity.too.large":
      return new HttpProblem("call_too_large", `A body here holds at most ${limitOf(error)} bytes.`, {
        limit: limitOf(error),
      });
    case "encoding.unsupported":
      return new HttpProblem(
        "media_type_unsupported",
        "The Content-Encoding is not taken; gzip, deflate and br are.",
      );
    case "request.aborted":
    case "request.size.invalid":
      return new HttpProblem("malformed_request", "The body ended before its stated length.");
    default:
  }
  if (typeof code === "string" && /^(Z_|ERR_)/.test(code))
    return new HttpProblem("invalid_encoding", "The body cannot be decompressed.");
  return status === 400 ? new HttpProblem("malformed_request", "The request cannot be read.") : null;
}

/** The limit that the body reader was given: another for a file than for JSON. */
function limitOf(error: object): number {
  const { limit } = error as { limit?: unknown };
  return typeof limit === "number" ? limit : limits.bodyBytes;
}

function isLostConnection(error: unknown): boolean {
  if (typeof error !== "object" || error === null) return false;
  const { original } = error as { original?: { fatal?: unknown } };
  return original?.fatal === true;
}
