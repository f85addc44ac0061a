import { clockDirection } from "../bore/clock-direction.ts";
import type { FootPlace, JointKeyPlace, MoveSupport, Plane, Roll, ShimStack } from "./move-problem.ts";
import { footOffsetMm } from "./roll.ts";

/** A place of a support that holds a stack of shims. */
export interface Place {
  /** Index of the support in its component. */
  readonly support: number;
  readonly name: string;
  readonly zMm: number;
  /** Change of the stack for a move of the bore by 1 in h and in v. */
  readonly direction: Readonly<Record<Plane, number>>;
  /** Change asked beside that move, to take out a roll. */
  readonly offsetMm: number;
  /** False for an upper pad: it follows the realised move and has no say in it. */
  readonly bearsLoad: boolean;
  /** The place changed alike, if it has a stack too: the other foot (roll is kept), the opposed key (its fit is kept). */
  readonly twin: string | null;
  readonly stack: ShimStack;
}

/**
 * The stacks of a support, and what a move of the bore changes each by.
 * - Feet: left and right by +v. Side keys outside the feet: key-left +h, key-right −h; inside them: swapped.
 * - Joint keys: key-left and key-right carry the height, +v each. The key at the bottom sets the side: its stack is the
 *   one at the left cheek, +h; the right cheek is cleared by as much.
 * - Pads at clock angle φ: −(h·sin φ + v·cos φ); those at 90 to 270 degrees bear load. Straight up by v on pads at 135
 *   and 225 degrees is +v·cos 45° each (common practice, no source).
 */
export function placesOf(support: MoveSupport, index: number, roll: Roll | null = null): Place[] {
  const at = { support: index, zMm: support.zMm };
  const offsetOf = (place: string) => footOffsetMm(roll, support.id, place);
  switch (support.form) {
    case "feet": {
      const side = support.keys === "outside" ? 1 : -1;
      const directions: Record<FootPlace, [h: number, v: number]> = {
        left: [0, 1],
        right: [0, 1],
        "key-left": [side, 0],
        "key-right": [-side, 0],
      };
      return stackedPlaces(at, directions, support.stacks, offsetOf);
    }
    case "joint_keys": {
      const directions: Record<JointKeyPlace, [h: number, v: number]> = {
        "key-left": [0, 1],
        "key-right": [0, 1],
        "key-bottom": [1, 0],
      };
      return stackedPlaces(at, directions, support.stacks, offsetOf);
    }
    case "pads":
      return support.pads.map(({ id, clockDeg, stack }) => {
        const { h, v } = clockDirection(clockDeg);
        // A hair of rounding (an angle sent as 450.0000000001 − 360) does not unload a pad.
        const bearsLoad = v <= 1e-12;
        return {
          ...at,
          name: id,
          direction: { h: 0 - h, v: 0 - v },
          offsetMm: 0,
          bearsLoad,
          twin: null,
          stack,
        };
      });
  }
}

const twins: Readonly<Record<string, string>> = {
  left: "right",
  right: "left",
  "key-left": "key-right",
  "key-right": "key-left",
};

function stackedPlaces<Name extends string>(
  at: Pick<Place, "support" | "zMm">,
  directions: Readonly<Record<Name, readonly [h: number, v: number]>>,
  stacks: Readonly<Partial<Record<Name, ShimStack>>>,
  offsetOf: (place: string) => number,
): Place[] {
  return (Object.keys(directions) as Name[]).flatMap((name) => {
    const stack = stacks[name];
    const [h, v] = directions[name];
    return stack
      ? [
          {
            ...at,
            name,
            direction: { h, v },
            offsetMm: offsetOf(name),
            bearsLoad: true,
            twin: twins[name] ?? null,
            stack,
          },
        ]
      : [];
  });
}
