import { expect } from "vitest";
import { dot } from "../../server/compute/moves/least-squares-in-order.ts";
import { solveQuadraticProgram, type Limit } from "../../server/compute/moves/quadratic-program.ts";
import { describeCases, mismatches } from "./read-cases.ts";

interface Bounded {
  readonly C: number[][];
  readonly d: number[];
  readonly A: number[][];
  readonly b: number[];
  readonly Aeq: number[][];
  readonly beq: number[];
  readonly lower: number;
  readonly upper: number;
}

const negative = (row: readonly number[]): number[] => row.map((value) => 0 - value);

describeCases<Bounded, object>(
  "ideal move: bounded-least-squares",
  ["bounded-least-squares"],
  (reference) => {
    const { C, d, A, b, Aeq, beq, lower, upper } = reference.input;
    const size = C[0]!.length;
    const units = Array.from({ length: size }, (_, i) =>
      Array.from({ length: size }, (_, k) => (i === k ? 1 : 0)),
    );
    const limits: Limit[] = [
      ...A.map((row, i) => ({ row, most: b[i]! })),
      ...Aeq.flatMap((row, i) => [
        { row, most: beq[i]! },
        { row: negative(row), most: 0 - beq[i]! },
      ]),
      ...units.flatMap((row) => [
        { row, most: upper },
        { row: negative(row), most: 0 - lower },
      ]),
    ];
    const optimum = solveQuadraticProgram(size, [{ rows: C, targets: d }], limits);
    const x = optimum.feasible ? optimum.point : [];
    const rss = C.reduce((sum, row, i) => sum + (dot(row, x) - d[i]!) ** 2, 0);
    expect(mismatches(reference, { x, rss })).toEqual([]);
  },
);
