import { assertFinite, ComputeError } from "../compute-error.ts";
import type { ExpandedUncertainty } from "../conformity/expand-uncertainty.ts";
import { judge } from "../conformity/judge.ts";
import type { PlaneTolerance, Tolerance } from "../conformity/tolerance.ts";
import { movesOf } from "../moves/component-answer.ts";
import type { MoveStation, Plane } from "../moves/move-problem.ts";
import { moveAt, noMove } from "../moves/rigid-freedom.ts";
import { dot } from "../moves/least-squares-in-order.ts";
import type { PlaneVector } from "../plane.ts";
import type { AxisShift, FewestChoice, FewestMovesProblem, FewestSearch } from "./fewest-moves-problem.ts";
import { mayMove, type MachineModel } from "./machine-model.ts";

/** A station with less than this share of its tolerance left is at its limit: shims cut to size can put it outside. */
const noRoomShare = 1e-3;

/**
 * A choice of blocks, with the unknowns that go with it, as axis, moves and predicted stations; each verdict is judged
 * anew from the numbers answered.
 * @throws ComputeError not_converged where a station does not conform by those numbers; result_overflow
 */
export function describeChoice(
  model: MachineModel,
  moved: ReadonlySet<number>,
  { x }: { readonly x: readonly number[] },
  search: FewestSearch,
): FewestChoice {
  const { problem, blocks } = model;
  const moves = problem.components.map((component, index) => {
    const b = blocks.findIndex((block) => block.component === index);
    const block = blocks[b];
    const amounts = block && moved.has(b) ? x.slice(block.first, block.first + block.modes.length) : [];
    return {
      id: component.id,
      moved: moved.has(b),
      fixed: !mayMove(problem, component),
      moves: movesOf(component, block && moved.has(b) ? (zMm) => moveAt(block.modes, amounts, zMm) : noMove),
    };
  });
  const heightAt = axisHeight(model, x);
  const fromNewAxis = problem.stations.map(({ deviation, zMm }) => {
    const { hMm, vMm } = heightAt(zMm);
    return { hMm: deviation.hMm - hMm, vMm: deviation.vMm - vMm };
  });
  return {
    cost: [...moved].reduce((sum, b) => sum + blocks[b]!.cost, 0),
    axis: axisShift(model, x, heightAt),
    components: moves,
    fromNewAxis,
    predicted: problem.stations.map((station, k) =>
      predict(problem, station, moveOf(model, x, fromNewAxis[k]!, station)),
    ),
    mustMove: blocks.flatMap(({ component, mustMove }) => (mustMove ? [component] : [])),
    search,
  };
}

/** The station after the moves of all parts that it follows. */
function moveOf(
  model: MachineModel,
  x: readonly number[],
  from: PlaneVector,
  station: MoveStation,
): PlaneVector {
  const rows = model.rowsOf(station);
  const moved = (plane: Plane) => dot(rows[plane].slice(model.axis.size), x.slice(model.axis.size));
  return { hMm: from.hMm + moved("h"), vMm: from.vMm + moved("v") };
}

function predict(
  { rule, level }: FewestMovesProblem,
  station: MoveStation,
  deviation: PlaneVector,
): FewestChoice["predicted"][number] {
  const { id, covariance, dof, tolerance } = station;
  assertFinite(deviation.hMm + deviation.vMm, "A predicted deviation");
  if (tolerance === null) return { id, deviation, verdict: null, unguarded: false, atLimit: false };
  const guarded = rule === "guarded" && covariance !== null;
  const input = {
    deviation,
    covariance,
    dof,
    tolerance,
    level,
    rule: guarded ? "guarded" : "simple",
  } as const;
  const { verdict, expandedUncertainty } = judge(input);
  if (verdict !== "conforms") {
    throw new ComputeError("not_converged", `${id} is inside by rounding alone.`);
  }
  const room = roomLeft(tolerance, deviation, guarded ? expandedUncertainty : null);
  return { id, deviation, verdict, unguarded: rule === "guarded" && !guarded, atLimit: room < noRoomShare };
}

/** (T − U − |d|)/T, of two planes the smaller. */
function roomLeft(
  tolerance: Tolerance,
  { hMm, vMm }: PlaneVector,
  guard: ExpandedUncertainty | null,
): number {
  if (tolerance.form === "radial") {
    return 1 - (Math.hypot(hMm, vMm) + (guard?.radialMm ?? 0)) / tolerance.halfWidthMm;
  }
  const inPlane = ({ minMm, maxMm }: PlaneTolerance, value: number, uncertainty: number) =>
    1 - (2 * (Math.abs(value - (minMm + maxMm) / 2) + uncertainty)) / (maxMm - minMm);
  return Math.min(inPlane(tolerance.h, hMm, guard?.hMm ?? 0), inPlane(tolerance.v, vMm, guard?.vMm ?? 0));
}

function axisHeight({ axis }: MachineModel, x: readonly number[]): (zMm: number) => PlaneVector {
  if (axis.size === 0) return () => ({ hMm: 0, vMm: 0 });
  return (zMm) => {
    const [first, last] = axis.sharesAt(zMm);
    return { hMm: first * x[0]! + last * x[1]!, vMm: first * x[2]! + last * x[3]! };
  };
}

function axisShift(
  { axis, problem }: MachineModel,
  x: readonly number[],
  heightAt: (zMm: number) => PlaneVector,
): AxisShift {
  const atZero = heightAt(0);
  const lengthMm = axis.size === 0 ? 1 : Math.max(...axis.zMm) - Math.min(...axis.zMm);
  const slope = (at: number) => (axis.size === 0 ? 0 : (x[at + 1]! - x[at]!) / lengthMm);
  return {
    h: { at0Mm: assertFinite(atZero.hMm, "The axis at z = 0"), slope: assertFinite(slope(0), "Its slope") },
    v: { at0Mm: assertFinite(atZero.vMm, "The axis at z = 0"), slope: assertFinite(slope(2), "Its slope") },
    atReferences: problem.references.map(({ stationId }, k) => ({ stationId, ...heightAt(axis.zMm[k]!) })),
  };
}
