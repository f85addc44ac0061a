import { clockDirection } from "../bore/clock-direction.ts";
import type { PlanForm, TakenReading } from "./plan-input.ts";

/** A direction from the centre, less `Frame`'s own: thin arcs keep their digits. */
export interface Direction {
  readonly x: number;
  readonly y: number;
}

/** Σw, Σw·n, Σw·n·nᵀ of readings of weight w = 1/u² in directions n. */
export interface Sums {
  readonly w: number;
  readonly x: number;
  readonly y: number;
  readonly xx: number;
  readonly xy: number;
  readonly yy: number;
}

/** A symmetric 2 × 2 matrix. */
export interface Symmetric {
  readonly xx: number;
  readonly xy: number;
  readonly yy: number;
}

export const nothing: Sums = { w: 0, x: 0, y: 0, xx: 0, xy: 0, yy: 0 };

/** Smaller eigenvalue below this share of the larger: the readings leave a direction of the centre open. */
const openShare = 1e-12;
/** Larger eigenvalue below this share of Σw: all directions are one, as far as numbers tell. */
const oneDirection = 1e-24;

/** The sums with `times` more readings of weight `weight` in direction n; negative `times` takes them out. */
export function withReading(sums: Sums, { x, y }: Direction, weight: number, times = 1): Sums {
  const w = weight * times;
  return {
    w: sums.w + w,
    x: sums.x + w * x,
    y: sums.y + w * y,
    xx: sums.xx + w * x * x,
    xy: sums.xy + w * x * y,
    yy: sums.yy + w * y * y,
  };
}

/**
 * Information on the centre (h, v), 1/mm²: the inverse of its covariance. A wall distance at direction n is n·c + R and
 * its scatter; with R, that every reading shares, eliminated: Σw(n − n̄)(n − n̄)ᵀ. A spot of a turned target is the
 * mounting error and the centre turned by t; with the error eliminated: Σw|n − n̄|² in every direction.
 */
export function informationOf({ w, x, y, xx, xy, yy }: Sums, form: PlanForm): Symmetric {
  if (!(w > 0)) return { xx: 0, xy: 0, yy: 0 };
  const mxx = xx - (x * x) / w;
  const myy = yy - (y * y) / w;
  if (form === "rotating_target") return { xx: mxx + myy, xy: 0, yy: mxx + myy };
  return { xx: mxx, xy: xy - (x * y) / w, yy: myy };
}

/** Whether the information of these sums has an inverse that rounding did not make. */
export function isDetermined(information: Symmetric, sums: Sums): boolean {
  const spread = spreadOf(information, sums);
  return spread > 0 && eigenvaluesOf(information).least > openShare * spread;
}

/** Larger eigenvalue of the information, 0 where it is but rounding: all readings are in one direction. */
export function spreadOf(information: Symmetric, { w, xx, yy }: Sums): number {
  const { most } = eigenvaluesOf(information);
  return most > oneDirection * w && most > openShare * (xx + yy) ? most : 0;
}

/** Both eigenvalues; the smaller by det ÷ larger, which keeps the digits that a difference loses. */
export function eigenvaluesOf({ xx, xy, yy }: Symmetric): { readonly least: number; readonly most: number } {
  const most = (xx + yy) / 2 + Math.sqrt(((xx - yy) / 2) ** 2 + xy * xy);
  return { least: most > 0 ? (xx * yy - xy * xy) / most : 0, most };
}

/** The frame of a bore's directions: their mean is subtracted from all, which no information depends on. */
export interface Frame {
  readonly direction: (clockDeg: number) => Direction;
  /** Where the middle of the clock lies in it. */
  readonly middle: Direction;
}

/** The frame of these clock angles, in any order. */
export function frameOf(clockDegs: readonly number[]): Frame {
  let x = 0;
  let y = 0;
  for (const clockDeg of clockDegs) {
    const { h, v } = clockDirection(clockDeg);
    x += h / clockDegs.length;
    y += v / clockDegs.length;
  }
  return {
    direction(clockDeg) {
      const { h, v } = clockDirection(clockDeg);
      return { x: h - x, y: v - y };
    },
    middle: { x: -x, y: -y },
  };
}

/** The sums of readings at their clock angles. */
export function sumsOfTaken(taken: readonly TakenReading[], frame: Frame): Sums {
  return taken.reduce(
    (sums, { clockDeg, uMm, times }) => withReading(sums, frame.direction(clockDeg), 1 / (uMm * uMm), times),
    nothing,
  );
}
