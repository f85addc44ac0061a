import { bestTogether } from "./choice-frontier.ts";
import { chooseShims, type ShimOffer } from "./choose-shims.ts";
import type { SearchBudget } from "./search-budget.ts";
import type { ShimChoice, ShimTask } from "./shim-task.ts";

/** The choice for the tasks of a component, and how sure it is. */
export interface TasksChoice {
  /** One for each task. */
  readonly choices: readonly ShimChoice[];
  readonly proved: boolean;
  /** Cost that no choice goes below, of all tasks together. */
  readonly floor: number;
}

/**
 * Shims for the tasks of a component, each with the stock that its supply has available: by cost, then pieces, then total
 * change, then stock order; null when none will do. Lines are counted only where a choice takes more than there is:
 * a choice that keeps all numbers by itself is the best of those that do.
 * @throws ComputeError too_many_choices, not_converged
 */
export function chooseForTasks(tasks: readonly ShimTask[], budget: SearchBudget): TasksChoice | null {
  const offers: ShimOffer[] = [];
  for (const task of tasks) {
    const elsewhere = tasks.reduce((sum, other) => (other === task ? sum : sum + other.idealCost), 0);
    const offer = offerWithin(task, elsewhere, budget);
    if (offer.choices.length === 0) return null;
    offers.push(offer);
  }
  const choices = bestTogether(offers.map((offer) => offer.choices));
  if (!choices) return null;
  return {
    choices,
    proved: offers.every(({ proved }) => proved),
    floor: offers.reduce((sum, { floor }) => sum + floor, 0),
  };
}

/**
 * The offer for one task, with as many lines counted as it takes for no choice of it to be overdrawn.
 * @throws ComputeError too_many_choices, not_converged
 */
export function offerWithin(task: ShimTask, elsewhere: number, budget: SearchBudget, dearer = 0): ShimOffer {
  for (let supply = task.supply; ;) {
    const offer = chooseShims({ ...task, supply }, elsewhere, budget, dearer);
    const over = new Set(offer.choices.flatMap(({ net }) => supply.overdrawn(net)));
    if (over.size === 0) return offer;
    supply = supply.with({ counted: [...new Set([...supply.counted, ...over])].sort((a, b) => a - b) });
  }
}
