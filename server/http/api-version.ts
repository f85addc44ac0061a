import type { RequestHandler } from "express";
import { HttpProblem } from "./http-problem.ts";

/** The dated revision of /v1 that is served. Additions move it; nothing that breaks a client ever does. */
export const apiVersion = "2026-12-01";
const served: readonly string[] = [apiVersion];

/** Names the revision on every answer, and refuses a call that asks for one that is not served. */
export const apiVersionHeader: RequestHandler = (request, response, next) => {
  response.setHeader("Api-Version", apiVersion);
  const wanted = request.get("Api-Version");
  if (wanted === undefined || served.includes(wanted)) {
    next();
    return;
  }
  const detail = `Api-Version here: ${served.join(", ")}.`;
  throw new HttpProblem("invalid_header", detail, {
    errors: [{ header: "Api-Version", code: "invalid_header", detail }],
  });
};
