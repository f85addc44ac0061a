import type { PlaneTolerance } from "../../server/compute/conformity/tolerance.ts";
import type { ComponentMove, MovePlan, StackChange } from "../../server/compute/moves/move-plan.ts";
import type {
  MoveComponent,
  MoveProblem,
  MoveStation,
  MoveSupport,
  ShimStack,
} from "../../server/compute/moves/move-problem.ts";
import { solveMoves } from "../../server/compute/moves/solve-moves.ts";

export const unlimited: PlaneTolerance = { minMm: -Infinity, maxMm: Infinity };
export const range = (minMm: number, maxMm: number): PlaneTolerance => ({ minMm, maxMm });

type Position = Partial<Pick<MoveSupport, "travel" | "blocked">>;
const anywhere: Pick<MoveSupport, "travel" | "blocked"> = {
  travel: { h: unlimited, v: unlimited },
  blocked: [],
};

/** A stack without limits, its pieces not known. */
export function stackOf(thicknessMm: number, rest: Partial<ShimStack> = {}): ShimStack {
  return { thicknessMm, minMm: 0, maxMm: Infinity, maxCount: Infinity, piecesMm: null, ...rest };
}

/** A station at z with its deviation and a radial tolerance (null: none); exactly measured. */
export function stationOff(
  id: string,
  zMm: number,
  hMm: number,
  vMm: number,
  toleranceMm: number | null = 0.05,
  rest: Partial<MoveStation> = {},
): MoveStation {
  const tolerance = toleranceMm === null ? null : ({ form: "radial", halfWidthMm: toleranceMm } as const);
  return { id, zMm, deviation: { hMm, vMm }, covariance: null, dof: null, tolerance, ...rest };
}

type Feet = Extract<MoveSupport, { form: "feet" }>;
type JointKeys = Extract<MoveSupport, { form: "joint_keys" }>;
type Pads = Extract<MoveSupport, { form: "pads" }>;

/** Two feet on equal stacks and no side keys, unless others are given. */
export function feetAt(
  id: string,
  zMm: number,
  rest: Position & Partial<Pick<Feet, "stacks" | "keys">> = {},
): Feet {
  const stacks = { left: stackOf(5), right: stackOf(5) };
  return { id, zMm, ...anywhere, form: "feet", keys: "outside", stacks, ...rest };
}

export function jointKeysAt(
  id: string,
  zMm: number,
  rest: Position & Partial<Pick<JointKeys, "stacks">> = {},
): JointKeys {
  const stacks = { "key-left": stackOf(8), "key-right": stackOf(8), "key-bottom": stackOf(2) };
  return { id, zMm, ...anywhere, form: "joint_keys", stacks, ...rest };
}

/** Pads named after their clock angle (`p135`), all on the same stack. */
export function padsAt(
  id: string,
  zMm: number,
  clockDegs: readonly number[],
  stack: ShimStack = stackOf(3),
  rest: Position = {},
): Pads {
  const pads = clockDegs.map((clockDeg) => ({ id: `p${clockDeg}`, clockDeg, stack }));
  return { id, zMm, ...anywhere, form: "pads", pads, ...rest };
}

/** A casing that may move. */
export function partOn(
  id: string,
  stationIds: readonly string[],
  supports: readonly MoveSupport[],
  rest: Partial<MoveComponent> = {},
): MoveComponent {
  return {
    id,
    kind: "casing",
    stationIds,
    fixed: false,
    allowReferenceMove: false,
    supports,
    carriedById: null,
    tiltTolerance: null,
    roll: null,
    ...rest,
  };
}

/** Moves with every change the ideal one, unless an increment to cut shims to is given. */
export function moveProblem(
  stations: readonly MoveStation[],
  components: readonly MoveComponent[],
  rest: Partial<MoveProblem> = {},
): MoveProblem {
  return {
    stations,
    referenceIds: [],
    components,
    couplings: [],
    aim: "least_squares",
    cutIncrementMm: null,
    stock: null,
    reuse: false,
    maximumMisfitMm: 0.02,
    maximumIncrementMm: null,
    incrementsMax: 2000,
    indicators: [],
    level: 0.95,
    ...rest,
  };
}

/** The plan for one component that carries all stations, and that component's answer. */
export function solvePart(
  stations: readonly MoveStation[],
  supports: readonly MoveSupport[],
  rest: Partial<MoveProblem> = {},
  part: Partial<MoveComponent> = {},
): { problem: MoveProblem; plan: MovePlan; answer: ComponentMove; stack: (place: string) => StackChange } {
  const ids = stations.map(({ id }) => id);
  const problem = moveProblem(stations, [partOn("part", ids, supports, part)], rest);
  const plan = solveMoves(problem);
  const answer = plan.components[0]!;
  /** The first stack of that name; `support place` names one of several supports. */
  const stack = (name: string) => {
    const found = answer.stacks.find(
      ({ supportId, place }) => place === name || `${supportId} ${place}` === name,
    );
    if (!found) throw new Error(`There is no stack ${name}.`);
    return found;
  };
  return { problem, plan, answer, stack };
}

/** Σ (|d|/T)² of a plan's predicted deviations, d from the middle of the tolerance. */
export function costOfPlan({ stations }: MoveProblem, { predicted }: MovePlan): number {
  return predicted.reduce((sum, { id, deviation: { hMm, vMm } }) => {
    const tolerance = stations.find((station) => station.id === id)!.tolerance;
    if (!tolerance) return sum;
    if (tolerance.form === "radial") return sum + (hMm ** 2 + vMm ** 2) / tolerance.halfWidthMm ** 2;
    const share = (d: number, { minMm, maxMm }: PlaneTolerance) => (2 * d - minMm - maxMm) / (maxMm - minMm);
    return sum + share(hMm, tolerance.h) ** 2 + share(vMm, tolerance.v) ** 2;
  }, 0);
}

/** Freezes a value and all it holds: a function that writes into its input then throws. */
export function deepFreeze<T>(value: T): T {
  if (typeof value === "object" && value !== null) {
    Object.values(value).forEach(deepFreeze);
    Object.freeze(value);
  }
  return value;
}

/** Whether every number in a value, however deep, is finite. */
export function allFinite(value: unknown): boolean {
  return typeof value === "number"
    ? Number.isFinite(value)
    : typeof value !== "object" || value === null || Object.values(value).every(allFinite);
}
