import type { SearchBudget } from "./search-budget.ts";
import type { ShimChange } from "./shim-changes.ts";
import type { ChangeWays, ShimSupply } from "./shim-supply.ts";

/** Ways put together that take as long as one trial of the search. */
const pairsPerTrial = 4;

/** The ways to make the changes of a group: one for each use of the counted lines, of fewest pieces, then first in stock order. */
export function everyWayOf(
  changes: readonly ChangeWays[],
  supply: ShimSupply,
  budget: SearchBudget,
): ShimChange[][] {
  const [firsts = [], seconds] = changes.map(({ ways }) => ways);
  if (!seconds) return firsts.map((way) => [way]);
  const pairs = firsts.length * seconds.length;
  budget.spend(pairs / pairsPerTrial);
  if (pairs < 2) return firsts.flatMap((first) => seconds.map((second) => [first, second]));
  const used = (ways: readonly ShimChange[]) =>
    ways.map((way) => ({ way, use: supply.countedOf([way]), taken: supply.takenBy([way]) }));
  type Used = ReturnType<typeof used>[number];
  const others = used(seconds);
  const fewest = new Map<string, readonly [Used, Used]>();
  for (const first of used(firsts)) {
    for (const second of others) {
      const use = first.use.map((count, k) => count + (second.use[k] ?? 0)).join(" ");
      const known = fewest.get(use);
      if (!known || comesFirst(first, second, known)) fewest.set(use, [first, second]);
    }
  }
  return [...fewest.values()].map((pair) => pair.map(({ way }) => way));
}

interface WayTaken {
  readonly way: ShimChange;
  /** Pieces of each line of the stock. */
  readonly taken: readonly number[];
}

/** Whether two ways together handle fewer pieces than two others, or as many and stand before them in stock order. */
function comesFirst(a: WayTaken, b: WayTaken, [c, d]: readonly [WayTaken, WayTaken]): boolean {
  const fewer = a.way.handled + b.way.handled - (c.way.handled + d.way.handled);
  if (fewer !== 0) return fewer < 0;
  for (let line = 0; line < a.taken.length; line++) {
    const more = a.taken[line]! + b.taken[line]! - (c.taken[line]! + d.taken[line]!);
    if (more !== 0) return more > 0;
  }
  return false;
}
