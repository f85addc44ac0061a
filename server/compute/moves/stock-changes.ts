import type { ShimStack } from "./move-problem.ts";
import type { SearchBudget } from "./search-budget.ts";
import { fewerThenStockOrder, piecesOf, sameThicknessMm, type ShimChange } from "./shim-changes.ts";
import type { ChangeWays, ShimSupply } from "./shim-supply.ts";
import { piecesOfEntry } from "./stock-sums.ts";

interface Taken {
  readonly mm: number;
  readonly lines: readonly number[];
}

interface Removal {
  readonly sumMm: number;
  readonly pieces: readonly number[];
  readonly left: number;
}

/** What listing one way is worth in trials of the search, and comparing it with so many others. */
const trialsPerWay = 2;
const comparedPerTrial = 20;

/**
 * The changes of one stack within `from` to `to`, thinnest first, with pieces from stock, and one cut to size if they are
 * cut: any of its own pieces may come out. For each change the way that handles fewest pieces, and of equally few the one
 * first in stock order, for every number of pieces that it takes of the lines that are counted. A way is left out only
 * where another takes no more of any counted line and handles fewer, or as many and stands no later in stock order:
 * whatever the other stacks do, that other one does as well.
 * @throws ComputeError too_many_choices
 */
export function stockChangesWithin(
  supply: ShimSupply,
  stack: ShimStack,
  from: number,
  to: number,
  budget: SearchBudget,
): ChangeWays[] {
  const lowMm = Math.max(from, stack.minMm - stack.thicknessMm);
  const highMm = Math.min(to, stack.maxMm - stack.thicknessMm);
  if (!(lowMm <= highMm + 2 * sameThicknessMm)) return [];
  const removals = removalsFrom(supply, stack, budget);
  const thickestMm = Math.max(...removals.map(({ sumMm }) => sumMm)) + highMm;
  const sums = supply.sumsUpTo(Math.max(0, thickestMm), budget);
  const counted = takingsOf(supply, Math.max(0, thickestMm), stack.maxCount, budget);
  const kept = new Map<number, Map<string, ShimChange>>();
  for (const { sumMm, pieces, left } of removals) {
    for (const taken of counted) {
      const leastMm = lowMm + sumMm - taken.mm;
      const mostMm = highMm + sumMm - taken.mm;
      if (mostMm < -sameThicknessMm) continue;
      // Pieces beside those taken are of lines that are not counted.
      const use = supply.countedOf([{ stockLines: taken.lines, removeMm: pieces }]).join(" ");
      for (const { sumMm: besideMm, entry } of sums.within(leastMm, mostMm, budget)) {
        if (left + taken.lines.length + entry.pieces > stack.maxCount) continue;
        budget.spend(trialsPerWay);
        const ways = ensure(kept, Math.round((taken.mm + besideMm - sumMm) / sameThicknessMm));
        const handled = pieces.length + taken.lines.length + entry.pieces;
        const known = ways.get(use);
        if (known && known.handled < handled) continue;
        const made = piecesOfEntry(entry);
        const stockLines = [...taken.lines, ...made.lines].sort((a, b) => a - b);
        const addMm = stockLines.map((line) => supply.lines[line]?.thicknessMm ?? 0);
        if (made.cutMm > 0) addMm.push(made.cutMm);
        const changeMm = addMm.reduce((sum, mm) => sum + mm, 0) - sumMm;
        const way = { changeMm, addMm, removeMm: pieces, handled, stockLines };
        if (!known || fewerThenStockOrder(way, known) < 0) ways.set(use, way);
      }
    }
  }
  return [...kept.values()]
    .map((ways) => undominated(supply, [...ways.values()], budget))
    .map((ways) => ({ changeMm: ways[0]?.changeMm ?? 0, ways }))
    .sort((a, b) => a.changeMm - b.changeMm);
}

function ensure(kept: Map<number, Map<string, ShimChange>>, key: number): Map<string, ShimChange> {
  const known = kept.get(key) ?? new Map<string, ShimChange>();
  kept.set(key, known);
  return known;
}

/** Fewest pieces first, then in stock order; none that one before it makes with no more of any counted line. */
function undominated(supply: ShimSupply, ways: readonly ShimChange[], budget: SearchBudget): ShimChange[] {
  if (ways.length < 2) return [...ways];
  const inOrder = ways
    .map((way) => ({ way, use: supply.countedOf([way]) }))
    .sort((a, b) => fewerThenStockOrder(a.way, b.way));
  const kept: typeof inOrder = [];
  for (const each of inOrder) {
    budget.spend(kept.length / comparedPerTrial);
    if (!kept.some(({ use }) => use.every((count, k) => count <= (each.use[k] ?? 0)))) kept.push(each);
  }
  return kept.map(({ way }) => way);
}

/** Every choice of pieces of counted lines for one stack, up to `mostMm` together. */
function takingsOf(supply: ShimSupply, mostMm: number, maxCount: number, budget: SearchBudget): Taken[] {
  let takings: Taken[] = [{ mm: 0, lines: [] }];
  for (const line of supply.counted) {
    const { thicknessMm } = supply.lines[line] ?? { thicknessMm: Infinity };
    const most = supply.mostFor(line);
    takings = takings.flatMap((before) => {
      const made: Taken[] = [];
      for (let count = 0; count <= most && before.lines.length + count <= maxCount; count++) {
        const mm = before.mm + count * thicknessMm;
        if (mm > mostMm + sameThicknessMm) break;
        made.push({ mm, lines: [...before.lines, ...new Array<number>(count).fill(line)] });
      }
      budget.spend(made.length);
      return made;
    });
  }
  return takings;
}

/** Every thickness that can be taken out, by every number of pieces, and of counted ones, that makes it. */
function removalsFrom(supply: ShimSupply, stack: ShimStack, budget: SearchBudget): Removal[] {
  const all = piecesOf(stack);
  const keyOf = ({ sumMm, pieces, left }: Removal) => {
    const given = supply.reuse
      ? supply.counted.map((line) => pieces.filter((mm) => supply.lineOf(mm) === line).length)
      : [];
    return `${Math.round(sumMm / sameThicknessMm)} by ${left} ${given.join(" ")}`;
  };
  const nothing: Removal = { sumMm: 0, pieces: [], left: all.length };
  const removals = new Map([[keyOf(nothing), nothing]]);
  for (const piece of all) {
    for (const { sumMm, pieces, left } of [...removals.values()]) {
      const removal = { sumMm: sumMm + piece, pieces: [...pieces, piece], left: left - 1 };
      if (!removals.has(keyOf(removal))) removals.set(keyOf(removal), removal);
    }
    budget.spend(4 * removals.size);
  }
  return [...removals.values()];
}
