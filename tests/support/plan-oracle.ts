import { inverse, Matrix } from "ml-matrix";
import type { PlanForm, PlanInput, ReachablePlace } from "../../server/compute/planning/plan-input.ts";

export interface PlannedReading {
  readonly clockDeg: number;
  readonly uMm: number;
}

/**
 * Covariance of the centre by the inverse of JᵀWJ over all unknowns, from the definition: a wall distance is
 * h·sin t + v·cos t + R; a spot, two coordinates, the mounting error (two unknowns) plus the beam in the target's axes.
 * Null where JᵀWJ has no inverse.
 */
export function planCovariance(readings: readonly PlannedReading[], form: PlanForm): number[][] | null {
  const rows = readings.flatMap(({ clockDeg, uMm }) => {
    const angle = (clockDeg * Math.PI) / 180;
    const [sin, cos] = [Math.sin(angle) / uMm, Math.cos(angle) / uMm];
    if (form === "wall") return [[sin, cos, 1 / uMm]];
    return [
      [cos, -sin, 1 / uMm, 0],
      [sin, cos, 0, 1 / uMm],
    ];
  });
  const unknowns = form === "wall" ? 3 : 4;
  if (rows.length < unknowns) return null;
  const jacobian = new Matrix(rows);
  const normal = jacobian.transpose().mmul(jacobian);
  const scale = Math.max(...normal.diagonal());
  const determinant = determinantOf(normal.to2DArray().map((row) => row.map((entry) => entry / scale)));
  if (!(determinant > 1e-9)) return null;
  const full = inverse(normal, true).to2DArray();
  return [0, 1].map((row) => [0, 1].map((column) => full[row]![column]!));
}

/** By expansion along the first row: no pivot decides what is singular. */
function determinantOf(rows: readonly (readonly number[])[]): number {
  const [first, ...rest] = rows;
  if (!first) return 1;
  return first.reduce(
    (sum, entry, k) =>
      sum + (k % 2 === 0 ? 1 : -1) * entry * determinantOf(rest.map((row) => row.filter((_, j) => j !== k))),
    0,
  );
}

/** Roots of the characteristic polynomial, smaller first. */
export function eigenvalues(matrix: readonly (readonly number[])[]): [number, number] {
  const [a, b, c] = [matrix[0]![0]!, matrix[0]![1]!, matrix[1]![1]!];
  const root = Math.sqrt((a - c) ** 2 / 4 + b ** 2);
  return [(a + c) / 2 - root, (a + c) / 2 + root];
}

/** Expanded uncertainty over that wanted, k√u² from printed factors at 0.95: 1.959964, and 2.447747 in two dimensions. */
export function planRatio(readings: readonly PlannedReading[], { form, wanted }: PlanInput): number {
  const covariance = planCovariance(readings, form);
  if (!covariance) return Infinity;
  if (wanted.form === "radial")
    return (2.4477468306808166 * Math.sqrt(eigenvalues(covariance)[1])) / wanted.radialMm;
  const expanded = (k: number) => 1.959963984540054 * Math.sqrt(covariance[k]![k]!);
  return Math.max(expanded(0) / wanted.hMm, expanded(1) / wanted.vMm);
}

/** Every choice of readings that the places take, looked at one by one: the fewest that do, and the best of each number. */
export function everyChoice(input: PlanInput): { fewest: number; bestRatio: Map<number, number> } {
  const taken = input.taken.flatMap(({ clockDeg, uMm, times }) =>
    Array.from({ length: times }, () => ({ clockDeg, uMm })),
  );
  const bestRatio = new Map<number, number>();
  const visit = (places: readonly ReachablePlace[], readings: readonly PlannedReading[]): void => {
    const [place, ...rest] = places;
    if (!place) {
      const count = readings.length - taken.length;
      bestRatio.set(count, Math.min(bestRatio.get(count) ?? Infinity, planRatio(readings, input)));
      return;
    }
    for (let times = 0; times <= place.readingsMax; times++) {
      visit(rest, [
        ...readings,
        ...Array.from({ length: times }, () => ({ clockDeg: place.clockDeg, uMm: input.uMm })),
      ]);
    }
  };
  visit(input.places, taken);
  const enough = [...bestRatio].filter(([, ratio]) => ratio <= 1 + 1e-9).map(([count]) => count);
  return { fewest: Math.min(...enough), bestRatio };
}
