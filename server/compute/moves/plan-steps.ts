import { clockDirection } from "../bore/clock-direction.ts";
import { ComputeError } from "../compute-error.ts";
import type { Increment, Step, SupportMove, Watch } from "./move-plan.ts";
import type { MoveIndicator, MoveProblem } from "./move-problem.ts";
import type { RigidMove } from "./rigid-freedom.ts";
import type { SolvedComponent } from "./solve-component.ts";
import type { StationShift } from "./station-shifts.ts";

/**
 * The moves as steps, in the order solved: each made and locked before the next.
 * @throws ComputeError combination_invalid when the moves would be split into more parts than `incrementsMax`
 */
export function planSteps(
  problem: MoveProblem,
  inOrder: readonly SolvedComponent[],
  shiftOf: StationShift,
): Step[] {
  const moving = inOrder.filter(({ moved }) => moved);
  const parts = moving.reduce(
    (sum, { answer }) => sum + incrementCount(answer.realised, problem.maximumIncrementMm),
    0,
  );
  if (parts > problem.incrementsMax) throw tooManyParts(parts, problem.incrementsMax);
  return moving.map((each, index) => ({
    order: index + 1,
    componentId: each.component.id,
    increments: incrementsOf(problem, each),
    watch: watchOf(problem, each, shiftOf),
  }));
}

function tooManyParts(reached: number, limit: number): ComputeError {
  const detail = `The moves split into ${reached} parts; a call takes ${limit}.`;
  return new ComputeError("combination_invalid", detail, { at: ["maximumIncrement"], reached, limit });
}

/** Equal parts so that none passes the largest allowed: n = ⌈L/maximum⌉, L the largest |h| or |v| at any support. */
export function incrementCount(moves: readonly SupportMove[], maximumMm: number | null): number {
  const largestMm = Math.max(0, ...moves.flatMap(({ hMm, vMm }) => [Math.abs(hMm), Math.abs(vMm)]));
  return maximumMm === null ? 1 : Math.max(1, Math.ceil(largestMm / maximumMm - 1e-9));
}

function incrementsOf(problem: MoveProblem, { component, answer, realised }: SolvedComponent): Increment[] {
  const indicators = problem.indicators.filter(({ componentId }) => componentId === component.id);
  const count = incrementCount(answer.realised, problem.maximumIncrementMm);
  return Array.from({ length: count }, (_, k) => {
    const share = (k + 1) / count;
    return {
      moves: answer.realised.map(({ supportId, hMm, vMm }) => ({
        supportId,
        hMm: hMm * share,
        vMm: vMm * share,
      })),
      readings: indicators.map((indicator) => ({
        indicatorId: indicator.id,
        readingMm: readingMm(indicator, realised) * share,
      })),
    };
  });
}

/**
 * Positive when the part moves toward the indicator along its clock direction; reversed for one inside the bore. `move` is
 * that of the bores: an indicator points at the bore, and a part turned about it comes no nearer (rigid body, small angles).
 */
function readingMm({ zMm, clockDeg, contact }: MoveIndicator, move: RigidMove): number {
  const { h, v } = clockDirection(clockDeg);
  const { hMm, vMm } = move(zMm);
  const toward = h * hMm + v * vMm;
  return contact === "outside" ? toward : 0 - toward;
}

/**
 * The neighbours to read meanwhile: the reference stations, which must not change unless this part carries them, and
 * the stations of others that this move shifts.
 */
function watchOf(
  { stations, referenceIds, maximumMisfitMm }: MoveProblem,
  { index, component, realised }: SolvedComponent,
  shiftOf: StationShift,
): Watch[] {
  const about = (mm: number) => ({ minMm: mm - maximumMisfitMm, maxMm: mm + maximumMisfitMm });
  const byId = new Map(stations.map((station) => [station.id, station]));
  const shifted = stations.filter((station) => {
    const { hMm, vMm } = shiftOf(index, realised, station);
    return !component.stationIds.includes(station.id) && (hMm !== 0 || vMm !== 0);
  });
  const watched = new Set([...referenceIds, ...shifted.map(({ id }) => id)]);
  return [...watched].flatMap((stationId) => {
    const station = byId.get(stationId);
    if (!station) return [];
    const change = shiftOf(index, realised, station);
    return [{ stationId, change, stopAt: { h: about(change.hMm), v: about(change.vMm) } }];
  });
}
