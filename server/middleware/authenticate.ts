import type { Request, RequestHandler } from "express";
import { operationAccess, type Access, type OperationId } from "../../shared/access.ts";
import type { Deps } from "../deps.ts";
import { HttpProblem } from "../http/http-problem.ts";
import type { Caller } from "../services/caller.ts";
import { invalid, missing } from "../services/credentials.ts";

const IN_ADDRESS = ["api_key", "apikey", "key", "token", "access_token", "authorization", "secret"];

/** Enforces one row of the access table. The only place that decides who may call an operation. */
export function authenticate(deps: Deps, operationId: OperationId): RequestHandler {
  const access: Access = operationAccess[operationId];
  return async (request, response, next) => {
    refuseCredentialInAddress(request);
    const bearer = bearerOf(request);
    const caller = bearer !== null && access.by !== "anyone" ? await deps.credentials.callerOf(bearer) : null;
    refuseUnlessAllowed(access, caller);
    response.locals.caller = caller;
    next();
  };
}

function refuseUnlessAllowed(access: Access, caller: Caller | null): void {
  if (access.by === "anyone") return;
  if (!caller) throw missing();
  if (access.by === "caller") return;
  if (access.by === "member") {
    if (caller.by === "member") return;
    throw new HttpProblem("scope_missing", "This acts on a signed-in member's session; an API key has none.");
  }
  if (
    caller.by === "member" ? access.roles.includes(caller.member.role) : caller.scopes.includes(access.scope)
  )
    return;
  const who = caller.by === "member" ? `The role ${caller.member.role}` : "The key";
  throw new HttpProblem("scope_missing", `${who} does not have ${access.scope}.`, { scope: access.scope });
}

function bearerOf(request: Request): string | null {
  const sent = request.rawHeaders.filter(
    (_, index, all) => index % 2 === 1 && all[index - 1]?.toLowerCase() === "authorization",
  );
  if (sent.length > 1) {
    const detail = "Authorization was sent more than once.";
    throw new HttpProblem("invalid_header", detail, {
      errors: [{ header: "Authorization", code: "invalid_header", detail }],
    });
  }
  const [header] = sent;
  if (header === undefined) return null;
  const [, token] = /^Bearer +([A-Za-z0-9._~+/=-]+)$/i.exec(header.trim()) ?? [];
  if (!token) throw invalid();
  return token;
}

function refuseCredentialInAddress(request: Request): void {
  const [, query = ""] = request.url.split("?", 2);
  for (const name of new URLSearchParams(query).keys()) {
    if (IN_ADDRESS.includes(name.toLowerCase())) {
      throw new HttpProblem("credential_in_url", `The parameter ${name} is never taken from the address.`);
    }
  }
}
