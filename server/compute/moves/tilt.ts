import type { MoveStation, Plane } from "./move-problem.ts";
import { planes } from "./move-problem.ts";
import type { RigidMove } from "./rigid-freedom.ts";

/** Slopes of a part in its two planes, mm per mm. */
export type Tilt = Readonly<Record<Plane, number>>;

/** The two stations whose line is a part's tilt: the first and the last along z; null where all stand at one z. */
export function endStationsOf(stations: readonly MoveStation[]): readonly [MoveStation, MoveStation] | null {
  const [first, ...rest] = [...stations].sort((a, b) => a.zMm - b.zMm);
  const last = rest.at(-1);
  return first && last && last.zMm > first.zMm ? [first, last] : null;
}

/** The slope of the line through a part's end stations once it has made a move; null where it has no two. */
export function tiltOf(stations: readonly MoveStation[], move: RigidMove): Tilt | null {
  const ends = endStationsOf(stations);
  if (!ends) return null;
  const [first, last] = ends.map(({ deviation, zMm }) => {
    const { hMm, vMm } = move(zMm);
    return { h: deviation.hMm + hMm, v: deviation.vMm + vMm, zMm };
  });
  const lengthMm = (last?.zMm ?? 0) - (first?.zMm ?? 0);
  return {
    h: ((last?.h ?? 0) - (first?.h ?? 0)) / lengthMm,
    v: ((last?.v ?? 0) - (first?.v ?? 0)) / lengthMm,
  };
}

/** The planes in which a tilt is steeper than its tolerance; one that meets it to rounding is not. */
export function planesTooSteep(tilt: Tilt, tolerance: Tilt): Plane[] {
  return planes.filter((plane) => Math.abs(tilt[plane]) > tolerance[plane] * (1 + 1e-12));
}
