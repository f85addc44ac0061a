import type { PlaneTolerance, Tolerance } from "../conformity/tolerance.ts";
import type { PlaneCovariance, PlaneVector } from "../plane.ts";

export type Plane = "h" | "v";
export const planes = ["h", "v"] as const satisfies readonly Plane[];

/** One measured bore: where it lies off its target, and what it may be off. */
export interface MoveStation {
  readonly id: string;
  readonly zMm: number;
  readonly deviation: PlaneVector;
  /** Standard covariance of the deviation, mm²; null when not known: its verdict is then the simple one. */
  readonly covariance: PlaneCovariance | null;
  readonly dof: number | null;
  /** Null: the station asks for nothing, it is carried along and predicted. */
  readonly tolerance: Tolerance | null;
}

/** The shims at one place of a support. Unlimited limits are Infinity. */
export interface ShimStack {
  readonly thicknessMm: number;
  readonly minMm: number;
  readonly maxMm: number;
  /** Pieces of the finished stack, all counted. */
  readonly maxCount: number;
  /** Null: not known. Such a stack is one piece, none when its thickness is 0. */
  readonly piecesMm: readonly number[] | null;
}

export interface Pad {
  readonly id: string;
  readonly clockDeg: number;
  readonly stack: ShimStack;
}

interface SupportPosition {
  readonly id: string;
  readonly zMm: number;
  /** Least and most move from now, per plane. Unlimited is ±Infinity. */
  readonly travel: Readonly<Record<Plane, PlaneTolerance>>;
  readonly blocked: readonly Plane[];
}

export type FootPlace = "left" | "right" | "key-left" | "key-right";
export type JointKeyPlace = "key-left" | "key-right" | "key-bottom";

export type MoveSupport = SupportPosition &
  (
    | {
        readonly form: "feet";
        /** Where the side keys stand: beyond the feet, or between them. */
        readonly keys: "outside" | "inside";
        readonly stacks: Readonly<Partial<Record<FootPlace, ShimStack>>>;
      }
    | { readonly form: "joint_keys"; readonly stacks: Readonly<Partial<Record<JointKeyPlace, ShimStack>>> }
    | { readonly form: "pads"; readonly pads: readonly Pad[] }
  );

/** One rigid part, the stations it carries and the supports it rests on. */
export interface MoveComponent {
  readonly id: string;
  readonly kind: "casing" | "shroud" | "nozzle" | "bearing" | "other";
  readonly stationIds: readonly string[];
  readonly fixed: boolean;
  readonly allowReferenceMove: boolean;
  readonly supports: readonly MoveSupport[];
  /** The component that this one rests in: its stations follow that one's move before its own. */
  readonly carriedById: string | null;
  /** Largest slope of the line through its two end stations; null where its tilt is not held to anything. */
  readonly tiltTolerance: Readonly<Record<Plane, number>> | null;
  readonly roll: Roll | null;
}

/** A measured turn of a part about its bore, to be taken out by its feet. */
export interface Roll {
  /** Positive clockwise, seen downstream. */
  readonly radians: number;
  /** Where its feet stand, from the bore's centre. */
  readonly feet: readonly {
    readonly supportId: string;
    readonly place: string;
    readonly hMm: number;
    readonly vMm: number;
  }[];
}

/** How a support's move shifts a station that its part does not carry: by so much in h, and in v, per unit there. */
export interface Coupling {
  readonly componentId: string;
  readonly supportId: string;
  readonly stationId: string;
  readonly h: number;
  readonly v: number;
}

export interface MoveIndicator {
  readonly id: string;
  readonly componentId: string;
  readonly zMm: number;
  readonly clockDeg: number;
  readonly contact: "outside" | "inside";
}

/** What a move, and the choice of shims, makes least: Σ(|d|/T)², or the largest |d|/T of a component's stations. */
export type MoveAim = "least_squares" | "minimax";

/** Pieces of one thickness at hand. */
export interface StockItem {
  readonly thicknessMm: number;
  /** Infinity: unlimited. */
  readonly quantity: number;
}

export interface MoveProblem {
  readonly stations: readonly MoveStation[];
  readonly referenceIds: readonly string[];
  readonly components: readonly MoveComponent[];
  readonly couplings: readonly Coupling[];
  readonly aim: MoveAim;
  /** Shims cut to any whole multiple of this thickness; null: none are cut. */
  readonly cutIncrementMm: number | null;
  /** Shims at hand, shared by all stacks of the call; null: none. With neither, every change is the ideal one. */
  readonly stock: readonly StockItem[] | null;
  /** Whether pieces taken out serve the same component again, and those moved after it. */
  readonly reuse: boolean;
  /** Most that may be left between a chosen change and the rigid move, at any place. */
  readonly maximumMisfitMm: number;
  /** Largest part of a move made at once; null: a move is made in one. */
  readonly maximumIncrementMm: number | null;
  /** Parts that all moves together may be split into. */
  readonly incrementsMax: number;
  readonly indicators: readonly MoveIndicator[];
  /** Coverage probability of the predicted verdicts. */
  readonly level: number;
}
