import fc from "fast-check";
import { Matrix, solve } from "ml-matrix";
import { describe, expect, it } from "vitest";
import { dot, type LeastSquares } from "./least-squares-in-order.ts";
import { solveQuadraticProgram, type Limit } from "./quadratic-program.ts";

const sumOfSquares = ({ rows, targets }: LeastSquares, x: readonly number[]): number =>
  rows.reduce((sum, row, i) => sum + (dot(row, x) - targets[i]!) ** 2, 0);

const within = (limits: readonly Limit[], x: readonly number[], slack: number): boolean =>
  limits.every(({ row, most }) => dot(row, x) <= most + slack);

/** Tries every set of limits as equations: the least feasible stationary point, or null when there is none. */
function byActiveSets(size: number, problem: LeastSquares, limits: readonly Limit[]): number | null {
  let best: number | null = null;
  for (let set = 0; set < 2 ** limits.length; set++) {
    const tight = limits.filter((_, k) => (set >> k) % 2 === 1);
    if (tight.length > size) continue;
    // [RᵀR Aᵀ; A 0]·[x; λ] = [Rᵀt; b]
    const rows = new Matrix(problem.rows.map((row) => [...row]));
    const n = size + tight.length;
    const system = Matrix.zeros(n, n);
    system.setSubMatrix(rows.transpose().mmul(rows), 0, 0);
    tight.forEach(({ row }, k) =>
      row.forEach((value, i) => system.set(size + k, i, value).set(i, size + k, value)),
    );
    const right = [
      ...rows
        .transpose()
        .mmul(Matrix.columnVector([...problem.targets]))
        .to1DArray(),
      ...tight.map(({ most }) => most),
    ];
    try {
      const x = solve(system, Matrix.columnVector(right)).to1DArray().slice(0, size);
      const met = tight.every(({ row, most }) => Math.abs(dot(row, x) - most) < 1e-7);
      if (!met || !x.every(Number.isFinite) || !within(limits, x, 1e-7)) continue;
      best = Math.min(best ?? Infinity, sumOfSquares(problem, x));
    } catch {
      // Limits that depend on each other: another set holds the same points.
    }
  }
  return best;
}

const number = fc.integer({ min: -40, max: 40 }).map((value) => value / 10);

interface Program {
  readonly size: number;
  readonly problem: LeastSquares;
  readonly limits: readonly Limit[];
}

/** Problems that determine x (the identity is among their rows), with small round numbers: degenerate corners abound. */
const program: fc.Arbitrary<Program> = fc.integer({ min: 1, max: 4 }).chain((size) => {
  const row = fc.array(number, { minLength: size, maxLength: size });
  return fc
    .record({
      more: fc.array(fc.record({ row, target: number }), { maxLength: 3 }),
      targets: row,
      limits: fc.array(fc.record({ row, most: number }), { maxLength: 7 }),
    })
    .map(({ more, targets, limits }) => ({
      size,
      problem: {
        rows: [
          ...targets.map((_, i) => targets.map((_, k) => (i === k ? 1 : 0))),
          ...more.map((each) => each.row),
        ],
        targets: [...targets, ...more.map(({ target }) => target)],
      },
      limits,
    }));
});

