import fc from "fast-check";
import { describe, it } from "vitest";
import type { BruteGroup } from "../../../tests/support/brute-force-shims.ts";
import { padsAt, range, unlimited } from "../../../tests/support/move-problems.ts";
import {
  anyStack,
  expectSameChoice,
  grid,
  runs,
  stationsAt,
  supply,
} from "../../../tests/support/shim-choices.ts";
import type { ShimStack } from "./move-problem.ts";

describe("the choice of shims cut to size against every choice tried", () => {
  it("for pads at 135, 180 and 225 degrees, which answer to h and v at once", () => {
    const problem = fc.tuple(anyStack, supply, stationsAt([0, 500], "both"), fc.constantFrom(180, 205));
    fc.assert(
      fc.property(problem, ([stack, { incrementMm, maximumMisfitMm }, stations, third]) => {
        const clock = [135, 225, third];
        const place = (clockDeg: number) => {
          const rad = (clockDeg * Math.PI) / 180;
          return [{ zMm: 100, h: -Math.sin(rad), v: -Math.cos(rad), sign: 1 as const }];
        };
        expectSameChoice({
          supports: [padsAt("seat", 100, clock, stack)],
          task: {
            groups: clock.map((clockDeg) => ({ stack, places: place(clockDeg) })),
            stations,
            freedoms: ["h", "v"],
            incrementMm,
            maximumMisfitMm,
            windowMm: 0.14,
          },
        });
      }),
      runs,
    );
  });

  it("for two lower pads with two upper ones that follow, the upper on stacks of their own", () => {
    const problem = fc.tuple(anyStack, anyStack, supply, stationsAt([0], "both"));
    fc.assert(
      fc.property(problem, ([lower, upper, { incrementMm, maximumMisfitMm }, stations]) => {
        const seat = padsAt("seat", 0, [135, 225, 40, 320], lower);
        const pads = seat.pads.map((pad, k) => (k < 2 ? pad : { ...pad, stack: upper }));
        const place = (clockDeg: number) => {
          const rad = (clockDeg * Math.PI) / 180;
          return { zMm: 0, h: -Math.sin(rad), v: -Math.cos(rad) };
        };
        const onLower = (clockDeg: number) => ({
          stack: lower,
          places: [{ ...place(clockDeg), sign: 1 as const }],
        });
        expectSameChoice({
          supports: [{ ...seat, pads }],
          task: {
            groups: [onLower(135), onLower(225)],
            followers: [40, 320].map((clockDeg) => ({ stack: upper, place: place(clockDeg) })),
            stations,
            freedoms: ["h", "v"],
            incrementMm,
            maximumMisfitMm,
            windowMm: 0.14,
          },
        });
      }),
      runs,
    );
  });

  it("for pads at two supports, four ways of moving at once, with travel limits", () => {
    const off = stationsAt([0, 1000], "both").map((all) =>
      all.map((one) => ({ ...one, hMm: one.hMm / 2, vMm: one.vMm / 2 })),
    );
    const problem = fc.tuple(anyStack, anyStack, supply, off, grid(0.01, 3));
    fc.assert(
      fc.property(problem, ([front, rear, { maximumMisfitMm }, stations, most]) => {
        const travel = { h: unlimited, v: range(-Math.abs(most), Math.abs(most)) };
        const group = (zMm: number, stack: ShimStack, clockDeg: number): BruteGroup => {
          const rad = (clockDeg * Math.PI) / 180;
          return { stack, places: [{ zMm, h: -Math.sin(rad), v: -Math.cos(rad), sign: 1 }] };
        };
        expectSameChoice({
          supports: [
            padsAt("f", 0, [135, 225], front, { travel }),
            padsAt("g", 1000, [120, 210], rear, { travel }),
          ],
          task: {
            groups: [
              group(0, front, 135),
              group(0, front, 225),
              group(1000, rear, 120),
              group(1000, rear, 210),
            ],
            stations,
            freedoms: ["h", "v", "tilt-h", "tilt-v"],
            incrementMm: 0.02,
            maximumMisfitMm,
            windowMm: 0.1,
            travelV: [travel.v.minMm, travel.v.maxMm],
          },
        });
      }),
      runs,
    );
  });
});
