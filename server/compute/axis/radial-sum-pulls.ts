import { LuDecomposition, Matrix } from "ml-matrix";
import { remaindersOf } from "./minimax-problem.ts";
import { expandSum, severalAxes, smoothingAtEnd, type SumProblem } from "./radial-sum.ts";

/** The second derivative that is weakest, as a share of the strongest, below which lines of one sum are not told apart. */
const weakest = 1e-13;

/** weight × direction of what is left, smoothed as at the end of the path. */
export function pullsOf(remainders: readonly Float64Array[], weights: Float64Array): Float64Array[] {
  return remainders.map((plane) =>
    plane.map((value, j) => {
      const distance = Math.hypot(...remainders.map((other) => other[j]!), smoothingAtEnd);
      return (weights[j]! * value) / distance;
    }),
  );
}

/**
 * Multipliers at x: weight × direction where the line does not pass; where it passes those of the path's end, moved by
 * the least that makes them all orthogonal to every line.
 */
export function pullsAt(
  whole: SumProblem,
  x: readonly number[],
  passed: readonly number[],
  near: readonly Float64Array[],
): Float64Array[] {
  const remainders = remaindersOf(whole, x);
  const isPassed = new Set(passed);
  const pulls = remainders.map((plane, d) =>
    plane.map((value, j) =>
      isPassed.has(j)
        ? near[d]![j]!
        : (whole.weights[j]! * value) / Math.hypot(...remainders.map((other) => other[j]!)),
    ),
  );
  const oneZ = passed.every((j) => whole.design[1]![j] === whole.design[1]![passed[0]!]);
  const design = oneZ ? whole.design.slice(0, 1) : whole.design;
  const normal = new Matrix(
    design.map((row) =>
      design.map((column) => passed.reduce((sum, j) => sum + whole.weights[j]! * row[j]! * column[j]!, 0)),
    ),
  );
  const lu = new LuDecomposition(normal);
  if (passed.length === 0 || lu.isSingular()) return pulls;
  for (const plane of pulls) {
    const excess = design.map((column) => plane.reduce((sum, value, j) => sum + value * column[j]!, 0));
    const back = lu.solve(Matrix.columnVector(excess)).getColumn(0);
    for (const j of passed) {
      plane[j]! -= whole.weights[j]! * design.reduce((sum, column, i) => sum + back[i]! * column[j]!, 0);
    }
  }
  return pulls;
}

/**
 * What the offset of a point in one plane does to the x of least sum: (second derivatives)⁻¹ × mixed derivatives, one
 * number for each unknown.
 * @throws ComputeError rank_deficient
 */
export function effectsOf(
  problem: SumProblem,
  x: readonly number[],
): (place: number, plane: number) => number[] {
  const { hessian } = expandSum(problem, x, 0);
  const lu = new LuDecomposition(hessian);
  const pivots = lu.upperTriangularMatrix.diagonal().map(Math.abs);
  if (lu.isSingular() || Math.min(...pivots) < weakest * Math.max(...pivots)) {
    throw severalAxes();
  }
  const inverse = lu.solve(Matrix.eye(x.length));
  const remainders = remaindersOf(problem, x);
  return (place, plane) => {
    const distance = Math.hypot(...remainders.map((one) => one[place]!));
    const pull = problem.weights[place]! / distance;
    const caused = x.map((_, a) => {
      const own = Math.floor(a / problem.design.length);
      const across =
        (own === plane ? 1 : 0) -
        (remainders[own]![place]! / distance) * (remainders[plane]![place]! / distance);
      return pull * across * problem.design[a % problem.design.length]![place]!;
    });
    return inverse.mmul(Matrix.columnVector(caused)).getColumn(0);
  };
}
