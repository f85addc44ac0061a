import type { PlaneVector } from "../plane.ts";

/** How far a rigid part is to move at one of its supports. */
export interface SupportMove {
  readonly zMm: number;
  readonly move: PlaneVector;
}

export interface RigidMove {
  readonly at: (zMm: number) => PlaneVector;
  /** The most that a stated move lies off the rigid one, mm: what a rigid part cannot follow. */
  readonly misfitMm: number;
}

/**
 * The rigid move δ(z) = δ₀ + θ·(z − z̄) that best fits, in least squares and in each plane, what is stated at the
 * supports; z̄ their mean. Supports all at one z only translate. One support at least. mm.
 */
export function rigidMove(supports: readonly SupportMove[]): RigidMove {
  const count = supports.length;
  const mean = (of: (support: SupportMove) => number) =>
    supports.reduce((sum, support) => sum + of(support) / count, 0);
  const middleMm = mean(({ zMm }) => zMm);
  const middle = { hMm: mean(({ move }) => move.hMm), vMm: mean(({ move }) => move.vMm) };
  const spread = mean(({ zMm }) => (zMm - middleMm) ** 2);
  const isLevel = supports.every(({ zMm }) => zMm === supports[0]?.zMm) || spread === 0;
  const slope = (of: (move: PlaneVector) => number) =>
    isLevel ? 0 : mean(({ zMm, move }) => (zMm - middleMm) * of(move)) / spread;
  const [slopeH, slopeV] = [slope(({ hMm }) => hMm), slope(({ vMm }) => vMm)];
  const at = (zMm: number): PlaneVector => ({
    hMm: middle.hMm + slopeH * (zMm - middleMm),
    vMm: middle.vMm + slopeV * (zMm - middleMm),
  });
  const misfitMm = Math.max(
    0,
    ...supports.map(({ zMm, move }) => {
      const rigid = at(zMm);
      return Math.hypot(move.hMm - rigid.hMm, move.vMm - rigid.vMm);
    }),
  );
  return { at, misfitMm };
}

/**
 * How much of a planned move was made: (achieved·planned)/|planned|², 1 when all of it was; null when none was planned.
 * What lies across the plan does not count.
 */
export function achievedRatio(achieved: PlaneVector, planned: PlaneVector): number | null {
  const size = Math.hypot(planned.hMm, planned.vMm);
  if (size === 0) return null;
  return (achieved.hMm / size) * (planned.hMm / size) + (achieved.vMm / size) * (planned.vMm / size);
}
