import { Matrix, solve } from "ml-matrix";
import type { Pair } from "./limiting-oracles.ts";

/** Centre, semi-axes, angle of the first axis from h. */
export type OracleEllipse = readonly [number, number, number, number, number];

const pointAt = ([a, b, p, q, turn]: OracleEllipse, t: number): Pair => {
  const [cos, sin] = [Math.cos(turn), Math.sin(turn)];
  return [
    a + p * Math.cos(t) * cos - q * Math.sin(t) * sin,
    b + p * Math.cos(t) * sin + q * Math.sin(t) * cos,
  ];
};

/** Distance from the ellipse by looking at many of its points, then at more between the best: no calculus. */
export function distanceByLooking(ellipse: OracleEllipse, [h, v]: Pair): number {
  let [best, middle, width] = [Infinity, 0, Math.PI];
  for (let round = 0; round < 14; round++) {
    const from = middle - width;
    for (let k = 0; k <= 200; k++) {
      const t = from + (k * width) / 100;
      const [x, y] = pointAt(ellipse, t);
      const d = Math.hypot(x - h, y - v);
      if (d < best) [best, middle] = [d, t];
    }
    width /= 20;
  }
  return best;
}

/**
 * The geometric fit as W. Gander, G. H. Golub and R. Strebel state it (BIT 34 (1994) 558): a foot-point angle of every
 * point is unknown beside the five parameters, Gauss and Newton's steps by orthogonal factors, halved until they
 * descend. `u`: standard uncertainty of each point.
 */
export function ellipseByAngles(points: readonly Pair[], start: OracleEllipse, u: readonly number[]) {
  const n = points.length;
  let unknowns: number[] = [
    ...start,
    ...points.map(([h, v]) => {
      const [cos, sin] = [Math.cos(start[4]), Math.sin(start[4])];
      const [dh, dv] = [h - start[0], v - start[1]];
      return Math.atan2((cos * dv - sin * dh) / start[3], (cos * dh + sin * dv) / start[2]);
    }),
  ];
  const ellipseOf = (values: readonly number[]) => values.slice(0, 5) as unknown as OracleEllipse;
  const residualsOf = (values: readonly number[]) =>
    points.flatMap(([h, v], i) => {
      const [x, y] = pointAt(ellipseOf(values), values[5 + i]!);
      return [(h - x) / u[i]!, (v - y) / u[i]!];
    });
  const squares = (values: readonly number[]) => residualsOf(values).reduce((sum, r) => sum + r * r, 0);
  for (let round = 0; round < 100; round++) {
    const [, , p, q, turn] = ellipseOf(unknowns);
    const [cos, sin] = [Math.cos(turn), Math.sin(turn)];
    const jacobian = Matrix.zeros(2 * n, n + 5);
    for (let i = 0; i < n; i++) {
      const [ct, st] = [Math.cos(unknowns[5 + i]!), Math.sin(unknowns[5 + i]!)];
      const rows = [
        [1, 0, ct * cos, -st * sin, -p * ct * sin - q * st * cos, -p * st * cos - q * ct * sin],
        [0, 1, ct * sin, st * cos, p * ct * cos - q * st * sin, -p * st * sin + q * ct * cos],
      ];
      for (const [k, row] of rows.entries()) {
        for (let j = 0; j < 5; j++) jacobian.set(2 * i + k, j, row[j]! / u[i]!);
        jacobian.set(2 * i + k, 5 + i, row[5]! / u[i]!);
      }
    }
    const step = solve(jacobian, Matrix.columnVector(residualsOf(unknowns)), true).getColumn(0);
    const moved = (share: number) => unknowns.map((value, k) => value + share * step[k]!);
    let share = 1;
    while (share > 1e-9 && squares(moved(share)) > squares(unknowns)) share /= 2;
    if (share <= 1e-9) break;
    unknowns = moved(share);
  }
  return { ellipse: ellipseOf(unknowns), squares: squares(unknowns) };
}
