import { describe, expect, it } from "vitest";
import { nextDelayMs, readRetryAfter, retryDelaysMs } from "./retry-schedule.ts";

describe("nextDelayMs", () => {
  it("follows the schedule that the Standard Webhooks specification proposes, and ends after ten attempts", () => {
    // https://github.com/standard-webhooks/standard-webhooks, spec, "Deliverability and reliability"; from memory.
    const seconds = retryDelaysMs.map((ms) => ms / 1_000);
    expect(seconds).toEqual([5, 300, 1_800, 7_200, 18_000, 36_000, 50_400, 72_000, 86_400]);
    expect(Array.from({ length: 10 }, (_, index) => nextDelayMs(index + 1, null, 0))).toEqual([
      ...retryDelaysMs,
      null,
    ]);
  });

  it("spreads upward by at most a fifth", () => {
    expect(nextDelayMs(2, null, 0.5)).toBe(330_000);
    expect(nextDelayMs(2, null, 0.999_999) ?? 0).toBeLessThanOrEqual(360_000);
  });

  it("never comes sooner than Retry-After, and lets nobody ask for more than a day", () => {
    expect(nextDelayMs(1, 60_000, 0)).toBe(60_000);
    expect(nextDelayMs(2, 60_000, 0)).toBe(300_000);
    expect(nextDelayMs(1, 1e12, 0)).toBe(86_400_000);
  });
});

describe("readRetryAfter", () => {
  const now = new Date("2026-12-01T06:00:00Z");
  it("reads seconds and dates (RFC 9110, section 10.2.3), and nothing else", () => {
    expect(readRetryAfter("120", now)).toBe(120_000);
    expect(readRetryAfter("Tue, 01 Dec 2026 06:02:00 GMT", now)).toBe(120_000);
    for (const sent of [undefined, "", "0", "-5", "soon", "Tue, 01 Dec 2026 05:00:00 GMT", "9".repeat(30)])
      expect(readRetryAfter(sent, now)).toBeNull();
  });
});
