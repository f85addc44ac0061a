import jwt from "jsonwebtoken";
import type { Secrets } from "./secrets.ts";

/** Minutes an access token is good for. The page renews it through the refresh cookie. */
const LIFE_SECONDS = 10 * 60;
const ISSUER = "borewright";

export interface AccessToken {
  readonly text: string;
  readonly expiresAt: Date;
}

/** A token that names member and session and nothing else: what they may do is read at each request. */
export function signAccessToken(
  secrets: Secrets,
  who: { memberId: string; sessionId: string },
  now: Date,
): AccessToken {
  const issued = Math.floor(now.getTime() / 1000);
  const text = jwt.sign(
    { sub: who.memberId, sid: who.sessionId, iat: issued, exp: issued + LIFE_SECONDS, iss: ISSUER },
    secrets.accessToken,
    {
      algorithm: "HS256",
    },
  );
  return { text, expiresAt: new Date((issued + LIFE_SECONDS) * 1000) };
}

/** The member and session of a token that is ours and not past its time; null for any other. */
export function readAccessToken(
  secrets: Secrets,
  text: string,
  now: Date,
): { memberId: string; sessionId: string } | null {
  try {
    const claims = jwt.verify(text, secrets.accessToken, {
      algorithms: ["HS256"],
      issuer: ISSUER,
      clockTimestamp: Math.floor(now.getTime() / 1000),
    });
    if (typeof claims === "string") return null;
    const { sub, sid } = claims as { sub?: unknown; sid?: unknown };
    return typeof sub === "string" && typeof sid === "string" ? { memberId: sub, sessionId: sid } : null;
  } catch (error) {
    if (error instanceof jwt.JsonWebTokenError) return null;
    throw error;
  }
}
