import type { Deps } from "../deps.ts";
import type { WebhookAttempt } from "../models/webhook-attempt.ts";
import type { WebhookDelivery } from "../models/webhook-delivery.ts";
import type { WebhookEndpoint } from "../models/webhook-endpoint.ts";
import { checkTarget, TargetRefused } from "./check-target.ts";
import { postMessage } from "./post-message.ts";
import { readRetryAfter } from "./retry-schedule.ts";
import { messageHeaders, signingSecrets } from "./sign-message.ts";

/** One attempt, from the look-up of the name to the end of the answer. */
export const ATTEMPT_MS = 15_000;

export const testEvent = "webhook.test";

export interface Outcome extends Pick<
  WebhookAttempt,
  "at" | "status" | "durationMs" | "error" | "detail" | "replyText"
> {
  readonly delivered: boolean;
  readonly retryAfterMs: number | null;
}

/**
 * Makes one attempt: judges the address as it is now, signs, posts. Never throws for what the other side does.
 * @throws AbortError when `stop` came first: how the attempt would have ended is not known
 */
export async function attemptDelivery(
  deps: Pick<Deps, "config" | "secrets" | "now" | "resolveHost">,
  { id, type, payloadText }: Pick<WebhookDelivery, "id" | "type" | "payloadText">,
  endpoint: WebhookEndpoint,
  stop: AbortSignal,
): Promise<Outcome> {
  const at = deps.now();
  const started = performance.now();
  const timeout = AbortSignal.timeout(ATTEMPT_MS);
  const signal = AbortSignal.any([stop, timeout]);
  const ended = (outcome: Partial<Outcome>): Outcome => ({
    at,
    durationMs: Math.round(performance.now() - started),
    status: null,
    error: null,
    detail: null,
    replyText: null,
    delivered: false,
    retryAfterMs: null,
    ...outcome,
  });
  try {
    const target = await before(signal, checkTarget(endpoint.url, deps.config, deps.resolveHost));
    const headers = messageHeaders(id, at, payloadText, signingSecrets(deps.secrets, endpoint, at));
    const { status, retryAfter, replyText } = await postMessage(target, headers, payloadText, signal);
    return ended({
      status,
      delivered: status >= 200 && status <= 299,
      retryAfterMs: readRetryAfter(retryAfter, at),
      replyText: type === testEvent ? null : replyText,
    });
  } catch (error) {
    stop.throwIfAborted();
    if (error instanceof TargetRefused) return ended({ error: "target_refused", detail: error.message });
    if (timeout.aborted) return ended({ error: "timeout", detail: `No answer in ${ATTEMPT_MS / 1000} s.` });
    return ended({ error: "connection_failed", detail: causeOf(error) });
  }
}

/** Waits for `work`, and no longer than until `signal`. */
function before<T>(signal: AbortSignal, work: Promise<T>): Promise<T> {
  return new Promise((resolve, reject) => {
    const abort = (): void => reject(new Error("Cut short."));
    if (signal.aborted) abort();
    signal.addEventListener("abort", abort, { once: true });
    work.then(resolve, reject).finally(() => signal.removeEventListener("abort", abort));
  });
}

/** The code that the platform gives a failed connection, such as ECONNREFUSED; never its text, which names addresses. */
function causeOf(error: unknown): string | null {
  const { code, errors } = error as { code?: unknown; errors?: readonly { code?: unknown }[] };
  const found = code ?? errors?.[0]?.code;
  return typeof found === "string" ? found.slice(0, 64) : null;
}
