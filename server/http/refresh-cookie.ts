import { parseCookie, stringifySetCookie } from "cookie";
import type { Request } from "express";
import type { Config } from "../config.ts";
import { SESSION_MS } from "../services/sessions.ts";
import { HttpProblem } from "./http-problem.ts";

/** Behind https the name carries `__Host-`, which browsers take only with Secure, Path=/ and no Domain. */
function nameFor({ publicUrl }: Config): { name: string; secure: boolean } {
  const secure = publicUrl?.startsWith("https:") ?? false;
  return { name: secure ? "__Host-borewright-refresh" : "borewright-refresh", secure };
}

/** Set-Cookie for a refresh secret; an empty one takes the cookie away. */
export function refreshCookie(config: Config, refresh: string): string {
  const { name, secure } = nameFor(config);
  return stringifySetCookie({
    name,
    value: refresh,
    httpOnly: true,
    sameSite: "strict",
    secure,
    path: "/",
    maxAge: refresh === "" ? 0 : SESSION_MS / 1000,
  });
}

/**
 * The refresh secret that the browser sent with a request of our own pages.
 * @throws HttpProblem origin_refused when another origin's page sent it
 */
export function readRefreshCookie(config: Config, request: Request): string | null {
  const origin = request.get("Origin");
  const own = config.publicUrl ?? `${request.protocol}://${request.get("Host") ?? ""}`;
  if (origin !== undefined && origin !== own)
    throw new HttpProblem("origin_refused", "Sessions are renewed from the console's own address.");
  return parseCookie(request.get("Cookie") ?? "")[nameFor(config).name] ?? null;
}
