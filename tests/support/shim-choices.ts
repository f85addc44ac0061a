import fc from "fast-check";
import { expect } from "vitest";
import type { MoveSupport, ShimStack } from "../../server/compute/moves/move-problem.ts";
import { bruteForceShims, type BruteGroup, type BruteStation, type BruteTask } from "./brute-force-shims.ts";
import { costOfPlan, solvePart, stackOf, stationOff } from "./move-problems.ts";

/** Round numbers, so that equal objectives are met often. */
export const grid = (stepMm: number, most: number) =>
  fc.integer({ min: -most, max: most }).map((n) => Math.round(n * stepMm * 1e6) / 1e6);

export const anyStack: fc.Arbitrary<ShimStack> = fc
  .record({
    pieces: fc.constantFrom(null, [], [0.03], [0.03, 0.02], [1, 0.04, 0.015]),
    thicknessMm: fc.constantFrom(0, 0.06, 3),
    down: fc.constantFrom(Infinity, Infinity, 0.02),
    up: fc.constantFrom(Infinity, Infinity, 0.03),
    maxCount: fc.constantFrom(Infinity, Infinity, 1, 2),
  })
  .map(({ pieces, thicknessMm, down, up, maxCount }) => {
    const thick = pieces?.reduce((sum, piece) => sum + piece, 0) ?? thicknessMm;
    return stackOf(thick, {
      piecesMm: pieces,
      minMm: Math.max(0, thick - down),
      maxMm: thick + up,
      // A stack that must not stay as it is has no plain zero to compare with.
      maxCount: Math.max(maxCount, pieces?.length ?? 1),
    });
  });

export const supply = fc.record({
  incrementMm: fc.constantFrom(0.01, 0.02),
  maximumMisfitMm: fc.constantFrom(0, 0.004, 0.02),
});

export const stationsAt = (zs: readonly number[], plane: "v" | "both"): fc.Arbitrary<BruteStation[]> =>
  fc.tuple(
    ...zs.map((zMm) =>
      fc.record({
        zMm: fc.constant(zMm),
        hMm: plane === "v" ? fc.constant(0) : grid(0.005, 12),
        vMm: grid(0.005, 12),
        toleranceMm: fc.constantFrom(0.02, 0.05),
      }),
    ),
  );

export const both = (zMm: number, h: number, v: number, second = 1 as 1 | -1): BruteGroup["places"] => [
  { zMm, h, v, sign: 1 },
  { zMm, h: h * second, v: v * second, sign: second },
];

export const feetGroup = (zMm: number, stack: ShimStack): BruteGroup => ({ stack, places: both(zMm, 0, 1) });

/** What is solved, the same said twice: as a component's supports, and as places for the brute force. */
export interface Twice {
  readonly supports: readonly MoveSupport[];
  readonly task: BruteTask;
}

/** Solves both, and expects the same cost, pieces handled and total change; where no choice will do, that it is said. */
export function expectSameChoice({ supports, task }: Twice): void {
  const stations = task.stations.map(({ zMm, hMm, vMm, toleranceMm }, i) =>
    stationOff(`s${i}`, zMm, hMm, vMm, toleranceMm),
  );
  const { problem, plan, answer } = solvePart(stations, supports, {
    cutIncrementMm: task.incrementMm,
    maximumMisfitMm: task.maximumMisfitMm,
  });
  const best = bruteForceShims(task);
  if (!best) {
    expect(answer.unreachable).not.toBe(null);
    return;
  }
  expect(best.atEdge).toBe(false);
  const cost = costOfPlan(problem, plan);
  const share = (cost - best.cost) / (1 + best.cost);
  const handled = answer.stacks.reduce((sum, { addMm, removeMm }) => sum + addMm.length + removeMm.length, 0);
  const totalMm = answer.stacks.reduce((sum, { changeMm }) => sum + Math.abs(changeMm), 0);
  expect({ ...best, cost: Math.abs(share) < 1.1e-9, handled, sameTotal: true }).toEqual({
    ...best,
    cost: true,
    handled: best.fewestHandled,
    sameTotal: Math.abs(totalMm - best.leastTotalMm) < 1e-8,
  });
}

export const runs = { numRuns: 50 };
