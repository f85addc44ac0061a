import type { Hindrance } from "./ideal-move.ts";
import type { LeastSquares } from "./least-squares-in-order.ts";
import type { PlacedLimit } from "./move-limits.ts";
import type { RigidFit } from "./rigid-fit.ts";
import type { ShimChange } from "./shim-changes.ts";
import type { Pull } from "./station-pull.ts";
import type { Place } from "./support-places.ts";

/** The planes of one component whose shims must be chosen together. The unknowns are the amounts of their modes. */
export interface ShimTask {
  readonly size: number;
  readonly pull: Pull;
  /** Of moves that serve the stations alike, the one wanted. */
  readonly leastMovement: LeastSquares;
  readonly travel: readonly PlacedLimit[];
  /** Places that bear load, and upper pads, which follow. The change at each is row·amounts. */
  readonly loaded: readonly PlaceRow[];
  readonly following: readonly PlaceRow[];
  /** How changes at the loaded places become the move. */
  readonly fit: RigidFit;
  readonly ideal: readonly number[];
  /**
   * Best move within travel and within stack limits, widened by the misfit where there can be one: none that shims can
   * realise is better. And the limits that hold it back, with what a millimetre short of each costs at least.
   */
  readonly bestImaginable: readonly number[];
  readonly hindrances: readonly Hindrance[];
  readonly incrementMm: number;
  readonly maximumMisfitMm: number;
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
  readonly cost: number;
  readonly handled: number;
  readonly totalMm: number;
  readonly stacks: readonly ChosenStack[];
}
