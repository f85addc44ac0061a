import { equalCost, stockOrder } from "./choice-frontier.ts";
import type { MoveAim } from "./move-problem.ts";
import { sameThicknessMm } from "./shim-changes.ts";
import type { Column, Unit } from "./stock-program.ts";

/** What a pick of one column for each unit comes to. */
export interface PickValue {
  readonly largest: number;
  readonly sum: number;
  readonly handled: number;
  readonly totalMm: number;
  readonly taken: readonly number[];
}

export interface BestPick {
  readonly picks: readonly number[];
  readonly value: PickValue;
}

/** What one column of each unit comes to: the largest cost, their sum, pieces handled, total change, and what the stock gives. */
export function valueOfPicks(units: readonly Unit[], picks: readonly number[]): PickValue {
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

/** Below 0 when `a` is the better: least cost (the sum, or the largest and then the sum), fewest pieces, least change, stock order. */
export function comparePicks(a: PickValue, b: PickValue, aim: MoveAim): number {
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

/** Costs of one unit that differ by less are one to the order of trying; far below what makes costs equal. */
const sameCost = 1e-12;
const stepsAbove = (least: number, { cost }: Column): number =>
  Math.round((cost - least) / (sameCost * (1 + least)));

/**
 * Tries every pick, depth first, the cheapest columns of each unit first (or of those that cost about the same the ones
 * that handle fewest pieces, which leads sooner to what cannot be bettered), up to `most` branches; the first found of equals
 * stands. A branch is left where what the open units cost, handle, change and take at least, or at most, cannot make it
 * better than the best, or overdraws a line whatever they do.
 */
export function enumerateColumns(
  units: readonly Unit[],
  quantities: readonly number[],
  aim: MoveAim,
  most: number,
  first: "cheapest" | "fewest_pieces" = "cheapest",
): { readonly complete: boolean; readonly best: BestPick | null } {
  const inOrder = units.map(({ columns }) => {
    const least = Math.min(...columns.map(({ cost }) => cost));
    const cheapest = (a: Column, b: Column) => a.cost - b.cost;
    const fewest = (a: Column, b: Column) =>
      stepsAbove(least, a) - stepsAbove(least, b) || a.handled - b.handled || a.totalMm - b.totalMm;
    const order = first === "cheapest" ? cheapest : fewest;
    return columns.map((column, at) => ({ column, at })).sort((a, b) => order(a.column, b.column));
  });
  const later = laterOf(units, quantities.length);
  let best: BestPick | null = null;
  let branches = 0;
  const picks: number[] = [];

  const descend = (u: number, before: PickValue, net: readonly number[]): void => {
    const unit = units[u];
    if (!unit) {
      const value = valueOfPicks(units, picks);
      if (!best || comparePicks(value, best.value, aim) < 0) best = { picks: [...picks], value };
      return;
    }
    const open = later[u + 1]!;
    const componentEnds = units[u + 1]?.component !== unit.component;
    for (const { column, at } of inOrder[u] ?? []) {
      if (++branches > most) return;
      const after: PickValue = {
        largest: Math.max(before.largest, column.cost),
        sum: before.sum + column.cost,
        handled: before.handled + column.handled,
        totalMm: before.totalMm + column.totalMm,
        taken: before.taken.map((count, line) => count + (column.taken[line] ?? 0)),
      };
      const held: BestPick | null = best;
      if (held) {
        const atBest = together(after, open);
        // In order of cost the next columns cost more still.
        if (first === "cheapest" && costsMore(atBest, held.value, aim)) break;
        if (comparePicks(atBest, held.value, aim) >= 0) continue;
      }
      const next = net.map((count, k) => count + (column.net[k] ?? 0));
      if (componentEnds && next.some((count, k) => count > (quantities[k] ?? Infinity))) continue;
      if (next.some((count, k) => count + (open.net[k] ?? 0) > (quantities[k] ?? Infinity))) continue;
      picks.push(at);
      descend(u + 1, after, next);
      picks.pop();
    }
  };
  const lines = units[0]?.columns[0]?.taken.length ?? 0;
  const none = { largest: 0, sum: 0, handled: 0, totalMm: 0, taken: new Array<number>(lines).fill(0) };
  descend(
    0,
    none,
    quantities.map(() => 0),
  );
  return { complete: branches <= most, best };
}

/**
 * The units without the columns that another of the same unit beats in everything, costs that rounding tells apart taken
 * for equal; and where each column kept stood before.
 */
export function withoutBeaten(units: readonly Unit[]): { readonly units: Unit[]; readonly from: number[][] } {
  const from = units.map(({ columns }) => {
    const least = Math.min(...columns.map(({ cost }) => cost));
    const inOrder = columns
      .map((column, at) => ({ column, at, steps: stepsAbove(least, column) }))
      .sort((a, b) => a.steps - b.steps || a.column.handled - b.column.handled);
    const kept: typeof inOrder = [];
    for (const each of inOrder) {
      const { column } = each;
      const beaten = kept.some(
        ({ column: other }) =>
          other.handled <= column.handled &&
          other.totalMm <= column.totalMm + sameThicknessMm &&
          other.net.every((count, k) => count <= (column.net[k] ?? 0)) &&
          (other.handled < column.handled || stockOrder(other.taken, column.taken) <= 0),
      );
      if (!beaten) kept.push(each);
    }
    return kept.map(({ at }) => at);
  });
  return {
    from,
    units: units.map(({ component, columns }, u) => ({
      component,
      columns: (from[u] ?? []).flatMap((at) => columns[at] ?? []),
    })),
  };
}

const together = (a: PickValue, b: PickValue): PickValue => ({
  largest: Math.max(a.largest, b.largest),
  sum: a.sum + b.sum,
  handled: a.handled + b.handled,
  totalMm: a.totalMm + b.totalMm,
  taken: a.taken.map((count, line) => count + (b.taken[line] ?? 0)),
});

const costsMore = (a: PickValue, b: PickValue, aim: MoveAim): boolean =>
  aim === "minimax" ? a.largest > b.largest + equalCost(b.largest) : a.sum > b.sum + equalCost(b.sum);

/** What units from one on come to at the least; of each line, what they take at the most and net at the least. */
interface Later extends PickValue {
  readonly net: readonly number[];
}

function laterOf(units: readonly Unit[], lines: number): Later[] {
  const none: Later = {
    largest: 0,
    sum: 0,
    handled: 0,
    totalMm: 0,
    taken: [],
    net: new Array<number>(lines).fill(0),
  };
  const later = [none];
  for (const { columns } of [...units].reverse()) {
    const after = later[0]!;
    const least = (of: (column: Column) => number) => Math.min(...columns.map(of));
    const cost = least((column) => column.cost);
    later.unshift({
      largest: Math.max(after.largest, cost),
      sum: after.sum + cost,
      handled: after.handled + least(({ handled }) => handled),
      totalMm: after.totalMm + least(({ totalMm }) => totalMm),
      taken: (columns[0]?.taken ?? []).map(
        (_, line) => (after.taken[line] ?? 0) + Math.max(...columns.map(({ taken }) => taken[line] ?? 0)),
      ),
      net: after.net.map((count, k) => count + least(({ net }) => net[k] ?? 0)),
    });
  }
  return later;
}
