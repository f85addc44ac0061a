import { describe, expect, it } from "vitest";
import { startOfDay, writeDay, writeInstant, writeUtc } from "./write-instant.ts";

describe("a moment", () => {
  it("is written in the reader's zone, largest part first", () => {
    expect(writeInstant(new Date(2026, 0, 5, 7, 8, 9))).toBe("2026-01-05 07:08:09");
  });

  it("is written in UTC as such", () => {
    expect(writeUtc(new Date("2026-12-01T23:59:59.999Z"))).toBe("2026-12-01 23:59:59 UTC");
  });
});

describe("the start of a day", () => {
  it("is midnight of the reader", () => {
    expect(startOfDay("2026-12-31")).toEqual(new Date(2026, 11, 31));
  });

  it("goes over the end of a month and of a year", () => {
    const next = startOfDay("2026-12-31", 1);
    expect(next && writeDay(next)).toBe("2027-01-01");
  });

  it.each(["", "2026-13-01", "2026-02-30", "31.12.2026", "2026-1-1"])("is none for %j", (day) => {
    expect(startOfDay(day)).toBeNull();
  });
});
