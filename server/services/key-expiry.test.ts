import { describe, expect, it } from "vitest";
import { noticeDue } from "./key-expiry.ts";

const DAY_MS = 86_400_000;
const end = new Date("2026-12-31T12:00:00Z");
const key = (lifeDays: number) => ({
  createdAt: new Date(end.getTime() - lifeDays * DAY_MS),
  expiresAt: end,
  revokedAt: null,
});
const dueAt = (daysLeft: number, lifeDays = 90) =>
  noticeDue(key(lifeDays), new Date(end.getTime() - daysLeft * DAY_MS));

describe("noticeDue", () => {
  it("is 14, 7 and 1 days before the end, each from its moment on", () => {
    expect([14.001, 14, 7.001, 7, 1.001, 1, 0.001].map((left) => dueAt(left))).toEqual([
      null,
      14,
      14,
      7,
      7,
      1,
      1,
    ]);
  });

  it("is none for a key that ended, was revoked, or never ends", () => {
    expect(dueAt(0)).toBeNull();
    expect(dueAt(-1)).toBeNull();
    const now = new Date(end.getTime() - DAY_MS);
    expect(noticeDue({ ...key(90), revokedAt: now }, now)).toBeNull();
    expect(noticeDue({ ...key(90), expiresAt: null }, now)).toBeNull();
  });

  it("is none that the maker of a short key has just read", () => {
    expect(dueAt(5, 5)).toBeNull();
    expect(dueAt(0.5, 5)).toBe(1);
    expect(dueAt(7, 7)).toBeNull();
    expect(dueAt(0.5, 0.5)).toBeNull();
  });
});
