import { Router, type Request, type RequestHandler } from "express";
import type { Deps } from "../deps.ts";
import { bodyDeadline } from "../middleware/body-deadline.ts";
import { authenticate } from "../middleware/authenticate.ts";
import type { RateLimits } from "../middleware/rate-limit.ts";
import { readBody } from "../middleware/read-body.ts";
import { validate } from "../middleware/validate.ts";
import { HttpProblem } from "./http-problem.ts";
import type { Method, Operation } from "./operation.ts";
import { runOperation } from "./run-operation.ts";

/** Routes every operation; a known path with another method answers 405 and says what it takes. */
export function mountOperations(operations: readonly Operation[], deps: Deps, limits: RateLimits): Router {
  const router = Router({ caseSensitive: true, strict: true });
  for (const path of new Set(operations.map((operation) => operation.path))) {
    const atPath = operations.filter((operation) => operation.path === path);
    const route = router.route(expressPath(path));
    for (const operation of atPath) route[operation.method](...steps(operation, deps, limits));
    route.all(methodNotAllowed(atPath.map((operation) => operation.method)));
  }
  return router;
}

function steps(operation: Operation, deps: Deps, limits: RateLimits): RequestHandler[] {
  const limit = operation.limit ?? "standard";
  return [
    label(operation),
    refuseOtherAnswers(operation),
    ...(operation.lines ? [] : [bodyDeadline(deps.config.requestTimeoutSeconds)]),
    authenticate(deps, operation.operationId),
    ...(limit === "none" ? [] : [limit === "sign-in" ? limits.signIn : limits.standard]),
    ...readBody(operation),
    validate(operation),
    runOperation(operation, deps),
  ];
}

/** The route's template, for metrics and log: never the address as sent, which anyone can vary. */
function label(operation: Operation): RequestHandler {
  return (_request, response, next) => {
    response.locals.route = operation.path;
    next();
  };
}

function refuseOtherAnswers({ response: answered }: Operation): RequestHandler {
  const mediaTypes = answered.files ?? [answered.mediaType ?? "application/json"];
  return (request, _response, next) => {
    if (!request.accepts([...mediaTypes, "application/problem+json"])) {
      throw new HttpProblem("not_acceptable", `This answers in ${mediaTypes.join(", ")}.`);
    }
    next();
  };
}

function expressPath(path: string): string {
  return path.replaceAll(/\{(\w+)\}/g, ":$1");
}

function methodNotAllowed(methods: readonly Method[]): RequestHandler {
  const names = methods.map((method) => method.toUpperCase());
  const allow = [...names, ...(names.includes("GET") ? ["HEAD"] : [])].join(", ");
  return (request: Request) => {
    throw new HttpProblem(
      "method_not_allowed",
      `${request.method} is not taken here; ${allow} is.`,
      {},
      { Allow: allow },
    );
  };
}
