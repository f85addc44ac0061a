import type { DecisionRule } from "../conformity/judge.ts";
import type { PlaneTolerance, Verdict } from "../conformity/tolerance.ts";
import type { LimitPlace, SupportMove } from "../moves/move-plan.ts";
import type { MoveComponent, MoveStation, Plane } from "../moves/move-problem.ts";
import type { PlaneVector } from "../plane.ts";

/** A station that sets the axis, and how far the axis may leave there the one surveyed. */
export interface FloatingReference {
  readonly stationId: string;
  readonly float: Readonly<Record<Plane, PlaneTolerance>>;
}

/** A rigid part and what moving it costs, above 0. */
export interface CostedComponent extends MoveComponent {
  readonly cost: number;
}

export interface FewestMovesProblem {
  readonly stations: readonly MoveStation[];
  /** None: the axis stays. Else two or more, apart along z. */
  readonly references: readonly FloatingReference[];
  /** No couplings, rolls or tilt tolerances. What carries, or rests in, another part has bounded moves. */
  readonly components: readonly CostedComponent[];
  readonly rule: DecisionRule;
  readonly level: number;
  /** Kept free of every tolerance, beside the uncertainty. */
  readonly marginMm: number;
}

/** A limit of the problem, and where it was stated. */
export type LimitSource =
  | { readonly of: "float"; readonly reference: number; readonly plane: Plane; readonly side: "min" | "max" }
  /** Plane null: a round tolerance. */
  | {
      readonly of: "station";
      readonly station: number;
      readonly plane: Plane | null;
      readonly side: "min" | "max";
    }
  | { readonly of: "component"; readonly component: number; readonly limit: LimitPlace };

/** Why no choice of moves and axis brings every station inside. */
export type Infeasible =
  /** The uncertainty, with the margin, is as large as the tolerance of these stations. */
  | {
      readonly cause: "uncertainty";
      readonly stations: readonly {
        readonly station: number;
        readonly plane: Plane | null;
        readonly uncertaintyMm: number;
        readonly halfWidthMm: number;
      }[];
    }
  /** These cannot all be met, though every part that may move does; without any one of them the others can. */
  | { readonly cause: "contradiction"; readonly limits: readonly LimitSource[] };

export interface FewestSearch {
  readonly method: "none_needed" | "mixed_integer_program";
  /** Whether no cheaper choice exists. */
  readonly proved: boolean;
  /** Cost that a better choice could save at most. */
  readonly betterBy: number;
  /** Tangents to round tolerances that the program was given. */
  readonly cuts: number;
  /** Other choices of parts at the same cost that were found, and compared. */
  readonly tied: number;
}

export interface FewestComponent {
  readonly id: string;
  readonly moved: boolean;
  /** May not move: fixed, or it holds a reference station. */
  readonly fixed: boolean;
  readonly moves: readonly SupportMove[];
}

export interface AxisShift {
  /** The new axis from the one surveyed, at z = 0 and per mm. */
  readonly h: { readonly at0Mm: number; readonly slope: number };
  readonly v: { readonly at0Mm: number; readonly slope: number };
  readonly atReferences: readonly (PlaneVector & { readonly stationId: string })[];
}

/** A choice of parts with its axis and moves. */
export interface FewestChoice {
  readonly cost: number;
  readonly axis: AxisShift;
  readonly components: readonly FewestComponent[];
  /** Every station from the new axis, before the moves. */
  readonly fromNewAxis: readonly PlaneVector[];
  /** And after them. */
  readonly predicted: readonly {
    readonly id: string;
    readonly deviation: PlaneVector;
    readonly verdict: Verdict | null;
    /** Whether a guarded verdict fell back on the simple one: no uncertainty is known. */
    readonly unguarded: boolean;
    /** |d| + U against T leaves next to nothing. */
    readonly atLimit: boolean;
  }[];
  /** Parts, by index, that had to move whatever the stations ask: their limits leave out staying. */
  readonly mustMove: readonly number[];
  readonly search: FewestSearch;
}

export type FewestMoves =
  | { readonly possible: true; readonly choice: FewestChoice }
  | { readonly possible: false; readonly why: Infeasible };
