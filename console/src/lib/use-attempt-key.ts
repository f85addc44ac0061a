import { useCallback, useRef } from "react";
import { CancelledError, isWorthRetrying, ProblemError } from "./service-error.ts";

interface Attempt {
  readonly body: string;
  readonly key: string;
}

/**
 * One Idempotency-Key for one attempt of a form: sending the same body again before an answer came repeats the call
 * instead of making a second thing. A changed body, or an answer, begins a new attempt.
 */
export function useAttemptKey(): {
  keyFor: (body: string) => string;
  settle: (error?: unknown) => void;
} {
  const attempt = useRef<Attempt | null>(null);
  const keyFor = useCallback((body: string): string => {
    if (attempt.current?.body !== body) attempt.current = { body, key: makeKey() };
    return attempt.current.key;
  }, []);
  const settle = useCallback((error?: unknown): void => {
    if (!leavesOutcomeOpen(error)) attempt.current = null;
  }, []);
  return { keyFor, settle };
}

/** After these nobody knows yet whether the thing was made: the same key must ask again. */
function leavesOutcomeOpen(error: unknown): boolean {
  if (error instanceof CancelledError) return true;
  if (error instanceof ProblemError && error.problem.code === "idempotency_in_progress") return true;
  if (error instanceof ProblemError && error.problem.status === 401) return true;
  return error !== undefined && isWorthRetrying(error);
}

/** 128 random bits. `crypto.randomUUID` exists in secure contexts only, and the console also runs on a plain http LAN. */
function makeKey(): string {
  const bytes = crypto.getRandomValues(new Uint8Array(16));
  return Array.from(bytes, (byte) => byte.toString(16).padStart(2, "0")).join("");
}
