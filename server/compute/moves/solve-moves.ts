import { assertFinite } from "../compute-error.ts";
import { collectAdvice } from "./collect-advice.ts";
import type { ComponentMove, MovePlan, PredictedStation } from "./move-plan.ts";
import type { MoveComponent, MoveProblem } from "./move-problem.ts";
import { planSteps } from "./plan-steps.ts";
import { predictStation } from "./predict-station.ts";
import { noMove } from "./rigid-freedom.ts";
import { SearchBudget } from "./search-budget.ts";
import { solveComponent, type SolvedComponent } from "./solve-component.ts";

/** Runs over the components; a caller that gathers every refusal brings its own. */
export type ForEachComponent = (
  components: readonly MoveComponent[],
  solve: (component: MoveComponent) => SolvedComponent,
) => SolvedComponent[];

/**
 * The moves of a whole machine: for each component the best rigid move inside its limits and the real shims for it;
 * where every station then lies; the steps in their order; what to measure again; what else to know.
 * Lengths in mm. Ids are unique, every reference exists and every station belongs to one component at most.
 * Work: per component linear in its stations and limits; the choice of shims is bounded by a budget.
 * @throws ComputeError supports_insufficient, too_many_choices, not_converged, tolerance_invalid, combination_invalid,
 * result_overflow
 */
export function solveMoves(
  problem: MoveProblem,
  forEachComponent: ForEachComponent = (components, solve) => components.map(solve),
): MovePlan {
  const budget = new SearchBudget();
  const stationById = new Map(problem.stations.map((station) => [station.id, station]));
  const solved = forEachComponent(problem.components, (component) => {
    budget.startComponent();
    const stations = component.stationIds.flatMap((id) => stationById.get(id) ?? []);
    const one = solveComponent(problem, component, stations, budget);
    assertAllFinite(one.answer);
    return one;
  });
  const carrier = new Map(solved.flatMap((each) => each.stations.map(({ id }) => [id, each] as const)));
  const predicted = problem.stations.map((station) =>
    predictStation(station, carrier.get(station.id)?.realised ?? noMove, problem.level),
  );
  predicted.forEach(assertPredicted);
  return {
    components: solved.map(({ answer }) => answer),
    predicted,
    steps: planSteps(problem, solved),
    remeasureIds: remeasureOf(problem, solved),
    advice: collectAdvice(problem, solved),
  };
}

/** Reference stations first; then, in the order sent, the stations of every component that moved. */
function remeasureOf({ stations, referenceIds }: MoveProblem, solved: readonly SolvedComponent[]): string[] {
  const moved = solved.filter((each) => each.moved);
  if (moved.length === 0) return [];
  const movedIds = new Set(moved.flatMap(({ component }) => component.stationIds));
  return [...new Set([...referenceIds, ...stations.map(({ id }) => id).filter((id) => movedIds.has(id))])];
}

function assertAllFinite({ ideal, realised, stacks }: ComponentMove): void {
  for (const { hMm, vMm } of [...ideal, ...realised]) assertFinite(hMm + vMm, "A move");
  for (const { toMm, misfitMm } of stacks) assertFinite(toMm + misfitMm, "A stack's thickness");
}

function assertPredicted({ deviation }: PredictedStation): void {
  assertFinite(deviation.hMm + deviation.vMm, "A predicted deviation");
}
