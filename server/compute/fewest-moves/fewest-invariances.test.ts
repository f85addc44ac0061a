import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { movedIds, someFewestProblem } from "../../../tests/support/fewest-machines.ts";
import { range } from "../../../tests/support/move-problems.ts";
import type { PlaneTolerance, Tolerance } from "../conformity/tolerance.ts";
import type { MoveStation } from "../moves/move-problem.ts";
import type { PlaneVector } from "../plane.ts";
import type { FewestMoves, FewestMovesProblem } from "./fewest-moves-problem.ts";
import { findFewestMoves } from "./find-fewest-moves.ts";

const anyMachine = fc.constantFrom("radial", "planes" as const).chain((form) => someFewestProblem(form, 3));

/** Cost, parts and predictions of two problems agree, the second seen through `seen`. */
function expectSame(
  first: FewestMoves,
  second: FewestMoves,
  seen: (deviation: PlaneVector) => PlaneVector = (same) => same,
): void {
  expect(second.possible).toBe(first.possible);
  if (!first.possible || !second.possible) return;
  expect(Math.abs(second.choice.cost - first.choice.cost)).toBeLessThan(1e-9);
  expect(movedIds(second.choice).sort()).toEqual(movedIds(first.choice).sort());
  const there = new Map(second.choice.predicted.map(({ id, deviation }) => [id, deviation]));
  for (const { id, deviation } of first.choice.predicted) {
    const [wanted, got] = [seen(deviation), there.get(id)!];
    // mm; the sum of squares is flat to 1e-9 of itself, so its place is known to its root.
    expect(Math.abs(got.hMm - wanted.hMm) + Math.abs(got.vMm - wanted.vMm)).toBeLessThan(1e-7);
  }
}

const mirrored = ({ minMm, maxMm }: PlaneTolerance) => range(-maxMm, -minMm);
const withStations = (
  problem: FewestMovesProblem,
  change: (station: MoveStation) => Partial<MoveStation>,
): FewestMovesProblem => ({
  ...problem,
  stations: problem.stations.map((station) => ({ ...station, ...change(station) })),
});

function check(
  change: (problem: FewestMovesProblem) => FewestMovesProblem,
  seen?: (d: PlaneVector) => PlaneVector,
) {
  let possible = 0;
  fc.assert(
    fc.property(anyMachine, (problem) => {
      const found = findFewestMoves(problem);
      possible += found.possible ? 1 : 0;
      expectSame(found, findFewestMoves(change(problem)), seen);
    }),
    { numRuns: 25, endOnFailure: true },
  );
  expect(possible).toBeGreaterThan(8);
}

describe("the fewest moves", () => {
  it("are mirrored when the machine is", () => {
    const mirrorTolerance = (tolerance: Tolerance | null): Tolerance | null =>
      tolerance?.form === "planes" ? { ...tolerance, h: mirrored(tolerance.h) } : tolerance;
    check(
      (problem) => ({
        ...withStations(problem, ({ deviation, tolerance }) => ({
          deviation: { hMm: -deviation.hMm, vMm: deviation.vMm },
          tolerance: mirrorTolerance(tolerance),
        })),
        references: problem.references.map((each) => ({
          ...each,
          float: { ...each.float, h: mirrored(each.float.h) },
        })),
        components: problem.components.map((part) => ({
          ...part,
          supports: part.supports.map((support) => ({
            ...support,
            travel: { ...support.travel, h: mirrored(support.travel.h) },
          })),
        })),
      }),
      ({ hMm, vMm }) => ({ hMm: -hMm, vMm }),
    );
  });

  it("are the same in whatever order stations, references and parts are sent", () => {
    check((problem) => ({
      ...problem,
      stations: [...problem.stations].reverse(),
      references: [...problem.references].reverse(),
      components: [...problem.components].reverse(),
    }));
  });

  it("are the same from another axis as surveyed, when its limits are stated from that one", () => {
    // The survey's axis laid 0.07 − 0.00002·z higher: what it may float to is the same lines in space.
    const height = (zMm: number) => 0.07 - 0.00002 * zMm;
    check((problem) => {
      const zOf = (id: string) => problem.stations.find((station) => station.id === id)!.zMm;
      return {
        ...withStations(problem, ({ zMm, deviation }) => ({
          deviation: { ...deviation, vMm: deviation.vMm - height(zMm) },
        })),
        references: problem.references.map(({ stationId, float: { h, v } }) => {
          const by = height(zOf(stationId));
          return { stationId, float: { h, v: range(v.minMm - by, v.maxMm - by) } };
        }),
      };
    });
  });

  it("cost no more when a limit is loosened, and no less when the margin grows", () => {
    fc.assert(
      fc.property(anyMachine, (problem) => {
        const costs = [0.01, 0, -1].map((step) => {
          const looser = {
            ...problem,
            marginMm: Math.max(0, step),
            references: problem.references.map(({ stationId, float: { h, v } }) => {
              const by = step < 0 ? 0.05 : 0;
              return {
                stationId,
                float: { h: range(h.minMm - by, h.maxMm + by), v: range(v.minMm - by, v.maxMm + by) },
              };
            }),
          };
          const found = findFewestMoves(looser);
          return found.possible ? found.choice.cost : Infinity;
        });
        expect(costs[0]).toBeGreaterThanOrEqual(costs[1]! - 1e-9);
        expect(costs[1]).toBeGreaterThanOrEqual(costs[2]! - 1e-9);
      }),
      { numRuns: 25, endOnFailure: true },
    );
  });

  it("cost nothing again once they are made, from the axis that they were made for", () => {
    fc.assert(
      fc.property(anyMachine, (problem) => {
        const found = findFewestMoves(problem);
        if (!found.possible) return;
        const left = new Map(found.choice.predicted.map(({ id, deviation }) => [id, deviation]));
        const after = findFewestMoves({
          ...withStations(problem, ({ id }) => ({ deviation: left.get(id)! })),
          references: problem.references.map(({ stationId }) => ({
            stationId,
            float: { h: range(-1e-9, 1e-9), v: range(-1e-9, 1e-9) },
          })),
          marginMm: 0,
        });
        expect(after).toMatchObject({ possible: true, choice: { cost: 0 } });
      }),
      { numRuns: 25, endOnFailure: true },
    );
  });
});
