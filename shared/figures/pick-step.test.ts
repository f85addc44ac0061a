import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { stepAtMost, ticksBetween } from "./pick-step.ts";

describe("stepAtMost", () => {
  it.each([
    [1, 1],
    [1.99, 1],
    [2, 2],
    [4.9, 2],
    [4.999999999999999, 5],
    [9.9, 5],
    [0.03, 0.02],
    [700, 500],
  ])("of %d is %d", (size, step) => {
    expect(Math.abs(stepAtMost(size) / step - 1)).toBeLessThan(1e-12);
  });

  it("is 1, 2 or 5 times a power of ten, not above the size and more than two fifths of it", () => {
    fc.assert(
      fc.property(fc.double({ min: 1e-9, max: 1e9, noNaN: true }), (size) => {
        const step = stepAtMost(size);
        const lead = Number(step.toExponential(6).split("e")[0]);
        expect([1, 2, 5, 10]).toContain(lead);
        expect(step).toBeLessThanOrEqual(size * (1 + 1e-11));
        expect(step).toBeGreaterThan(size * 0.4 * (1 - 1e-11));
      }),
    );
  });
});

describe("ticksBetween", () => {
  it("are round, even, and inside", () => {
    expect(ticksBetween(0, 1, 5)).toEqual([0, 0.2, 0.4, 0.6000000000000001, 0.8, 1]);
    expect(ticksBetween(-0.31, 0.12, 4).map((tick) => Number(tick.toFixed(9)))).toEqual([
      -0.3, -0.2, -0.1, 0, 0.1,
    ]);
  });

  it("has no minus nought", () => {
    expect(ticksBetween(-1, 1, 2).some((tick) => Object.is(tick, -0))).toBe(false);
  });

  it("are none where there is no room", () => {
    expect(ticksBetween(1, 1, 5)).toEqual([]);
    expect(ticksBetween(2, 1, 5)).toEqual([]);
  });
});
