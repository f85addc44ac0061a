import type { StackChange, SupportMove } from "./move-plan.ts";
import type { MoveComponent } from "./move-problem.ts";
import type { RigidMove } from "./rigid-freedom.ts";
import type { ChosenStack } from "./shim-task.ts";
import type { Place } from "./support-places.ts";

/** The move at every support of a component. */
export const movesOf = ({ supports }: MoveComponent, move: RigidMove): SupportMove[] =>
  supports.map(({ id, zMm }) => ({ supportId: id, ...move(zMm) }));

/** The change that a move of the part asks of a place, with what a roll taken out asks of it. */
export function changeFor({ direction, zMm, offsetMm }: Place, move: RigidMove): number {
  const { hMm, vMm } = move(zMm);
  return direction.h * hMm + direction.v * vMm + offsetMm;
}

/** A stack changed by just what the move asks, without pieces. */
export function asIdeal(place: Place, ideal: RigidMove): ChosenStack {
  const change = { changeMm: changeFor(place, ideal), addMm: [], removeMm: [], handled: 0 };
  return { place, change, misfitMm: 0 };
}

/** What becomes of one stack; unchanged where nothing was chosen for it, and then nothing is asked of it either. */
export function stackChangeOf(
  { supports }: MoveComponent,
  place: Place,
  ideal: RigidMove | null,
  chosen: readonly ChosenStack[],
): StackChange {
  const stack = chosen.find((each) => each.place.support === place.support && each.place.name === place.name);
  const changeMm = stack?.change.changeMm ?? 0;
  return {
    supportId: supports[place.support]?.id ?? "",
    place: place.name,
    idealMm: ideal ? changeFor(place, ideal) : 0,
    changeMm,
    fromMm: place.stack.thicknessMm,
    toMm: place.stack.thicknessMm + changeMm,
    addMm: stack?.change.addMm ?? [],
    removeMm: stack?.change.removeMm ?? [],
    misfitMm: stack?.misfitMm ?? 0,
  };
}
