import { Matrix, pseudoInverse } from "ml-matrix";
import type { MoveAim, ShimStack, StockItem } from "../../server/compute/moves/move-problem.ts";
import type { BrutePlace, BruteStation } from "./brute-force-shims.ts";

/** Equal stacks changed alike, each by its own sign times the change. */
export interface StockGroup {
  readonly stacks: readonly {
    readonly stack: ShimStack;
    readonly place: BrutePlace;
    readonly sign: 1 | -1;
  }[];
}

export interface StockPart {
  readonly groups: readonly StockGroup[];
  readonly stations: readonly BruteStation[];
  /** What its shims set: the rest has nothing to do. */
  readonly freedoms: readonly ("h" | "v" | "tilt-h" | "tilt-v")[];
}

export interface StockTask {
  readonly parts: readonly StockPart[];
  readonly stock: readonly StockItem[];
  readonly incrementMm: number | null;
  readonly reuse: boolean;
  readonly aim: MoveAim;
  readonly maximumMisfitMm: number;
  /** Changes up to this far from none are tried, with up to so many pieces put in. */
  readonly windowMm: number;
  readonly piecesMost: number;
}

interface Way {
  readonly changeMm: number;
  readonly handled: number;
  /** Pieces taken of each item of the stock, and those less the ones given back. */
  readonly taken: readonly number[];
  readonly net: readonly number[];
}

interface WaySet extends Pieces {
  readonly changesMm: readonly number[];
}

interface Choice extends Pieces {
  readonly cost: number;
  readonly totalMm: number;
}

type Pieces = Pick<Way, "handled" | "taken" | "net">;

export interface StockBest {
  readonly cost: number;
  readonly fewestHandled: number;
  readonly leastTotalMm: number;
  /** Pieces taken of each item by the first of the best in stock order: of the first item as many as can be, and so on. */
  readonly firstTaken: readonly number[];
  readonly choices: number;
}

const plus = (a: readonly number[], b: readonly number[]) => a.map((value, k) => value + b[k]!);

const together = (a: Pieces, b: Pieces): Pieces => ({
  handled: a.handled + b.handled,
  taken: plus(a.taken, b.taken),
  net: plus(a.net, b.net),
});

/** Above 0 when `a` takes more of the first item in which they differ. */
const order = (a: readonly number[], b: readonly number[]) =>
  a.map((count, k) => count - b[k]!).find((more) => more !== 0) ?? 0;

const same = (a: number, b: number) => Math.abs(a - b) < 1e-7;

/** Pieces of an item that there are at all, in stock and where they are used again in the stacks. */
function numberOf({ stock, reuse, parts }: StockTask, item: number): number {
  const { thicknessMm, quantity } = stock[item]!;
  if (!reuse) return quantity;
  const stacks = parts.flatMap(({ groups }) =>
    groups.flatMap((group) => group.stacks.map(({ stack }) => stack)),
  );
  const held = stacks.flatMap(
    (stack) => stack.piecesMm ?? (stack.thicknessMm > 0 ? [stack.thicknessMm] : []),
  );
  return quantity + held.filter((mm) => same(mm, thicknessMm)).length;
}

/** Every set of own pieces out, every number of each item in, one piece or none cut: by definition, without cleverness. */
export function everyStockWay(task: StockTask, stack: ShimStack): Way[] {
  const own = stack.piecesMm ?? (stack.thicknessMm > 0 ? [stack.thicknessMm] : []);
  const ways: Way[] = [];
  for (let subset = 0; subset < 2 ** own.length; subset++) {
    const out = own.filter((_, k) => (subset >> k) % 2 === 1);
    const outMm = out.reduce((sum, mm) => sum + mm, 0);
    const given = task.stock.map(({ thicknessMm }) =>
      task.reuse ? out.filter((mm) => same(mm, thicknessMm)).length : 0,
    );
    const put = (item: number, counts: readonly number[], inMm: number, pieces: number): void => {
      if (inMm - outMm > task.windowMm + 1e-9 || pieces > task.piecesMost) return;
      if (item < task.stock.length) {
        const { thicknessMm } = task.stock[item]!;
        const most = Math.min(task.piecesMost - pieces, numberOf(task, item));
        for (let count = 0; count <= most; count++) {
          put(item + 1, [...counts, count], inMm + count * thicknessMm, pieces + count);
        }
        return;
      }
      const cutMost =
        task.incrementMm === null ? 0 : Math.floor((task.windowMm + outMm - inMm) / task.incrementMm + 1e-9);
      for (let cut = 0; cut <= cutMost; cut++) {
        const changeMm = inMm + cut * (task.incrementMm ?? 0) - outMm;
        const added = pieces + (cut > 0 ? 1 : 0);
        const toMm = stack.thicknessMm + changeMm;
        if (Math.abs(changeMm) > task.windowMm + 1e-9 || own.length - out.length + added > stack.maxCount)
          continue;
        if (toMm < stack.minMm - 1e-9 || toMm > stack.maxMm + 1e-9) continue;
        ways.push({
          changeMm,
          handled: out.length + added,
          taken: counts,
          net: counts.map((count, k) => count - given[k]!),
        });
      }
    };
    put(0, [], 0, 0);
  }
  return ways;
}

