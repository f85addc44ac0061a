import type { MoveAim, MoveProblem } from "./move-problem.ts";
import { SearchBudget } from "./search-budget.ts";
import { shareStock } from "./share-stock.ts";
import type { ChoiceSearch } from "./shared-choice.ts";
import type { TasksChoice } from "./choose-for-tasks.ts";
import { supplyOf, type ShimSupply } from "./shim-supply.ts";
import type { ShimChoice, ShimTask } from "./shim-task.ts";
import type { ComponentShims, SolvedComponent } from "./solve-component.ts";
import { chooseAlone, chooseFromRest, overdrawnBy, type TasksOf } from "./take-from-stock.ts";

/** Solves all components in order, each with the shims told for it. */
export type SolvePass = (shimsOf: (index: number) => ComponentShims | null) => SolvedComponent[];

/** Sharing stock by prices solves every component some tens of times; for the largest deviation a trial takes longer. */
const sharedByPrices = {
  least_squares: { calls: 3.5, share: 0.5, perProgram: 100 },
  minimax: { calls: 1.2, share: 0.15, perProgram: 600 },
} as const satisfies Record<MoveAim, object>;
/** What comes of taking in turn is only where sharing begins. */
const shareInTurn = 0.1;

interface Solved {
  readonly inOrder: SolvedComponent[];
  readonly search: ChoiceSearch | null;
}

/**
 * All components with their shims. First each by itself, with all of the stock: where that overdraws nothing it is the
 * best there is. Else, where no component's move shifts another's stations, for all together (share-stock.ts); where one
 * does, each in its turn with what those before it leave, and then nothing is proved of the choice as a whole.
 * @throws ComputeError supports_insufficient, too_many_choices, not_converged
 */
export function solveWithShims(problem: MoveProblem, pass: SolvePass): Solved {
  const supply = supplyOf(problem);
  if (supply === null) return { inOrder: pass(() => null), search: null };
  const budget = new SearchBudget();
  const components: TasksOf[] = [];
  const alone: (TasksChoice | null)[] = [];
  const first = pass((index) => ({
    supply,
    choose: (tasks) => {
      budget.startComponent();
      const own = { index, tasks };
      const choice = chooseAlone(supply, components, own, budget);
      components.push(own);
      alone.push(choice);
      return choice?.choices ?? null;
    },
  }));
  const choices = alone.map((each) => each?.choices ?? null);
  if (overdrawnBy(supply, choices).length === 0) return { inOrder: first, search: searchAlone(alone) };

  const linked =
    problem.couplings.length > 0 || problem.components.some(({ carriedById }) => carriedById !== null);
  if (linked) {
    const inOrder = inTurn(pass, supply);
    return { inOrder, search: { method: "in_turn", proved: false, betterBy: null } };
  }
  const turn: (readonly ShimChoice[] | null)[] = [];
  const turnBudget = new SearchBudget(1, shareInTurn);
  for (const each of components) {
    turnBudget.startComponent();
    turn.push(chooseFromRest(supply, turn, each, turnBudget));
  }
  const priced = sharedByPrices[problem.aim];
  const shared = shareStock(
    problem,
    supply,
    components,
    alone,
    turn,
    new SearchBudget(1, 1, priced.perProgram),
    new SearchBudget(priced.calls, priced.share, priced.perProgram),
  );
  const inOrder = pass((index) => ({ supply, choose: () => shared.byComponent.get(index) ?? null }));
  return { inOrder, search: shared.search };
}

function inTurn(pass: SolvePass, supply: ShimSupply): SolvedComponent[] {
  const budget = new SearchBudget();
  const before: (readonly ShimChoice[] | null)[] = [];
  return pass((index) => ({
    supply,
    choose: (tasks: readonly ShimTask[]) => {
      budget.startComponent();
      const choice = chooseFromRest(supply, before, { index, tasks }, budget);
      before.push(choice);
      return choice;
    },
  }));
}

function searchAlone(alone: readonly (TasksChoice | null)[]): ChoiceSearch {
  const unproved = alone.filter((each) => each && !each.proved);
  const gap = unproved.reduce((sum, each) => {
    const cost = (each?.choices ?? []).reduce((total, choice) => total + choice.cost, 0);
    return sum + Math.max(0, cost - (each?.floor ?? 0));
  }, 0);
  return { method: "alone", proved: unproved.length === 0, betterBy: gap };
}
