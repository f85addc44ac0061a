import type { Request, RequestHandler, Response } from "express";
import { ipKeyGenerator, rateLimit } from "express-rate-limit";
import type { Deps } from "../deps.ts";
import { HttpProblem } from "../http/http-problem.ts";
import { credentialOf, type Caller } from "../services/caller.ts";

const WINDOW_MS = 60_000;
/** Addresses of one /56 are one network: a household or a site is given that much. */
const IPV6_SUBNET = 56;

export interface RateLimits {
  /** Per credential, or per network where there is none. */
  readonly standard: RequestHandler;
  /** Where a password or an invitation could be guessed, per network. A refresh secret cannot, and every page asks with it. */
  readonly signIn: RequestHandler;
}

/** Limits of one process, in memory. */
export function rateLimits({ config }: Deps): RateLimits {
  return {
    standard: limiter("standard", config.rateLimitPerMinute, callerOrNetwork),
    signIn: limiter("sign-in", config.signInLimitPerMinute, network),
  };
}

function limiter(
  name: string,
  limit: number,
  keyGenerator: (request: Request, response: Response) => string,
): RequestHandler {
  return rateLimit({
    windowMs: WINDOW_MS,
    limit,
    identifier: name,
    standardHeaders: "draft-8",
    legacyHeaders: false,
    keyGenerator,
    handler: (_request, response, next) => {
      const seconds = Number(response.getHeader("Retry-After") ?? WINDOW_MS / 1000);
      next(
        new HttpProblem("rate_limited", `More than ${limit} calls in a minute.`, {
          limit,
          retryAfterSeconds: seconds,
        }),
      );
    },
  });
}

function network(request: Request): string {
  return ipKeyGenerator(request.ip ?? "", IPV6_SUBNET);
}

function callerOrNetwork(request: Request, response: Response): string {
  const caller = response.locals.caller as Caller | null;
  return caller ? credentialOf(caller) : network(request);
}
