import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { someMachine } from "../../../tests/support/move-machines.ts";
import { range } from "../../../tests/support/move-problems.ts";
import type { StackChange } from "./move-plan.ts";
import type { MoveProblem, MoveSupport, ShimStack } from "./move-problem.ts";
import { solveMoves } from "./solve-moves.ts";

const near = (got: number, wanted: number, within = 1e-9) =>
  expect(Math.abs(got - wanted)).toBeLessThan(within); // mm

/** The model after the shims are in: stacks, travel left, and deviations as predicted. */
function afterwards(problem: MoveProblem): MoveProblem {
  const plan = solveMoves(problem);
  const shimmed = (stack: ShimStack, { toMm, addMm, removeMm }: StackChange): ShimStack => {
    const left = [...(stack.piecesMm ?? (stack.thicknessMm > 0 ? [stack.thicknessMm] : []))];
    for (const piece of removeMm) left.splice(left.indexOf(piece), 1);
    return { ...stack, thicknessMm: toMm, piecesMm: [...left, ...addMm] };
  };
  return {
    ...problem,
    stations: problem.stations.map((station) => ({
      ...station,
      deviation: plan.predicted.find(({ id }) => id === station.id)!.deviation,
    })),
    components: problem.components.map((component, c) => ({
      ...component,
      supports: component.supports.map((support, k): MoveSupport => {
        const { hMm, vMm } = plan.components[c]!.realised[k]!;
        const { h, v } = support.travel;
        const travel = {
          h: range(h.minMm - hMm, h.maxMm - hMm),
          v: range(v.minMm - vMm, v.maxMm - vMm),
        };
        const changed = (place: string, stack: ShimStack) =>
          shimmed(
            stack,
            plan.components[c]!.stacks.find((one) => one.supportId === support.id && one.place === place)!,
          );
        if (support.form === "pads") {
          return {
            ...support,
            travel,
            pads: support.pads.map((pad) => ({ ...pad, stack: changed(pad.id, pad.stack) })),
          };
        }
        const stacks = Object.fromEntries(
          Object.entries(support.stacks).map(([place, stack]) => [place, changed(place, stack)]),
        );
        return { ...support, travel, stacks };
      }),
    })),
  };
}

describe("a machine whose moves were made as planned", () => {
  it("leaves nothing to do: solved again it asks for no shims", () => {
    fc.assert(
      fc.property(someMachine(0.01), (problem) => {
        const again = afterwards(problem);
        const plan = solveMoves(again);
        plan.components.forEach(({ stacks, realised }) => {
          for (const { changeMm, addMm, removeMm } of stacks) {
            expect({ changeMm, addMm, removeMm }).toEqual({ changeMm: 0, addMm: [], removeMm: [] });
          }
          for (const { hMm, vMm } of realised) near(Math.hypot(hMm, vMm), 0);
        });
        plan.predicted.forEach(({ deviation }, i) => {
          near(deviation.hMm, again.stations[i]!.deviation.hMm);
          near(deviation.vMm, again.stations[i]!.deviation.vMm);
        });
      }),
      { numRuns: 60 },
    );
  });
});
