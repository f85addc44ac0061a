import type { PlaneVector } from "../plane.ts";
import type { MoveSupport, Plane } from "./move-problem.ts";

/** One way in which a rigid part can move in one plane: by constant + perMm·(z − pivot) for an amount of 1. */
export interface Mode {
  readonly plane: Plane;
  readonly constant: number;
  readonly perMm: number;
  readonly pivotMm: number;
}

/** Supports closer to each other than this share of the component's length count as standing at one z. */
const sameZWithin = 1e-9;

/**
 * The ways in which a component can move in `plane`: up and down (or across) and tilting about the mean z of its
 * supports, δ(z) = δ₀ + θ·(z − z̄); supports at one z give no tilt. Blocked at one z it only turns about that z, blocked
 * at two it does not move. Amounts are the move, in mm, at the support farthest from the pivot.
 */
export function modesOf(
  supports: readonly Pick<MoveSupport, "zMm" | "blocked">[],
  stationZMm: readonly number[],
  plane: Plane,
): Mode[] {
  const zMm = supports.map((support) => support.zMm);
  if (zMm.length === 0) return [];
  const same = sameZWithin * spreadOf([...zMm, ...stationZMm]);
  const tilts = spreadOf(zMm) > same;
  const blocked = supports.filter((support) => support.blocked.includes(plane)).map((support) => support.zMm);
  const [held] = blocked;
  if (held === undefined) {
    const shift: Mode = { plane, constant: 1, perMm: 0, pivotMm: 0 };
    return tilts ? [shift, tiltAbout(meanOf(zMm), zMm, plane)] : [shift];
  }
  return tilts && spreadOf(blocked) <= same ? [tiltAbout(held, zMm, plane)] : [];
}

/** How far one unit of `mode` moves the part at `zMm`. */
export function modeAt(mode: Mode, zMm: number): number {
  return mode.constant + mode.perMm * (zMm - mode.pivotMm);
}

/** The move at `zMm`, for the amount of each mode. */
export function moveAt(modes: readonly Mode[], amounts: readonly number[], zMm: number): PlaneVector {
  const inPlane = (plane: Plane) =>
    modes.reduce(
      (sum, mode, k) => (mode.plane === plane ? sum + (amounts[k] ?? 0) * modeAt(mode, zMm) : sum),
      0,
    );
  return { hMm: inPlane("h"), vMm: inPlane("v") };
}

/** The row that gives, from the amounts, the part of the move at `zMm` along `direction`. */
export function rowAlong(
  modes: readonly Mode[],
  direction: Readonly<Record<Plane, number>>,
  zMm: number,
): number[] {
  return modes.map((mode) => direction[mode.plane] * modeAt(mode, zMm));
}

/** A move of a rigid part, as a function of z. */
export type RigidMove = (zMm: number) => PlaneVector;

/** The move of a part that stays: 0 mm at every z. */
export const noMove: RigidMove = () => ({ hMm: 0, vMm: 0 });

/** Moves in different planes, taken together. */
export function sumOfMoves(moves: readonly RigidMove[]): RigidMove {
  return (zMm) => {
    const parts = moves.map((move) => move(zMm));
    return { hMm: sumOf(parts.map(({ hMm }) => hMm)), vMm: sumOf(parts.map(({ vMm }) => vMm)) };
  };
}

const sumOf = (values: readonly number[]): number => values.reduce((sum, value) => sum + value, 0);

function tiltAbout(pivotMm: number, supportZMm: readonly number[], plane: Plane): Mode {
  const leverMm = Math.max(...supportZMm.map((z) => Math.abs(z - pivotMm)));
  return { plane, constant: 0, perMm: 1 / leverMm, pivotMm };
}

const spreadOf = (values: readonly number[]): number => Math.max(...values) - Math.min(...values);

/** About the first value, so that a common z far from zero costs no digits. */
function meanOf(values: readonly number[]): number {
  const first = values[0] ?? 0;
  return first + values.reduce((sum, value) => sum + (value - first), 0) / values.length;
}
