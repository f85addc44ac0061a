import type { RequestHandler } from "express";
import type { Deps } from "../deps.ts";

const ACCEPTABLE = /^[A-Za-z0-9._-]{1,128}$/;

/** Gives every request an id: the caller's own when it can stand in a log line, else a new one. */
export function requestId({ newId }: Pick<Deps, "newId">): RequestHandler {
  return (request, response, next) => {
    const sent = request.get("X-Request-Id");
    const id = sent && ACCEPTABLE.test(sent) ? sent : newId();
    response.locals.requestId = id;
    response.setHeader("X-Request-Id", id);
    next();
  };
}

/** The id that `requestId` gave. */
export function requestIdOf(locals: Record<string, unknown>): string {
  return typeof locals.requestId === "string" ? locals.requestId : "";
}
