import fc from "fast-check";
import { Matrix, solve } from "ml-matrix";
import { describe, expect, it } from "vitest";
import { ComputeError } from "../compute-error.ts";
import { solveTridiagonal } from "./solve-tridiagonal.ts";

describe("solveTridiagonal", () => {
  it("solves what a dense solver of ml-matrix solves, at any scale of the unknowns", () => {
    const row = fc.record({
      beside: fc.double({ min: -1, max: 1, noNaN: true }),
      more: fc.double({ min: 0.1, max: 5, noNaN: true }),
      right: fc.double({ min: -9, max: 9, noNaN: true }),
    });
    fc.assert(
      fc.property(fc.array(row, { minLength: 1, maxLength: 12 }), (rows) => {
        const beside = rows.slice(1).map((one) => one.beside);
        const diagonal = rows.map(
          ({ more }, i) => Math.abs(beside[i - 1] ?? 0) + Math.abs(beside[i] ?? 0) + more,
        );
        const right = rows.map((one) => one.right);
        const dense = Matrix.zeros(rows.length, rows.length);
        diagonal.forEach((entry, i) => dense.set(i, i, entry));
        beside.forEach((entry, i) => dense.set(i, i + 1, entry).set(i + 1, i, entry));
        const wanted = solve(dense, Matrix.columnVector(right)).getColumn(0);
        const scale = rows.map((_, i) => 10 ** ((i % 5) * 8 - 16));
        const scaled = solveTridiagonal(
          diagonal.map((entry, i) => entry * scale[i]! ** 2),
          beside.map((entry, i) => entry * scale[i]! * scale[i + 1]!),
          right.map((entry, i) => entry * scale[i]!),
        ).map((value, i) => value * scale[i]!);
        const size = Math.max(1e-200, ...wanted.map(Math.abs));
        for (const solution of [solveTridiagonal(diagonal, beside, right), scaled])
          solution.forEach((value, i) =>
            expect(Math.abs(value - wanted[i]!)).toBeLessThanOrEqual(1e-12 * size),
          );
      }),
    );
  });

  it("solves nothing when there is nothing", () => {
    expect(solveTridiagonal([], [], [])).toEqual([]);
  });

  it.each([
    [[1, 1], [1]],
    [[0], []],
    [[-1], []],
    [[1, NaN], [0]],
    [[1, 1 + 1e-15], [1]],
  ])("refuses %j beside %j", (diagonal, beside) => {
    const attempt = () => solveTridiagonal(diagonal, beside, diagonal);
    expect(attempt).toThrow(ComputeError);
    expect(attempt).toThrow(expect.objectContaining({ code: "rank_deficient" }));
  });
});
