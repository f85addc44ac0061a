const SECOND = 1_000;
const MINUTE = 60 * SECOND;
const HOUR = 60 * MINUTE;

/** Waits between attempts, as the Standard Webhooks specification ("Deliverability and reliability") proposes them. */
export const retryDelaysMs = [
  5 * SECOND,
  5 * MINUTE,
  30 * MINUTE,
  2 * HOUR,
  5 * HOUR,
  10 * HOUR,
  14 * HOUR,
  20 * HOUR,
  24 * HOUR,
] as const;

/** A receiver cannot ask to be left alone longer than the longest wait of the schedule. */
const LONGEST_MS = 24 * HOUR;
/** Up to this part is added to a wait, so that many that failed together do not come back together. */
const JITTER = 0.2;

/**
 * When to try again after the `tries`-th attempt failed; null when that was the last.
 * Never sooner than the schedule, nor than the receiver's Retry-After. `random` is from [0, 1).
 */
export function nextDelayMs(tries: number, retryAfterMs: number | null, random: number): number | null {
  const scheduled = retryDelaysMs[tries - 1];
  if (scheduled === undefined) return null;
  const wait = Math.max(scheduled, Math.min(retryAfterMs ?? 0, LONGEST_MS));
  return Math.round(wait * (1 + JITTER * random));
}

/** Retry-After of RFC 9110, section 10.2.3, in seconds or as a date; null when absent or past. */
export function readRetryAfter(sent: string | undefined, now: Date): number | null {
  if (sent === undefined) return null;
  const text = sent.trim();
  const ms = /^\d{1,9}$/.test(text) ? Number(text) * SECOND : Date.parse(text) - now.getTime();
  return Number.isFinite(ms) && ms > 0 ? ms : null;
}
