import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { mirroredPlace, retell, someMachine } from "../../../tests/support/move-machines.ts";
import { deepFreeze } from "../../../tests/support/move-problems.ts";
import type { MovePlan } from "./move-plan.ts";
import { solveMoves } from "./solve-moves.ts";

const anyMachine = fc.oneof(someMachine(null), someMachine(0.01), someMachine(0.025));
const runs = { numRuns: 60 };

const near = (got: number, wanted: number, within = 1e-9) =>
  expect(Math.abs(got - wanted)).toBeLessThan(within); // mm, or mm times the factor of a scaling

/** Expects `after` to be `before` with every offset times `factor`, and h reversed in a mirror. */
function expectSamePlan(before: MovePlan, after: MovePlan, factor = 1, turn: 1 | -1 = 1): void {
  const same = (got: number, wanted: number) => near(got / factor, wanted);
  for (const component of before.components) {
    const other = after.components.find(({ id }) => id === component.id)!;
    expect(other.unreachable?.cause).toBe(component.unreachable?.cause);
    for (const kind of ["ideal", "realised"] as const) {
      for (const move of component[kind]) {
        const its = other[kind].find(({ supportId }) => supportId === move.supportId)!;
        same(its.hMm, turn * move.hMm);
        same(its.vMm, move.vMm);
      }
    }
    for (const stack of component.stacks) {
      const place = turn < 0 ? mirroredPlace(stack.place) : stack.place;
      const its = other.stacks.find((one) => one.supportId === stack.supportId && one.place === place)!;
      // The one stack at the bottom key is that of the left cheek, in the mirror too.
      const oneCheek = turn < 0 && place === "key-bottom";
      same(its.changeMm, oneCheek ? -stack.changeMm : stack.changeMm);
      same(its.misfitMm, oneCheek ? -stack.misfitMm : stack.misfitMm);
      if (oneCheek) continue;
      expect(its.addMm.length + its.removeMm.length).toBe(stack.addMm.length + stack.removeMm.length);
    }
  }
  for (const { id, deviation, verdict } of before.predicted) {
    const its = after.predicted.find((one) => one.id === id)!;
    same(its.deviation.hMm, turn * deviation.hMm);
    same(its.deviation.vMm, deviation.vMm);
    expect(its.verdict).toBe(verdict);
  }
  for (const step of before.steps) {
    const its = after.steps.find(({ componentId }) => componentId === step.componentId)!;
    expect(its.increments.length).toBe(step.increments.length);
    step.increments.forEach(({ readings }, k) =>
      readings.forEach(({ readingMm }, i) => same(its.increments[k]!.readings[i]!.readingMm, readingMm)),
    );
  }
}

describe("solveMoves", () => {
  it("does not feel where z = 0 was put, nor the unit of z", () => {
    const along = fc.double({ min: -1e5, max: 1e5, noNaN: true });
    fc.assert(
      fc.property(anyMachine, along, fc.constantFrom(1, 1e-3, 25.4, 304.8), (problem, shiftMm, factor) => {
        const after = retell(problem, { z: (zMm) => factor * (zMm + shiftMm) });
        expectSamePlan(solveMoves(problem), solveMoves(after));
      }),
      runs,
    );
  });

  it("looks the same from the other side: h, left and right change places", () => {
    fc.assert(
      fc.property(anyMachine, (problem) => {
        expectSamePlan(solveMoves(problem), solveMoves(retell(problem, { mirrored: true })), 1, -1);
      }),
      runs,
    );
  });

  it("scales with all offsets: it knows no unit", () => {
    fc.assert(
      fc.property(anyMachine, fc.constantFrom(1 / 25.4, 25.4, 1000), (problem, factor) => {
        expectSamePlan(solveMoves(problem), solveMoves(retell(problem, { factor })), factor);
      }),
      runs,
    );
  });

  it("does not mind the order of components, stations, supports and pads", () => {
    fc.assert(
      fc.property(anyMachine, (problem) => {
        const after = {
          ...problem,
          stations: [...problem.stations].reverse(),
          components: [...problem.components].reverse().map((component) => ({
            ...component,
            stationIds: [...component.stationIds].reverse(),
            supports: [...component.supports]
              .reverse()
              .map((one) => (one.form === "pads" ? { ...one, pads: [...one.pads].reverse() } : one)),
          })),
        };
        expectSamePlan(solveMoves(problem), solveMoves(after));
      }),
      runs,
    );
  });

  it("answers the same a second time, and leaves its input as it was", () => {
    fc.assert(
      fc.property(anyMachine, (problem) => {
        expect(solveMoves(deepFreeze(problem))).toEqual(solveMoves(problem));
      }),
      runs,
    );
  });
});
