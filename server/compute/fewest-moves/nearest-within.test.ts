import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { solveQuadraticProgram } from "../moves/quadratic-program.ts";
import { nearestWithin } from "./nearest-within.ts";

const part = fc.integer({ min: -40, max: 40 }).map((n) => n / 8 + 0.013);
const limit = fc.record({ row: fc.tuple(part, part, part).map((row) => [...row]), most: part });

describe("nearestWithin", () => {
  it("is the optimum of another algorithm, and finds none where that finds none", () => {
    const seen = { feasible: 0, not: 0 };
    const origin = {
      rows: [
        [1, 0, 0],
        [0, 1, 0],
        [0, 0, 1],
      ],
      targets: [0, 0, 0],
    };
    fc.assert(
      fc.property(fc.array(limit, { minLength: 1, maxLength: 9 }), (limits) => {
        const found = nearestWithin(3, limits);
        const other = solveQuadraticProgram(3, [origin], limits);
        expect(found.feasible).toBe(other.feasible);
        if (!found.feasible || !other.feasible) {
          seen.not++;
          // What contradicts does so by itself, and without any one of it no more.
          if (found.feasible) return;
          const only = (those: readonly number[]) =>
            nearestWithin(
              3,
              those.map((k) => limits[k]!),
            ).feasible;
          expect(only(found.conflict)).toBe(false);
          for (const k of found.conflict) expect(only(found.conflict.filter((j) => j !== k))).toBe(true);
          return;
        }
        seen.feasible++;
        found.point.forEach((value, k) => expect(Math.abs(value - other.point[k]!)).toBeLessThan(1e-9));
        // The point is minus the sum of the rows, each with its multiplier.
        found.point.forEach((value, k) => {
          const held = limits.reduce((sum, { row }, j) => sum + found.multipliers[j]! * row[k]!, 0);
          expect(Math.abs(value + held)).toBeLessThan(1e-9);
        });
      }),
      { numRuns: 400, endOnFailure: true },
    );
    expect(seen.feasible).toBeGreaterThan(50);
    expect(seen.not).toBeGreaterThan(50);
  });

  it("meets limits that leave one point, and names a limit on nothing that cannot be met", () => {
    const pinned = [
      { row: [2, 0], most: 1 },
      { row: [-2, 0], most: -1 },
      { row: [1, 1], most: 0.75 },
      { row: [-1, -1], most: -0.75 },
    ];
    const found = nearestWithin(2, pinned);
    expect(found.feasible && found.point.map((value) => Number(value.toFixed(14)))).toEqual([0.5, 0.25]);
    expect(nearestWithin(2, [{ row: [0, 0], most: -1e-9 }])).toEqual({ feasible: false, conflict: [0] });
    expect(nearestWithin(0, [{ row: [], most: 0 }])).toMatchObject({ feasible: true, point: [] });
  });
});
