import type { Verdict } from "../conformity/tolerance.ts";
import type { PlaneVector } from "../plane.ts";
import type { Plane } from "./move-problem.ts";
import type { RollAnswer } from "./roll.ts";
import type { ChoiceSearch } from "./shared-choice.ts";
import type { Tilt } from "./tilt.ts";

/** How far the bore moves at one support. */
export interface SupportMove extends PlaneVector {
  readonly supportId: string;
}

/** What is done to one stack. Positive changes make it thicker. */
export interface StackChange {
  readonly supportId: string;
  readonly place: string;
  /** Change that the ideal move asks. */
  readonly idealMm: number;
  readonly changeMm: number;
  readonly fromMm: number;
  readonly toMm: number;
  /** One thickness per piece. Empty when no shims were chosen. */
  readonly addMm: readonly number[];
  readonly removeMm: readonly number[];
  /** Chosen change less the one that the realised move would need: what a rigid part cannot follow. */
  readonly misfitMm: number;
}

/** A limit stated in the problem, and where. */
export type LimitPlace =
  | { readonly of: "travel"; readonly support: number; readonly plane: Plane; readonly side: "min" | "max" }
  | { readonly of: "stack"; readonly support: number; readonly place: string; readonly side: "min" | "max" };

/** Why a component's stations cannot all be brought inside their tolerances. */
export type Unreachable = {
  /** The station left worst, and its |d|/T; null when no station of it is beyond its tolerance. */
  readonly worst: { readonly stationId: string; readonly ratio: number } | null;
} & (
  | { readonly cause: "fixed" }
  | { readonly cause: "reference"; readonly stationId: string }
  /** These limits leave no move at all, not even none. */
  | { readonly cause: "contradiction"; readonly limits: readonly LimitPlace[] }
  /** The limit that costs most: the move stops at `limitMm` where the stations ask for `wantedMm`. */
  | {
      readonly cause: "limit";
      readonly limit: LimitPlace;
      readonly limitMm: number;
      readonly wantedMm: number;
    }
  | { readonly cause: "blocked"; readonly support: number; readonly plane: Plane }
  /** The bores do not lie straight enough to each other for a rigid part. */
  | { readonly cause: "rigid" }
  /** The ideal move would do; the shims that can be cut do not. */
  | { readonly cause: "shims" }
  /** The ideal move would do; the shims at hand do not. */
  | { readonly cause: "stock" }
  /** The stations are inside; the tilt of the part is not. */
  | { readonly cause: "tilt"; readonly planes: readonly Plane[] }
);

export interface ComponentMove {
  readonly id: string;
  readonly fixed: boolean;
  readonly ideal: readonly SupportMove[];
  readonly realised: readonly SupportMove[];
  readonly stacks: readonly StackChange[];
  readonly unreachable: Unreachable | null;
  /** Slope of the line through the end stations before and after; null where no tolerance of it was stated. */
  readonly tilt: { readonly found: Tilt; readonly predicted: Tilt } | null;
  readonly roll: RollAnswer | null;
}

export interface PredictedStation {
  readonly id: string;
  readonly deviation: PlaneVector;
  /** Null where the station has no tolerance. */
  readonly verdict: Verdict | null;
}

/** One part of a move, cumulative from the component's start. */
export interface Increment {
  readonly moves: readonly SupportMove[];
  readonly readings: readonly { readonly indicatorId: string; readonly readingMm: number }[];
}

/** A neighbour to read while a component moves, and between which changes it may stay. */
export interface Watch {
  readonly stationId: string;
  readonly change: PlaneVector;
  readonly stopAt: Readonly<Record<Plane, { readonly minMm: number; readonly maxMm: number }>>;
}

export interface Step {
  /** From 1. */
  readonly order: number;
  readonly componentId: string;
  readonly increments: readonly Increment[];
  readonly watch: readonly Watch[];
}

/** What the crew must know beside the numbers; put into words where the answer is written. */
export type Advice =
  | { readonly code: "shims_not_chosen" }
  | { readonly code: "shim_practice" }
  | { readonly code: "optimality_not_proved"; readonly betterBy: number | null }
  | {
      readonly code: "stack_over_four_pieces";
      readonly componentId: string;
      readonly places: readonly string[];
    }
  | {
      readonly code: "set_by_jack";
      readonly componentId: string;
      readonly supports: readonly { readonly id: string; readonly planes: readonly Plane[] }[];
    }
  | { readonly code: "key_bottom_cheeks"; readonly componentId: string }
  | { readonly code: "limit_reached"; readonly componentId: string; readonly limits: readonly LimitPlace[] }
  | {
      readonly code: "stations_without_tolerance";
      readonly componentId: string;
      readonly stationIds: readonly string[];
    }
  | { readonly code: "tilt_not_determined"; readonly componentId: string; readonly planes: readonly Plane[] }
  | { readonly code: "tilt_not_adjustable"; readonly componentId: string; readonly planes: readonly Plane[] }
  | {
      readonly code: "shifted_afterwards";
      readonly componentId: string;
      readonly stationIds: readonly string[];
    }
  | { readonly code: "bearing_afterwards"; readonly componentIds: readonly string[] }
  | { readonly code: "reference_held"; readonly componentId: string; readonly stationIds: readonly string[] }
  | { readonly code: "axis_survey_anew"; readonly stationIds: readonly string[] };

export interface MovePlan {
  readonly components: readonly ComponentMove[];
  /** Every station sent, moved or not, in the order sent. */
  readonly predicted: readonly PredictedStation[];
  readonly steps: readonly Step[];
  /** Reference stations first, then every station of a component that moved. */
  readonly remeasureIds: readonly string[];
  readonly advice: readonly Advice[];
  /** How the shims were chosen; null where none were. */
  readonly search: ChoiceSearch | null;
}
