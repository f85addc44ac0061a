import { ComputeError } from "../compute-error.ts";
import { asIdeal, movesOf, stackChangeOf } from "./component-answer.ts";
import { explainUnreachable } from "./explain-unreachable.ts";
import { fitShims, type ChooseForTasks, type FittedShims } from "./fit-shims.ts";
import { idealMoveOf, planesTogether, type IdealMove } from "./ideal-move.ts";
import type { ComponentMove, LimitPlace, Unreachable } from "./move-plan.ts";
import type { MoveComponent, MoveProblem, MoveStation } from "./move-problem.ts";
import { worstBeyond } from "./predict-station.ts";
import { moveAt, noMove, sumOfMoves, type RigidMove } from "./rigid-freedom.ts";
import { boreShiftOf, rollTakenOut, type RollAnswer } from "./roll.ts";
import type { ShimSupply } from "./shim-supply.ts";
import { shiftedBy } from "./station-shifts.ts";
import { placesOf, type Place } from "./support-places.ts";
import { planesTooSteep, tiltOf } from "./tilt.ts";

/** A component's answer, and what the plan of the whole machine is made of. */
export interface SolvedComponent {
  /** Of the component in its problem. */
  readonly index: number;
  readonly component: MoveComponent;
  /** Its own, where the moves before this one leave them. */
  readonly stations: readonly MoveStation[];
  readonly answer: ComponentMove;
  readonly places: readonly Place[];
  /** The ideal moves of its planes; none when it may not move or no move keeps all limits. */
  readonly ideals: readonly IdealMove[];
  /** The move of its supports. */
  readonly supportMove: RigidMove;
  /** The move of its bores: the same, and what taking out a roll adds. */
  readonly realised: RigidMove;
  readonly moved: boolean;
}

/** What the shims of a component are chosen from, and by whom. */
export interface ComponentShims {
  readonly supply: ShimSupply;
  readonly choose: ChooseForTasks;
}

/** An amount below this is rounding, not a move. */
const noMoveMm = 1e-12;

/**
 * Moves one component: the best rigid move, the real shims for it, and the move that those make. `stations` are its
 * own, where the moves before leave them. Without shims to choose from, every change is the ideal one, and so is the
 * realised move.
 * @throws ComputeError supports_insufficient, too_many_choices, not_converged
 */
export function solveComponent(
  problem: MoveProblem,
  index: number,
  stations: readonly MoveStation[],
  shims: ComponentShims | null,
): SolvedComponent {
  const component = problem.components[index];
  if (!component) throw new RangeError("A component is solved by an index of the problem's.");
  const { roll } = component;
  const places = component.supports.flatMap((support, at) => placesOf(support, at, roll));
  const still = { index, component, stations, places };
  const held = whyHeld(problem, component);
  if (held) return stayPut(still, problem.level, held);
  if (component.supports.length === 0) {
    const detail = "A component that may move rests on one support or more.";
    throw new ComputeError("supports_insufficient", detail, { at: ["supports"] });
  }

  // The roll comes out whatever the move: the stations are served from where that leaves them.
  const level = roll ? [boreShiftOf(roll, roll.radians)] : [];
  const served = stations.map((station) => shiftedBy(station, level));
  const answers = planesTogether(places, problem.aim).map((together) =>
    idealMoveOf(component, served, places, together, problem.aim),
  );
  if (answers.some(({ possible }) => !possible)) {
    const limits = answers.flatMap((answer) => (answer.possible ? [] : answer.conflict));
    return stayPut(still, problem.level, { cause: "contradiction", limits });
  }
  const ideals = answers.flatMap((answer) => (answer.possible ? [answer.move] : []));
  const idealMove = togetherOf(
    ideals,
    ideals.map(({ amounts }) => amounts),
  );
  const chosen = chooseStacks(problem, still, ideals, idealMove, shims);
  return { ...still, ideals, ...realise(problem, still, served, ideals, idealMove, chosen) };
}

type Still = Pick<SolvedComponent, "index" | "component" | "stations" | "places">;

function chooseStacks(
  { maximumMisfitMm, aim }: MoveProblem,
  { component, places }: Still,
  ideals: readonly IdealMove[],
  idealMove: RigidMove,
  shims: ComponentShims | null,
): FittedShims | null {
  if (shims === null) {
    return {
      amounts: ideals.map(({ amounts }) => amounts),
      stacks: places.map((place) => asIdeal(place, idealMove)),
    };
  }
  const terms = { supply: shims.supply, maximumMisfitMm, aim };
  return fitShims(component, places, ideals, terms, shims.choose);
}

