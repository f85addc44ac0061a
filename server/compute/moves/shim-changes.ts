import type { ShimStack } from "./move-problem.ts";
import type { SearchBudget } from "./search-budget.ts";

/** One way to change a stack: pieces in, pieces out. */
export interface ShimChange {
  readonly changeMm: number;
  readonly addMm: readonly number[];
  readonly removeMm: readonly number[];
  /** Pieces from stock among those added, each by its line, in their order. */
  readonly stockLines?: readonly number[];
  /** Pieces handled: added and removed. */
  readonly handled: number;
}

/** Thicknesses this near are one thickness: far below any gauge, far above rounding. */
export const sameThicknessMm = 1e-9;

/** Below 0 when `a` handles fewer pieces than `b`, or as many and takes more of the first line in which they differ. */
export function fewerThenStockOrder(a: ShimChange, b: ShimChange): number {
  if (a.handled !== b.handled) return a.handled - b.handled;
  const { stockLines: ones = [] } = a;
  const { stockLines: others = [] } = b;
  for (let k = 0; k < Math.max(ones.length, others.length); k++) {
    const [one = Infinity, other = Infinity] = [ones[k], others[k]];
    if (one !== other) return one - other;
  }
  return 0;
}

/** What listing one change, and one set of pieces to take out, is worth in trials of the search. */
const trialsPerWay = 10;
const trialsPerRemoval = 4;

/**
 * The changes of one stack that lie within `from` to `to`, thinnest first, with shims cut to any whole multiple of
 * `incrementMm`: any of its pieces may come out (a pack whose pieces are not known is one piece: it stays and is added
 * to, or comes out whole), and at most one new piece goes in, cut to size: a second could be cut as one with it. So a
 * pack is thickened by one piece of the change, and thinned by fitting one piece in place of those taken out. Of ways
 * to the same thickness the one that handles fewest pieces is kept. The finished stack keeps its least and most
 * thickness and its count.
 * @throws ComputeError too_many_choices
 */
export function changesWithin(
  stack: ShimStack,
  incrementMm: number,
  from: number,
  to: number,
  budget: SearchBudget,
): ShimChange[] {
  const lowMm = Math.max(from, stack.minMm - stack.thicknessMm) - sameThicknessMm;
  const highMm = Math.min(to, stack.maxMm - stack.thicknessMm) + sameThicknessMm;
  const kept = new Map<number, ShimChange>();
  for (const { sumMm, pieces, left } of removalsFrom(stack, budget)) {
    const fewest = Math.max(0, Math.ceil((lowMm + sumMm) / incrementMm));
    const most = Math.floor((highMm + sumMm) / incrementMm);
    const ways = Math.max(0, most - fewest + 1);
    budget.spend(trialsPerWay * ways);
    // Counted by ways: beyond 2^53 adding 1 to a count would not end.
    for (let way = 0; way < ways; way++) {
      const count = fewest + way;
      if (left + (count > 0 ? 1 : 0) > stack.maxCount) continue;
      const addMm = count > 0 ? [count * incrementMm] : [];
      const handled = pieces.length + addMm.length;
      const changeMm = count * incrementMm - sumMm;
      const key = Math.round(changeMm / sameThicknessMm);
      if ((kept.get(key)?.handled ?? Infinity) > handled)
        kept.set(key, { changeMm, addMm, removeMm: pieces, handled });
    }
  }
  return [...kept.values()].sort((a, b) => a.changeMm - b.changeMm);
}

/** Pieces of the stack as it stands. */
export function piecesOf({ thicknessMm, piecesMm }: ShimStack): readonly number[] {
  return piecesMm ?? (thicknessMm > 0 ? [thicknessMm] : []);
}

interface Removal {
  readonly sumMm: number;
  readonly pieces: readonly number[];
  /** Pieces left in the stack. */
  readonly left: number;
}

/** Every thickness that can be taken out, by every number of pieces that makes it. */
function removalsFrom(stack: ShimStack, budget: SearchBudget): Iterable<Removal> {
  const all = piecesOf(stack);
  const keyOf = ({ sumMm, left }: Removal) => `${Math.round(sumMm / sameThicknessMm)} by ${left}`;
  const nothing: Removal = { sumMm: 0, pieces: [], left: all.length };
  const removals = new Map([[keyOf(nothing), nothing]]);
  for (const piece of all) {
    for (const { sumMm, pieces, left } of [...removals.values()]) {
      const removal = { sumMm: sumMm + piece, pieces: [...pieces, piece], left: left - 1 };
      if (!removals.has(keyOf(removal))) removals.set(keyOf(removal), removal);
    }
    budget.spend(trialsPerRemoval * removals.size);
  }
  return removals.values();
}
