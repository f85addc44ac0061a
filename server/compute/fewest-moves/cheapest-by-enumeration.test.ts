import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { cheapestSets, gapOfSum } from "../../../tests/support/fewest-oracle.ts";
import { movedIds, someFewestProblem } from "../../../tests/support/fewest-machines.ts";
import type { PlaneVector } from "../plane.ts";
import type { FewestMovesProblem } from "./fewest-moves-problem.ts";
import { findFewestMoves } from "./find-fewest-moves.ts";

/** Σ(|d|/T)². */
function sumOf({ stations }: FewestMovesProblem, deviations: readonly PlaneVector[]): number {
  return stations.reduce((sum, { tolerance }, k) => {
    if (!tolerance) return sum;
    const { hMm, vMm } = deviations[k]!;
    if (tolerance.form === "radial") return sum + (hMm ** 2 + vMm ** 2) / tolerance.halfWidthMm ** 2;
    const share = (value: number, { minMm, maxMm }: { minMm: number; maxMm: number }) =>
      (2 * value - minMm - maxMm) / (maxMm - minMm);
    return sum + share(hMm, tolerance.h) ** 2 + share(vMm, tolerance.v) ** 2;
  }, 0);
}

/** The same machine on which only these parts may move, and cost nothing to speak of. */
const holding = (problem: FewestMovesProblem, ids: readonly string[]): FewestMovesProblem => ({
  ...problem,
  components: problem.components.map((part) => ({ ...part, fixed: !ids.includes(part.id) })),
});

describe.each(["planes", "radial"] as const)("the fewest moves, tolerances %s", (form) => {
  it("are those that trying every set of parts finds, with the axis and moves of least squares", () => {
    const seen = { none: 0, some: 0, tied: 0, impossible: 0, undecided: 0 };
    fc.assert(
      fc.property(someFewestProblem(form, 4), (problem) => {
        const outside = cheapestSets(problem, "outside");
        const inside = form === "radial" ? cheapestSets(problem, "inside") : outside;
        // Between the two polygons, 2e-4 of a radius apart, the oracle cannot tell.
        if (outside?.length !== inside?.length || outside?.[0]?.cost !== inside?.[0]?.cost) {
          seen.undecided++;
          return;
        }
        const found = findFewestMoves(problem);
        expect(found.possible).toBe(outside !== null);
        if (!found.possible || outside === null) {
          seen.impossible++;
          return;
        }
        const { choice } = found;
        seen[choice.cost === 0 ? "none" : "some"]++;
        expect(Math.abs(choice.cost - outside[0]!.cost)).toBeLessThan(1e-9);
        expect(outside.map(({ ids }) => ids)).toContainEqual(movedIds(choice));
        expect(choice.search).toMatchObject({ proved: true, betterBy: 0, tied: outside.length - 1 });
        expect(choice.predicted.map(({ verdict }) => verdict)).toEqual(
          choice.predicted.map(() => "conforms"),
        );
        // The sum can lose nothing, to the accuracy of the polygons; and no other set at this cost has a smaller one.
        const deviations = choice.predicted.map(({ deviation }) => deviation);
        const own = sumOf(problem, deviations);
        const gap = gapOfSum(problem, movedIds(choice), deviations);
        expect(gap).toBeLessThan((form === "radial" ? 2e-3 : 1e-6) * (1 + own));
        for (const { ids } of outside.length > 1 ? outside : []) {
          seen.tied++;
          const other = findFewestMoves(holding(problem, ids));
          if (!other.possible) throw new Error("A set at the least cost was lost.");
          const sum = sumOf(
            problem,
            other.choice.predicted.map(({ deviation }) => deviation),
          );
          expect(own).toBeLessThan(sum + 1e-7 * (1 + sum));
        }
      }),
      { numRuns: form === "radial" ? 40 : 60, endOnFailure: true },
    );
    expect(seen.none).toBeGreaterThan(2);
    expect(seen.some).toBeGreaterThan(10);
    expect(seen.tied).toBeGreaterThan(1);
    expect(seen.impossible).toBeGreaterThan(3);
    expect(seen.undecided).toBeLessThan(5);
  }, 120_000);
});
