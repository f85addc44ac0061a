import fc from "fast-check";
import { Matrix, solve } from "ml-matrix";
import { describe, expect, it } from "vitest";
import { someMachine } from "../../../tests/support/move-machines.ts";
import {
  feetAt,
  range,
  solvePart,
  stackOf,
  stationOff,
  unlimited,
} from "../../../tests/support/move-problems.ts";
import type { SupportMove } from "./move-plan.ts";
import type { MoveSupport, ShimStack } from "./move-problem.ts";
import { solveMoves } from "./solve-moves.ts";

const near = (got: number, wanted: number, within = 1e-9) =>
  expect(Math.abs(got - wanted)).toBeLessThan(within); // mm

/** The move at z of a rigid part, by its moves at its first and last support. */
function moveAtZ(supports: readonly MoveSupport[], moves: readonly SupportMove[], zMm: number) {
  const [z0, z1] = [supports[0]!.zMm, supports.at(-1)!.zMm];
  const share = z1 === z0 ? 0 : (zMm - z0) / (z1 - z0);
  const [a, b] = [moves[0]!, moves.at(-1)!];
  return { hMm: a.hMm + share * (b.hMm - a.hMm), vMm: a.vMm + share * (b.vMm - a.vMm) };
}

describe("the realised move", () => {
  it("is the rigid move that best fits the changes, in least squares; what is left is the misfit", () => {
    // Three supports, the middle one's feet limited so that the part cannot follow all of them.
    const zs = [0, 700, 2000];
    const limited = stackOf(5, { maxMm: 5.03 });
    const supports = zs.map((z, k) =>
      feetAt(`f${k}`, z, k === 1 ? { stacks: { left: limited, right: limited } } : {}),
    );
    const stations = [stationOff("a", 100, 0, -0.061), stationOff("b", 1900, 0, -0.038)];
    const { answer, plan } = solvePart(stations, supports, { cutIncrementMm: 0.01 });
    const lefts = answer.stacks.filter(({ place }) => place === "left");
    const line = solve(
      new Matrix(zs.map((z) => [1, z])),
      Matrix.columnVector(lefts.map(({ changeMm }) => changeMm)),
      true,
    ).to1DArray();
    const liftAt = (z: number) => line[0]! + line[1]! * z;
    zs.forEach((z, k) => {
      near(answer.realised[k]!.vMm, liftAt(z), 1e-12);
      near(lefts[k]!.misfitMm, lefts[k]!.changeMm - liftAt(z), 1e-12);
      expect(Math.abs(lefts[k]!.misfitMm)).toBeLessThanOrEqual(0.02 + 1e-9);
    });
    expect(lefts.some(({ misfitMm }) => Math.abs(misfitMm) > 1e-4)).toBe(true);
    plan.predicted.forEach(({ deviation }, i) =>
      near(deviation.vMm, stations[i]!.deviation.vMm + liftAt(stations[i]!.zMm), 1e-12),
    );
  });

  it("is what the predicted deviations are of, not the ideal move", () => {
    const { plan, answer } = solvePart([stationOff("s", 0, 0, -0.113)], [feetAt("f", 0)], {
      cutIncrementMm: 0.05,
    });
    near(answer.ideal[0]!.vMm, 0.113);
    near(answer.realised[0]!.vMm, 0.1);
    near(plan.predicted[0]!.deviation.vMm, -0.013);
  });

  it("sets by jack, to the best and within its travel, what no stack sets", () => {
    const keys = { left: stackOf(5), right: stackOf(5), "key-left": stackOf(4), "key-right": stackOf(4) };
    const stations = [stationOff("a", 0, -0.013, 0), stationOff("b", 1000, -0.0237, 0)];
    const free = [feetAt("f", 0, { stacks: keys }), feetAt("g", 1000)];
    const { answer, plan } = solvePart(stations, free, { cutIncrementMm: 0.01 });
    near(answer.realised[0]!.hMm, 0.01, 1e-12);
    near(answer.realised[1]!.hMm, 0.0237, 1e-12);
    near(plan.predicted[1]!.deviation.hMm, 0, 1e-12);
    const held = [free[0]!, feetAt("g", 1000, { travel: { h: range(-1, 0.02), v: unlimited } })];
    near(solvePart(stations, held, { cutIncrementMm: 0.01 }).answer.realised[1]!.hMm, 0.02, 1e-12);
  });

  it("takes every part of the prediction from the moves at the supports, and a verdict that holds", () => {
    fc.assert(
      fc.property(fc.oneof(someMachine(null), someMachine(0.01)), (problem) => {
        const plan = solveMoves(problem);
        for (const [c, { stationIds, supports }] of problem.components.entries()) {
          for (const id of stationIds) {
            const station = problem.stations.find((one) => one.id === id)!;
            const { deviation, verdict } = plan.predicted.find((one) => one.id === id)!;
            const move = moveAtZ(supports, plan.components[c]!.realised, station.zMm);
            near(deviation.hMm, station.deviation.hMm + move.hMm);
            near(deviation.vMm, station.deviation.vMm + move.vMm);
            const tolerance = station.tolerance!;
            const inside =
              tolerance.form === "radial"
                ? Math.hypot(deviation.hMm, deviation.vMm) <= tolerance.halfWidthMm
                : deviation.hMm >= tolerance.h.minMm &&
                  deviation.hMm <= tolerance.h.maxMm &&
                  deviation.vMm >= tolerance.v.minMm &&
                  deviation.vMm <= tolerance.v.maxMm;
            expect(verdict).toBe(inside ? "conforms" : "exceeds");
          }
          const exceeds = stationIds.some(
            (id) => plan.predicted.find((one) => one.id === id)!.verdict === "exceeds",
          );
          if (exceeds) expect(plan.components[c]!.unreachable).not.toBe(null);
        }
      }),
      { numRuns: 60 },
    );
  });

  it("keeps every limit that was stated: travel, least and most thickness, misfit", () => {
    fc.assert(
      fc.property(someMachine(0.01), (problem) => {
        const plan = solveMoves(problem);
        problem.components.forEach(({ supports }, c) => {
          const { realised, stacks } = plan.components[c]!;
          supports.forEach(({ travel, blocked }, k) => {
            const { hMm, vMm } = realised[k]!;
            expect(hMm).toBeGreaterThanOrEqual(travel.h.minMm - 1e-9);
            expect(hMm).toBeLessThanOrEqual(travel.h.maxMm + 1e-9);
            expect(vMm).toBeGreaterThanOrEqual(travel.v.minMm - 1e-9);
            expect(vMm).toBeLessThanOrEqual(travel.v.maxMm + 1e-9);
            for (const plane of blocked) near(plane === "h" ? hMm : vMm, 0, 1e-12);
          });
          for (const { supportId, place, toMm, misfitMm, fromMm, changeMm, addMm, removeMm } of stacks) {
            const support = supports.find(({ id }) => id === supportId)!;
            const stack: ShimStack =
              support.form === "pads"
                ? support.pads.find(({ id }) => id === place)!.stack
                : (support.stacks as Record<string, ShimStack>)[place]!;
            expect(toMm).toBeGreaterThanOrEqual(stack.minMm - 1e-9);
            expect(toMm).toBeLessThanOrEqual(stack.maxMm + 1e-9);
            expect(Math.abs(misfitMm)).toBeLessThanOrEqual(problem.maximumMisfitMm + 2e-9);
            const sum = (values: readonly number[]) => values.reduce((total, one) => total + one, 0);
            near(sum(addMm) - sum(removeMm), changeMm);
            near(fromMm + changeMm, toMm);
          }
        });
      }),
      { numRuns: 60 },
    );
  });
});
