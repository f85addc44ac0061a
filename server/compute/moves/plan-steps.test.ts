import { describe, expect, it } from "vitest";
import { feetAt, moveProblem, partOn, solvePart, stationOff } from "../../../tests/support/move-problems.ts";
import type { MoveComponent, MoveIndicator, MoveProblem } from "./move-problem.ts";
import { incrementCount } from "./plan-steps.ts";
import { solveMoves } from "./solve-moves.ts";

const near = (got: number, wanted: number, within = 1e-12) =>
  expect(Math.abs(got - wanted)).toBeLessThan(within); // mm

/** Parts of the named kinds, each with one station 0.1 low on one support. */
function machineOf(kinds: readonly MoveComponent["kind"][], rest: Partial<MoveProblem> = {}): MoveProblem {
  return moveProblem(
    kinds.map((_, k) => stationOff(`s${k}`, 1000 * k, 0, -0.1)),
    kinds.map((kind, k) => partOn(`${kind}-${k}`, [`s${k}`], [feetAt("f", 1000 * k)], { kind })),
    rest,
  );
}

const indicator = (
  id: string,
  clockDeg: number,
  contact: MoveIndicator["contact"] = "outside",
  zMm = 0,
  componentId = "part",
): MoveIndicator => ({ id, componentId, zMm, clockDeg, contact });

describe("the order of steps", () => {
  it("moves casings, shrouds, nozzles and others first, bearings after, each group in the order sent", () => {
    const kinds = ["bearing", "casing", "bearing", "shroud", "nozzle", "other"] as const;
    const { steps } = solveMoves(machineOf(kinds));
    expect(steps.map(({ componentId }) => componentId)).toEqual([
      "casing-1",
      "shroud-3",
      "nozzle-4",
      "other-5",
      "bearing-0",
      "bearing-2",
    ]);
    expect(steps.map(({ order }) => order)).toEqual([1, 2, 3, 4, 5, 6]);
  });

  it("has no step for a part that stays", () => {
    const problem = machineOf(["casing", "bearing"]);
    const still = { ...problem.components[0]!, fixed: true };
    const { steps } = solveMoves({ ...problem, components: [still, problem.components[1]!] });
    expect(steps.map(({ componentId, order }) => [componentId, order])).toEqual([["bearing-1", 1]]);
  });
});

