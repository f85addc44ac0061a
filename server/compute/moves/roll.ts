import type { PlaneVector } from "../plane.ts";
import type { StackChange } from "./move-plan.ts";
import type { Roll } from "./move-problem.ts";
import type { RigidMove } from "./rigid-freedom.ts";

/** How a measured roll is taken out: by how much, and what that does to the bore. */
export interface RollAnswer {
  /** Positive clockwise, seen downstream. */
  readonly foundRadians: number;
  readonly predictedRadians: number;
  /** The bore's own move, for it stands above the feet about which the part turns. */
  readonly boreShift: PlaneVector;
}

/**
 * What taking out a roll asks of a foot beside the move of the part: turned by −ρ about the bore, a foot at h goes up by
 * h·ρ (small angles: a clockwise turn by ρ moves the point (h, v) by (v·ρ, −h·ρ)).
 */
export function footOffsetMm(roll: Roll | null, supportId: string, place: string): number {
  const foot = roll?.feet.find((each) => each.supportId === supportId && each.place === place);
  return roll && foot ? foot.hMm * roll.radians : 0;
}

/** The bore's move when `radians` are taken out: roll × height, toward −h for a clockwise roll and feet below. */
export function boreShiftOf({ feet }: Roll, radians: number): PlaneVector {
  const heightMm = feet.reduce((sum, { vMm }) => sum + vMm, 0) / Math.max(1, feet.length);
  return { hMm: heightMm * radians, vMm: 0 };
}

/**
 * The roll that `stacks` really take out: the slope, over the feet's h, of what each foot rises beyond the part's own
 * move (straight line by least squares).
 */
export function rollTakenOut(
  { radians, feet }: Roll,
  stacks: readonly StackChange[],
  move: RigidMove,
  zMmOf: (supportId: string) => number,
): RollAnswer {
  const risen = feet.flatMap(({ supportId, place, hMm }) => {
    const stack = stacks.find((each) => each.supportId === supportId && each.place === place);
    return stack ? [{ hMm, riseMm: stack.changeMm - move(zMmOf(supportId)).vMm }] : [];
  });
  const mean = (of: (foot: { hMm: number; riseMm: number }) => number) =>
    risen.reduce((sum, foot) => sum + of(foot), 0) / Math.max(1, risen.length);
  const [middleMm, meanRiseMm] = [mean(({ hMm }) => hMm), mean(({ riseMm }) => riseMm)];
  const spread = risen.reduce((sum, { hMm }) => sum + (hMm - middleMm) ** 2, 0);
  const turned = risen.reduce((sum, { hMm, riseMm }) => sum + (hMm - middleMm) * (riseMm - meanRiseMm), 0);
  const removed = spread > 0 ? turned / spread : 0;
  return {
    foundRadians: radians,
    predictedRadians: radians - removed,
    boreShift: boreShiftOf({ radians, feet }, removed),
  };
}