describe("solveQuadraticProgram", () => {
  it("finds what trying every set of limits as equations finds, or that no point keeps all limits", () => {
    let impossible = 0;
    let held = 0;
    fc.assert(
      fc.property(program, ({ size, problem, limits }) => {
        const optimum = solveQuadraticProgram(size, [problem], limits);
        const cost = byActiveSets(size, problem, limits);
        expect(optimum.feasible).toBe(cost !== null);
        if (!optimum.feasible) {
          impossible++;
          const conflict = optimum.conflict.map((k) => limits[k]!);
          expect(byActiveSets(size, problem, conflict)).toBe(null);
          return;
        }
        if (optimum.binding.length > 0) held++;
        expect(within(limits, optimum.point, 1e-9)).toBe(true);
        expect(Math.abs(sumOfSquares(problem, optimum.point) - cost!)).toBeLessThan(1e-6 * (1 + cost!));
      }),
      { numRuns: 400 },
    );
    expect(impossible).toBeGreaterThan(10);
    expect(held).toBeGreaterThan(100);
  });

  it("keeps the conditions of Karush, Kuhn and Tucker", () => {
    fc.assert(
      fc.property(program, ({ size, problem, limits }) => {
        const optimum = solveQuadraticProgram(size, [problem], limits);
        if (!optimum.feasible) return;
        const x = optimum.point;
        // Half the gradient, plus Σ λⱼ·(unit row of limit j), is 0 with λ > 0, and each such limit is met with equality.
        const gradient = x.map((_, k) =>
          problem.rows.reduce((sum, row, i) => sum + row[k]! * (dot(row, x) - problem.targets[i]!), 0),
        );
        for (const { limit, multiplier } of optimum.binding) {
          const { row, most } = limits[limit]!;
          expect(multiplier).toBeGreaterThan(0);
          expect(Math.abs(dot(row, x) - most)).toBeLessThan(1e-8);
          row.forEach((value, k) => (gradient[k]! += (multiplier * value) / Math.hypot(...row)));
        }
        gradient.forEach((left) => expect(Math.abs(left)).toBeLessThan(1e-6));
      }),
      { numRuns: 400 },
    );
  });

  it("takes later problems only among what the earlier ones leave open, within the limits", () => {
    const sum = { rows: [[1, 1]], targets: [2] };
    const small = {
      rows: [
        [1, 0],
        [0, 1],
      ],
      targets: [0, 0],
    };
    const solveIt = (limits: readonly Limit[]) => {
      const optimum = solveQuadraticProgram(2, [sum, small], limits);
      return optimum.feasible ? optimum.point : [];
    };
    const near = (got: readonly number[], wanted: readonly number[]) =>
      wanted.forEach((value, k) => expect(Math.abs(got[k]! - value)).toBeLessThan(1e-12));
    near(solveIt([]), [1, 1]);
    near(solveIt([{ row: [1, 0], most: 0.25 }]), [0.25, 1.75]);
    near(
      solveIt([
        { row: [1, 0], most: 0.25 },
        { row: [0, 1], most: 1 },
      ]),
      [0.25, 1],
    );
  });

  it("names the limits that leave no point at all", () => {
    const problem = {
      rows: [
        [1, 0],
        [0, 1],
      ],
      targets: [0, 0],
    };
    const limits = [
      { row: [0, 1], most: 5 },
      { row: [1, 0], most: -1 },
      { row: [-1, 0], most: -1 },
    ];
    const optimum = solveQuadraticProgram(2, [problem], limits);
    expect(optimum.feasible ? [] : [...optimum.conflict].sort()).toEqual([1, 2]);
  });

  it("gives the published answer of a bounded problem with an equation", () => {
    // The lsqlin example of MATLAB's Optimization Toolbox, as printed in the manual of R's pracma, lsqlincon:
    // least ‖C·x − d‖² with A·x ≤ b, 3x₁ + 5x₂ + 7x₃ + 9x₄ = 4, −0.1 ≤ x ≤ 2.
    const problem = {
      rows: [
        [0.9501, 0.762, 0.6153, 0.4057],
        [0.2311, 0.4564, 0.7919, 0.9354],
        [0.6068, 0.0185, 0.9218, 0.9169],
        [0.4859, 0.8214, 0.7382, 0.4102],
        [0.8912, 0.4447, 0.1762, 0.8936],
      ],
      targets: [0.0578, 0.3528, 0.8131, 0.0098, 0.1388],
    };
    const unit = [0, 1, 2, 3].map((i) => [0, 1, 2, 3].map((k) => (i === k ? 1 : 0)));
    const limits = [
      { row: [0.2027, 0.2721, 0.7467, 0.4659], most: 0.5251 },
      { row: [0.1987, 0.1988, 0.445, 0.4186], most: 0.2026 },
      { row: [0.6037, 0.0152, 0.9318, 0.8462], most: 0.6721 },
      { row: [3, 5, 7, 9], most: 4 },
      { row: [-3, -5, -7, -9], most: -4 },
      ...unit.flatMap((row) => [
        { row, most: 2 },
        { row: row.map((value) => -value), most: 0.1 },
      ]),
    ];
    const optimum = solveQuadraticProgram(4, [problem], limits);
    const x = optimum.feasible ? optimum.point : [];
    [-0.1, -0.1, 0.1599088, 0.4089598].forEach((value, k) =>
      expect(Math.abs(x[k]! - value)).toBeLessThan(6e-8),
    );
    expect(Math.abs(sumOfSquares(problem, x) - 0.1695104)).toBeLessThan(6e-8);
  });
});
