import type { Request, RequestHandler, Response } from "express";
import { limits } from "../../shared/limits.ts";
import type { Deps } from "../deps.ts";
import { requestIdOf } from "../middleware/request-id.ts";
import { credentialOf, type Caller } from "../services/caller.ts";
import { Claim, openClaim } from "../services/idempotency.ts";
import { HttpProblem } from "./http-problem.ts";
import type { Call, Operation, Reply } from "./operation.ts";

/** Runs a handler on a checked request and writes its reply; keeps the promise of an Idempotency-Key around it. */
export function runOperation(operation: Operation, deps: Deps): RequestHandler {
  return async (request, response) => {
    const call = callOf(deps, request, response);
    const reply =
      operation.method === "post" && call.caller && !operation.lines
        ? await runOnce(operation, call)
        : await operation.handle(call);
    if (reply.stream) {
      response.status(reply.status).set({ "Cache-Control": "no-store", ...reply.headers });
      await reply.stream(response);
      return;
    }
    verifyReply(operation, deps, reply);
    writeReply(response, reply);
  };
}

function callOf(deps: Deps, request: Request, response: Response): Call {
  const { caller, body, query, params, text, canonicalText, bytes } = response.locals as Omit<Call, "deps">;
  return {
    deps,
    request,
    response,
    caller,
    body,
    query,
    params,
    text,
    canonicalText,
    bytes,
    claim: null,
    path: request.path,
    requestId: requestIdOf(response.locals),
  };
}

async function runOnce(operation: Operation, call: Call): Promise<Reply> {
  const key = idempotencyKeyOf(call.request);
  if (key === null) return operation.handle(call);
  const { organisation } = call.caller as Caller;
  const claim = await openClaim(call.deps, {
    organisationId: organisation.id,
    credentialId: credentialOf(call.caller as Caller),
    key,
    call: callText(call),
  });
  if (!(claim instanceof Claim)) return claim;
  try {
    const reply = await operation.handle({ ...call, claim });
    if (!claim.isSettled) {
      if (operation.answersSecret) throw new Error(`${operation.operationId} left its claim unsettled.`);
      await claim.settle({ status: reply.status, answerText: JSON.stringify(reply.body ?? null) });
    }
    return reply;
  } finally {
    if (!claim.isSettled) await claim.release();
  }
}

/** What makes two calls the same call: the address with its query, since store=true is another call than a preview. */
export function callText({ request, canonicalText }: Pick<Call, "request" | "canonicalText">): string {
  return `${request.method} ${request.originalUrl}\n${canonicalText}`;
}

/** The key as sent, bare or as a quoted string. */
export function idempotencyKeyOf(request: Request): string | null {
  const sent = request.get("Idempotency-Key");
  if (sent === undefined) return null;
  const key = sent.replace(/^"(.*)"$/, "$1");
  if (key.length >= 1 && key.length <= limits.idempotencyKeyLength && /^[\x21-\x7e]+$/.test(key)) return key;
  const detail = `Idempotency-Key is 1 to ${limits.idempotencyKeyLength} printable characters.`;
  throw new HttpProblem("invalid_header", detail, {
    errors: [{ header: "Idempotency-Key", code: "invalid_header", detail }],
  });
}

function verifyReply(operation: Operation, deps: Deps, reply: Reply): void {
  if (!deps.verifyReplies || !operation.response.schema || reply.status !== operation.response.status) return;
  // A page for people stands beside the answer that the document describes.
  if (reply.headers?.["Content-Type"]?.startsWith("text/html")) return;
  const parsed = operation.response.schema.safeParse(reply.body);
  if (!parsed.success)
    throw new Error(`${operation.operationId} answers against its schema: ${parsed.error.message}`);
}

function writeReply(response: Response, { status, body, headers }: Reply): void {
  response.status(status).set({ "Cache-Control": "no-store", ...headers });
  if (body === undefined) response.end();
  else if (typeof body === "string" || Buffer.isBuffer(body)) response.send(body);
  else
    response.type(status >= 400 ? "application/problem+json" : "application/json").send(JSON.stringify(body));
}
