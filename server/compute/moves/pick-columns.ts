import { equalCost } from "./choice-frontier.ts";
import {
  comparePicks,
  enumerateColumns,
  valueOfPicks,
  withoutBeaten,
  type BestPick,
} from "./enumerate-columns.ts";
import type { MoveAim } from "./move-problem.ts";
import { sameThicknessMm } from "./shim-changes.ts";
import { solveStockProgram, type Column, type Unit } from "./stock-program.ts";

export interface Picked {
  /** One column for each unit. */
  readonly picks: readonly number[];
  readonly method: "enumeration" | "mixed_integer_program";
  readonly proved: boolean;
  /** Cost below which nothing lies, of all units together. */
  readonly bound: number;
}

/** Branches of the enumeration before the program is handed to the solver. */
const branchesMost = 100_000;
/** Time for the least cost, and for each rank of those that cost as little. */
const costSeconds = 3;
const tieSeconds = 1;

/**
 * One column for each unit so that no short line is overdrawn after any component: of least cost (the sum, or the largest
 * and then the sum), then fewest pieces, then least total change, then stock order; null when there is none. By
 * enumeration, branch and bound on the sums of the least that the units still open cost and take; where that takes too
 * many branches by a mixed-integer program (HiGHS, 0/1 columns), whose answer is costed again from the columns.
 * @throws ComputeError not_converged
 */
export function pickColumns(
  units: readonly Unit[],
  quantities: readonly number[],
  aim: MoveAim,
  enumerateMost = branchesMost,
  ties: "broken" | "left" = "broken",
): Picked | null {
  if (units.some(({ columns }) => columns.length === 0)) return null;
  const enumerated = ({ best }: { readonly best: BestPick | null }): Picked | null =>
    best && { picks: best.picks, method: "enumeration", proved: true, bound: best.value.sum };
  const found = enumerateColumns(units, quantities, aim, enumerateMost);
  if (found.complete) return enumerated(found);
  const fewer = withoutBeaten(units);
  const second = enumerateColumns(fewer.units, quantities, aim, enumerateMost, "fewest_pieces");
  const picked = second.complete ? enumerated(second) : byProgram(fewer.units, quantities, aim, ties);
  return picked && { ...picked, picks: picked.picks.map((pick, u) => fewer.from[u]?.[pick] ?? -1) };
}

function byProgram(
  units: readonly Unit[],
  quantities: readonly number[],
  aim: MoveAim,
  ties: "broken" | "left",
): Picked | null {
  const least = units.map(({ columns }) => Math.min(...columns.map(({ cost }) => cost)));
  const floor = least.reduce((sum, cost) => sum + cost, 0);
  const ceiling = aim === "minimax" ? leastLargest(units, quantities) : Infinity;
  if (ceiling === null) return null;
  const allowed = ({ cost }: Column) => cost <= ceiling + equalCost(ceiling);
  const leastOf = new Map(
    units.flatMap(({ columns }, u) => columns.map((column) => [column, least[u] ?? 0])),
  );
  const above = (column: Column) => column.cost - (leastOf.get(column) ?? 0);
  const base = { units, quantities, allowed };
  const first = solveStockProgram({ ...base, of: above, within: [] }, costSeconds);
  if (!first) return null;
  let best = first.picks;
  const reached = valueOfPicks(units, best);
  const bound = floor + Math.max(0, first.bound);
  const excess = reached.sum - floor + equalCost(reached.sum);
  const cheap = { of: above, most: excess };
  const keep = (picks: readonly number[] | undefined) => {
    if (picks && comparePicks(valueOfPicks(units, picks), valueOfPicks(units, best), aim) < 0) best = picks;
  };
  const cheapest = first.optimal && reached.sum - bound <= 1e-6 * (1 + reached.sum);
  const picked = (proved: boolean) => ({
    picks: best,
    method: "mixed_integer_program" as const,
    proved,
    bound,
  });
  if (ties === "left") return picked(cheapest);
  // Of those that cost as little, one rank after another: each holds what the ones before it reached.
  const within: { of: (column: Column) => number; most: number }[] = [cheap];
  let ranked = true;
  for (const { of, slack } of ranksOf(units)) {
    const solved = solveStockProgram({ ...base, of, within }, tieSeconds);
    ranked &&= solved?.optimal === true;
    keep(solved?.picks);
    if (!ranked) break;
    within.push({ of, most: sumOver(units, best, of) + slack });
  }
  return picked(cheapest && ranked);
}

/** What is made least of equal costs, in turn: pieces handled, total change, and of each line of the stock pieces left. */
function ranksOf(
  units: readonly Unit[],
): { readonly of: (column: Column) => number; readonly slack: number }[] {
  const columns = units.flatMap((unit) => unit.columns);
  const lines = [...(columns[0]?.taken.keys() ?? [])].filter((line) =>
    units.some((unit) => new Set(unit.columns.map(({ taken }) => taken[line])).size > 1),
  );
  return [
    { of: ({ handled }) => handled, slack: 0 },
    { of: ({ totalMm }) => totalMm, slack: sameThicknessMm },
    ...lines.map((line) => ({ of: ({ taken }: Column) => 0 - (taken[line] ?? 0), slack: 0 })),
  ];
}

function sumOver(units: readonly Unit[], picks: readonly number[], of: (column: Column) => number): number {
  return units.reduce((sum, { columns }, u) => {
    const column = columns[picks[u] ?? -1];
    return column ? sum + of(column) : sum;
  }, 0);
}

/** The least largest cost: the smallest of the columns' costs at which what is left still fits. */
function leastLargest(units: readonly Unit[], quantities: readonly number[]): number | null {
  const costs = [...new Set(units.flatMap(({ columns }) => columns.map(({ cost }) => cost)))].sort(
    (a, b) => a - b,
  );
  const fits = (most: number) =>
    solveStockProgram({ units, quantities, of: () => 0, within: [], allowed: ({ cost }) => cost <= most }) !==
    null;
  let [low, high] = [0, costs.length - 1];
  if (!fits(costs[high] ?? 0)) return null;
  while (low < high) {
    const middle = (low + high) >> 1;
    if (fits(costs[middle] ?? 0)) high = middle;
    else low = middle + 1;
  }
  return costs[low] ?? null;
}
