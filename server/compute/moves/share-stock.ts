import { offerWithin, type TasksChoice } from "./choose-for-tasks.ts";
import { equalCost } from "./choice-frontier.ts";
import type { ShimOffer } from "./choose-shims.ts";
import type { MoveProblem } from "./move-problem.ts";
import { pickColumns } from "./pick-columns.ts";
import type { SearchBudget } from "./search-budget.ts";
import { sharePriced } from "./share-priced.ts";
import type { SharedChoice } from "./shared-choice.ts";
import type { ShimSupply } from "./shim-supply.ts";
import type { ShimChoice, ShimTask } from "./shim-task.ts";
import { couldHave, overdrawnBy, type TasksOf } from "./take-from-stock.ts";

const roundsMost = 30;

/**
 * One choice for each component so that the stock they share is never overdrawn: of least cost together (the sum; or the
 * largest of all, then the sum), then fewest pieces, least total change, stock order. Every unit offers all choices up to
 * so much above its own best; the offers widen until the best pick from them (pick-columns.ts) lies within, for then no
 * choice that was not offered belongs to a better one. Lines are counted from where a pick overdraws them. Components
 * are not linked: what one does changes nothing for the stations of another.
 * @throws ComputeError too_many_choices, not_converged
 */
export function shareStock(
  { aim }: Pick<MoveProblem, "aim">,
  supply: ShimSupply,
  components: readonly TasksOf[],
  alone: readonly (TasksChoice | null)[],
  inTurn: readonly (readonly ShimChoice[] | null)[],
  budget: SearchBudget,
  pricedBudget: SearchBudget,
): SharedChoice {
  const serving = components.filter((_, k) => alone[k]);
  const units = serving.flatMap((each) => each.tasks.map((task) => ({ of: each, task })));
  let short = overdrawnBy(
    supply,
    alone.map((each) => each?.choices ?? null),
  );
  const turn: SharedChoice = {
    byComponent: new Map(components.map(({ index }, k) => [index, inTurn[k] ?? null])),
    search: { method: "in_turn", proved: false, betterBy: null },
  };
  if (aim === "least_squares" && inTurn.every((choices, k) => choices !== null || alone[k] === null)) {
    return sharePriced(aim, supply, components, alone, inTurn, pricedBudget);
  }
  // What is not proved the best: in turn, or what prices lead to where that is better.
  const bestKnown = (least: readonly number[]): SharedChoice => {
    const other = withGap(
      sharePriced(aim, supply, components, alone, inTurn, pricedBudget),
      units,
      least,
      aim,
    );
    const first = withGap(turn, units, least, aim);
    return (other.search.betterBy ?? Infinity) < (first.search.betterBy ?? Infinity) ? other : first;
  };
  const least = units.map(() => 0);
  let dearer = 0;
  for (let round = 0; round < roundsMost; round++) {
    const offers: ShimOffer[] = [];
    const done = budget.lasts(
      () => {
        for (const [u, { of, task }] of units.entries()) {
          const counted = couldHave(supply, components.slice(0, components.indexOf(of)), of, task).with({
            counted: short,
          });
          const top = Math.max(...least) + dearer;
          const more = aim === "minimax" ? Math.max(0, top - (least[u] ?? 0)) : dearer;
          budget.startComponent();
          const offer = offerWithin({ ...task, supply: counted }, 0, budget, more);
          offers.push(offer);
        }
      },
      () => true,
    );
    if (!done || offers.some(({ proved }) => !proved)) return bestKnown(least);
    for (const [u, { choices }] of offers.entries()) least[u] = Math.min(...choices.map(({ cost }) => cost));
    const picked = pickColumns(
      units.map(({ of }, u) => ({
        component: of.index,
        columns: (offers[u]?.choices ?? []).map((choice) => ({
          ...choice,
          net: short.map((line) => choice.net[line] ?? 0),
        })),
      })),
      short.map((line) => supply.available[line] ?? 0),
      aim,
    );
    const chosen = picked && units.map((_, u) => offers[u]?.choices[picked.picks[u] ?? -1]);
    if (!picked || !chosen) {
      const known = excessKnown(turn, units, least, aim) + firstWidening;
      const wider = Math.max(firstWidening, 8 * dearer);
      dearer = dearer < known ? Math.min(wider, known) : wider;
      continue;
    }
    const costs = chosen.map((choice) => choice?.cost ?? 0);
    const excess = excessOf(costs, least, aim);
    if (excess > dearer + equalCost(dearer)) {
      dearer = excess;
      continue;
    }
    const byComponent = new Map<number, readonly ShimChoice[] | null>(
      components.map(({ index }) => [
        index,
        alone[components.findIndex((each) => each.index === index)]
          ? units.flatMap(({ of }, u) => (of.index === index ? (chosen[u] ?? []) : []))
          : null,
      ]),
    );
    const over = overdrawnBy(
      supply,
      components.map(({ index }) => byComponent.get(index) ?? null),
    );
    if (over.length > 0) {
      short = [...new Set([...short, ...over])].sort((a, b) => a - b);
      continue;
    }
    const { method, proved, bound } = picked;
    const sum = costs.reduce((total, cost) => total + cost, 0);
    return { byComponent, search: { method, proved, betterBy: proved ? 0 : Math.max(0, sum - bound) } };
  }
  return bestKnown(least);
}

/** How much of a least cost the first offers lie above it. */
const firstWidening = 1e-3;

type UnitTask = { readonly of: TasksOf; readonly task: ShimTask };

function excessOf(costs: readonly number[], least: readonly number[], aim: MoveProblem["aim"]): number {
  if (aim === "minimax") return Math.max(0, ...costs) - Math.max(0, ...least);
  return costs.reduce((sum, cost, u) => sum + cost - (least[u] ?? 0), 0);
}

/** What a choice costs above the least of each unit. */
function excessKnown(
  { byComponent }: SharedChoice,
  units: readonly UnitTask[],
  least: readonly number[],
  aim: MoveProblem["aim"],
): number {
  const costs = units.map(({ of, task }) => {
    const choice = byComponent.get(of.index)?.[of.tasks.indexOf(task)];
    return choice?.cost ?? Infinity;
  });
  return excessOf(costs, least, aim);
}

function withGap(
  choice: SharedChoice,
  units: readonly UnitTask[],
  least: readonly number[],
  aim: MoveProblem["aim"],
): SharedChoice {
  const gap = excessKnown(choice, units, least, aim);
  const { method } = choice.search;
  return { ...choice, search: { method, proved: false, betterBy: Number.isFinite(gap) ? gap : null } };
}