function realise(
  { level, aim, stock }: MoveProblem,
  { component, stations, places }: Still,
  served: readonly MoveStation[],
  ideals: readonly IdealMove[],
  idealMove: RigidMove,
  chosen: FittedShims | null,
): Pick<SolvedComponent, "supportMove" | "realised" | "moved" | "answer"> {
  const { id, roll, supports } = component;
  const supportMove = chosen ? togetherOf(ideals, chosen.amounts) : noMove;
  const stacks = places.map((place) => stackChangeOf(component, place, idealMove, chosen?.stacks ?? []));
  const zMmOf = (supportId: string) => supports.find((support) => support.id === supportId)?.zMm ?? 0;
  const turned: RollAnswer | null = roll && rollTakenOut(roll, stacks, supportMove, zMmOf);
  const realised = turned ? sumOfMoves([supportMove, () => turned.boreShift]) : supportMove;
  const worst = worstBeyond(stations, realised, level);
  const unreachable =
    worst || !chosen ? explainUnreachable(component, served, ideals, level, aim, worst) : null;
  const moves = movesOf(component, supportMove);
  return {
    supportMove,
    realised,
    moved: moves.some(({ hMm, vMm }) => hMm !== 0 || vMm !== 0) || stacks.some((each) => each.changeMm !== 0),
    answer: {
      id,
      fixed: false,
      ideal: movesOf(component, idealMove),
      realised: moves,
      stacks,
      unreachable: fromStock(unreachable, stock !== null) ?? tooSteep(component, stations, realised),
      tilt: tiltAnswer(component, stations, realised),
      roll: turned,
    },
  };
}

/** Where shims come from stock, it is the stock that does not do. */
const fromStock = (unreachable: Unreachable | null, stocked: boolean): Unreachable | null =>
  stocked && unreachable?.cause === "shims" ? { ...unreachable, cause: "stock" } : unreachable;

type Held =
  | { readonly cause: "fixed" }
  | { readonly cause: "reference"; readonly stationId: string }
  | { readonly cause: "contradiction"; readonly limits: readonly LimitPlace[] };

function whyHeld({ referenceIds }: MoveProblem, component: MoveComponent): Held | null {
  if (component.fixed) return { cause: "fixed" };
  const stationId = component.stationIds.find((id) => referenceIds.includes(id));
  return stationId === undefined || component.allowReferenceMove ? null : { cause: "reference", stationId };
}

function stayPut(still: Still, level: number, held: Held): SolvedComponent {
  const { component, stations, places } = still;
  const { id, roll } = component;
  const worst = worstBeyond(stations, noMove, level);
  const unreachable: Unreachable | null = worst || held.cause === "contradiction" ? { worst, ...held } : null;
  const moves = movesOf(component, noMove);
  return {
    ...still,
    ideals: [],
    supportMove: noMove,
    realised: noMove,
    moved: false,
    answer: {
      id,
      fixed: held.cause !== "contradiction",
      ideal: moves,
      realised: moves,
      stacks: places.map((place) => stackChangeOf(component, place, null, [])),
      unreachable: unreachable ?? tooSteep(component, stations, noMove),
      tilt: tiltAnswer(component, stations, noMove),
      roll: roll && {
        foundRadians: roll.radians,
        predictedRadians: roll.radians,
        boreShift: boreShiftOf(roll, 0),
      },
    },
  };
}

function togetherOf(ideals: readonly IdealMove[], amounts: readonly (readonly number[])[]): RigidMove {
  return sumOfMoves(
    ideals.map(({ modes }, k) => {
      const exact = (amounts[k] ?? []).map((amount) => (Math.abs(amount) < noMoveMm ? 0 : amount));
      return (zMm) => moveAt(modes, exact, zMm);
    }),
  );
}

function tiltAnswer(
  { tiltTolerance }: MoveComponent,
  stations: readonly MoveStation[],
  move: RigidMove,
): ComponentMove["tilt"] {
  const found = tiltTolerance && tiltOf(stations, noMove);
  const predicted = tiltTolerance && tiltOf(stations, move);
  return found && predicted ? { found, predicted } : null;
}

function tooSteep(
  { tiltTolerance }: MoveComponent,
  stations: readonly MoveStation[],
  move: RigidMove,
): Unreachable | null {
  const tilt = tiltTolerance && tiltOf(stations, move);
  const planes = tilt ? planesTooSteep(tilt, tiltTolerance) : [];
  return planes.length > 0 ? { worst: null, cause: "tilt", planes } : null;
}
