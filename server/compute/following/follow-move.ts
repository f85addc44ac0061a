import { ComputeError, assertFinite } from "../compute-error.ts";
import type { PlaneVector } from "../plane.ts";
import { clockDirection } from "../bore/clock-direction.ts";
import { dot } from "../moves/least-squares-in-order.ts";
import { planes, type MoveIndicator, type MoveSupport, type Plane } from "../moves/move-problem.ts";
import { rigidFitOf } from "../moves/rigid-fit.ts";
import { modesOf, rowAlong, type Mode } from "../moves/rigid-freedom.ts";

/** What has been read since a component began to move, in millimetres. */
export interface MoveReadings {
  readonly supports: readonly Pick<MoveSupport, "id" | "zMm" | "blocked">[];
  /** The move wanted at each support, from where the component began. */
  readonly wanted: readonly { readonly supportId: string; readonly hMm: number; readonly vMm: number }[];
  readonly indicators: readonly (Pick<MoveIndicator, "zMm" | "clockDeg" | "contact"> & {
    readonly readingMm: number;
  })[];
  /** Stations of the component seen by the line of sight: how far each has moved. */
  readonly sights: readonly { readonly zMm: number; readonly change: PlaneVector }[];
  /** Within it a support is where it shall be, and readings agree. */
  readonly enoughMm: number;
}

/** A plane of a support: null where the readings do not tell it. */
type PartlyKnown = Readonly<Record<Plane, number | null>>;

export interface FollowedMove {
  readonly supports: readonly {
    readonly supportId: string;
    readonly movedMm: PartlyKnown;
    readonly leftMm: PartlyKnown;
  }[];
  /** Every support within `enoughMm` of where it shall be; null while the readings do not tell. */
  readonly done: boolean | null;
  /** Supports that have gone past by more than `enoughMm`. */
  readonly past: readonly string[];
  /** What each reading has beyond the rigid move through all of them: indicators, then h and v of each sight. */
  readonly residualsMm: readonly number[];
}

/** Below it a direction that the readings leave open has no part in what is asked. */
const openWithin = 1e-9;

/**
 * How far a rigid component has come while it moves. An indicator reads the move at its z along its clock direction
 * (reversed inside), a sighted station moves by (h, v): all of them are linear in the shift and tilt of the component in
 * each plane, δ(z) = δ₀ + θ·(z − z̄), which is their least squares solution (pseudoinverse by singular values). A move
 * that the readings leave open is answered as unknown, never as the smallest that fits. Common practice, no source.
 * Work: n readings by at most four unknowns.
 *
 * @throws ComputeError too_few_points with nothing read; supports_insufficient where the component has no support
 */
export function followMove(readings: MoveReadings): FollowedMove {
  const { supports, wanted, indicators, sights, enoughMm } = readings;
  if (supports.length === 0) throw new ComputeError("supports_insufficient", "The component has no support.");
  if (indicators.length + sights.length === 0) throw new ComputeError("too_few_points", "Nothing was read.");
  const sightedZMm = sights.map(({ zMm }) => zMm);
  const modes = planes.flatMap((plane) => modesOf(supports, sightedZMm, plane));
  const { rows, values } = equationsOf(modes, indicators, sights);
  const fit = rigidFitOf(rows, modes.length);
  const amounts = modes.map((_, k) =>
    values.reduce((sum, value, row) => sum + value * (fit.columns[row]?.[k] ?? 0), 0),
  );
  const residualsMm = rows.map((row, index) =>
    assertFinite((values[index] ?? 0) - dot(row, amounts), "What a reading has beyond the move"),
  );

  const movedAt = (zMm: number, plane: Plane): number | null => {
    const row = rowAlong(modes, { h: plane === "h" ? 1 : 0, v: plane === "v" ? 1 : 0 }, zMm);
    const isOpen = fit.open.some((direction) => Math.abs(dot(direction, row)) > openWithin);
    return isOpen ? null : dot(row, amounts);
  };
  const followed = supports.map(({ id, zMm }) => {
    const target = wanted.find(({ supportId }) => supportId === id) ?? { hMm: 0, vMm: 0 };
    const movedMm = { h: movedAt(zMm, "h"), v: movedAt(zMm, "v") };
    return {
      supportId: id,
      target: { h: target.hMm, v: target.vMm },
      movedMm,
      leftMm: { h: less(target.hMm, movedMm.h), v: less(target.vMm, movedMm.v) },
    };
  });
  const lefts = followed.flatMap(({ leftMm }) => [leftMm.h, leftMm.v]);
  return {
    supports: followed.map(({ supportId, movedMm, leftMm }) => ({ supportId, movedMm, leftMm })),
    done: lefts.some((left) => left !== null && Math.abs(left) > enoughMm)
      ? false
      : lefts.includes(null)
        ? null
        : true,
    past: followed
      .filter(({ target, leftMm }) => planes.some((plane) => isPast(target[plane], leftMm[plane], enoughMm)))
      .map(({ supportId }) => supportId),
    residualsMm,
  };
}

function equationsOf(
  modes: readonly Mode[],
  indicators: MoveReadings["indicators"],
  sights: MoveReadings["sights"],
): { readonly rows: readonly (readonly number[])[]; readonly values: readonly number[] } {
  const equations = [
    ...indicators.map(({ zMm, clockDeg, contact, readingMm }) => ({
      row: rowAlong(modes, clockDirection(clockDeg), zMm),
      value: contact === "outside" ? readingMm : 0 - readingMm,
    })),
    ...sights.flatMap(({ zMm, change }) => [
      { row: rowAlong(modes, { h: 1, v: 0 }, zMm), value: change.hMm },
      { row: rowAlong(modes, { h: 0, v: 1 }, zMm), value: change.vMm },
    ]),
  ];
  return { rows: equations.map(({ row }) => row), values: equations.map(({ value }) => value) };
}

const less = (target: number, moved: number | null): number | null =>
  moved === null ? null : target - moved;

/** Past its target: what is left points back; where no move is wanted, any move that is more than enough. */
function isPast(target: number, left: number | null, enoughMm: number): boolean {
  if (left === null || Math.abs(left) <= enoughMm) return false;
  return target === 0 || Math.sign(left) !== Math.sign(target);
}
