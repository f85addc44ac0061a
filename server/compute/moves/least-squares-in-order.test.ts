import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { dot, minimiseInOrder } from "./least-squares-in-order.ts";
import { nonnegativeLeastSquares } from "./nonnegative-least-squares.ts";

const near = (got: readonly number[], wanted: readonly number[], within = 1e-12) => {
  expect(got.length).toBe(wanted.length);
  wanted.forEach((value, k) => expect(Math.abs(got[k]! - value)).toBeLessThan(within));
};

describe("minimiseInOrder", () => {
  it("solves a determined problem, and leaves the next no say", () => {
    const line = {
      rows: [
        [1, 0],
        [1, 1],
        [1, 2],
      ],
      targets: [1, 2, 4],
    };
    const other = { rows: [[1, 0]], targets: [99] };
    // Normal equations 3a + 3b = 7, 3a + 5b = 10.
    const { point, free } = minimiseInOrder(2, [line, other]);
    near(point, [5 / 6, 1.5]);
    expect(free).toEqual([]);
  });

  it("minimises the second among what the first leaves open, and says what stays open", () => {
    const sum = { rows: [[1, 1, 0]], targets: [3] };
    const first = { rows: [[1, 0, 0]], targets: [1] };
    const { point, free } = minimiseInOrder(3, [sum, first]);
    near(point, [1, 2, 0]);
    near(
      free.map((direction) => Math.abs(direction[2]!)),
      [1],
    );
  });

  it("takes a direction seen by less than 1e-10 of the problem's size for one it does not determine", () => {
    const solveIt = (small: number) =>
      minimiseInOrder(2, [
        {
          rows: [
            [1, 0],
            [0, small],
          ],
          targets: [1, small],
        },
      ]).free.length;
    expect([solveIt(1e-8), solveIt(1e-12), solveIt(0)]).toEqual([0, 1, 1]);
  });

  it("refuses what is not finite: a decomposition of it would not end", () => {
    for (const bad of [NaN, Infinity]) {
      expect(() =>
        minimiseInOrder(2, [
          {
            rows: [
              [1, bad],
              [0, 1],
            ],
            targets: [0, 0],
          },
        ]),
      ).toThrow(expect.objectContaining({ code: "result_overflow" }) as Error);
    }
  });
});

describe("nonnegativeLeastSquares", () => {
  it("gives the nearest point of the cone of its columns, on an edge, inside and at the tip", () => {
    const columns = [
      [1, 0],
      [1, 1],
    ];
    near(nonnegativeLeastSquares(columns, [2, -1]).weights, [2, 0]);
    near(nonnegativeLeastSquares(columns, [3, 1]).weights, [2, 1]);
    near(nonnegativeLeastSquares(columns, [-1, -1]).weights, [0, 0]);
    near(nonnegativeLeastSquares(columns, [-1, 3]).weights, [0, 1]);
    near(nonnegativeLeastSquares(columns, [-1, 3]).remainder, [-2, 2]);
    near(nonnegativeLeastSquares([], [1, 2]).remainder, [1, 2]);
  });

  it("keeps the conditions of its optimum: weights ≥ 0, no column helps, none in use is left over", () => {
    const entry = fc.integer({ min: -9, max: 9 });
    const vector = fc.tuple(entry, entry, entry);
    fc.assert(
      fc.property(fc.array(vector, { maxLength: 7 }), vector, (columns, target) => {
        const { weights, remainder } = nonnegativeLeastSquares(columns, target);
        columns.forEach((column, j) => {
          expect(weights[j]).toBeGreaterThanOrEqual(0);
          const gain = dot(column, remainder);
          expect(gain).toBeLessThan(1e-9);
          if (weights[j]! > 1e-9) expect(Math.abs(gain)).toBeLessThan(1e-9);
        });
      }),
      { numRuns: 500 },
    );
  });
});
