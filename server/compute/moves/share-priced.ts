import type { TasksChoice } from "./choose-for-tasks.ts";
import type { MoveAim } from "./move-problem.ts";
import type { SearchBudget } from "./search-budget.ts";
import { shareByPrices, type PricedUnit } from "./share-by-prices.ts";
import type { SharedChoice } from "./shared-choice.ts";
import type { ShimSupply } from "./shim-supply.ts";
import type { ShimChoice } from "./shim-task.ts";
import { couldHave, overdrawnBy, type TasksOf } from "./take-from-stock.ts";

/**
 * Shares by prices (share-by-prices.ts), as many lines counted as it takes for the choice to keep them all. For sums of
 * costs it is the best there is, or told with its gap; for the largest cost the best of those met, which proves nothing.
 * @throws ComputeError too_many_choices, not_converged
 */
export function sharePriced(
  aim: MoveAim,
  supply: ShimSupply,
  components: readonly TasksOf[],
  alone: readonly (TasksChoice | null)[],
  inTurn: readonly (readonly ShimChoice[] | null)[],
  budget: SearchBudget,
): SharedChoice {
  let short = overdrawnBy(
    supply,
    alone.map((each) => each?.choices ?? null),
  );
  // Fewer lines counted leave more open: what was met then is known, and no choice costs less than was proved then.
  let met: readonly (readonly ShimChoice[])[] | null = null;
  let floor = alone.reduce((sum, each) => sum + (each?.floor ?? 0), 0);
  for (;;) {
    const counted = components.flatMap((own, k) =>
      (alone[k] ? own.tasks : []).map((task, t): PricedUnit => {
        const could = couldHave(supply, components.slice(0, k), own, task).with({ counted: short });
        const known = [alone[k]?.choices[t], inTurn[k]?.[t]].filter((choice) => choice !== undefined);
        return { component: own.index, task: { ...task, supply: could }, known };
      }),
    );
    const units = counted.map((unit, u) => ({ ...unit, known: met?.[u] ?? unit.known }));
    const quantities = short.map((line) => supply.available[line] ?? 0);
    const byComponentOf = (chosen: readonly ShimChoice[] | null) =>
      components.map(({ index }, k) =>
        chosen && alone[k] ? chosen.filter((_, u) => units[u]?.component === index) : (inTurn[k] ?? null),
      );
    const keepsRest = (chosen: readonly ShimChoice[]) =>
      overdrawnBy(supply, byComponentOf(chosen)).length === 0;
    const best = shareByPrices(units, short, quantities, budget, floor, keepsRest, aim);
    const choices = byComponentOf(best?.chosen ?? null);
    const byComponent = new Map(components.map(({ index }, k) => [index, choices[k] ?? null]));
    const over = overdrawnBy(supply, choices);
    if (over.length === 0) {
      const { method, proved, betterBy } = best ?? { method: "in_turn", proved: false, betterBy: null };
      return { byComponent, search: { method, proved, betterBy } };
    }
    short = [...new Set([...short, ...over])].sort((a, b) => a - b);
    met = best?.pool ?? null;
    floor = best?.floor ?? floor;
  }
}
