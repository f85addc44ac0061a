import { idealMoveOf, planesTogether, type IdealMove } from "./ideal-move.ts";
import type { Unreachable } from "./move-plan.ts";
import { planes, type MoveAim, type MoveComponent, type MoveStation } from "./move-problem.ts";
import { worstBeyond } from "./predict-station.ts";
import { moveAt, sumOfMoves, type RigidMove } from "./rigid-freedom.ts";

/**
 * Why the stations of a component that may move are not all brought inside their tolerances, `worst` being the one left
 * farthest beyond. The first that holds: the ideal move would do, so it is the shims; the move without limits would do,
 * so it is the limit that costs most; the move with nothing blocked would do, so it is what is blocked; else no rigid
 * move of least cost does.
 * @throws ComputeError not_converged
 */
export function explainUnreachable(
  component: MoveComponent,
  stations: readonly MoveStation[],
  ideals: readonly IdealMove[],
  level: number,
  aim: MoveAim,
  worst: Unreachable["worst"],
): Unreachable {
  const wouldDo = (move: RigidMove) => worstBeyond(stations, move, level) === null;
  const together = (amounts: (ideal: IdealMove) => readonly number[]) =>
    sumOfMoves(ideals.map((ideal) => (zMm) => moveAt(ideal.modes, amounts(ideal), zMm)));

  if (wouldDo(together(({ amounts }) => amounts))) return { worst, cause: "shims" };
  const [costliest] = ideals.flatMap(({ hindrances }) => hindrances).sort((a, b) => b.worth - a.worth);
  if (costliest && wouldDo(together(({ unhindered }) => unhindered))) {
    const { limit, limitMm, wantedMm } = costliest;
    return { worst, cause: "limit", limit, limitMm, wantedMm };
  }
  const blocked = component.supports.flatMap((support, index) =>
    planes.filter((plane) => support.blocked.includes(plane)).map((plane) => ({ support: index, plane })),
  )[0];
  if (blocked && wouldDo(unblockedMove(component, stations, aim)))
    return { worst, cause: "blocked", ...blocked };
  return { worst, cause: "rigid" };
}

function unblockedMove(component: MoveComponent, stations: readonly MoveStation[], aim: MoveAim): RigidMove {
  const free = { ...component, supports: component.supports.map((support) => ({ ...support, blocked: [] })) };
  return sumOfMoves(
    planesTogether([], aim).flatMap((together) => {
      const ideal = idealMoveOf(free, stations, [], together, aim);
      return ideal.possible ? [(zMm: number) => moveAt(ideal.move.modes, ideal.move.unhindered, zMm)] : [];
    }),
  );
}
