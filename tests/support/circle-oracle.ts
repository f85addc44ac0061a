import { inverse, Matrix, solve } from "ml-matrix";

/** A reading as the oracle sees it. */
export interface OraclePoint {
  readonly h: number;
  readonly v: number;
  readonly z: number;
  readonly u: number;
}

/** Centre at z = 0, radius there, then what else is fitted: the tangent of the taper, or two slopes. */
export type Parameters = readonly number[];
export type Surface = "circle" | "taper" | "tilt";

/** Distance from the axis − radius, written down plainly: its own formula, nothing shared with the engine. */
export function residualOf(surface: Surface, { h, v, z }: OraclePoint, parameters: Parameters): number {
  const [a, b, radius, first = 0, second = 0] = parameters as [number, number, number, number?, number?];
  if (surface === "tilt") return Math.hypot(h - a - first * z, v - b - second * z) - radius;
  return Math.hypot(h - a, v - b) - radius - (surface === "taper" ? first * z : 0);
}

/** Jacobian of the residuals ÷ u by central differences. */
export function differencedJacobian(
  surface: Surface,
  points: readonly OraclePoint[],
  parameters: Parameters,
): Matrix {
  const size = Math.max(...points.map(({ h, v }) => Math.hypot(h - parameters[0]!, v - parameters[1]!)));
  const reach = Math.max(1, ...points.map(({ z }) => Math.abs(z)));
  return new Matrix(
    points.map((point) =>
      parameters.map((_, k) => {
        const step = (1e-5 * size) / (k < 3 ? 1 : reach);
        const moved = (by: number) => parameters.map((value, j) => (j === k ? value + by : value));
        const rise = residualOf(surface, point, moved(step)) - residualOf(surface, point, moved(-step));
        return rise / (2 * step) / point.u;
      }),
    ),
  );
}

/** (JᵀWJ)⁻¹ with W = 1/u². */
export function differencedCovariance(
  surface: Surface,
  points: readonly OraclePoint[],
  parameters: Parameters,
): number[][] {
  const jacobian = differencedJacobian(surface, points, parameters);
  return inverse(jacobian.transpose().mmul(jacobian), true).to2DArray();
}

export const weightedSquares = (surface: Surface, points: readonly OraclePoint[], parameters: Parameters) =>
  points.reduce((sum, point) => sum + (residualOf(surface, point, parameters) / point.u) ** 2, 0);

/**
 * Least squares by Gauss and Newton with all parameters at once, each step by orthogonal factors (ml-matrix), halved
 * until it descends: another path than the engine's, which eliminates the radius and uses second derivatives.
 */
export function gaussNewton(surface: Surface, points: readonly OraclePoint[], start: Parameters): Parameters {
  let parameters = start;
  for (let round = 0; round < 200; round++) {
    const jacobian = differencedJacobian(surface, points, parameters);
    const residuals = Matrix.columnVector(
      points.map((point) => residualOf(surface, point, parameters) / point.u),
    );
    const step = solve(jacobian, residuals).getColumn(0);
    const now = weightedSquares(surface, points, parameters);
    let share = 1;
    const trial = () => parameters.map((value, k) => value - share * step[k]!);
    while (share > 1e-6 && weightedSquares(surface, points, trial()) > now) share /= 2;
    if (share <= 1e-6) return parameters;
    parameters = trial();
  }
  return parameters;
}

/** The best radius for a centre is the weighted mean distance; what is left is a function of the plane. */
function squaresAt(points: readonly OraclePoint[], a: number, b: number): number {
  const weights = points.map(({ u }) => 1 / u ** 2);
  const sum = weights.reduce((total, w) => total + w, 0);
  const distances = points.map(({ h, v }) => Math.hypot(h - a, v - b));
  const mean = distances.reduce((total, d, i) => total + weights[i]! * d, 0) / sum;
  return distances.reduce((total, d, i) => total + weights[i]! * (d - mean) ** 2, 0);
}

/** Brute force: the least of a grid over the square about (h, v), then finer grids about it. No derivative at all. */
export function gridSearch(points: readonly OraclePoint[], around: [number, number], halfWidth: number) {
  let [a, b] = around;
  for (let width = halfWidth; width > halfWidth * 1e-8; width /= 4) {
    let least = Infinity;
    const [fromA, fromB] = [a, b];
    for (let i = -10; i <= 10; i++) {
      for (let j = -10; j <= 10; j++) {
        const [tryA, tryB] = [fromA + (i * width) / 10, fromB + (j * width) / 10];
        const squares = squaresAt(points, tryA, tryB);
        if (squares < least) [least, a, b] = [squares, tryA, tryB];
      }
    }
  }
  return { a, b, squares: squaresAt(points, a, b) };
}
