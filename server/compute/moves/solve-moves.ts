import { assertFinite } from "../compute-error.ts";
import { collectAdvice } from "./collect-advice.ts";
import type { ComponentMove, MovePlan, PredictedStation } from "./move-plan.ts";
import type { MoveProblem } from "./move-problem.ts";
import { planSteps } from "./plan-steps.ts";
import { predictStation } from "./predict-station.ts";
import { noMove } from "./rigid-freedom.ts";
import { solveComponent, type ComponentShims, type SolvedComponent } from "./solve-component.ts";
import { solveWithShims, type SolvePass } from "./solve-with-shims.ts";
import { solvingOrder } from "./solving-order.ts";
import { shiftedBy, stationShiftsOf, type StationShift } from "./station-shifts.ts";

/** Runs over the components, by index, in the order given; a caller that gathers every refusal brings its own. */
export type ForEachComponent = (
  order: readonly number[],
  solve: (index: number) => SolvedComponent,
) => SolvedComponent[];

/**
 * The moves of a whole machine: for each component the best rigid move inside its limits and the real shims for it;
 * where every station then lies; the steps in their order; what to measure again; what else to know. Each component is
 * solved with its stations where the moves before its own leave them.
 * Lengths in mm. Ids are unique, every reference exists, every station belongs to one component at most and nothing
 * carries itself.
 * Work: per component linear in its stations and limits; the choice of shims is bounded by a budget. Shims from a stock that all share are
 * chosen for all components together (share-stock.ts).
 * @throws ComputeError supports_insufficient, too_many_choices, not_converged, tolerance_invalid, combination_invalid,
 * result_overflow
 */
export function solveMoves(
  problem: MoveProblem,
  forEachComponent: ForEachComponent = (order, solve) => order.map(solve),
): MovePlan {
  const { stations, level } = problem;
  const shiftOf = stationShiftsOf(problem);
  const pass: SolvePass = (shimsOf) => solvePass(problem, shiftOf, forEachComponent, shimsOf);
  const { inOrder, search } = solveWithShims(problem, pass);

  const predicted = stations.map((station) => {
    const shifts = inOrder.map((each) => shiftOf(each.index, each.realised, station));
    return predictStation(shiftedBy(station, shifts), noMove, level);
  });
  predicted.forEach(assertPredicted);
  const asSent = [...inOrder].sort((a, b) => a.index - b.index);
  const shifted = stations
    .filter((station, k) => {
      const there = predicted[k]?.deviation;
      return there?.hMm !== station.deviation.hMm || there.vMm !== station.deviation.vMm;
    })
    .map(({ id }) => id);
  return {
    components: asSent.map(({ answer }) => answer),
    predicted,
    steps: planSteps(problem, inOrder, shiftOf),
    remeasureIds: remeasureOf(problem, inOrder, shifted),
    advice: collectAdvice(problem, asSent, shiftOf, search),
    search,
  };
}

/** Solves every component in its turn, with its stations where the moves before its own leave them. */
function solvePass(
  problem: MoveProblem,
  shiftOf: StationShift,
  forEachComponent: ForEachComponent,
  shimsOf: (index: number) => ComponentShims | null,
): SolvedComponent[] {
  const { components, stations } = problem;
  const stationById = new Map(stations.map((station) => [station.id, station]));
  const before: SolvedComponent[] = [];
  return forEachComponent(solvingOrder(components), (index) => {
    const own = (components[index]?.stationIds ?? []).flatMap((id) => stationById.get(id) ?? []);
    const asMoved = own.map((station) =>
      shiftedBy(
        station,
        before.map((each) => shiftOf(each.index, each.realised, station)),
      ),
    );
    const one = solveComponent(problem, index, asMoved, shimsOf(index));
    assertAllFinite(one.answer);
    before.push(one);
    return one;
  });
}

/** Reference stations first; then, in the order sent, the stations of every component that moved, and all shifted. */
function remeasureOf(
  { stations, referenceIds }: MoveProblem,
  solved: readonly SolvedComponent[],
  shiftedIds: readonly string[],
): string[] {
  const moved = solved.filter((each) => each.moved);
  if (moved.length === 0) return [];
  const movedIds = new Set([...moved.flatMap(({ component }) => component.stationIds), ...shiftedIds]);
  return [...new Set([...referenceIds, ...stations.map(({ id }) => id).filter((id) => movedIds.has(id))])];
}

function assertAllFinite({ ideal, realised, stacks }: ComponentMove): void {
  for (const { hMm, vMm } of [...ideal, ...realised]) assertFinite(hMm + vMm, "A move");
  for (const { toMm, misfitMm } of stacks) assertFinite(toMm + misfitMm, "A stack's thickness");
}

function assertPredicted({ deviation }: PredictedStation): void {
  assertFinite(deviation.hMm + deviation.vMm, "A predicted deviation");
}
