import { ComputeError } from "../compute-error.ts";
import { explainUnreachable } from "./explain-unreachable.ts";
import { fitShims } from "./fit-shims.ts";
import { idealMoveOf, planesTogether, type IdealMove } from "./ideal-move.ts";
import type { ComponentMove, LimitPlace, StackChange, SupportMove, Unreachable } from "./move-plan.ts";
import type { MoveComponent, MoveProblem, MoveStation } from "./move-problem.ts";
import { worstBeyond } from "./predict-station.ts";
import { moveAt, noMove, sumOfMoves, type RigidMove } from "./rigid-freedom.ts";
import type { SearchBudget } from "./search-budget.ts";
import type { ChosenStack } from "./shim-task.ts";
import { placesOf, type Place } from "./support-places.ts";

/** A component's answer, and what the plan of the whole machine is made of. */
export interface SolvedComponent {
  readonly component: MoveComponent;
  readonly stations: readonly MoveStation[];
  readonly answer: ComponentMove;
  readonly places: readonly Place[];
  /** The ideal moves of its planes; none when it may not move or no move keeps all limits. */
  readonly ideals: readonly IdealMove[];
  readonly realised: RigidMove;
  readonly moved: boolean;
}

/** An amount below this is rounding, not a move. */
const noMoveMm = 1e-12;

/**
 * Moves one component: the best rigid move, the real shims for it, and the move that those make. `stations` are its
 * own. Without an increment to cut shims to, every change is the ideal one, and so is the realised move.
 * @throws ComputeError supports_insufficient, too_many_choices, not_converged
 */
export function solveComponent(
  problem: MoveProblem,
  component: MoveComponent,
  stations: readonly MoveStation[],
  budget: SearchBudget,
): SolvedComponent {
  const { cutIncrementMm, maximumMisfitMm, level } = problem;
  const places = component.supports.flatMap(placesOf);
  const held = whyHeld(problem, component);
  if (held) return stayPut(component, stations, places, level, held);
  if (component.supports.length === 0) {
    throw new ComputeError(
      "supports_insufficient",
      "A component that may move rests on one support or more.",
      {
        at: ["supports"],
      },
    );
  }

  const answers = planesTogether(places).map((together) =>
    idealMoveOf(component, stations, places, together),
  );
  const limits = answers.flatMap((answer) => (answer.possible ? [] : answer.conflict));
  const contradiction = answers.some(({ possible }) => !possible);
  if (contradiction) return stayPut(component, stations, places, level, { cause: "contradiction", limits });
  const ideals = answers.flatMap((answer) => (answer.possible ? [answer.move] : []));
  const idealMove = togetherOf(
    ideals,
    ideals.map(({ amounts }) => amounts),
  );

  const chosen =
    cutIncrementMm === null
      ? {
          amounts: ideals.map(({ amounts }) => amounts),
          stacks: places.map((place) => asIdeal(place, idealMove)),
        }
      : fitShims(
          component,
          stations,
          places,
          ideals,
          { incrementMm: cutIncrementMm, maximumMisfitMm },
          budget,
        );
  const realisedMove = chosen ? togetherOf(ideals, chosen.amounts) : noMove;
  const worst = worstBeyond(stations, realisedMove, level);
  const realised = movesOf(component, realisedMove);
  const unreachable = worst || !chosen ? explainUnreachable(component, stations, ideals, level, worst) : null;
  return {
    component,
    stations,
    places,
    ideals,
    realised: realisedMove,
    moved: realised.some(({ hMm, vMm }) => hMm !== 0 || vMm !== 0),
    answer: {
      id: component.id,
      fixed: false,
      ideal: movesOf(component, idealMove),
      realised,
      stacks: places.map((place) => stackChangeOf(component, place, idealMove, chosen?.stacks ?? [])),
      unreachable,
    },
  };
}

type Held =
  | { readonly cause: "fixed" }
  | { readonly cause: "reference"; readonly stationId: string }
  | { readonly cause: "contradiction"; readonly limits: readonly LimitPlace[] };

function whyHeld({ referenceIds }: MoveProblem, component: MoveComponent): Held | null {
  if (component.fixed) return { cause: "fixed" };
  const stationId = component.stationIds.find((id) => referenceIds.includes(id));
  return stationId === undefined || component.allowReferenceMove ? null : { cause: "reference", stationId };
}

function stayPut(
  component: MoveComponent,
  stations: readonly MoveStation[],
  places: readonly Place[],
  level: number,
  held: Held,
): SolvedComponent {
  const worst = worstBeyond(stations, noMove, level);
  const unreachable: Unreachable | null = worst || held.cause === "contradiction" ? { worst, ...held } : null;
  const still = movesOf(component, noMove);
  const stacks = places.map((place) => stackChangeOf(component, place, noMove, []));
  return {
    component,
    stations,
    places,
    ideals: [],
    realised: noMove,
    moved: false,
    answer: {
      id: component.id,
      fixed: held.cause !== "contradiction",
      ideal: still,
      realised: still,
      stacks,
      unreachable,
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

const movesOf = ({ supports }: MoveComponent, move: RigidMove): SupportMove[] =>
  supports.map(({ id, zMm }) => ({ supportId: id, ...move(zMm) }));

/** The change that a move of the bore asks of a place. */
function changeFor({ direction, zMm }: Place, move: RigidMove): number {
  const { hMm, vMm } = move(zMm);
  return direction.h * hMm + direction.v * vMm;
}

function asIdeal(place: Place, ideal: RigidMove): ChosenStack {
  const change = { changeMm: changeFor(place, ideal), addMm: [], removeMm: [], handled: 0 };
  return { place, change, misfitMm: 0 };
}

function stackChangeOf(
  { supports }: MoveComponent,
  place: Place,
  ideal: RigidMove,
  chosen: readonly ChosenStack[],
): StackChange {
  const stack = chosen.find((each) => each.place === place);
  const changeMm = stack?.change.changeMm ?? 0;
  return {
    supportId: supports[place.support]?.id ?? "",
    place: place.name,
    idealMm: changeFor(place, ideal),
    changeMm,
    fromMm: place.stack.thicknessMm,
    toMm: place.stack.thicknessMm + changeMm,
    addMm: stack?.change.addMm ?? [],
    removeMm: stack?.change.removeMm ?? [],
    misfitMm: stack?.misfitMm ?? 0,
  };
}
