import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { feetAt, solvePart, stationOff } from "../../../tests/support/move-problems.ts";
import { dot, lengthOf } from "./least-squares-in-order.ts";
import { remainderOf, solveMinimaxProgram, type MinimaxTerm } from "./minimax-program.ts";

const near = (got: number, wanted: number, within = 1e-9) =>
  expect(Math.abs(got - wanted)).toBeLessThan(within);

/** One line through heights: terms of one row in intercept and slope. */
const lineTerms = (z: readonly number[], h: readonly number[]): MinimaxTerm[] =>
  z.map((at, i) => ({ rows: [[1, at]], targets: [h[i]!] }));
const squares = (terms: readonly MinimaxTerm[]) => ({
  rows: terms.flatMap(({ rows }) => rows),
  targets: terms.flatMap(({ targets }) => targets),
});
const least = (size: number) => ({
  rows: Array.from({ length: size }, (_, i) => Array.from({ length: size }, (__, k) => (i === k ? 1 : 0))),
  targets: new Array<number>(size).fill(0),
});

const largestAt = (terms: readonly MinimaxTerm[], x: readonly number[]) =>
  Math.max(...terms.map((term) => lengthOf(remainderOf(term, x))));

describe("solveMinimaxProgram", () => {
  it("fits the line of the least largest distance: S. Dasgupta, C. Papadimitriou, U. Vazirani, Algorithms (2006), exercise 7.8", () => {
    const terms = lineTerms([1, 2, 3, 5, 7, 8, 10], [3, 5, 7, 11, 14, 15, 19]);
    const best = solveMinimaxProgram(2, terms, [squares(terms), least(2)], []);
    if (!best.feasible) throw new Error("There is no limit.");
    // The book gives the data; 13/7, 12/7 and 4/7 by all triples in exact rationals.
    near(best.point[0]!, 13 / 7);
    near(best.point[1]!, 12 / 7);
    near(best.largest, 4 / 7);
    near(best.floor, 4 / 7);
  });

  it("fits z² on 0 to 1 by z − 1/8, within 1/8 (P. L. Chebyshev, from memory)", () => {
    const z = Array.from({ length: 9 }, (_, k) => k / 8);
    const terms = lineTerms(
      z,
      z.map((at) => at * at),
    );
    const best = solveMinimaxProgram(2, terms, [squares(terms), least(2)], []);
    if (!best.feasible) throw new Error("There is no limit.");
    near(best.point[0]!, -1 / 8);
    near(best.point[1]!, 1);
    near(best.largest, 1 / 8);
  });

  it("centres round tolerances: the smallest circle about a triangle of right angle is about its longest side", () => {
    const points = [
      [0, 0],
      [3, 0],
      [0, 4],
      [1, 1],
    ] as const;
    const terms = points.map(([h, v]): MinimaxTerm => ({
      rows: [
        [1, 0],
        [0, 1],
      ],
      targets: [h, v],
    }));
    const best = solveMinimaxProgram(2, terms, [squares(terms), least(2)], []);
    if (!best.feasible) throw new Error("There is no limit.");
    near(best.point[0]!, 1.5);
    near(best.point[1]!, 2);
    near(best.largest, 2.5);
    // The two ends hold it up, half each; the right angle touches and holds nothing.
    near(best.weights[1]! + best.weights[2]!, 1);
  });

  it("serves the others best once the largest is at its least", () => {
    // v of the first is stopped at 1; the second could be met, and of all moves that leave the first at 1 it is.
    const terms: MinimaxTerm[] = [
      {
        rows: [
          [1, 0],
          [0, 1],
        ],
        targets: [0, 2],
      },
      { rows: [[1, 0]], targets: [0.3] },
    ];
    const best = solveMinimaxProgram(2, terms, [squares(terms), least(2)], [{ row: [0, 1], most: 1 }]);
    if (!best.feasible) throw new Error("There is room.");
    near(best.largest, 1);
    near(best.point[0]!, 0);
    near(best.point[1]!, 1);
    expect(best.binding.map(({ limit }) => limit)).toEqual([0]);
    near(best.binding[0]!.worth, 1);
  });

  const share = fc.integer({ min: -1000, max: 1000 }).map((n) => n / 1000);
  const someTerm = fc.record({
    z: share,
    h: share,
    v: share,
    tolerance: fc.constantFrom(0.02, 0.05, 0.1),
    round: fc.boolean(),
  });
  const someLimit = fc.record({
    z: share,
    h: fc.boolean(),
    sign: fc.constantFrom(1, -1),
    most: share.map(Math.abs),
  });

  it("is proved by a second problem, and no step from it within the limits is better", () => {
    fc.assert(
      fc.property(
        fc.array(someTerm, { minLength: 1, maxLength: 6 }),
        fc.array(someLimit, { maxLength: 4 }),
        fc.array(fc.tuple(share, share, share, share), { minLength: 30, maxLength: 30 }),
        (asked, bounded, steps) => {
          const terms = asked.flatMap(({ z, h, v, tolerance: t, round }): MinimaxTerm[] => {
            const inH = { rows: [[1 / t, z / t, 0, 0]], targets: [h / t] };
            const inV = { rows: [[0, 0, 1 / t, z / t]], targets: [v / t] };
            return round
              ? [{ rows: [...inH.rows, ...inV.rows], targets: [...inH.targets, ...inV.targets] }]
              : [inH, inV];
          });
          const limits = bounded.map(({ z, h, sign, most }) => ({
            row: h ? [sign, sign * z, 0, 0] : [0, 0, sign, sign * z],
            most,
          }));
          const best = solveMinimaxProgram(4, terms, [squares(terms), least(4)], limits);
          if (!best.feasible) throw new Error("No move keeps every limit.");
          near(best.largest, largestAt(terms, best.point), 1e-9 * (1 + best.largest));
          expect(best.largest - best.floor).toBeLessThan(1e-9 * (1 + best.largest));
          for (const { row, most } of limits) expect(dot(row, best.point) - most).toBeLessThan(1e-9);
          for (const step of steps) {
            for (const length of [1, 1e-2, 1e-4]) {
              const x = best.point.map((value, k) => value + length * step[k]!);
              if (limits.some(({ row, most }) => dot(row, x) > most)) continue;
              expect(largestAt(terms, x)).toBeGreaterThan(best.largest - 1e-9 * (1 + best.largest));
            }
          }
        },
      ),
      { numRuns: 60 },
    );
  });
});

describe("moves of the least largest deviation", () => {
  it("put a part between two bores that no rigid move serves, in shares of their tolerances", () => {
    // One support: by v alone; −0.3 and 0.1 at tolerances 0.1 and 0.05 meet at x with (0.3 − x)/0.1 = (0.1 + x)/0.05.
    const { answer, plan } = solvePart(
      [stationOff("a", 0, 0, -0.3, 0.1), stationOff("b", 500, 0, 0.1, 0.05)],
      [feetAt("f", 0)],
      { aim: "minimax" },
    );
    near(answer.realised[0]!.vMm, 1 / 30);
    const ratios = plan.predicted.map(({ deviation }, k) => Math.abs(deviation.vMm) / [0.1, 0.05][k]!);
    near(ratios[0]!, ratios[1]!);
    // Least squares: (100·0.3 − 400·0.1)/500.
    const bySquares = solvePart(
      [stationOff("a", 0, 0, -0.3, 0.1), stationOff("b", 500, 0, 0.1, 0.05)],
      [feetAt("f", 0)],
    );
    near(bySquares.answer.realised[0]!.vMm, -0.02);
  });
});
