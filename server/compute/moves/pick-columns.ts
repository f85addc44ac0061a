import { equalCost, stockOrder } from "./choice-frontier.ts";
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
): Picked | null {
  if (units.some(({ columns }) => columns.length === 0)) return null;
  const found = enumerate(units, quantities, aim, enumerateMost);
  if (found.complete) {
    const { best } = found;
    return best && { picks: best.picks, method: "enumeration", proved: true, bound: best.value.sum };
  }
  return byProgram(units, quantities, aim);
}

interface Value {
  readonly largest: number;
  readonly sum: number;
  readonly handled: number;
  readonly totalMm: number;
  readonly taken: readonly number[];
}

interface Best {
  readonly picks: readonly number[];
  readonly value: Value;
}

function valueOf(units: readonly Unit[], picks: readonly number[]): Value {
  const columns = units.flatMap(({ columns: all }, u) => all[picks[u] ?? -1] ?? []);
  const sum = (of: (column: Column) => number) => columns.reduce((total, column) => total + of(column), 0);
  return {
    largest: Math.max(0, ...columns.map(({ cost }) => cost)),
    sum: sum(({ cost }) => cost),
    handled: sum(({ handled }) => handled),
    totalMm: sum(({ totalMm }) => totalMm),
    taken: (columns[0]?.taken ?? []).map((_, line) => sum(({ taken }) => taken[line] ?? 0)),
  };
}

/** Below 0 when `a` is the better. */
function compare(a: Value, b: Value, aim: MoveAim): number {
  const costs = (one: number, other: number) =>
    Math.abs(one - other) <= equalCost(Math.min(one, other)) ? 0 : one - other;
  return (
    (aim === "minimax" ? costs(a.largest, b.largest) : 0) ||
    costs(a.sum, b.sum) ||
    a.handled - b.handled ||
    (Math.abs(a.totalMm - b.totalMm) <= sameThicknessMm ? 0 : a.totalMm - b.totalMm) ||
    stockOrder(a.taken, b.taken)
  );
}

function enumerate(
  units: readonly Unit[],
  quantities: readonly number[],
  aim: MoveAim,
  most: number,
): { readonly complete: boolean; readonly best: Best | null } {
  const inOrder = units.map(({ columns }) =>
    columns.map((column, at) => ({ column, at })).sort((a, b) => a.column.cost - b.column.cost),
  );
  const leastLater = new Array<number>(units.length + 1).fill(0);
  for (let u = units.length - 1; u >= 0; u--)
    leastLater[u] = (leastLater[u + 1] ?? 0) + (inOrder[u]?.[0]?.column.cost ?? 0);
  let best: Best | null = null;
  let branches = 0;
  const picks: number[] = [];
  const descend = (u: number, sum: number, largest: number, net: readonly number[]): void => {
    const unit = units[u];
    if (!unit) {
      const value = valueOf(units, picks);
      if (!best || compare(value, best.value, aim) < 0) best = { picks: [...picks], value };
      return;
    }
    const componentEnds = units[u + 1]?.component !== unit.component;
    for (const { column, at } of inOrder[u] ?? []) {
      if (++branches > most) return;
      const least = sum + column.cost + (leastLater[u + 1] ?? 0);
      const held: Best | null = best;
      if (held) {
        const { value } = held;
        const worse =
          aim === "minimax"
            ? Math.max(largest, column.cost) > value.largest + equalCost(value.largest)
            : least > value.sum + equalCost(value.sum);
        if (worse) break;
      }
      const next = net.map((count, k) => count + (column.net[k] ?? 0));
      if (componentEnds && next.some((count, k) => count > (quantities[k] ?? Infinity))) continue;
      picks.push(at);
      descend(u + 1, sum + column.cost, Math.max(largest, column.cost), next);
      picks.pop();
    }
  };
  descend(
    0,
    0,
    0,
    quantities.map(() => 0),
  );
  return { complete: branches <= most, best };
}

function byProgram(units: readonly Unit[], quantities: readonly number[], aim: MoveAim): Picked | null {
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
  const first = solveStockProgram({ ...base, of: above, within: [] });
  if (!first) return null;
  let best = first.picks;
  const reached = valueOf(units, best);
  const bound = floor + Math.max(0, first.bound);
  const excess = reached.sum - floor + equalCost(reached.sum);
  const cheap = { of: above, most: excess };
  const keep = (picks: readonly number[] | undefined) => {
    if (picks && compare(valueOf(units, picks), valueOf(units, best), aim) < 0) best = picks;
  };
  const fewest = solveStockProgram({ ...base, of: ({ handled }) => handled, within: [cheap] });
  keep(fewest?.picks);
  const handled = { of: (column: Column) => column.handled, most: valueOf(units, best).handled };
  keep(solveStockProgram({ ...base, of: ({ totalMm }) => totalMm, within: [cheap, handled] })?.picks);
  const proved = first.optimal && reached.sum - bound <= 1e-6 * (1 + reached.sum);
  return { picks: best, method: "mixed_integer_program", proved, bound };
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