describe("the parts of a step", () => {
  it("number ⌈L/maximum − 1e-9⌉, L the largest |h| or |v| at any support", () => {
    const count = (hMm: number, vMm: number, maximumMm: number | null) =>
      incrementCount(
        [
          { supportId: "a", hMm: 0, vMm: 0 },
          { supportId: "b", hMm, vMm },
        ],
        maximumMm,
      );
    expect(count(0, 0.5, 0.25)).toBe(2);
    expect(count(-0.5, 0.1, 0.25)).toBe(2);
    expect(count(0, 0.25 * (2 + 0.9e-9), 0.25)).toBe(2);
    expect(count(0, 0.25 * (2 + 2e-9), 0.25)).toBe(3);
    expect(count(0.1, 0, 0.25)).toBe(1);
    expect(count(9, 9, null)).toBe(1);
    // 0.3/0.1 is a hair under 3 in binary, 0.6/0.2 a hair under 3, 0.7/0.1 a hair under 7: whole numbers all.
    expect([count(0, 0.3, 0.1), count(0, 0.6, 0.2), count(0, 0.7, 0.1)]).toEqual([3, 3, 7]);
  });

  it("are equal and cumulative, the last one being the realised move", () => {
    const supports = [feetAt("f", 0), feetAt("g", 1000)];
    const { plan, answer } = solvePart(
      [stationOff("a", 0, 0.3, -0.6), stationOff("b", 1000, 0, 0.2)],
      supports,
      {
        maximumIncrementMm: 0.25,
      },
    );
    const { increments } = plan.steps[0]!;
    expect(increments.length).toBe(3);
    increments.forEach(({ moves }, k) => {
      near(moves[0]!.hMm, (-0.3 * (k + 1)) / 3);
      near(moves[0]!.vMm, (0.6 * (k + 1)) / 3);
      near(moves[1]!.vMm, (-0.2 * (k + 1)) / 3);
    });
    expect(increments.at(-1)!.moves).toEqual(answer.realised);
  });

  it("say what every indicator of the part reads: positive when the part comes toward it", () => {
    const { plan } = solvePart([stationOff("s", 0, 0.1, -0.2)], [feetAt("f", 0)], {
      maximumIncrementMm: 0.1,
      indicators: [
        indicator("top", 0),
        indicator("right", 90),
        indicator("bottom", 180),
        indicator("inside-top", 0, "inside"),
        indicator("oblique", 45),
        indicator("elsewhere", 0, "outside", 0, "other"),
      ],
    });
    const { increments } = plan.steps[0]!;
    expect(increments.length).toBe(2);
    const last = Object.fromEntries(increments[1]!.readings.map((one) => [one.indicatorId, one.readingMm]));
    expect(Object.keys(last)).toEqual(["top", "right", "bottom", "inside-top", "oblique"]);
    // The part moves 0.1 to the left and 0.2 up.
    near(last["top"]!, 0.2);
    near(last["right"]!, -0.1);
    near(last["bottom"]!, -0.2);
    near(last["inside-top"]!, -0.2);
    near(last["oblique"]!, (0.2 - 0.1) * Math.SQRT1_2);
    near(increments[0]!.readings[0]!.readingMm, 0.1);
  });

  it("read a tilting part at the indicator's own z", () => {
    const supports = [feetAt("f", 0), feetAt("g", 1000)];
    const { plan } = solvePart([stationOff("a", 0, 0, -0.2), stationOff("b", 1000, 0, 0.2)], supports, {
      indicators: [indicator("quarter", 0, "outside", 250), indicator("beyond", 0, "outside", 1500)],
    });
    const [quarter, beyond] = plan.steps[0]!.increments[0]!.readings;
    near(quarter!.readingMm, 0.1);
    near(beyond!.readingMm, -0.4);
  });

  it("read what the bore does while a roll is taken out, for an indicator points at the bore", () => {
    // Feet 650 below the bore, 0.0001 rad clockwise: turned back, the bore goes 0.065 to the left (rigid body, small angles).
    const feet = [
      { supportId: "f", place: "left" as const, hMm: -1000, vMm: -650 },
      { supportId: "f", place: "right" as const, hMm: 1000, vMm: -650 },
    ];
    const indicators = [
      indicator("top", 0),
      indicator("right", 90),
      indicator("inside-right", 90, "inside"),
      indicator("oblique", 45),
    ];
    const { answer, plan } = solvePart(
      [stationOff("s", 0, 0.2, -0.3)],
      [feetAt("f", 0)],
      { maximumIncrementMm: 0.25, indicators },
      { roll: { radians: 1e-4, feet } },
    );
    near(answer.realised[0]!.hMm, -0.135);
    const [half, whole] = plan.steps[0]!.increments;
    const readings = whole!.readings.map(({ readingMm }) => readingMm);
    [0.3, -0.2, 0.2, (0.3 - 0.2) * Math.SQRT1_2].forEach((wanted, k) => {
      near(readings[k]!, wanted);
      near(half!.readings[k]!.readingMm, wanted / 2);
    });
  });

  it("are refused by code when a call would make more of them than it may", () => {
    const most = { maximumIncrementMm: 0.01, incrementsMax: 20 };
    expect(solveMoves(machineOf(["casing", "bearing"], most)).steps.length).toBe(2);
    const refused = () => solveMoves(machineOf(["casing", "bearing", "bearing"], most));
    expect(refused).toThrow(
      expect.objectContaining({
        code: "combination_invalid",
        details: { at: ["maximumIncrement"], reached: 30, limit: 20 },
      }) as Error,
    );
    const hair = { maximumIncrementMm: 1e-300, incrementsMax: 2000 };
    expect(() => solveMoves(machineOf(["casing"], hair))).toThrow(
      expect.objectContaining({ code: "combination_invalid" }) as Error,
    );
  });
});

describe("the stations to watch", () => {
  it("are the reference stations: their change, and where to stop either side of it", () => {
    const problem = machineOf(["casing", "casing"], { referenceIds: ["s1"], maximumMisfitMm: 0.03 });
    const [first, second] = problem.components;
    const { steps } = solveMoves({
      ...problem,
      components: [first!, { ...second!, allowReferenceMove: true }],
    });
    const [still] = steps[0]!.watch;
    expect(still).toEqual({
      stationId: "s1",
      change: { hMm: 0, vMm: 0 },
      stopAt: { h: { minMm: -0.03, maxMm: 0.03 }, v: { minMm: -0.03, maxMm: 0.03 } },
    });
    const [moving] = steps[1]!.watch;
    near(moving!.change.vMm, 0.1);
    near(moving!.stopAt.v.minMm, 0.07);
    near(moving!.stopAt.v.maxMm, 0.13);
    expect(moving!.stopAt.h).toEqual({ minMm: -0.03, maxMm: 0.03 });
  });
});

describe("what to measure again", () => {
  it("is the reference stations first, then every station of a part that moved, in the order sent", () => {
    const problem = machineOf(["bearing", "casing", "shroud"], { referenceIds: ["s2"] });
    expect(solveMoves(problem).remeasureIds).toEqual(["s2", "s0", "s1"]);
    const allowed = problem.components.map((one) => ({ ...one, allowReferenceMove: true }));
    expect(solveMoves({ ...problem, components: allowed }).remeasureIds).toEqual(["s2", "s0", "s1"]);
  });

  it("is nothing when nothing moved", () => {
    const problem = machineOf(["bearing", "casing"], { referenceIds: ["s0"] });
    const components = problem.components.map((one) => ({ ...one, fixed: true }));
    expect(solveMoves({ ...problem, components }).remeasureIds).toEqual([]);
  });
});
