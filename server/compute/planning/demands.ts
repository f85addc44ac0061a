import { radialFactor } from "../statistics/radial-factor.ts";
import { studentFactor } from "../statistics/student-t.ts";
import { eigenvaluesOf, type Direction, type Symmetric } from "./information.ts";
import type { PlanForm, WantedUncertainty } from "./plan-input.ts";

/** Largest variance of the centre allowed, mm²: in every direction, or of h and of v. */
export type Limits =
  | { readonly form: "radial"; readonly worstMm2: number }
  | { readonly form: "planes"; readonly hMm2: number; readonly vMm2: number };

/** One thing asked of the readings: that Σw·(n − n̄)ᵀ·shape·(n − n̄) is `least` or more. */
export interface Demand {
  readonly shape: Symmetric;
  /** 1/mm². */
  readonly least: number;
  /** The variance that now answers to it, mm². */
  readonly varianceMm2: number;
}

/** What is met but for rounding is met. */
export const rounding = 1e-9;

/** Whether a largest variance over its limit, or its root, suffices. */
export function suffices(share: number): boolean {
  return share <= 1 + rounding;
}

/** (U/k)²: two-dimensional factor for the worst direction, Student's for one plane, both of infinite dof. */
export function limitsOf(wanted: WantedUncertainty, level: number): Limits {
  if (wanted.form === "radial")
    return { form: "radial", worstMm2: (wanted.radialMm / radialFactor(level, null)) ** 2 };
  const k = studentFactor(level, null);
  return { form: "planes", hMm2: (wanted.hMm / k) ** 2, vMm2: (wanted.vMm / k) ** 2 };
}

/**
 * Largest variance over its limit: 1 and less suffices. Infinite where the information has no inverse. The variance in
 * the worst direction is 1/λmin, that of h is 1/(Mhh − Mhv²/Mvv).
 */
export function shareOf(information: Symmetric, limits: Limits): number {
  const { xx, xy, yy } = information;
  if (limits.form === "radial") return 1 / (Math.max(0, eigenvaluesOf(information).least) * limits.worstMm2);
  const determinant = Math.max(0, xx * yy - xy * xy);
  return Math.max(yy / limits.hMm2, xx / limits.vMm2) / determinant;
}

/**
 * What the limits ask, in the directions that matter at this (invertible) information. Whatever readings there are, they
 * meet the limits only if they meet every demand of any information: 1/λmax(C) is the least of Σw(x·(n − t))² over unit
 * x and any t, and 1/C_hh the least over x with x_h = 1.
 */
export function demandsOf(information: Symmetric, limits: Limits, form: PlanForm): readonly Demand[] {
  const { xx, xy, yy } = information;
  if (form === "rotating_target") {
    const variance = 1 / xx;
    const limit = limits.form === "radial" ? limits.worstMm2 : Math.min(limits.hMm2, limits.vMm2);
    return [{ shape: { xx: 1, xy: 0, yy: 1 }, least: 1 / limit, varianceMm2: variance }];
  }
  if (limits.form === "planes") {
    const rest = { h: xx - (xy * xy) / yy, v: yy - (xy * xy) / xx };
    return [
      { shape: shapeOf({ x: 1, y: -xy / yy }), least: 1 / limits.hMm2, varianceMm2: 1 / rest.h },
      { shape: shapeOf({ x: -xy / xx, y: 1 }), least: 1 / limits.vMm2, varianceMm2: 1 / rest.v },
    ];
  }
  const { least, most } = eigenvaluesOf(information);
  // Half the angle of (xx − yy, 2xy) is the direction of the larger eigenvalue.
  const angle = Math.atan2(2 * xy, xx - yy) / 2;
  const along = { x: Math.cos(angle), y: Math.sin(angle) };
  return [
    { shape: shapeOf({ x: -along.y, y: along.x }), least: 1 / limits.worstMm2, varianceMm2: 1 / least },
    { shape: shapeOf(along), least: 1 / limits.worstMm2, varianceMm2: 1 / most },
  ];
}

const shapeOf = ({ x, y }: Direction): Symmetric => ({ xx: x * x, xy: x * y, yy: y * y });

/** (n − centre)ᵀ·shape·(n − centre). */
export function formAt({ xx, xy, yy }: Symmetric, { x, y }: Direction, centre: Direction): number {
  const dx = x - centre.x;
  const dy = y - centre.y;
  return xx * dx * dx + 2 * xy * dx * dy + yy * dy * dy;
}
