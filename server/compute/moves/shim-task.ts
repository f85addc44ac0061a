import type { Hindrance } from "./ideal-move.ts";
import type { LeastSquares } from "./least-squares-in-order.ts";
import type { PlacedLimit } from "./move-limits.ts";
import type { RigidFit } from "./rigid-fit.ts";
import type { ShimChange } from "./shim-changes.ts";
import type { MoveObjective } from "./move-objective.ts";
import type { ShimSupply } from "./shim-supply.ts";
import type { Place } from "./support-places.ts";

/** The planes of one component whose shims must be chosen together. The unknowns are the amounts of their modes. */
export interface ShimTask {
  readonly size: number;
  readonly objective: MoveObjective;
  /** Of moves that serve the stations alike, the one wanted. */
  readonly leastMovement: LeastSquares;
  readonly travel: readonly PlacedLimit[];
  /** Places that bear load, and upper pads, which follow. The change at each is row·amounts. */
  readonly loaded: readonly PlaceRow[];
  readonly following: readonly PlaceRow[];
  /** How changes at the loaded places become the move. */
  readonly fit: RigidFit;
  readonly ideal: readonly number[];
  readonly idealCost: number;
  /**
   * Best move within travel and within stack limits, widened by the misfit where there can be one: none that shims can
   * realise is better. And the limits that hold it back, with what a millimetre short of each costs at least.
   */
  readonly bestImaginable: readonly number[];
  readonly hindrances: readonly Hindrance[];
  readonly supply: ShimSupply;
  /** What a piece of each counted line costs beside what the move costs; none when empty. */
  readonly prices: readonly number[];
  readonly maximumMisfitMm: number;
  /** Whether the best choice found is answered when the trials run out; else it is refused. */
  readonly bestIfLong: boolean;
}

export interface PlaceRow {
  readonly place: Place;
  readonly row: readonly number[];
}

export interface ChosenStack {
  readonly place: Place;
  readonly change: ShimChange;
  readonly misfitMm: number;
}

/** One choice of real shims for all stacks of the task, and the rigid move that it makes. */
export interface ShimChoice {
  readonly amounts: readonly number[];
  /** What the objective makes of it: Σ(|d|/T)², or the largest |d|/T. */
  readonly cost: number;
  readonly handled: number;
  readonly totalMm: number;
  /** Pieces of each line of the stock that it takes, and those less the ones that it gives back. */
  readonly taken: readonly number[];
  readonly net: readonly number[];
  readonly stacks: readonly ChosenStack[];
}