/** Changed alike: to changes of which each is the nearest that the other stack can have; by equal stacks, the very same. */
function waysOfGroup(task: StockTask, { stacks }: StockGroup): WaySet[] {
  const [first = [], second] = stacks.map(({ stack, sign }) =>
    everyStockWay(task, stack).map((way) => ({ ...way, changeMm: way.changeMm * sign })),
  );
  const isNearest = (ways: readonly Way[], from: number, at: number) =>
    ways.every(({ changeMm }) => Math.abs(changeMm - from) >= Math.abs(at - from) - 1e-9);
  const all: WaySet[] = !second
    ? first.map((way) => ({ ...way, changesMm: [way.changeMm] }))
    : first.flatMap((one) =>
        second
          .filter(
            (other) =>
              isNearest(second, one.changeMm, other.changeMm) &&
              isNearest(first, other.changeMm, one.changeMm),
          )
          .map((other) => ({
            changesMm: [one.changeMm, other.changeMm],
            ...together(one, other),
          })),
      );
  const fewest = new Map<string, WaySet>();
  for (const way of all) {
    const key = `${way.changesMm.map((mm) => Math.round(mm * 1e7)).join(" ")} ${way.net.join(" ")}`;
    const known = fewest.get(key);
    const less = known ? way.handled - known.handled || order(known.taken, way.taken) : -1;
    if (less < 0) fewest.set(key, way);
  }
  return [...fewest.values()];
}

function nothingOf({ stock }: StockTask): Pieces {
  const none = stock.map(() => 0);
  return { handled: 0, taken: none, net: none };
}

function choicesOf(task: StockTask, part: StockPart): Choice[] {
  const rowAt = ({ zMm, h, v }: BrutePlace) =>
    part.freedoms.map((freedom) => ({ h, v, "tilt-h": h * zMm, "tilt-v": v * zMm })[freedom]);
  const times = (row: readonly number[], x: readonly number[]) =>
    row.reduce((sum, value, k) => sum + value * x[k]!, 0);
  const places = part.groups.flatMap(({ stacks }) => stacks);
  const rows = places.map(({ place }) => rowAt(place));
  const fit = pseudoInverse(new Matrix(rows)).to2DArray();
  const waysOf = part.groups.map((group) => waysOfGroup(task, group));
  const found: Choice[] = [];
  const chosen: WaySet[] = [];
  const choose = (g: number): void => {
    if (g < part.groups.length) {
      for (const way of waysOf[g]!) {
        chosen[g] = way;
        choose(g + 1);
      }
      return;
    }
    const changes = part.groups.flatMap(({ stacks }, k) =>
      stacks.map(({ sign }, at) => sign * chosen[k]!.changesMm[at]!),
    );
    const amounts = fit.map((row) => times(row, changes));
    if (rows.some((row, j) => Math.abs(times(row, amounts) - changes[j]!) > task.maximumMisfitMm + 1e-9))
      return;
    const ratios = part.stations.map(({ zMm, hMm, vMm, toleranceMm }) => {
      const h = hMm + times(rowAt({ zMm, h: 1, v: 0 }), amounts);
      const v = vMm + times(rowAt({ zMm, h: 0, v: 1 }), amounts);
      return Math.hypot(h, v) / toleranceMm;
    });
    found.push({
      cost: task.aim === "minimax" ? Math.max(...ratios) : ratios.reduce((sum, ratio) => sum + ratio ** 2, 0),
      totalMm: changes.reduce((sum, mm) => sum + Math.abs(mm), 0),
      ...chosen.slice(0, part.groups.length).reduce<Pieces>(together, nothingOf(task)),
    });
  };
  choose(0);
  const best = new Map<string, Choice>();
  for (const one of found) {
    const key = one.net.join(" ");
    const known = best.get(key) ?? { ...one, cost: Infinity };
    if (one.cost < known.cost - 1e-12) best.set(key, one);
  }
  // A choice dearer than another with the same pieces can still be part of an equal sum: only clearly dearer ones go.
  return found.filter((one) => one.cost <= best.get(one.net.join(" "))!.cost + 1e-6);
}

/** Every choice of every part together, the parts in the order in which they take from stock. */
export function bruteForceStock(task: StockTask): StockBest | null {
  const ofPart = task.parts.map((part) => choicesOf(task, part));
  let all: (Pieces & { costs: readonly number[]; totalMm: number })[] = [
    { costs: [], totalMm: 0, ...nothingOf(task) },
  ];
  for (const choices of ofPart) {
    all = all.flatMap((before) =>
      choices.flatMap((one) => {
        const sum = together(before, one);
        if (sum.net.some((count, k) => count > task.stock[k]!.quantity)) return [];
        return [{ ...sum, costs: [...before.costs, one.cost], totalMm: before.totalMm + one.totalMm }];
      }),
    );
  }
  if (all.length === 0) return null;
  const sumOf = (costs: readonly number[]) => costs.reduce((sum, cost) => sum + cost, 0);
  const equal = (cost: number, least: number) => cost <= least + 1e-9 * (1 + least);
  let left = all;
  if (task.aim === "minimax") {
    const largest = left.reduce((least, { costs }) => Math.min(least, Math.max(...costs)), Infinity);
    left = left.filter(({ costs }) => equal(Math.max(...costs), largest));
  }
  const cost = left.reduce((least, { costs }) => Math.min(least, sumOf(costs)), Infinity);
  left = left.filter(({ costs }) => equal(sumOf(costs), cost));
  const fewestHandled = Math.min(...left.map(({ handled }) => handled));
  left = left.filter(({ handled }) => handled === fewestHandled);
  const leastTotalMm = Math.min(...left.map(({ totalMm }) => totalMm));
  left = left.filter(({ totalMm }) => same(totalMm, leastTotalMm));
  const firstTaken = left.map(({ taken }) => taken).reduce((a, b) => (order(b, a) > 0 ? b : a));
  return { cost, fewestHandled, leastTotalMm, firstTaken, choices: all.length };
}
