import { describe, expect, it } from "vitest";
import { costOfPlan, feetAt, solvePart, stackOf, stationOff } from "../../../tests/support/move-problems.ts";

const near = (got: number, wanted: number, within = 1e-9) =>
  expect(Math.abs(got - wanted)).toBeLessThan(within); // mm

describe("equal objectives", () => {
  const single = (v: number, tolerance: number, rest: object = {}) =>
    solvePart(
      [stationOff("s", 0, 0, v, tolerance)],
      [feetAt("f", 0, { stacks: { left: stackOf(2), right: stackOf(2) } })],
      {
        cutIncrementMm: 0.01,
        ...rest,
      },
    );

  it("go to fewest pieces handled: half an increment is left as it is, above and below", () => {
    expect(single(-0.005, 0.05).answer.stacks.map(({ changeMm }) => changeMm)).toEqual([0, 0]);
    expect(single(0.005, 0.05).answer.stacks.map(({ changeMm }) => changeMm)).toEqual([0, 0]);
  });

  it("then to the least total change", () => {
    near(single(-0.015, 0.05).stack("left").changeMm, 0.01);
    near(single(0.015, 0.05).stack("left").changeMm, -0.01);
  });

  it("are equal within 1e-9·(1 + the smaller), and not beyond", () => {
    // 0.005 + e: none and one increment differ by 2·0.01·e/T² at a cost of 0.01: e = 1e-9·1.01·0.05²/0.02 = 1.2625e-10.
    expect(single(-0.005 - 1.2e-10, 0.05).stack("left").changeMm).toBe(0);
    near(single(-0.005 - 1.3e-10, 0.05).stack("left").changeMm, 0.01);
  });

  it("are told by the cost of the whole component: a part that cannot come right anyway is not disturbed", () => {
    const apart = (v: number) =>
      solvePart([stationOff("a", 0, 0, v), stationOff("b", 10, 0, -v - 0.002)], [feetAt("f", 0)], {
        cutIncrementMm: 0.001,
      }).stack("left").changeMm;
    // A lift of 0.001 is worth 2·(0.001/0.05)² = 8e-4: more than 1e-9 of 2·(1/0.05)², less than that of 2·(100/0.05)².
    near(apart(1), 0.001);
    expect(apart(100)).toBe(0);
  });

  it("stay near the ideal move where the stations leave a tilt open", () => {
    const supports = [feetAt("f", 0), feetAt("g", 1000)];
    const { answer, plan, problem } = solvePart([stationOff("s", 500, 0, -0.104)], supports, {
      cutIncrementMm: 0.01,
    });
    // 0.10 at both leaves 0.004; 0.10 and 0.11 leaves 0.001.
    near(costOfPlan(problem, plan), (0.001 / 0.05) ** 2);
    for (const { changeMm, idealMm } of answer.stacks)
      expect(Math.abs(changeMm - idealMm)).toBeLessThan(0.01);
    expect(plan.advice).toContainEqual({
      code: "tilt_not_determined",
      componentId: "part",
      planes: ["h", "v"],
    });
  });
});
